namespace EvapMonitor.Core.Properties;

/// <summary>
/// Sea water and its brines: Sharqawy, Lienhard and Zubair, "Thermophysical properties of seawater: a review of existing correlations and data",
/// Desalination and Water Treatment 16 (2010) 354 to 380. Solids are the salinity as a mass fraction.
/// </summary>
public sealed class SeaWater : Liquor
{
    private static readonly CorrelationRange ElevationRange = new(0, 0.12, 0, 200);
    private static readonly CorrelationRange HeatCapacityRange = new(0, 0.18, 0, 180);
    private static readonly CorrelationRange DensityRange = new(0, 0.16, 0, 180);

    /// <inheritdoc/>
    /// <remarks>Equation 36: A·S² + B·S, for 0 to 200 °C and 0 to 120 g/kg; accuracy 0.018 K, taken as two standard uncertainties.</remarks>
    public override PropertyValue BoilingPointElevation(double solids, double waterBoilingPoint)
    {
        var s = CorrelationRange.Solids(solids);
        var t = waterBoilingPoint - CorrelationRange.IcePoint;
        var a = 17.945189194 + t * (0.28230948284 - 4.5838530457e-4 * t);
        var b = 6.5604855793 + t * (5.2669058133e-2 + 1.5361752708e-4 * t);
        return ElevationRange.Answer(s * (a * s + b), s == 0 ? 0 : 0.009, s, waterBoilingPoint);
    }

    /// <inheritdoc/>
    /// <remarks>
    /// Equation 9, Jamieson et al. 1969, for 0 to 180 °C and 0 to 180 g/kg; accuracy 0.28 %, taken as two standard uncertainties.
    /// Its temperatures are those of the scale of 1968, 1.00024 times today's. Above 180 g/kg the value at 180 g/kg is answered: the quadratic turns
    /// upward there.
    /// </remarks>
    public override PropertyValue HeatCapacity(double solids, double temperature)
    {
        var s = CorrelationRange.Solids(solids);
        var t = Scale1968 * temperature;
        var c = Coefficients(s);
        var value = 1000 * (c.A + t * (c.B + t * (c.C + t * c.D)));
        return HeatCapacityRange.Answer(value, 0.0014 * value, s, temperature);
    }

    /// <inheritdoc/>
    /// <remarks>Heat capacity integrated; the heat of dilution, small for brines of this range, is left out.</remarks>
    public override double Enthalpy(double solids, double temperature)
    {
        var salt = Coefficients(CorrelationRange.Solids(solids));
        var fresh = Coefficients(0);
        return WaterReference.Enthalpy(temperature) + (salt.A == fresh.A ? 0 : Content(salt, temperature) - Content(fresh, temperature));
    }

    /// <inheritdoc/>
    /// <remarks>Equation 8, the part that salt adds, on the steam tables' water; 0 to 180 °C and 0 to 160 g/kg; accuracy 0.1 %, taken as two standard
    /// uncertainties. Above that salinity S in the small quadratic term stays at its border.</remarks>
    public override PropertyValue Density(double solids, double temperature)
    {
        var s = CorrelationRange.Solids(solids);
        var t = temperature - CorrelationRange.IcePoint;
        var salt = s * (8.020e2 + t * (-2.001 + t * (1.677e-2 + t * (-3.060e-5))) + double.Min(s, 0.16) * -1.613e-5 * t * t);
        var value = WaterReference.Density(temperature) + salt;
        return DensityRange.Answer(value, 0.0005 * value, s, temperature);
    }

    private const double Scale1968 = 1.00024;

    private readonly record struct Cubic(double A, double B, double C, double D);

    // kJ/(kg·K) as a cubic in the temperature of 1968; S in g/kg.
    private static Cubic Coefficients(double salinity)
    {
        var s = 1000 * double.Min(salinity, HeatCapacityRange.HighestSolids);
        return new Cubic(5.328 + s * (-9.76e-2 + s * 4.04e-4), -6.913e-3 + s * (7.351e-4 - s * 3.15e-6),
            9.6e-6 + s * (-1.927e-6 + s * 8.23e-9), 2.5e-9 + s * (1.666e-9 - s * 7.125e-12));
    }

    // Heat content from 0 °C, J/kg.
    private static double Content(Cubic c, double temperature) =>
        1000 / Scale1968 * (Antiderivative(c, Scale1968 * temperature) - Antiderivative(c, Scale1968 * CorrelationRange.IcePoint));

    private static double Antiderivative(Cubic c, double t) => t * (c.A + t * (c.B / 2 + t * (c.C / 3 + t * c.D / 4)));
}
