using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Evaluation;

/// <summary>Collects, while the windows of a line pass by, what its surfaces are computed from, and the little of each window that is then held against them.</summary>
/// <param name="line">The line.</param>
/// <param name="step">Length of a window, ms.</param>
internal sealed class LineHours(Line line, long step)
{
    private readonly List<EffectHour>[] _hours = [.. line.Effects.Select(_ => new List<EffectHour>())];
    private readonly List<EffectStretch>[] _stretches = [.. line.Effects.Select(_ => new List<EffectStretch>())];
    private readonly List<(long At, Measured Coefficient, double Solids, double Boiling, double Flux)> _windows = [];

    /// <summary>Adds the windows of a day.</summary>
    public void Add(IReadOnlyList<LineWindow> windows)
    {
        for (int i = 0; i < _hours.Length; i++)
        {
            EffectWindow[] its = [.. windows.Select(window => window.Effects[i])];
            _hours[i].AddRange(EffectHour.Summarise(its));
            _stretches[i].AddRange(EffectStretch.Of(its, step));
        }

        foreach (EffectWindow window in windows.SelectMany(window => window.Effects))
            _windows.Add((window.At, window.Coefficient, window.Solids, window.BoilingTemperature.Value, window.Coefficient.Value * window.DrivingForce.Value));
    }

    /// <summary>The records of the effects, with what was logged.</summary>
    public IReadOnlyList<EffectRecord> Records(IReadOnlyList<LoggedEvent> events) => [.. line.Effects.Select((effect, i) => new EffectRecord(
        effect, _hours[i], _stretches[i],
        [.. events.Where(one => one.Line == line.Name && one.Effect == effect.Name && one.Kind is EventFile.Cleaning or EventFile.RejectedCleaning)
            .Select(one => new EffectCleaning(one.Start, one.End ?? long.MaxValue, one.Note, null, one.Kind == EventFile.RejectedCleaning, null))],
        [.. events.Where(one => one.Line == line.Name && one.Kind == InstrumentLogStore.Recalibrated && SurfaceInputs.Behind(line, effect).Contains(one.Signal!)).Select(one => one.Start).Order()]))];

    /// <summary>The windows held against their surfaces, in the order in which they came: by window, then effect.</summary>
    public IEnumerable<CleanComparisonResult> Compare(IReadOnlyList<Surface> surfaces)
    {
        CleanInTime[] clean = [.. line.Effects.Select((effect, i) => new CleanInTime(effect.Name, surfaces, _stretches[i]))];
        for (int k = 0; k < _windows.Count; k++)
        {
            (long at, Measured coefficient, double solids, double boiling, double flux) = _windows[k];
            yield return clean[k % clean.Length].At(at) is (_, { } reference) ? reference.Compare(coefficient, SurfaceConditions.Of(solids, boiling, flux)) : CleanComparisonResult.Absent;
        }
    }
}
