using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Balances;

/// <summary>
/// Properties for readings as a plant delivers them: outside the range of the steam tables the answer is NaN, not an exception, because a gauge that reads
/// nonsense must cost one number and no more.
/// </summary>
internal static class Physical
{
    private const double LowestPressure = 611.657, HighestPressure = 16.5e6, LowestTemperature = 273.16, HighestTemperature = 623.15;

    /// <summary>True when a temperature can be a saturation temperature of the steam tables used here.</summary>
    public static bool IsSaturated(double temperature) => temperature is >= LowestTemperature and <= HighestTemperature;

    /// <summary>True when a reading, SI units and absolute, can be of anything in an evaporator.</summary>
    public static bool IsPossible(Dimension dimension, double value) => dimension switch
    {
        Dimension.Pressure => value is >= LowestPressure and <= HighestPressure,
        Dimension.Fraction => value is >= 0 and < 1,
        Dimension.Temperature => value is >= LowestTemperature and <= HighestTemperature,
        _ => double.IsFinite(value),
    };

    /// <summary>Density of liquor, kg/m³; NaN for solids outside 0 to 1 or temperatures outside 0 to 200 °C.</summary>
    public static double LiquorDensity(Liquor liquor, double solids, double temperature) =>
        IsLiquor(solids, temperature) ? liquor.Density(solids, temperature).Value : double.NaN;

    /// <summary>Mass flow of condensate, kg/s, from a mass or volume flow.</summary>
    public static double WaterMassFlow(double flow, UnitOfMeasure? unit, double temperature)
    {
        if (unit?.Dimension != Dimension.VolumeFlow) return flow;
        return IsSaturated(temperature) ? flow / Steam.LiquidVolume(Steam.SaturationPressure(temperature), temperature) : double.NaN;
    }

    private static bool IsLiquor(double solids, double temperature) => solids is >= 0 and < 1 && temperature is >= 273.15 and <= 473.15;
}
