using EvapMonitor.Core.Plant;
using EvapMonitor.Service.PlantFile;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Tests.Ingest;

/// <summary>An invented line of two effects with a handful of signals.</summary>
internal static class IngestPlant
{
    public const string Text = """
        site: Lyngdal
        time-zone: UTC
        atmosphere: 1013 mbar
        history-from: 2026-01-01
        lines:
          one:
            liquor: water
            feed:
              flow: {signal: F.1, unit: t/h, accuracy: 1 %}
              temperature: {signal: T.1, unit: degC, accuracy: 0.5 abs}
            steam:
              flow: {signal: F.2, unit: t/h, accuracy: 1 %}
              pressure: {signal: P.2, unit: bar, accuracy: 0.01 abs, at: chest}
            effects:
            - name: E1
              heating: steam
              liquor: feed
              area: 610 m2
              vapour: {pressure: {signal: P.1, unit: bar, accuracy: 0.01 abs}}
        """;

    public static readonly string[] Signals = ["F.1", "T.1", "F.2", "P.2", "P.1"];

    /// <summary>The plant as accepted, for parts that need no database.</summary>
    public static PlantHolder Holder()
    {
        PlantFileResult read = PlantFileReader.Read(Text);
        Site site = Assert.IsType<Site>(read.Site);
        var signals = Signals.Select((name, i) => (name, new SignalPlace(i + 1, 1, [1]))).ToDictionary(pair => pair.name, pair => pair.Item2);
        var plant = new PlantInForce(1, default, site.HistoryFrom, "test", Text, site, [], signals);
        return new PlantHolder(TimeProvider.System) { Timeline = new PlantTimeline([plant], signals.Select(pair => (pair.Key, pair.Value.SignalId, pair.Value.HomeLineId)), 1) };
    }
}
