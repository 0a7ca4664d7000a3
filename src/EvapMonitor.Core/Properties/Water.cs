namespace EvapMonitor.Core.Properties;

/// <summary>Water: the steam tables alone. Solids are ignored; a water run boils without elevation whatever the meter says.</summary>
public sealed class Water : Liquor
{
    /// <inheritdoc/>
    public override PropertyValue BoilingPointElevation(double solids, double waterBoilingPoint) => new(0, 0, false);

    /// <inheritdoc/>
    /// <remarks>Standard uncertainty 0.1 % (R7-97(2012), section 12; figure from memory).</remarks>
    public override PropertyValue HeatCapacity(double solids, double temperature)
    {
        var value = WaterReference.HeatCapacity(temperature);
        return new PropertyValue(value, 0.001 * value, false);
    }

    /// <inheritdoc/>
    public override double Enthalpy(double solids, double temperature) => WaterReference.Enthalpy(temperature);

    /// <inheritdoc/>
    /// <remarks>Standard uncertainty 0.01 % (R7-97(2012), section 12; figure from memory).</remarks>
    public override PropertyValue Density(double solids, double temperature)
    {
        var value = WaterReference.Density(temperature);
        return new PropertyValue(value, 1e-4 * value, false);
    }

    /// <inheritdoc/>
    public override double EnthalpyBySolids(double solids, double temperature) => 0;

    /// <inheritdoc/>
    public override double EnthalpyByTemperature(double solids, double temperature) => WaterReference.EnthalpySlope(temperature);

    /// <inheritdoc/>
    public override (double BySolids, double ByTemperature, double StandardBySolids, double StandardByTemperature) ElevationSlopes(
        double solids, double waterBoilingPoint) => default;
}
