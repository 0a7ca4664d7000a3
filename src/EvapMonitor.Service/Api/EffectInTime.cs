using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Api;

/// <summary>An effect as the plant revisions had it over time: a rebuilt surface is compared with its own clean coefficient.</summary>
internal sealed class EffectInTime
{
    private readonly (long From, Effect Effect, CleanExpectation? Clean)[] _eras;

    /// <summary>An effect under the revisions given, in order of time; where one does not have it, as it is now.</summary>
    public EffectInTime(IReadOnlyList<PlantInForce> eras, LinePlace line, Effect now, int effectId)
    {
        (Now, EffectId, LongestWindow) = (now, effectId, eras.Max(era => era.Site.Window));
        _eras = [.. eras.Select(era =>
        {
            Effect then = Of(era, line.LineId, effectId) ?? now;
            return (PlantTimeline.Midnight(PlantTimeline.FirstDay(era.InForceFrom)).ToUnixTimeMilliseconds(), then, CleanExpectation.Design(then));
        })];
    }

    /// <summary>The effect now.</summary>
    public Effect Now { get; }

    /// <summary>Its key.</summary>
    public int EffectId { get; }

    /// <summary>The longest window of the revisions.</summary>
    public TimeSpan LongestWindow { get; }

    /// <summary>The effect at an instant, and what it does when clean.</summary>
    public (Effect Effect, CleanExpectation? Clean) At(long instant)
    {
        int era = _eras.Length - 1;
        while (era > 0 && _eras[era].From > instant) era--;
        return (_eras[era].Effect, _eras[era].Clean);
    }

    private static Effect? Of(PlantInForce era, int lineId, int effectId)
    {
        return era.Lines.FirstOrDefault(place => place.LineId == lineId)?.Find(effectId);
    }
}
