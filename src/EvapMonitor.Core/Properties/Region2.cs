using System.Runtime.CompilerServices;
using static EvapMonitor.Core.Properties.Region2Table;

namespace EvapMonitor.Core.Properties;

/// <summary>
/// Steam and vapour, IAPWS-IF97 region 2: R7-97(2012), section 6.1, equations 15 to 17, table 12; the ideal-gas coefficients are those of table 10.
/// Arguments are taken as they come; <see cref="Steam"/> guards the range.
/// </summary>
internal static class Region2
{
    private const double PressureScale = 1e6;
    private const double TemperatureScale = 540;

    private const double Ideal1 = -0.96927686500217e1; // J = 0
    private const double Ideal2 = 0.10086655968018e2; // J = 1
    private const double Ideal3 = -0.56087911283020e-2; // J = -5
    private const double Ideal4 = 0.71452738081455e-1; // J = -4
    private const double Ideal5 = -0.40710498223928; // J = -3
    private const double Ideal6 = 0.14240819171444e1; // J = -2
    private const double Ideal7 = -0.43839511319450e1; // J = -1
    private const double Ideal8 = -0.28408632460772; // J = 2
    private const double Ideal9 = 0.21268463753307e-1; // J = 3

    /// <summary>Specific enthalpy, J/kg: R·T·τ·(γ°τ + γʳτ), with the powers of π and τ - 0.5 scheduled by hand.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static double Enthalpy(double pressure, double temperature)
    {
        var tau = TemperatureScale / temperature;
        var t = temperature * (1 / TemperatureScale);
        double t2 = t * t;
        var ideal = Sum(t2, Sum(t2, Sum(t2, -5 * Ideal3, Sum(t, -4 * Ideal4, -3 * Ideal5)), Sum(t, -2 * Ideal6, -Ideal7)), Ideal2)
            + tau * Sum(3 * Ideal9, tau, 2 * Ideal8);

        var s = tau - 0.5;
        double s2 = s * s, s3 = s2 * s, s4 = s2 * s2, s5 = s2 * s3, s6 = s3 * s3, s7 = s3 * s4;
        double s10 = s5 * s5, s12 = s6 * s6, s14 = s7 * s7, s15 = s5 * s10, s18 = s6 * s12, s19 = s12 * s7, s20 = s10 * s10, s24 = s12 * s12;
        double s25 = s15 * s10, s28 = s14 * s14, s34 = s20 * s14, s35 = s15 * s20, s38 = s19 * s19, s52 = s28 * s24, s56 = s28 * s28;
        double p = pressure * 1e-6, p2 = p * p, p3 = p2 * p, p4 = p2 * p2, p8 = p4 * p4, p16 = p8 * p8;

        var i1 = Sum(6 * N5, s5, Sum(Sum(3 * N4, s, 2 * N3), s, N2));
        var i2 = Sum(36 * N10, s35, Sum(Sum(7 * N9, s3, 4 * N8), s3, Sum(2 * N7, s, N6)));
        var i3 = Sum(35 * N15, s34, Sum(Sum(6 * N14, s3, 3 * N13), s2, N12));
        var i4 = Sum(Sum(3 * N18, s, 2 * N17), s, N16);
        var i5 = 7 * N19 * s6;
        var i6 = Sum(35 * N22, s34, Sum(16 * N21, s15, 3 * N20 * s2));
        var i7 = Sum(25 * N25, s24, 11 * N24 * s10);
        var i8 = s7 * Sum(36 * N27, s28, 8 * N26);
        var i9 = 13 * N28 * s12;
        var i10 = s3 * Sum(Sum(14 * N31, s4, 10 * N30), s6, 4 * N29);
        var i16 = s28 * Sum(50 * N33, s * s20, 29 * N32);
        var i18 = 57 * N34 * s56;
        var i20 = s19 * Sum(Sum(48 * N37, s3 * s10, 35 * N36), s15, 20 * N35);
        var i21 = 21 * N38 * s20;
        var i22 = 53 * N39 * s52;
        var i23 = 39 * N40 * s38;
        var i24 = s25 * Sum(Sum(58 * N43, s18, 40 * N42), s14, 26 * N41);

        var low = Sum(p2, Sum(p, i4, i3), Sum(p, i2, i1));
        var middle = Sum(p2, Sum(p, i8, i7), Sum(p, i6, i5)) + p4 * Sum(p, i10, i9);
        var steep = Sum(p2, i18, i16) + p4 * (Sum(p2, Sum(p, i23, i22), Sum(p, i21, i20)) + p4 * i24);
        var residual = Sum(p16, steep, p * Sum(p4, middle, low));
        return Steam.GasConstant * TemperatureScale * (ideal + residual);
    }

    /// <summary>γ and its derivatives by π and τ, ideal-gas part and residual part together.</summary>
    public static GibbsEnergy Gibbs(double pressure, double temperature)
    {
        double pi = pressure / PressureScale, tau = TemperatureScale / temperature, t = 1 / tau;
        var residual = GibbsSeries.Evaluate(pi, tau - 0.5, I, J, N);
        var value = double.Log(pi) + Ideal1 + tau * (Ideal2 + tau * (Ideal8 + tau * Ideal9))
            + t * (Ideal7 + t * (Ideal6 + t * (Ideal5 + t * (Ideal4 + t * Ideal3))));
        var slope = Ideal2 + tau * (2 * Ideal8 + tau * 3 * Ideal9)
            - t * t * (Ideal7 + t * (2 * Ideal6 + t * (3 * Ideal5 + t * (4 * Ideal4 + t * 5 * Ideal3))));
        var curvature = 2 * Ideal8 + 6 * Ideal9 * tau
            + t * t * t * (2 * Ideal7 + t * (6 * Ideal6 + t * (12 * Ideal5 + t * (20 * Ideal4 + t * 30 * Ideal3))));
        return new GibbsEnergy(residual.Value + value, residual.ByPressure + 1 / pi, residual.ByTemperature + slope,
            residual.ByTemperatureTwice + curvature, residual.ByBoth);
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
