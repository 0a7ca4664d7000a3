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
}
