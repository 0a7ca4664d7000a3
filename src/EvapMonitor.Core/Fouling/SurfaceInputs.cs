using EvapMonitor.Core.Coefficients;

namespace EvapMonitor.Core.Fouling;

/// <summary>
/// One hour of a heating surface (an effect's own, a rotating body's, or that of a group of parallel bodies): means of its steady windows, in production or on water.
/// </summary>
/// <param name="Hour">Start of the hour, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="Effect">The effect in which the surface served.</param>
/// <param name="Product">The product that the line made; empty when there is only one.</param>
/// <param name="Windows">Windows that entered, at least 1.</param>
/// <param name="Coefficient">Apparent coefficient, W/(m²·K), above 0.</param>
/// <param name="DrivingForce">Driving force, K.</param>
/// <param name="BoilingTemperature">Boiling temperature, K; NaN when not known.</param>
/// <param name="Solids">Dissolved solids of the leaving liquor, mass fraction; NaN when not known.</param>
/// <param name="Flux">Heat flux over the surface in service, W/m²; NaN when not known.</param>
/// <param name="FeedFlow">Measured feed flow of the line, kg/s; NaN when not measured.</param>
public sealed record SurfaceHour(
    long Hour, string Effect, string Product, int Windows, Measured Coefficient,
    double DrivingForce, double BoilingTemperature, double Solids, double Flux, double FeedFlow);

/// <summary>What a surface did when it did not produce.</summary>
public enum SpanKind
{
    /// <summary>The line stood or was being filled.</summary>
    Standing,
    /// <summary>It was being cleaned, as a signal says.</summary>
    Cleaning,
    /// <summary>Another body served in its place.</summary>
    OutOfService,
    /// <summary>The line ran on water.</summary>
    WaterRun,
}

/// <summary>A time in which a surface did not produce. Time without any data is neither an hour nor a span.</summary>
/// <param name="Start">Start, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="End">End, after <paramref name="Start"/>.</param>
/// <param name="Kind">What it did.</param>
public sealed record SurfaceSpan(long Start, long End, SpanKind Kind);

/// <summary>What people say about a surface.</summary>
public enum SurfaceEventKind
{
    /// <summary>It was cleaned.</summary>
    Cleaning,
    /// <summary>A cleaning that was recognised here was none.</summary>
    RejectedCleaning,
    /// <summary>An instrument behind the coefficient was recalibrated: levels before and after are not to be compared.</summary>
    Recalibration,
}

/// <summary>Something that people logged about a surface.</summary>
/// <param name="Start">Start, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="End">End; <see cref="long.MaxValue"/> while it goes on; equal to the start for an instant.</param>
/// <param name="Kind">What it is.</param>
/// <param name="Word">The plant's word, such as the kind of cleaning; may be empty.</param>
/// <param name="Id">The entry's identifier; null when it has none.</param>
public sealed record SurfaceEvent(long Start, long End, SurfaceEventKind Kind, string Word, Guid? Id);

/// <summary>What is known of a surface before any hour, and what the plant decides.</summary>
/// <param name="DesignCoefficient">Clean coefficient by design, W/(m²·K); null when not given. It serves until a cleaning was seen.</param>
public sealed record SurfaceSettings(double? DesignCoefficient)
{
    /// <summary>Out of production for at least this long, a cleaning may have happened unlogged. Default 1 h.</summary>
    public TimeSpan MinimumStandstill { get; init; } = TimeSpan.FromHours(1);

    /// <summary>How many of the latest cleanings the best one is chosen from. Default 10, at least 1.</summary>
    public int BestOf { get; init; } = 10;
}
