using System.Diagnostics.CodeAnalysis;
using System.Runtime.CompilerServices;

namespace EvapMonitor.Core.Properties;

/// <summary>
/// Water and steam after IAPWS-IF97, "Revised Release on the IAPWS Industrial Formulation 1997", R7-97(2012): regions 1 (liquid), 2 (vapour) and 4
/// (saturation).
/// SI units throughout: Pa absolute, K, J/kg, m³/kg, J/(kg·K). Enthalpy and entropy are zero in the saturated liquid at the triple point.
/// No method allocates. Every method throws <see cref="ArgumentOutOfRangeException"/>, naming value, unit and bound, outside the range that it states.
/// </summary>
/// <remarks>
/// Uncertainty of the formulation (R7-97(2012), section 12; the figures from memory): saturation pressure 0.025 %; liquid volume up to 0.01 %;
/// vapour volume 0.05 %; heat capacity 0.2 to 0.3 %. Against plant instruments all of these are nothing.
/// The phase of a (p, T) state is the caller's word: both equations continue smoothly a little past the saturation line, which iterations need.
/// Further than <see cref="PhaseTolerance"/> past it the state is refused.
/// </remarks>
public static partial class Steam
{
    /// <summary>Specific gas constant of water, J/(kg·K): R7-97(2012), equation 1.</summary>
    public const double GasConstant = 461.526;

    /// <summary>Temperature at the critical point, K: R7-97(2012), equation 2.</summary>
    public const double CriticalTemperature = 647.096;

    /// <summary>Pressure at the critical point, Pa: R7-97(2012), equation 3.</summary>
    public const double CriticalPressure = 22.064e6;

    /// <summary>Lowest temperature of every equation here, K: 0 °C.</summary>
    public const double LowestTemperature = 273.15;

    /// <summary>Lowest pressure of the saturation line, Pa: equation 30 at 273.15 K.</summary>
    public const double LowestSaturationPressure = 611.212677;

    /// <summary>Highest temperature at which saturated liquid and vapour are those of regions 1 and 2, K.</summary>
    public const double HighestSaturatedStateTemperature = 623.15;

    /// <summary>Highest pressure at which saturated liquid and vapour are those of regions 1 and 2, Pa: equation 30 at 623.15 K.</summary>
    public const double HighestSaturatedStatePressure = 16.5291643e6;

    /// <summary>Highest temperature of region 2, K.</summary>
    public const double HighestVapourTemperature = 1073.15;

    /// <summary>Highest pressure of regions 1 and 2, Pa.</summary>
    public const double HighestPressure = 100e6;

    /// <summary>How far past the saturation line, K, a state still counts as the phase that the caller names (rounded down to whole kelvins).</summary>
    public const double PhaseTolerance = 20;

    /// <summary>Saturation temperature, K: equation 31.</summary>
    /// <param name="pressure">Pa, from <see cref="LowestSaturationPressure"/> to <see cref="CriticalPressure"/>.</param>
    public static double SaturationTemperature(double pressure)
    {
        if (!(pressure >= LowestSaturationPressure && pressure <= CriticalPressure))
            RefusePressure(pressure, LowestSaturationPressure, CriticalPressure, "saturation line");
        return Saturation.Temperature(pressure);
    }

    /// <summary>Saturation pressure, Pa: equation 30.</summary>
    /// <param name="temperature">K, from <see cref="LowestTemperature"/> to <see cref="CriticalTemperature"/>.</param>
    public static double SaturationPressure(double temperature)
    {
        if (!(temperature >= LowestTemperature && temperature <= CriticalTemperature))
            RefuseTemperature(temperature, LowestTemperature, CriticalTemperature, "saturation line");
        return Saturation.Pressure(temperature);
    }

    /// <summary>Slope of the saturation temperature, dT/dp in K/Pa: equation 29 differentiated.</summary>
    /// <param name="pressure">Pa, from <see cref="LowestSaturationPressure"/> to <see cref="CriticalPressure"/>.</param>
    public static double SaturationTemperatureSlope(double pressure)
    {
        if (!(pressure >= LowestSaturationPressure && pressure <= CriticalPressure))
            RefusePressure(pressure, LowestSaturationPressure, CriticalPressure, "saturation line");
        return Saturation.TemperatureSlope(pressure);
    }

    [DoesNotReturn, MethodImpl(MethodImplOptions.NoInlining)]
    private static void RefusePressure(double pressure, double lowest, double highest, string what) =>
        throw new ArgumentOutOfRangeException(nameof(pressure), pressure, FormattableString.Invariant(
            $"Pressure {pressure} Pa is outside the range of the {what}: {lowest} Pa to {highest} Pa (absolute)."));

    [DoesNotReturn, MethodImpl(MethodImplOptions.NoInlining)]
    private static void RefuseTemperature(double temperature, double lowest, double highest, string what) =>
        throw new ArgumentOutOfRangeException(nameof(temperature), temperature, FormattableString.Invariant(
            $"Temperature {temperature} K is outside the range of the {what}: {lowest} K to {highest} K."));
}
