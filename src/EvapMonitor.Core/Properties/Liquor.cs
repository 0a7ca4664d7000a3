namespace EvapMonitor.Core.Properties;

/// <summary>A property of a liquor with the standard uncertainty of its correlation.</summary>
/// <param name="Value">The property, SI units.</param>
/// <param name="Standard">Standard uncertainty of the correlation itself, same unit: systematic, no averaging shrinks it.</param>
/// <param name="Extrapolated">True outside the range that the publication states.</param>
public readonly record struct PropertyValue(double Value, double Standard, bool Extrapolated);

/// <summary>
/// The properties of one liquor as functions of dissolved solids (mass fraction, 0 to 1) and temperature (K).
/// Outside its published range a correlation still answers and says so; it never throws for solids in 0 to 1 and temperatures in 273.15 to 473.15 K.
/// </summary>
public abstract class Liquor
{
    /// <summary>The name in the plant file, or the kind where it has none.</summary>
    public required string Name { get; init; }

    /// <summary>Boiling-point elevation, K.</summary>
    /// <param name="solids">Mass fraction of dissolved solids.</param>
    /// <param name="waterBoilingPoint">Boiling temperature of water at the vapour pressure, K.</param>
    public abstract PropertyValue BoilingPointElevation(double solids, double waterBoilingPoint);

    /// <summary>Specific heat capacity at constant pressure, J/(kg·K).</summary>
    public abstract PropertyValue HeatCapacity(double solids, double temperature);

    /// <summary>
    /// Specific enthalpy, J/kg, on the steam tables' datum: h(x,T) = h′(T) + ∫ from 0 °C to T of [cp(x) − cp(0)] dT + h_mixing(x), so that x = 0 is exactly the steam tables.
    /// </summary>
    public abstract double Enthalpy(double solids, double temperature);

    /// <summary>Density, kg/m³.</summary>
    public abstract PropertyValue Density(double solids, double temperature);

    /// <summary>∂h/∂x at constant temperature, J/kg: central difference where a liquor knows no better.</summary>
    public virtual double EnthalpyBySolids(double solids, double temperature)
    {
        (double low, double high) = Around(solids);
        return (Enthalpy(high, temperature) - Enthalpy(low, temperature)) / (high - low);
    }

    /// <summary>∂h/∂T at constant solids, J/(kg·K): central difference where a liquor knows no better.</summary>
    public virtual double EnthalpyByTemperature(double solids, double temperature) =>
        (Enthalpy(solids, temperature + KelvinStep) - Enthalpy(solids, temperature - KelvinStep)) / (2 * KelvinStep);

    /// <summary>Slopes of the boiling-point elevation and of its standard uncertainty, by solids (K) and by the boiling temperature of water (K/K).</summary>
    public virtual (double BySolids, double ByTemperature, double StandardBySolids, double StandardByTemperature) ElevationSlopes(
        double solids, double waterBoilingPoint)
    {
        (double low, double high) = Around(solids);
        PropertyValue thin = BoilingPointElevation(low, waterBoilingPoint), thick = BoilingPointElevation(high, waterBoilingPoint);
        PropertyValue cold = BoilingPointElevation(solids, waterBoilingPoint - KelvinStep), hot = BoilingPointElevation(solids, waterBoilingPoint + KelvinStep);
        return ((thick.Value - thin.Value) / (high - low), (hot.Value - cold.Value) / (2 * KelvinStep),
            (thick.Standard - thin.Standard) / (high - low), (hot.Standard - cold.Standard) / (2 * KelvinStep));
    }

    // Steps large enough for sixteen digits, small against the curvature of any correlation used here.
    private const double SolidsStep = 1e-5, KelvinStep = 5e-3;

    private static (double Low, double High) Around(double solids) =>
        (double.Clamp(solids - SolidsStep, 0, 1 - (2 * SolidsStep)), double.Clamp(solids + SolidsStep, 2 * SolidsStep, 1));
}
