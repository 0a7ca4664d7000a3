namespace EvapMonitor.Service.Tests.Support;

/// <summary>An invented line of one effect with four signals: enough for everything that does not ask for a real line's numbers.</summary>
internal static class SmallPlant
{
    /// <summary>The service's present in tests with this plant.</summary>
    public static readonly DateTimeOffset Now = new(2026, 4, 20, 12, 0, 0, TimeSpan.Zero);

    public const string Text = """
        site: Lyngdal
        time-zone: Europe/Copenhagen
        atmosphere: 1013 mbar
        history-from: 2025-09-01
        lines:
          one:
            liquor: water
            feed:
              flow: {signal: FT-1, unit: t/h, accuracy: 1 %}
              temperature: {signal: TT-1, unit: degC}
            steam:
              flow: {signal: FT-2, unit: t/h, accuracy: 1 %}
              pressure: {signal: PT-2, unit: bar, accuracy: 0.01 abs, at: chest}
            effects:
              - name: E1
                heating: steam
                liquor: feed
                area: 100 m2
                clean-coefficient: 2000 W/(m2.K)
                vapour: {pressure: {signal: PT-1, unit: bar, accuracy: 0.005 abs}}
                due-when: {hours-since-cleaning: 100}
        """;
}
