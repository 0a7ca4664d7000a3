using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Service.PlantFile;

/// <summary>The root of the plant file.</summary>
internal sealed class SiteReader
{
    private const int MostLines = 100;
    private const double StandardAtmosphere = 101_325;
    private readonly Findings _findings;
    private readonly SignalUse _signals;
    private readonly InstrumentReader _instruments;

    public SiteReader(Findings findings)
    {
        _findings = findings;
        _signals = new(findings);
        _instruments = new(findings, _signals);
    }

    /// <summary>The site; it counts only when there is no finding.</summary>
    public Site? Read(PlantNode root)
    {
        if (MappingReader.Open(root, PlantFileKeys.Site, _findings) is not { } mapping) return null;
        string? name = Texts.Text(mapping.Require("site", "the site's name"), "the site's name, at most 200 letters", _findings);
        string? zone = Calendar.TimeZone(mapping.Require("time-zone", Calendar.ZoneAllowed), _findings);
        DateTimeOffset? from = Calendar.Start(mapping.Require("history-from", Calendar.StartAllowed), zone, _findings);
        FixedOrMeasured? atmosphere = Atmosphere(mapping.Take("atmosphere"));
        Dictionary<string, Liquor> liquors = LiquorReader.Read(mapping.Take("liquors"), _findings, out IReadOnlySet<string> liquorNames);
        IReadOnlyList<Line> lines = Lines(mapping.Require("lines", "a mapping from each line's name to its members"), liquors, liquorNames);
        CleaningRules? rules = new CleaningReader(_findings, _instruments).Rules(mapping.Take("cleaning-rules"), lines);
        if (mapping.Take("atmosphere") is null && _signals.FirstGauge is { } gauge)
        {
            _findings.Missing(mapping.Node, "atmosphere", Invariant(
                $"{Units.Allowed(Dimension.Pressure)} or an instrument: {gauge.Instrument.Signal} in line {gauge.Node.Line} reads against the atmosphere"));
        }

        var site = new Site
        {
            Name = name ?? "",
            TimeZone = zone ?? "",
            Atmosphere = atmosphere ?? new(StandardAtmosphere, null),
            HistoryFrom = from ?? default,
            Lines = lines,
            CleaningRules = rules,
        };
        return Calendar.Window(mapping.Take("window"), _findings) is { } window ? site with { Window = window } : site;
    }

    private FixedOrMeasured? Atmosphere(PlantNode? node)
    {
        if (node is MappingNode)
        {
            Instrument? instrument = _instruments.Read(node, Dimension.Pressure);
            if (instrument is { Unit.Reference: not PressureReference.Absolute })
                _findings.Wrong(node, $"the atmosphere in {instrument.Unit.Written}", "an absolute pressure, such as unit: mbar");
            return instrument is null ? null : new(null, instrument);
        }

        if (node is ScalarNode scalar && Quantities.TrySplit(scalar.Text, out _, out string written)
            && Units.Find(written) is { Reference: not PressureReference.Absolute })
            _findings.Wrong(node, "an absolute pressure such as 1008 mbar, from 500 to 1100 mbar, or an instrument {signal: …, unit: mbar}");
        double? pascals = Quantities.Read(
            node, Dimension.Pressure, p => p is >= 50_000 and <= 110_000, "from 500 to 1100 mbar, or an instrument {signal: …, unit: mbar}",
            _findings);
        return pascals is null ? null : new(pascals, null);
    }

    private IReadOnlyList<Line> Lines(PlantNode? node, Dictionary<string, Liquor> liquors, IReadOnlySet<string> liquorNames)
    {
        IReadOnlyList<(string Name, PlantNode Key, PlantNode Value)> named = MappingReader.Named(node, "each line's name", _findings);
        if (named.Count > MostLines)
        {
            _findings.Wrong(node!, Invariant($"{named.Count} lines"), Invariant($"at most {MostLines} lines"));
            return [];
        }

        var reader = new LineReader(_findings, _instruments, liquors, liquorNames);
        List<(Line? Line, PlantNode Key, PlantNode Value)> lines = [.. named.Select(n => (reader.Read(n.Name, n.Value), n.Key, n.Value))];
        LineChecks.NamesOnce(
            lines.Where(l => l.Line is not null).Select(l => (l.Line!.Name, l.Key, l.Line.Formerly, (l.Value as MappingNode)?.Find("formerly"))), _findings);
        return [.. lines.Select(l => l.Line).OfType<Line>()];
    }
}
