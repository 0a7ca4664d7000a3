using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>The first settled hours of one use after a cleaning, or after another product.</summary>
/// <param name="CleanedAt">End of the cleaning, ms.</param>
/// <param name="Hours">Indices of the hours.</param>
/// <param name="Origin">Hours of service at which production, or this product, began.</param>
internal sealed record LevelSample(long CleanedAt, int[] Hours, double Origin)
{
    /// <summary>Resistance that was there at the origin, m²·K/W, as the product before told it; none after a cleaning.</summary>
    public Measured Carried { get; init; } = new(0, 0, 0);

    /// <summary>The product before; null after a cleaning.</summary>
    public string? Before { get; init; }

    /// <summary>Hours of production that count as starting up.</summary>
    public const int StartUp = 2;

    /// <summary>Hours taken after starting up.</summary>
    public const int Most = 24;

    /// <summary>Fewest hours that make a level.</summary>
    public const int Fewest = 6;

    /// <summary>How long after a cleaning an hour still tells of the clean surface, ms.</summary>
    public const long Within = 3 * Milliseconds.Day;
}

/// <summary>ln U of a surface as it came out of a cleaning, at mean conditions.</summary>
/// <param name="Value">The level at the moment production began.</param>
/// <param name="Standard">Its standard uncertainty from the scatter of the hours.</param>
/// <param name="At">Mean conditions.</param>
internal sealed record CleanLevel(double Value, double Standard, double[] At);
