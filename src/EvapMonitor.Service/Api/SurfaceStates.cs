using System.Collections.Concurrent;
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
        return new CleanInTime(effect, surfaces.Surfaces, surfaces.Version == 0 ? [] : trends.Stretches(lineId, effectId, from, to));
    }
}
