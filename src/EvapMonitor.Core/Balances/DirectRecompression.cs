using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Balances;

/// <summary>What a recompressor delivers, straight from the instruments around it.</summary>
internal static class DirectRecompression
{
    /// <summary>Enthalpy of what is delivered, J/kg; NaN when an instrument is missing.</summary>
    /// <param name="machine">The machine.</param>
    /// <param name="at">Its instruments.</param>
    /// <param name="inputs">The window's inputs.</param>
    /// <param name="delivered">What condenses in and is vented from the chests that it heats, kg/s.</param>
    /// <param name="suction">Enthalpy of the vapour drawn, J/kg.</param>
    /// <param name="chestPressure">Pressure at the discharge, Pa.</param>
    /// <param name="efficiency">Share of the power that reaches the vapour.</param>
    public static double Enthalpy(
        Recompressor machine, RecompressorPlaces at, LineInputs inputs, double delivered, double suction, double chestPressure, double efficiency)
    {
        if (machine.Kind == RecompressorKind.Thermal)
        {
            double pressure = inputs.At(at.MotivePressure), temperature = inputs.At(at.MotiveTemperature), motive = inputs.At(at.MotiveFlow);
            double enthalpy = Physical.VapourEnthalpy(pressure, double.IsNaN(temperature) ? Physical.SaturationTemperature(pressure) : temperature);
            return suction + (motive / delivered * (enthalpy - suction));
        }

        double spray = machine.Spray is { } meter
            ? Physical.WaterMassFlow(inputs.At(at.Spray), meter.Unit, Physical.SaturationTemperature(chestPressure)) : 0;
        double water = spray == 0 ? suction : Physical.CondensateEnthalpy(chestPressure, double.NaN);
        return suction + (((efficiency * inputs.At(at.Power)) + (spray * (water - suction))) / delivered);
    }
}
