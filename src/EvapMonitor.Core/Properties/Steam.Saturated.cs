using System.Runtime.CompilerServices;

namespace EvapMonitor.Core.Properties;

/// <summary>Saturated liquid and vapour: equations 7 and 15 on the line of equations 30 and 31.</summary>
public static partial class Steam
{
    /// <summary>Specific enthalpy of saturated liquid, h′ in J/kg.</summary>
    /// <param name="pressure">Pa, from <see cref="LowestSaturationPressure"/> to <see cref="HighestSaturatedStatePressure"/>.</param>
    public static double SaturatedLiquidEnthalpy(double pressure)
    {
        RequireSaturatedPressure(pressure);
        return Region1.Enthalpy(pressure, Saturation.Temperature(pressure));
    }

    /// <summary>Specific enthalpy of saturated vapour, h″ in J/kg.</summary>
    /// <param name="pressure">Pa, from <see cref="LowestSaturationPressure"/> to <see cref="HighestSaturatedStatePressure"/>.</param>
    public static double SaturatedVapourEnthalpy(double pressure)
    {
        RequireSaturatedPressure(pressure);
        return Region2.Enthalpy(pressure, Saturation.Temperature(pressure));
    }

    /// <summary>Latent heat, r = h″ - h′ in J/kg.</summary>
    /// <param name="pressure">Pa, from <see cref="LowestSaturationPressure"/> to <see cref="HighestSaturatedStatePressure"/>.</param>
    public static double LatentHeat(double pressure)
    {
        RequireSaturatedPressure(pressure);
        var temperature = Saturation.Temperature(pressure);
        return Region2.Enthalpy(pressure, temperature) - Region1.Enthalpy(pressure, temperature);
    }

    /// <summary>Specific volume of saturated liquid, v′ in m³/kg.</summary>
    /// <param name="pressure">Pa, from <see cref="LowestSaturationPressure"/> to <see cref="HighestSaturatedStatePressure"/>.</param>
    public static double SaturatedLiquidVolume(double pressure)
    {
        RequireSaturatedPressure(pressure);
        return Region1.Volume(pressure, Saturation.Temperature(pressure));
    }

    /// <summary>Specific volume of saturated vapour, v″ in m³/kg.</summary>
    /// <param name="pressure">Pa, from <see cref="LowestSaturationPressure"/> to <see cref="HighestSaturatedStatePressure"/>.</param>
    public static double SaturatedVapourVolume(double pressure)
    {
        RequireSaturatedPressure(pressure);
        return Region2.Volume(pressure, Saturation.Temperature(pressure));
    }

    /// <summary>Slope of h′ along the saturation line, dh′/dp in J/(kg·Pa).</summary>
    /// <param name="pressure">Pa, from <see cref="LowestSaturationPressure"/> to <see cref="HighestSaturatedStatePressure"/>.</param>
    public static double SaturatedLiquidEnthalpySlope(double pressure)
    {
        RequireSaturatedPressure(pressure);
        var temperature = Saturation.Temperature(pressure);
        return Region1.EnthalpyByPressure(pressure, temperature) + Region1.HeatCapacity(pressure, temperature) * Saturation.TemperatureSlope(pressure);
    }

    /// <summary>Slope of h″ along the saturation line, dh″/dp in J/(kg·Pa).</summary>
    /// <param name="pressure">Pa, from <see cref="LowestSaturationPressure"/> to <see cref="HighestSaturatedStatePressure"/>.</param>
    public static double SaturatedVapourEnthalpySlope(double pressure)
    {
        RequireSaturatedPressure(pressure);
        var temperature = Saturation.Temperature(pressure);
        return Region2.EnthalpyByPressure(pressure, temperature) + Region2.HeatCapacity(pressure, temperature) * Saturation.TemperatureSlope(pressure);
    }

    /// <summary>Specific enthalpy of saturated liquid, h′ in J/kg.</summary>
    /// <param name="temperature">K, from <see cref="LowestTemperature"/> to <see cref="HighestSaturatedStateTemperature"/>.</param>
    public static double SaturatedLiquidEnthalpyAt(double temperature) => Region1.Enthalpy(SaturatedPressure(temperature), temperature);

    /// <summary>Specific enthalpy of saturated vapour, h″ in J/kg.</summary>
    /// <param name="temperature">K, from <see cref="LowestTemperature"/> to <see cref="HighestSaturatedStateTemperature"/>.</param>
    public static double SaturatedVapourEnthalpyAt(double temperature) => Region2.Enthalpy(SaturatedPressure(temperature), temperature);

    /// <summary>Latent heat, r = h″ - h′ in J/kg.</summary>
    /// <param name="temperature">K, from <see cref="LowestTemperature"/> to <see cref="HighestSaturatedStateTemperature"/>.</param>
    public static double LatentHeatAt(double temperature)
    {
        var pressure = SaturatedPressure(temperature);
        return Region2.Enthalpy(pressure, temperature) - Region1.Enthalpy(pressure, temperature);
    }

    /// <summary>Specific volume of saturated liquid, v′ in m³/kg.</summary>
    /// <param name="temperature">K, from <see cref="LowestTemperature"/> to <see cref="HighestSaturatedStateTemperature"/>.</param>
    public static double SaturatedLiquidVolumeAt(double temperature) => Region1.Volume(SaturatedPressure(temperature), temperature);

    /// <summary>Isobaric heat capacity of saturated liquid, J/(kg·K). The slope dh′/dT along the line is larger, by 0.06 % at 373 K and 0.3 % at 473
    /// K.</summary>
    /// <param name="temperature">K, from <see cref="LowestTemperature"/> to <see cref="HighestSaturatedStateTemperature"/>.</param>
    public static double SaturatedLiquidHeatCapacityAt(double temperature) => Region1.HeatCapacity(SaturatedPressure(temperature), temperature);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void RequireSaturatedPressure(double pressure)
    {
        if (!(pressure >= LowestSaturationPressure && pressure <= HighestSaturatedStatePressure))
            RefusePressure(pressure, LowestSaturationPressure, HighestSaturatedStatePressure, "saturated states of regions 1 and 2");
    }

    private static double SaturatedPressure(double temperature)
    {
        if (!(temperature >= LowestTemperature && temperature <= HighestSaturatedStateTemperature))
            RefuseTemperature(temperature, LowestTemperature, HighestSaturatedStateTemperature, "saturated states of regions 1 and 2");
        return Saturation.Pressure(temperature);
    }
}
