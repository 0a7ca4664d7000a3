namespace EvapMonitor.Core.Properties;

/// <summary>Saturated liquid water from the steam tables: what every liquor is at no solids, and the datum of its enthalpy.</summary>
internal static class WaterReference
{
    /// <summary>Enthalpy h′, J/kg.</summary>
    public static double Enthalpy(double temperature) => Steam.SaturatedLiquidEnthalpyAt(temperature);

    /// <summary>Slope of the enthalpy along the saturation line, dh′/dT in J/(kg·K).</summary>
    public static double EnthalpySlope(double temperature)
    {
        double pressure = Saturation.Pressure(temperature);
        return Region1.HeatCapacity(pressure, temperature) + (Region1.EnthalpyByPressure(pressure, temperature) / Saturation.TemperatureSlope(pressure));
    }

    /// <summary>Heat capacity, J/(kg·K).</summary>
    public static double HeatCapacity(double temperature) => Steam.SaturatedLiquidHeatCapacityAt(temperature);

    /// <summary>Density, kg/m³.</summary>
    public static double Density(double temperature) => 1 / Steam.SaturatedLiquidVolumeAt(temperature);

    /// <summary>Density of a solution whose solids and water keep their own volumes, kg/m³.</summary>
    /// <param name="solids">Mass fraction of solids.</param>
    /// <param name="temperature">K.</param>
    /// <param name="solidsDensity">Density of the solids as they take up room in solution, kg/m³.</param>
    public static double DensityByVolumes(double solids, double temperature, double solidsDensity) =>
        1 / ((1 - solids) * Steam.SaturatedLiquidVolumeAt(temperature) + solids / solidsDensity);

    /// <summary>
    /// What carries a small boiling-point elevation from atmospheric to another pressure: (T/373.15)²·r(373.15)/r(T), T the boiling point of water there, K.
    /// It follows from Clausius and Clapeyron for a solution whose activity does not change with temperature: 0.763 at 60 °C, 1.137 at 120 °C.
    /// </summary>
    public static double ElevationFactor(double waterBoilingPoint) =>
        waterBoilingPoint * waterBoilingPoint / (373.15 * 373.15) * LatentHeatAtNormalBoiling / Steam.LatentHeatAt(waterBoilingPoint);

    private static readonly double LatentHeatAtNormalBoiling = Steam.LatentHeatAt(373.15);
}
