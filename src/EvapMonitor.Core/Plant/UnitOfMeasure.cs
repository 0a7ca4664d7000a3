namespace EvapMonitor.Core.Plant;

/// <summary>What kind of quantity a number is. Temperatures and temperature differences are different dimensions.</summary>
public enum Dimension
{
    /// <summary>Mass per time, kg/s.</summary>
    MassFlow,
    /// <summary>Volume per time, m³/s; needs a density to become a mass flow.</summary>
    VolumeFlow,
    /// <summary>Temperature, K.</summary>
    Temperature,
    /// <summary>Temperature difference, K.</summary>
    TemperatureDifference,
    /// <summary>Pressure, Pa.</summary>
    Pressure,
    /// <summary>Share of a whole, 0 to 1 (solids are mass fractions).</summary>
    Fraction,
    /// <summary>Length, m.</summary>
    Length,
    /// <summary>Area, m².</summary>
    Area,
    /// <summary>Mass, kg.</summary>
    Mass,
    /// <summary>Power, W.</summary>
    Power,
    /// <summary>Heat-transfer coefficient, W/(m²·K).</summary>
    HeatTransferCoefficient,
    /// <summary>Duration, s.</summary>
    Duration,
    /// <summary>A bare number, such as the position of a valve or a step of a sequence.</summary>
    Number,
}

/// <summary>What a pressure is measured against.</summary>
public enum PressureReference
{
    /// <summary>Against empty space.</summary>
    Absolute,
    /// <summary>Above the atmosphere of the site.</summary>
    Gauge,
    /// <summary>Below the atmosphere of the site; a larger reading is a lower pressure.</summary>
    Vacuum,
}

/// <summary>A unit as the plant writes it, with its way to SI: si = written·<paramref name="Factor"/> + <paramref name="Offset"/>.</summary>
/// <param name="Written">The unit as it stands in the plant file.</param>
/// <param name="Dimension">The kind of quantity.</param>
/// <param name="Factor">SI units per written unit; positive.</param>
/// <param name="Offset">SI value of a written zero; not zero only for temperatures.</param>
/// <param name="Reference">For pressures, what they are measured against.</param>
public sealed record UnitOfMeasure(
    string Written,
    Dimension Dimension,
    double Factor,
    double Offset = 0,
    PressureReference Reference = PressureReference.Absolute)
{
    /// <summary>Turns a written value into SI. A gauge pressure stays a gauge pressure, in Pa; conditioning adds the atmosphere.</summary>
    public double ToSi(double written) => (written * Factor) + Offset;

    /// <summary>Turns an SI value into this unit.</summary>
    public double FromSi(double si) => (si - Offset) / Factor;

    /// <summary>Turns a difference (an accuracy, a span) into SI, without the offset.</summary>
    public double DifferenceToSi(double written) => written * Factor;
}
