using System.Collections.Concurrent;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Api;

/// <summary>The surfaces of each line as last computed. Kept until they change.</summary>
public sealed class SurfaceStates(SurfaceStore store, TrendStore trends)
{
    private readonly ConcurrentDictionary<int, StoredSurfaces> _known = new();

    /// <summary>The surfaces of a line.</summary>
    public async Task<StoredSurfaces> OfAsync(int lineId, CancellationToken stop)
    {
        if (_known.TryGetValue(lineId, out StoredSurfaces? known) && known.Version == await store.VersionAsync(lineId, stop)) return known;
        return _known[lineId] = await store.ReadAsync(lineId, stop);
    }

    /// <summary>What an effect would do if clean, over a span.</summary>
    /// <param name="lineId">The line.</param>
    /// <param name="effectId">The effect.</param>
    /// <param name="effect">Its name.</param>
    /// <param name="from">Begin of the span.</param>
    /// <param name="to">Its end.</param>
    /// <param name="stop">Cancels.</param>
    public async Task<CleanInTime> CleanAsync(int lineId, int effectId, string effect, DateTimeOffset from, DateTimeOffset to, CancellationToken stop)
    {
        StoredSurfaces surfaces = await OfAsync(lineId, stop);
        return new CleanInTime(effect, surfaces, surfaces.Version == 0 ? [] : trends.Stretches(lineId, effectId, from, to));
    }
}

/// <summary>The clean expectations of an effect over a span: which surface served when, with which product, in which campaign.</summary>
/// <param name="Effect">Name of the effect.</param>
/// <param name="Surfaces">The surfaces of its line.</param>
/// <param name="Stretches">What it did in the span, ascending.</param>
public sealed record CleanInTime(string Effect, StoredSurfaces Surfaces, IReadOnlyList<EffectStretch> Stretches)
{
    private int _last;

    /// <summary>The surface that served at an instant, and its clean expectation then; null without.</summary>
    public (Surface Surface, CleanReference? Reference)? At(long instant)
    {
        if (StretchAt(instant) is not { } stretch || stretch.SurfaceIn(Effect) is not { } name || Surfaces.Find(name) is not { } surface) return null;
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
