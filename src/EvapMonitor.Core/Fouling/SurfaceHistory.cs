namespace EvapMonitor.Core.Fouling;

/// <summary>What the hours of a surface tell: its campaigns, cleanings and stops, and how clean it was in every hour of production.</summary>
/// <param name="Campaigns">In order of time, without overlap; the last may be open.</param>
/// <param name="Cleanings">In order of time.</param>
/// <param name="Stops">Times out of production after which nothing was recovered, in order of time.</param>
/// <param name="Hours">One for each producing hour, in order of time.</param>
/// <param name="References">The clean expectations that the hours were held against.</param>
/// <param name="WaterTests">Runs on water, in order of time.</param>
public sealed record SurfaceHistory(
    IReadOnlyList<Campaign> Campaigns, IReadOnlyList<SurfaceCleaning> Cleanings, IReadOnlyList<SurfaceStop> Stops,
    IReadOnlyList<CleanHour> Hours, IReadOnlyList<CleanReference> References, IReadOnlyList<WaterTest> WaterTests)
{
    /// <summary>Computes the history. A pure function: the same hours give the same bits; what it says of a campaign rests on nothing after that campaign.</summary>
    /// <param name="settings">What is known beforehand.</param>
    /// <param name="producing">Hours in production, ascending, at most one for each hour.</param>
    /// <param name="water">Hours on water, ascending.</param>
    /// <param name="spans">Times out of production, in any order; they may overlap.</param>
    /// <param name="events">What people logged, in any order.</param>
    /// <exception cref="ArgumentException">Hours do not ascend, or a coefficient is not above 0.</exception>
    public static SurfaceHistory Of(
        SurfaceSettings settings, IReadOnlyList<SurfaceHour> producing, IReadOnlyList<SurfaceHour> water,
        IReadOnlyList<SurfaceSpan> spans, IReadOnlyList<SurfaceEvent> events) =>
        new CampaignWalk(settings, producing, spans, events).Run(WaterRuns.TestsOf(water, CampaignWalk.Recalibrations(events)));
}
