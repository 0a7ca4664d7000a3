using System.Diagnostics.CodeAnalysis;
using System.Runtime.CompilerServices;

namespace EvapMonitor.Core.Properties;

/// <summary>Liquid and vapour by pressure and temperature.</summary>
public static partial class Steam
{
    // Saturation pressures at 273, 274 … 624 K, so that the phase of a state is judged by one look-up instead of one equation.
    private static readonly double[] WholeKelvins = [.. Enumerable.Range(273, 352).Select(k => Saturation.Pressure(k))];

    /// <summary>Specific enthalpy of liquid water, J/kg: equation 7.</summary>
    /// <param name="pressure">Pa, above 0 (and the saturation pressure less <see cref="PhaseTolerance"/>) to <see cref="HighestPressure"/>.</param>
    /// <param name="temperature">K, from <see cref="LowestTemperature"/> to <see cref="HighestSaturatedStateTemperature"/>.</param>
    public static double LiquidEnthalpy(double pressure, double temperature)
    {
        RequireLiquid(pressure, temperature);
        return Region1.Enthalpy(pressure, temperature);
    }

    /// <summary>Specific enthalpy of liquid water with ∂h/∂p and ∂h/∂T, in one go: J/kg, J/(kg·Pa), J/(kg·K). Range as for <see cref="LiquidEnthalpy"/>.</summary>
    public static (double Value, double ByPressure, double ByTemperature) LiquidEnthalpyWithSlopes(double pressure, double temperature)
    {
        RequireLiquid(pressure, temperature);
        return Region1.EnthalpyWithSlopes(pressure, temperature);
    }

    /// <summary>Specific volume of liquid water, m³/kg: equation 7. Range as for <see cref="LiquidEnthalpy"/>.</summary>
    public static double LiquidVolume(double pressure, double temperature)
    {
        RequireLiquid(pressure, temperature);
        return Region1.Volume(pressure, temperature);
    }

    /// <summary>Specific entropy of liquid water, J/(kg·K): equation 7. Range as for <see cref="LiquidEnthalpy"/>.</summary>
    public static double LiquidEntropy(double pressure, double temperature)
    {
        RequireLiquid(pressure, temperature);
        return Region1.Entropy(pressure, temperature);
    }

    /// <summary>Isobaric heat capacity of liquid water, ∂h/∂T in J/(kg·K): equation 7. Range as for <see cref="LiquidEnthalpy"/>.</summary>
    public static double LiquidHeatCapacity(double pressure, double temperature)
    {
        RequireLiquid(pressure, temperature);
        return Region1.HeatCapacity(pressure, temperature);
    }

    /// <summary>∂h/∂p of liquid water at constant temperature, J/(kg·Pa): equation 7 differentiated. Range as for <see cref="LiquidEnthalpy"/>.</summary>
    public static double LiquidEnthalpyByPressure(double pressure, double temperature)
    {
        RequireLiquid(pressure, temperature);
        return Region1.EnthalpyByPressure(pressure, temperature);
    }

    /// <summary>Specific enthalpy of vapour, J/kg: equations 15 to 17.</summary>
    /// <param name="pressure">Pa, above 0 to the saturation pressure (and <see cref="PhaseTolerance"/> beyond), at most <see
    /// cref="HighestPressure"/>.</param>
    /// <param name="temperature">K, from <see cref="LowestTemperature"/> to <see cref="HighestVapourTemperature"/>; above 623.15 K only below the
    /// saturation pressure at 623.15 K or above 863.15 K (region 3 lies between).</param>
    public static double VapourEnthalpy(double pressure, double temperature)
    {
        RequireVapour(pressure, temperature);
        return Region2.Enthalpy(pressure, temperature);
    }

    /// <summary>Specific enthalpy of vapour with ∂h/∂p and ∂h/∂T, in one go: J/kg, J/(kg·Pa), J/(kg·K). Range as for <see cref="VapourEnthalpy"/>.</summary>
    public static (double Value, double ByPressure, double ByTemperature) VapourEnthalpyWithSlopes(double pressure, double temperature)
    {
        RequireVapour(pressure, temperature);
        return Region2.EnthalpyWithSlopes(pressure, temperature);
    }

    /// <summary>Specific volume of vapour, m³/kg: equations 15 to 17. Range as for <see cref="VapourEnthalpy"/>.</summary>
    public static double VapourVolume(double pressure, double temperature)
    {
        RequireVapour(pressure, temperature);
        return Region2.Volume(pressure, temperature);
    }

    /// <summary>Specific entropy of vapour, J/(kg·K): equations 15 to 17. Range as for <see cref="VapourEnthalpy"/>.</summary>
    public static double VapourEntropy(double pressure, double temperature)
    {
        RequireVapour(pressure, temperature);
        return Region2.Entropy(pressure, temperature);
    }

    /// <summary>Isobaric heat capacity of vapour, ∂h/∂T in J/(kg·K): equations 15 to 17. Range as for <see cref="VapourEnthalpy"/>.</summary>
    public static double VapourHeatCapacity(double pressure, double temperature)
    {
        RequireVapour(pressure, temperature);
        return Region2.HeatCapacity(pressure, temperature);
    }

    /// <summary>∂h/∂p of vapour at constant temperature, J/(kg·Pa): equations 15 to 17 differentiated. Range as for <see cref="VapourEnthalpy"/>.</summary>
    public static double VapourEnthalpyByPressure(double pressure, double temperature)
    {
        RequireVapour(pressure, temperature);
        return Region2.EnthalpyByPressure(pressure, temperature);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void RequireLiquid(double pressure, double temperature)
    {
        if (!(temperature >= LowestTemperature && temperature <= HighestSaturatedStateTemperature))
            RefuseTemperature(temperature, LowestTemperature, HighestSaturatedStateTemperature, "liquid (region 1)");
        var lower = (int)temperature - 273 - (int)PhaseTolerance;
        if (!(pressure > (lower < 0 ? 0 : WholeKelvins[lower]) && pressure <= HighestPressure))
            RefusePhase(pressure, temperature, lower < 0 ? 0 : WholeKelvins[lower], HighestPressure, "liquid (region 1)");
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void RequireVapour(double pressure, double temperature)
    {
        if (!(temperature >= LowestTemperature && temperature <= HighestVapourTemperature))
            RefuseTemperature(temperature, LowestTemperature, HighestVapourTemperature, "vapour (region 2)");
        var upper = (int)temperature - 273 + (int)PhaseTolerance;
        var highest = (uint)upper < (uint)WholeKelvins.Length ? WholeKelvins[upper] : HighestVapourPressure(temperature);
        if (!(pressure > 0 && pressure <= highest))
            RefusePhase(pressure, temperature, 0, highest, "vapour (region 2)");
    }

    // Above 603 K: the saturation line, then the border to region 3, R7-97(2012), equation 5 with table 1, then the highest pressure.
    private static double HighestVapourPressure(double temperature) => temperature switch
    {
        <= HighestSaturatedStateTemperature => HighestSaturatedStatePressure,
        <= 863.15 => 1e6 * (0.34805185628969e3 + temperature * (-0.11671859879975e1 + temperature * 0.10192970039326e-2)),
        _ => HighestPressure,
    };

    [DoesNotReturn, MethodImpl(MethodImplOptions.NoInlining)]
    private static void RefusePhase(double pressure, double temperature, double lowest, double highest, string what) =>
        throw new ArgumentOutOfRangeException(nameof(pressure), pressure, FormattableString.Invariant(
            $"Pressure {pressure} Pa is outside the range of {what} at {temperature} K: above {lowest} Pa, to {highest} Pa (absolute)."));
}
