using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>
/// The accuracy that stands in where the plant file gives none: half-widths, always marked as assumed. The figures are common practice for
/// installed and maintained process instruments, not those of any publication: an instrument's own data sheet and calibration are better.
/// </summary>
internal static class AssumedAccuracy
{
    private const double OfFlow = 0.02;
    private const double OfPressure = 0.01;
    private const double GaugeZero = 500;
    private const double OfTemperature = 0.5;
    private const double OfSolids = 0.005;
    private const double OfLevelRange = 0.05;
    private const double OfLevel = 0.1;
    private const double OfPower = 0.01;

    /// <summary>The default for an instrument.</summary>
    /// <param name="unit">Its unit; decides dimension and, for pressures, the reference.</param>
    /// <param name="range">Its range in SI units; null when not given.</param>
    /// <remarks>
    /// Flow 2 % of the reading; absolute pressure 1 % of the reading; gauge and vacuum 1 % of the reading and 5 mbar, because the reading may be
    /// near zero; temperature 0.5 K; solids and other shares 0.5 % absolute; level 5 % of the range, else 0.1 m; power 1 % of the reading.
    /// A bare number (a valve position, the number of a product) is exact and not marked.
    /// </remarks>
    public static Accuracy For(UnitOfMeasure unit, (double Low, double High)? range) => unit.Dimension switch
    {
        Dimension.MassFlow or Dimension.VolumeFlow => Assumed(OfFlow, 0),
        Dimension.Pressure => Assumed(OfPressure, unit.Reference == PressureReference.Absolute ? 0 : GaugeZero),
        Dimension.Temperature or Dimension.TemperatureDifference => Assumed(0, OfTemperature),
        Dimension.Fraction => Assumed(0, OfSolids),
        Dimension.Length => Assumed(0, range is { } r ? OfLevelRange * (r.High - r.Low) : OfLevel),
        Dimension.Power => Assumed(OfPower, 0),
        Dimension.Number => new(0, 0, AccuracyMeaning.Standard),
        _ => Assumed(OfFlow, 0),
    };

    /// <summary>The assumed accuracy in words, in the instrument's unit.</summary>
    public static string InWords(Accuracy accuracy, UnitOfMeasure unit)
    {
        string share = accuracy.OfReading > 0 ? Invariant($"{accuracy.OfReading * 100:0.###} % of the reading") : "";
        string absolute = accuracy.Absolute > 0 ? Invariant($"{accuracy.Absolute / unit.Factor:0.####} {unit.Written}") : "";
        return share.Length == 0 ? absolute : absolute.Length == 0 ? share : $"{share} and {absolute}";
    }

    private static Accuracy Assumed(double ofReading, double absolute) => new(ofReading, absolute, AccuracyMeaning.HalfWidth, Assumed: true);
}
