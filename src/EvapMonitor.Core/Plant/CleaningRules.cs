namespace EvapMonitor.Core.Plant;

/// <summary>What the plant allows when cleanings are planned.</summary>
/// <param name="AtOnce">How many cleanings may run at the same time; null: no limit is set.</param>
/// <param name="Allowed">Hours in which a cleaning may run; empty: any.</param>
/// <param name="NotTogether">Sets of effects of which at most one is cleaned at a time.</param>
public sealed record CleaningRules(
    int? AtOnce, IReadOnlyList<AllowedHours> Allowed, IReadOnlyList<IReadOnlyList<EffectOfLine>> NotTogether);

/// <summary>Hours of the week in local time of the site.</summary>
/// <param name="Days">The days on which they begin.</param>
/// <param name="From">Begin, since local midnight; 0 to under 24 h.</param>
/// <param name="To">End, since local midnight, at most 24 h; less than <paramref name="From"/> means on the next day.</param>
public sealed record AllowedHours(IReadOnlyList<DayOfWeek> Days, TimeSpan From, TimeSpan To);

/// <summary>An effect named together with its line.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="Effect">Name of the effect.</param>
public sealed record EffectOfLine(string Line, string Effect);
