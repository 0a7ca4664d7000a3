namespace EvapMonitor.Core.Fouling;

/// <summary>Where a clean expectation comes from.</summary>
public enum ReferenceBasis
{
    /// <summary>There is none.</summary>
    None,
    /// <summary>The design value.</summary>
    Design,
    /// <summary>The level after cleanings, at whatever conditions.</summary>
    Level,
    /// <summary>The level after cleanings, conditions divided out.</summary>
    Conditions,
}

/// <summary>The conditions that move a clean coefficient.</summary>
/// <param name="LogSolids">Natural logarithm of the mass fraction of dissolved solids; NaN when not known.</param>
/// <param name="BoilingTemperature">K; NaN when not known.</param>
/// <param name="LogFlux">Natural logarithm of the heat flux in W/m²; NaN when not known.</param>
public readonly record struct SurfaceConditions(double LogSolids, double BoilingTemperature, double LogFlux)
{
    /// <summary>The conditions of solids (mass fraction), boiling temperature (K) and heat flux (W/m²); what is not above 0 is not known.</summary>
    public static SurfaceConditions Of(double solids, double boilingTemperature, double flux) =>
        new(solids > 0 ? double.Log(solids) : double.NaN, boilingTemperature, flux > 0 ? double.Log(flux) : double.NaN);

    internal double this[int term] => term == 0 ? LogSolids : term == 1 ? BoilingTemperature : LogFlux;

    internal static SurfaceConditions From(IReadOnlyList<double> terms) => new(terms[0], terms[1], terms[2]);
}

/// <summary>
/// What a clean surface would do: ln U = level + b1 (ln solids − ref) + b2 (Tb − ref) + b3 (ln flux − ref), for one effect and product of one campaign. It is learnt
/// from what was before the campaign and from the campaign's own first hours, and then stays as it is.
/// </summary>
public sealed partial record CleanReference
{
    /// <summary>Index of the campaign.</summary>
    public required int Campaign { get; init; }

    /// <summary>The effect.</summary>
    public required string Effect { get; init; }

    /// <summary>The product.</summary>
    public required string Product { get; init; }

    /// <summary>From when on it holds within the campaign, ms since 1970-01-01T00:00:00Z: later than the campaign's start after a recalibration.</summary>
    public required long From { get; init; }

    /// <summary>What kind it is.</summary>
    public required ReferenceBasis Basis { get; init; }

    /// <summary>In plain words: what it rests on, or why there is none.</summary>
    public required string Source { get; init; }

    /// <summary>ln of the clean coefficient, W/(m²·K), at the reference conditions; NaN when there is none.</summary>
    public required double Level { get; init; }

    /// <summary>Standard uncertainty of the level.</summary>
    public required double LevelUncertainty { get; init; }

    /// <summary>b1 (per ln solids), b2 (per K), b3 (per ln flux).</summary>
    public required IReadOnlyList<double> Slopes { get; init; }

    /// <summary>Covariance of the slopes, row by row, 9 numbers.</summary>
    public required IReadOnlyList<double> SlopeCovariance { get; init; }

    /// <summary>Which slopes were learnt; the others are 0 and carry the width of what is usual as their uncertainty.</summary>
    public required IReadOnlyList<bool> Learnt { get; init; }

    /// <summary>The conditions at which the level holds; NaN where the level does not follow a condition.</summary>
    public required SurfaceConditions At { get; init; }

    /// <summary>Lowest conditions learnt.</summary>
    public required SurfaceConditions Lowest { get; init; }

    /// <summary>Highest conditions learnt.</summary>
    public required SurfaceConditions Highest { get; init; }

    /// <summary>Scatter of an hour about the fit, as a share of the coefficient; 0 until it is learnt.</summary>
    public required double HourScatter { get; init; }

    /// <summary>Share of the square of that scatter that lasts for about a day.</summary>
    public required double SlowShare { get; init; }
}
