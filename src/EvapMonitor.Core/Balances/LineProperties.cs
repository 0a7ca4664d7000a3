using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Balances;

/// <summary>
/// Properties as the line equations take them: value and slopes, for any state that an iteration may pass. Beyond the range of the tables they are drawn
/// straight on, so that a step too far leads back instead of ending the computation; a solution lies inside. By default IAPWS-IF97 and the liquor's own
/// correlations; published examples bring the rounded figures of their books.
/// </summary>
public class LineProperties(Liquor liquor)
{
    private const double LowestPressure = 700, HighestPressure = 1.6e7, LowestTemperature = 273.2, HighestLiquorTemperature = 473.1, HighestVapourTemperature = 1050, HighestLiquidTemperature = 623.1;

    /// <summary>How far under saturation vapour is asked for, K: within the steam tables' tolerance.</summary>
    private const double Wetness = 10;

    /// <summary>The liquor.</summary>
    public Liquor Liquor => liquor;

    /// <summary>Saturation temperature, K, by pressure (Pa).</summary>
    public virtual Sloped SaturationTemperature(double pressure)
    {
        double p = double.Clamp(pressure, LowestPressure, HighestPressure), slope = Steam.SaturationTemperatureSlope(p);
        return new(Steam.SaturationTemperature(p) + (slope * (pressure - p)), slope);
    }

    /// <summary>Enthalpy of vapour, J/kg, by pressure and temperature.</summary>
    public virtual Sloped VapourEnthalpy(double pressure, double temperature)
    {
        double p = double.Clamp(pressure, LowestPressure, HighestPressure);
        double t = double.Clamp(temperature, double.Max(LowestTemperature, Steam.SaturationTemperature(p) - Wetness), HighestVapourTemperature);
        (double value, double byPressure, double byTemperature) = Steam.VapourEnthalpyWithSlopes(p, t);
        return new(value + (byPressure * (pressure - p)) + (byTemperature * (temperature - t)), byPressure, byTemperature);
    }

    /// <summary>Enthalpy of condensate, J/kg, by pressure and temperature.</summary>
    public virtual Sloped CondensateEnthalpy(double pressure, double temperature)
    {
        double p = double.Clamp(pressure, LowestPressure, HighestPressure);
        double t = double.Clamp(temperature, LowestTemperature, double.Min(Steam.SaturationTemperature(p) + Wetness, HighestLiquidTemperature));
        (double value, double byPressure, double byTemperature) = Steam.LiquidEnthalpyWithSlopes(p, t);
        return new(value + (byPressure * (pressure - p)) + (byTemperature * (temperature - t)), byPressure, byTemperature);
    }

    /// <summary>Boiling-point elevation, K, by solids and the boiling temperature of water.</summary>
    /// <param name="solids">Mass fraction.</param>
    /// <param name="waterBoilingPoint">K.</param>
    /// <param name="error">How many of its standard uncertainties the correlation is off.</param>
    /// <param name="standard">The standard uncertainty, K: the slope by <paramref name="error"/>.</param>
    public virtual Sloped Elevation(double solids, double waterBoilingPoint, double error, out double standard)
    {
        double x = double.Clamp(solids, 0, 0.99), t = double.Clamp(waterBoilingPoint, LowestTemperature, HighestLiquorTemperature);
        PropertyValue elevation = liquor.BoilingPointElevation(x, t);
        var slopes = liquor.ElevationSlopes(x, t);
        standard = elevation.Standard;
        double bySolids = slopes.BySolids + (error * slopes.StandardBySolids), byTemperature = slopes.ByTemperature + (error * slopes.StandardByTemperature);
        return new(elevation.Value + (error * standard) + (bySolids * (solids - x)) + (byTemperature * (waterBoilingPoint - t)), bySolids, byTemperature);
    }

    /// <summary>Enthalpy of the line's liquor, J/kg, by solids and temperature.</summary>
    public virtual Sloped LiquorEnthalpy(double solids, double temperature) => Enthalpy(liquor, solids, temperature);

    /// <summary>Enthalpy of any liquor, J/kg, by solids and temperature.</summary>
    public static Sloped Enthalpy(Liquor liquor, double solids, double temperature)
    {
        ArgumentNullException.ThrowIfNull(liquor);
        double x = double.Clamp(solids, 0, 0.99), t = double.Clamp(temperature, LowestTemperature, HighestLiquorTemperature);
        double bySolids = liquor.EnthalpyBySolids(x, t), byTemperature = liquor.EnthalpyByTemperature(x, t);
        return new(liquor.Enthalpy(x, t) + (bySolids * (solids - x)) + (byTemperature * (temperature - t)), bySolids, byTemperature);
    }

    /// <summary>Enthalpy of saturated vapour, J/kg, by pressure: along the saturation line.</summary>
    public Sloped SaturatedVapour(double pressure) => Superheated(pressure, 0);

    /// <summary>Enthalpy of steam, J/kg, by pressure and superheat (K).</summary>
    public Sloped Superheated(double pressure, double superheat)
    {
        Sloped saturation = SaturationTemperature(pressure), enthalpy = VapourEnthalpy(pressure, saturation.Value + superheat);
        return new(enthalpy.Value, enthalpy.First + (enthalpy.Second * saturation.First), enthalpy.Second);
    }

    /// <summary>Enthalpy of condensate, J/kg, by pressure and how far it is under saturation (K).</summary>
    public Sloped Condensate(double pressure, double subcooling)
    {
        Sloped saturation = SaturationTemperature(pressure), enthalpy = CondensateEnthalpy(pressure, saturation.Value - subcooling);
        return new(enthalpy.Value, enthalpy.First + (enthalpy.Second * saturation.First), -enthalpy.Second);
    }
}
