using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Wording;

namespace EvapMonitor.Service.PlantFile;

/// <summary>Which instrument uses which signal. One signal may serve at several places, but it arrives in one unit.</summary>
internal sealed class SignalUse(Findings findings)
{
    private readonly Dictionary<string, (PlantNode Node, Instrument Instrument)> _first = new(StringComparer.Ordinal);
    private readonly List<(PlantNode Node, Instrument Instrument)> _gauges = [];

    /// <summary>The first instrument that reads against the atmosphere, and where; null when there is none.</summary>
    public (PlantNode Node, Instrument Instrument)? FirstGauge => _gauges.Count == 0 ? null : _gauges[0];

    public void Add(PlantNode node, Instrument instrument)
    {
        if (instrument.Unit.Reference != PressureReference.Absolute) _gauges.Add((node, instrument));
        if (_first.TryAdd(instrument.Signal, (node, instrument))) return;
        (PlantNode firstNode, Instrument first) = _first[instrument.Signal];
        if (SameUnit(first.Unit, instrument.Unit)) return;
        findings.Wrong(
            node,
            $"{Shown.Quoted(instrument.Signal)} in {Words(instrument.Unit)}",
            Invariant($"the unit of the same signal in line {firstNode.Line}: {Words(first.Unit)}"));
    }

    private static bool SameUnit(UnitOfMeasure one, UnitOfMeasure other) =>
        one.Dimension == other.Dimension && one.Factor == other.Factor && one.Offset == other.Offset && one.Reference == other.Reference;

    private static string Words(UnitOfMeasure unit) => unit.Written.Length == 0 ? "a bare number" : unit.Written;
}
