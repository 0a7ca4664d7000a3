using EvapMonitor.Core.Coefficients;

namespace EvapMonitor.Core.Fouling;

/// <summary>The clean expectations of an effect over a span: which surface served when, with which product, in which campaign.</summary>
/// <param name="Effect">Name of the effect.</param>
/// <param name="Surfaces">The surfaces of its line.</param>
/// <param name="Stretches">What it did in the span, ascending.</param>
public sealed record CleanInTime(string Effect, IReadOnlyList<Surface> Surfaces, IReadOnlyList<EffectStretch> Stretches)
{
    private int _last;

    /// <summary>The surface that served at an instant, and its clean expectation then; null without.</summary>
    public (Surface Surface, CleanReference? Reference)? At(long instant)
    {
        if (StretchAt(instant) is not { } stretch || stretch.SurfaceIn(Effect) is not { } name || Surfaces.FirstOrDefault(one => one.Name == name) is not { } surface) return null;
        int campaign = -1;
        for (int i = 0; i < surface.History.Campaigns.Count && surface.History.Campaigns[i].Start <= instant; i++) campaign = i;
        // An hour within a cleaning still belongs to the campaign that it ended.
        return (surface, surface.History.References.LastOrDefault(one =>
            one.Campaign == int.Max(campaign, 0) && one.Effect == Effect && one.Product == (stretch.Product ?? "") && (one.From <= instant || campaign < 0)));
    }

    /// <summary>Holds a window against what the surface would do if clean.</summary>
    public CleanComparisonResult Compare(EffectWindow window) => At(window.At) is (_, { } reference)
        ? reference.Compare(window.Coefficient, SurfaceConditions.Of(window.Solids, window.BoilingTemperature.Value, window.Coefficient.Value * window.DrivingForce.Value))
        : CleanComparisonResult.Absent;

    private EffectStretch? StretchAt(long instant)
    {
        // Asked in order of time, mostly.
        if (_last >= Stretches.Count || Stretches[_last].Start > instant) _last = 0;
        while (_last < Stretches.Count && Stretches[_last].End <= instant) _last++;
        return _last < Stretches.Count && Stretches[_last].Start <= instant ? Stretches[_last] : null;
    }
}
