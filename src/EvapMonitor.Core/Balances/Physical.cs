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

    /// <summary>Saturation temperature, K; NaN outside 611.657 Pa to 16.5 MPa.</summary>
    public static double SaturationTemperature(double pressure) =>
        pressure is >= LowestPressure and <= HighestPressure ? Steam.SaturationTemperature(pressure) : double.NaN;

    /// <summary>Saturation pressure, Pa; NaN outside 273.16 to 623.15 K.</summary>
    public static double SaturationPressure(double temperature) => IsSaturated(temperature) ? Steam.SaturationPressure(temperature) : double.NaN;

    /// <summary>Enthalpy of vapour, J/kg, at a pressure and temperature; never below saturation, because a thermometer's noise must not make it wet.</summary>
    public static double VapourEnthalpy(double pressure, double temperature)
    {
        double saturation = SaturationTemperature(pressure);
        if (double.IsNaN(saturation) || !(temperature <= 1073.15)) return double.NaN;
        return Steam.VapourEnthalpy(pressure, double.Max(saturation, temperature));
    }

    /// <summary>Enthalpy of condensate, J/kg: saturated, or as cold as it was measured.</summary>
    public static double CondensateEnthalpy(double pressure, double measured)
    {
        double saturation = SaturationTemperature(pressure);
        if (double.IsNaN(saturation)) return double.NaN;
        return Steam.LiquidEnthalpy(pressure, measured >= LowestTemperature ? double.Min(measured, saturation) : saturation);
    }

    /// <summary>Enthalpy of liquor, J/kg; NaN for solids outside 0 to 1 or temperatures outside 0 to 200 °C.</summary>
    public static double LiquorEnthalpy(Liquor liquor, double solids, double temperature) =>
        IsLiquor(solids, temperature) ? liquor.Enthalpy(solids, temperature) : double.NaN;

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
