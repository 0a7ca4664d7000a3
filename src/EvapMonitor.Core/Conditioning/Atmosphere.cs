using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>Atmospheric pressure by window. Its uncertainty is shared by all gauge pressures, so it is kept as an input of its own.</summary>
public sealed class Atmosphere
{
    private Atmosphere(double[] pressure, double[] systematic, double[] random)
    {
        Pressure = pressure;
        Systematic = systematic;
        Random = random;
    }

    /// <summary>Pressure, Pa; NaN where its signal has no value.</summary>
    public double[] Pressure { get; }

    /// <summary>Systematic standard uncertainty, Pa.</summary>
    public double[] Systematic { get; }

    /// <summary>Random standard uncertainty, Pa.</summary>
    public double[] Random { get; }

    internal static Atmosphere Of(FixedOrMeasured source, ConditionedSignal? measured, WindowGrid grid)
    {
        if (measured is not null) return new Atmosphere(measured.Mean, measured.Systematic, measured.Random);

        double[] Constant(double value)
        {
            var array = new double[grid.Count];
            Array.Fill(array, value);
            return array;
        }

        return new Atmosphere(Constant(source.Fixed!.Value), Constant(LineConditioning.WeatherStandard), new double[grid.Count]);
    }

    /// <summary>Makes a gauge or vacuum pressure absolute, in place.</summary>
    internal void MakeAbsolute(ConditionedSignal signal)
    {
        int sign = SignOf(signal.Instrument);
        if (sign == 0 || signal.Instrument.Unit.Reference == PressureReference.Absolute) return;
        for (int window = 0; window < signal.Mean.Length; window++)
        {
            double written = signal.Mean[window];
            signal.Mean[window] = signal.Instrument.Unit.Reference == PressureReference.Gauge ? Pressure[window] + written : Pressure[window] - written;
        }
    }

    /// <summary>How an absolute pressure follows the atmosphere: 1 for gauge and vacuum instruments, 0 for all others.</summary>
    public static int SignOf(Instrument instrument) =>
        instrument.Unit.Dimension == Dimension.Pressure && instrument.Unit.Reference != PressureReference.Absolute ? 1 : 0;
}
