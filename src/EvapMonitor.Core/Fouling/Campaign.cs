using EvapMonitor.Core.Coefficients;

namespace EvapMonitor.Core.Fouling;

/// <summary>How a cleaning came to be known, and so what a campaign began with.</summary>
public enum CleaningSource
{
    /// <summary>None: the first data of the surface.</summary>
    FirstData,
    /// <summary>People logged it.</summary>
    Logged,
    /// <summary>A signal said so.</summary>
    Signal,
    /// <summary>The coefficient rose while the surface was out of production.</summary>
    Recognised,
}

/// <summary>
/// The time between two cleanings of a surface. A cleaning that did not clean ends a campaign too: what was done to the surface is a fact, what it brought is a result.
/// </summary>
public sealed record Campaign
{
    /// <summary>End of the cleaning before it, or start of the first hour; ms since 1970-01-01T00:00:00Z.</summary>
    public required long Start { get; init; }

    /// <summary>Start of the next cleaning; null while it goes on.</summary>
    public required long? End { get; init; }

    /// <summary>What it began with.</summary>
    public required CleaningSource StartedBy { get; init; }

    /// <summary>How sure that is, 0 to 1: 1 for what was logged or signalled and for the first data; for a recognised cleaning 1 less the significance of its test.</summary>
    public required double Confidence { get; init; }

    /// <summary>Products made, in order of first appearance.</summary>
    public required IReadOnlyList<string> Products { get; init; }

    /// <summary>Fouling resistance at its start, m²·K/W, random part.</summary>
    public required Measured InitialResistance { get; init; }

    /// <summary>Fouling resistance at its end, or at its latest hours while it goes on, m²·K/W, random part.</summary>
    public required Measured FinalResistance { get; init; }

    /// <summary>Share of the resistance that the cleaning before it removed; NaN when not known.</summary>
    public required double RemovedShare { get; init; }

    /// <summary>Growth of the resistance, m²·K/W in a day of production (Theil-Sen), random part.</summary>
    public required Measured GrowthRate { get; init; }

    /// <summary>Hours of production.</summary>
    public required double ProductionHours { get; init; }

    /// <summary>Hours of production at its end since the last cleaning that did clean (or may have): cleanings that did not clean do not set this back.</summary>
    public required double HoursSinceCleaned { get; init; }
}

/// <summary>Time out of production after which the surface was as before, as far as can be told.</summary>
/// <param name="Start">Start, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="End">End; <see cref="long.MaxValue"/> while nothing was produced since.</param>
/// <param name="Test">The comparison before and after; null when there were not enough hours.</param>
/// <param name="Reason">Why it is not taken for a cleaning, in plain words.</param>
public sealed record SurfaceStop(long Start, long End, RecoveryTest? Test, string Reason);

/// <summary>A run on water: a test of the surface without solids or elevation, for itself and corrected for nothing.</summary>
/// <param name="Start">Start of its first hour, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="End">End of its last hour.</param>
/// <param name="Hours">Hours that entered.</param>
/// <param name="Coefficient">Coefficient on water, W/(m²·K).</param>
/// <param name="ResistanceSincePrevious">1/U less 1/U of the test before in the same effect, m²·K/W, random part; absent for the first and across a recalibration.</param>
/// <param name="Effect">The effect in which the surface served.</param>
public sealed record WaterTest(long Start, long End, int Hours, Measured Coefficient, Measured ResistanceSincePrevious, string Effect);
