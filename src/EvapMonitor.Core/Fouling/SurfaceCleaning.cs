using EvapMonitor.Core.Coefficients;

namespace EvapMonitor.Core.Fouling;

/// <summary>What a cleaning brought.</summary>
public enum CleaningVerdict
{
    /// <summary>The coefficient rose, beyond chance.</summary>
    Cleaned,
    /// <summary>It did not rise, and a rise worth the name would have been seen.</summary>
    DidNotClean,
    /// <summary>It cannot be told; the reason says why.</summary>
    CannotBeTold,
    /// <summary>It goes on, or there are not yet enough hours after it.</summary>
    AwaitingHours,
}

/// <summary>The coefficient before and after a time out of production, conditions and growth of fouling divided out.</summary>
/// <param name="Rise">ln(after/before), random part.</param>
/// <param name="Statistic">Rise over its standard uncertainty.</param>
/// <param name="Significance">Chance of so high a rise where nothing was recovered, one-sided (Student).</param>
/// <param name="HoursBefore">Hours compared before.</param>
/// <param name="HoursAfter">Hours compared after.</param>
public sealed record RecoveryTest(Measured Rise, double Statistic, double Significance, int HoursBefore, int HoursAfter);

/// <summary>A cleaning of a surface. Entries that overlap or lie within hours of each other are one cleaning.</summary>
public sealed record SurfaceCleaning
{
    /// <summary>Start as logged or signalled; of the time out of production when recognised. ms since 1970-01-01T00:00:00Z.</summary>
    public required long Start { get; init; }

    /// <summary>End; null while it goes on.</summary>
    public required long? End { get; init; }

    /// <summary>How it is known: logged before signal before recognised.</summary>
    public required CleaningSource Source { get; init; }

    /// <summary>The plant's words for it, joined; empty when there are none.</summary>
    public required string Word { get; init; }

    /// <summary>The logged entries that are this cleaning.</summary>
    public required IReadOnlyList<Guid> Ids { get; init; }

    /// <summary>What it brought.</summary>
    public required CleaningVerdict Verdict { get; init; }

    /// <summary>Why it cannot be told, or what is awaited; empty otherwise.</summary>
    public required string Reason { get; init; }

    /// <summary>The comparison; null when there were not enough hours.</summary>
    public required RecoveryTest? Test { get; init; }

    /// <summary>Fouling resistance just before, m²·K/W, random part, against the best of the latest cleanings.</summary>
    public required Measured Before { get; init; }

    /// <summary>Fouling resistance just after, m²·K/W: what it left, against the best of the latest cleanings.</summary>
    public required Measured Left { get; init; }

    /// <summary>Resistance removed, m²·K/W; it needs no clean expectation, only the same one before and after.</summary>
    public required Measured Removed { get; init; }
}
