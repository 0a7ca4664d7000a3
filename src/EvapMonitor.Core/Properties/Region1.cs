using System.Runtime.CompilerServices;
using static EvapMonitor.Core.Properties.Region1Table;

namespace EvapMonitor.Core.Properties;

/// <summary>
/// Liquid water, IAPWS-IF97 region 1: R7-97(2012), section 5.1, equation 7 and table 3. Arguments are taken as they come; <see cref="Steam"/> guards the
/// range.
/// </summary>
internal static class Region1
{
    private const double PressureScale = 16.53e6;
    private const double TemperatureScale = 1386;

    /// <summary>Specific enthalpy, J/kg: R·T·τ·γτ, with the powers of 7.1 - π and τ - 1.222 scheduled by hand.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static double Enthalpy(double pressure, double temperature)
    {
        var a = double.MultiplyAddEstimate(pressure, -1 / PressureScale, 7.1);
        var s = TemperatureScale / temperature - 1.222;
        var r = 1 / s;
        double s2 = s * s, s3 = s2 * s, s5 = s2 * s3, s4 = s2 * s2, s9 = s4 * s5, s16 = (s4 * s4) * (s4 * s4);
        double r2 = r * r, r3 = r2 * r, r4 = r2 * r2, r5 = r2 * r3, r6 = r3 * r3, r7 = r3 * r4, r8 = r4 * r4, r9 = r4 * r5, r10 = r5 * r5, r12 = r6 * r6;
        double a2 = a * a, a3 = a2 * a, a4 = a2 * a2, a8 = a4 * a4;

        var i0 = Sum(-2 * N1, r3, Sum(-N2, r2, N4)) + s * Sum(Sum(5 * N8, s, 4 * N7), s2, Sum(3 * N6, s, 2 * N5));
        var i1 = Sum(-9 * N9, r10, Sum(-7 * N10, r8, Sum(-N11, r2, Sum(3 * N14, s2, N13))));
        var i2 = Sum(-3 * N15, r4, Sum(17 * N19, s16, Sum(3 * N18, s2, N17)));
        var i3 = Sum(-4 * N20, r5, 6 * N22 * s5);
        var i4 = Sum(-5 * N23, r6, Sum(-2 * N24, r3, 10 * N25 * s9));
        var i5 = -8 * N26 * r9;
        var i8 = Sum(-11 * N27, r12, -6 * N28 * r7);
        // The six steep terms share a²¹·r³⁰, written with q = a·r.
        double q = a * r, q2 = q * q, q3 = q2 * q, q6 = q3 * q3, q7 = q6 * q, q21 = q7 * q7 * q7;
        var steep = Sum(q2, -31 * N30, -29 * N29) + q6 * q2 * r * Sum(q2, Sum(q, -41 * N34, -40 * N33), Sum(q, -39 * N32, -38 * N31));

        var low = Sum(a, i1, i0) + a2 * Sum(a, i3, i2);
        var high = Sum(a4, Sum(a, i5, i4), a8 * i8);
        var byTemperature = low + Sum(q21, r9 * steep, high);
        return Steam.GasConstant * TemperatureScale * byTemperature;
    }

    /// <summary>γ and its derivatives by π and τ.</summary>
    public static GibbsEnergy Gibbs(double pressure, double temperature)
    {
        var series = GibbsSeries.Evaluate(7.1 - pressure / PressureScale, TemperatureScale / temperature - 1.222, I, J, N);
        // π enters as 7.1 - π
        return series with { ByPressure = -series.ByPressure, ByBoth = -series.ByBoth };
    }

    /// <summary>Specific volume, m³/kg.</summary>
    public static double Volume(double pressure, double temperature) =>
        Steam.GasConstant * temperature / PressureScale * Gibbs(pressure, temperature).ByPressure;

    /// <summary>Specific entropy, J/(kg·K).</summary>
    public static double Entropy(double pressure, double temperature)
    {
        var gibbs = Gibbs(pressure, temperature);
        return Steam.GasConstant * (TemperatureScale / temperature * gibbs.ByTemperature - gibbs.Value);
    }

    /// <summary>Isobaric heat capacity, J/(kg·K).</summary>
    public static double HeatCapacity(double pressure, double temperature)
    {
        var tau = TemperatureScale / temperature;
        return -Steam.GasConstant * tau * tau * Gibbs(pressure, temperature).ByTemperatureTwice;
    }

    /// <summary>∂h/∂p at constant temperature, J/(kg·Pa).</summary>
    public static double EnthalpyByPressure(double pressure, double temperature) =>
        Steam.GasConstant * TemperatureScale / PressureScale * Gibbs(pressure, temperature).ByBoth;

    /// <summary>Specific enthalpy with its slopes by pressure and temperature: R·T·τ·γτ, and those above.</summary>
    public static (double Value, double ByPressure, double ByTemperature) EnthalpyWithSlopes(double pressure, double temperature)
    {
        GibbsEnergy gibbs = Gibbs(pressure, temperature);
        double tau = TemperatureScale / temperature;
        return (Steam.GasConstant * TemperatureScale * gibbs.ByTemperature, Steam.GasConstant * TemperatureScale / PressureScale * gibbs.ByBoth,
            -Steam.GasConstant * tau * tau * gibbs.ByTemperatureTwice);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static double Sum(double factor, double other, double addend) => double.MultiplyAddEstimate(factor, other, addend);
}
