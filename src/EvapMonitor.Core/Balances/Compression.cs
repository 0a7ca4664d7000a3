using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Balances;

/// <summary>Isentropic compression of vapour by IAPWS-IF97, with slopes.</summary>
/// <param name="Volume">Specific volume at the suction, m³/kg, by suction pressure and temperature.</param>
/// <param name="Work">Isentropic work, J/kg.</param>
/// <param name="WorkBySuctionPressure">Its slope, J/(kg·Pa).</param>
/// <param name="WorkBySuctionTemperature">Its slope, J/(kg·K).</param>
/// <param name="WorkByDischargePressure">Its slope, J/(kg·Pa): the volume at the discharge.</param>
internal readonly record struct Compression(
    Sloped Volume, double Work, double WorkBySuctionPressure, double WorkBySuctionTemperature, double WorkByDischargePressure)
{
    /// <summary>Compression from one state to another pressure; states beyond the tables are moved to their border.</summary>
    /// <param name="suctionPressure">Pa.</param>
    /// <param name="suctionTemperature">K.</param>
    /// <param name="dischargePressure">Pa.</param>
    public static Compression Of(double suctionPressure, double suctionTemperature, double dischargePressure)
    {
        double p = double.Clamp(suctionPressure, 700, 2e6), p2 = double.Clamp(dischargePressure, p / 2, 10 * p);
        double t = double.Clamp(suctionTemperature, double.Max(273.2, Steam.SaturationTemperature(p) - 10), 700);
        double enthalpy = Steam.VapourEnthalpy(p, t), byPressure = Steam.VapourEnthalpyByPressure(p, t), byTemperature = Steam.VapourHeatCapacity(p, t);
        double volume = Steam.VapourVolume(p, t), entropy = Steam.VapourEntropy(p, t);

        // T ds = dh − v dp; the temperature at the end from that of an ideal gas by Newton's method.
        double t2 = t * double.Pow(p2 / p, 0.25);
        for (int step = 0; step < 30; step++)
        {
            t2 = double.Clamp(t2, double.Max(273.2, Steam.SaturationTemperature(p2) - 15), 1000);
            double change = (entropy - Steam.VapourEntropy(p2, t2)) * t2 / Steam.VapourHeatCapacity(p2, t2);
            t2 += change;
            if (double.Abs(change) < 1e-10 * t2) break;
        }

        // ∂v/∂T = (v − ∂h/∂p)/T (Maxwell); ∂v/∂p from neighbours.
        double step1 = 1e-4 * p, volumeByPressure = (Steam.VapourVolume(p + step1, t) - Steam.VapourVolume(p - step1, t)) / (2 * step1);
        return new(
            new Sloped(volume, volumeByPressure, (volume - byPressure) / t), Steam.VapourEnthalpy(p2, t2) - enthalpy,
            (t2 * (byPressure - volume) / t) - byPressure, (t2 * byTemperature / t) - byTemperature, Steam.VapourVolume(p2, t2));
    }
}
