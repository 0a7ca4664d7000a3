using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Advice;

/// <summary>Limits that can make a cleaning due.</summary>
public enum DueLimit
{
    /// <summary>Floor of the apparent coefficient.</summary>
    Coefficient,
    /// <summary>Floor of the cleanliness against the clean value.</summary>
    Cleanliness,
    /// <summary>Hours since the last cleaning.</summary>
    Hours,
}

/// <summary>Whether a cleaning is due.</summary>
public enum DueState
{
    /// <summary>The plant file sets no limit.</summary>
    NoLimit,
    /// <summary>There is a limit, and nothing to hold against it.</summary>
    Unknown,
    /// <summary>No limit is reached.</summary>
    NotDue,
    /// <summary>A limit is reached.</summary>
    Due,
}

/// <summary>One limit with what was held against it.</summary>
/// <param name="Limit">Which limit.</param>
/// <param name="State">Whether it is reached.</param>
/// <param name="Value">The present value: W/(m²·K), a share, or hours; NaN when unknown.</param>
/// <param name="Bound">The limit in the same unit.</param>
/// <param name="Since">Since when it is reached, ms since 1970-01-01T00:00:00Z; null when it is not.</param>
public sealed record DueEvidence(DueLimit Limit, DueState State, double Value, double Bound, long? Since);

/// <summary>Whether a cleaning of an effect is due, by which limit, since when.</summary>
/// <param name="State">The verdict.</param>
/// <param name="Binding">The limit that was reached first; the first known one when none is reached; null without limits.</param>
/// <param name="Evidence">All limits that the plant file sets.</param>
public sealed record DueVerdict(DueState State, DueEvidence? Binding, IReadOnlyList<DueEvidence> Evidence);

/// <summary>
/// Flags a due cleaning. A coefficient or cleanliness must be under its limit for <see cref="Delay"/> hours of production before the flag rises and above
/// the limit by <see cref="DeadBand"/> for as long before it falls, so that noise at the limit does not make it chatter. A cleaning takes it down at once.
/// </summary>
public static class CleaningDue
{
    /// <summary>Hours of production in a row that raise or lower the flag.</summary>
    public const int Delay = 4;

    /// <summary>Share of the limit by which it must be exceeded to lower the flag.</summary>
    public const double DeadBand = 0.02;

    /// <summary>A last result older than this, ms, is no present state.</summary>
    public const long StaleAfter = 3 * Milliseconds.Day;

    /// <summary>Judges one effect.</summary>
    /// <param name="limits">Its limits.</param>
    /// <param name="hours">Median coefficient by hour of production since the last cleaning, ascending: start of the hour in ms, W/(m²·K).</param>
    /// <param name="cleanliness">Cleanliness in the same way; empty when unknown.</param>
    /// <param name="lastCleaningEnd">End of the last cleaning; null when none is logged.</param>
    /// <param name="now">The instant for which the verdict holds.</param>
    public static DueVerdict Judge(
        DueLimits? limits, IReadOnlyList<(long Hour, double Value)> hours, IReadOnlyList<(long Hour, double Value)> cleanliness, long? lastCleaningEnd, long now)
    {
        var evidence = new List<DueEvidence>();
        if (limits?.CoefficientBelow is { } floor) evidence.Add(Under(DueLimit.Coefficient, hours, floor, now));
        if (limits?.CleanlinessBelow is { } share) evidence.Add(Under(DueLimit.Cleanliness, cleanliness, share, now));
        if (limits?.HoursSinceCleaning is { } longest) evidence.Add(Since(longest, lastCleaningEnd, now));
        if (evidence.Count == 0) return new DueVerdict(DueState.NoLimit, null, evidence);
        DueEvidence? first = evidence.Where(one => one.State == DueState.Due).MinBy(one => one.Since);
        if (first is not null) return new DueVerdict(DueState.Due, first, evidence);
        first = evidence.FirstOrDefault(one => one.State == DueState.NotDue);
        return new DueVerdict(first is null ? DueState.Unknown : DueState.NotDue, first ?? evidence[0], evidence);
    }

    private static DueEvidence Under(DueLimit limit, IReadOnlyList<(long Hour, double Value)> hours, double bound, long now)
    {
        if (hours.Count == 0 || now - hours[^1].Hour > StaleAfter) return new DueEvidence(limit, DueState.Unknown, double.NaN, bound, null);
        long? since = null;
        long firstUnder = 0;
        int under = 0, over = 0;
        foreach ((long hour, double value) in hours)
        {
            if (value < bound && under++ == 0) firstUnder = hour;
            if (value >= bound) under = 0;
            over = value > bound * (1 + DeadBand) ? over + 1 : 0;
            if (under >= Delay) since ??= firstUnder;
            if (over >= Delay) since = null;
        }

        return new DueEvidence(limit, since is null ? DueState.NotDue : DueState.Due, hours[^1].Value, bound, since);
    }

    private static DueEvidence Since(double longest, long? lastCleaningEnd, long now)
    {
        if (lastCleaningEnd is not { } end) return new DueEvidence(DueLimit.Hours, DueState.Unknown, double.NaN, longest, null);
        double hours = (now - end) / (double)Milliseconds.Hour;
        bool due = hours >= longest;
        return new DueEvidence(DueLimit.Hours, due ? DueState.Due : DueState.NotDue, hours, longest, due ? end + (long)(longest * Milliseconds.Hour) : null);
    }
}
