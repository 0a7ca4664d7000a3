namespace EvapMonitor.Core.Properties;

/// <summary>The range that a publication states for a correlation, and what is answered outside it.</summary>
/// <param name="LowestSolids">Mass fraction.</param>
/// <param name="HighestSolids">Mass fraction.</param>
/// <param name="LowestCelsius">Temperature, °C.</param>
/// <param name="HighestCelsius">Temperature, °C.</param>
internal readonly record struct CorrelationRange(double LowestSolids, double HighestSolids, double LowestCelsius, double HighestCelsius)
{
    /// <summary>0 °C in kelvin.</summary>
    public const double IcePoint = 273.15;

    // Readings converted to kelvin and back must not fall off the edge of a range that they touch.
    private const double Slack = 1e-9;

    /// <summary>The value with its standard uncertainty, doubled and flagged outside the range. No solids are water, of which more is known: never
    /// outside on their account.</summary>
    public PropertyValue Answer(double value, double standard, double solids, double temperature)
    {
        var celsius = temperature - IcePoint;
        var inside = (solids == 0 || (solids >= LowestSolids - Slack && solids <= HighestSolids + Slack))
            && celsius >= LowestCelsius - Slack && celsius <= HighestCelsius + Slack;
        return inside ? new PropertyValue(value, standard, false) : new PropertyValue(value, 2 * standard, true);
    }

    /// <summary>Solids as correlations take them: a reading a little under nothing, as an instrument gives on water, is no solids.</summary>
    public static double Solids(double solids) => double.Clamp(solids, 0, 1);
}
