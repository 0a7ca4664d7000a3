using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>Quantities that are kept by the hour. The numbers are stored: never renumber.</summary>
public enum HourQuantity : short
{
    /// <summary>Apparent coefficient, W/(m²·K).</summary>
    Coefficient = 1,
    /// <summary>Driving force, K.</summary>
    DrivingForce = 2,
    /// <summary>Duty, W.</summary>
    Duty = 3,
    /// <summary>Heating temperature, K.</summary>
    HeatingTemperature = 4,
    /// <summary>Boiling temperature, K.</summary>
    BoilingTemperature = 5,
    /// <summary>Boiling-point elevation, K.</summary>
    Elevation = 6,
    /// <summary>Heat flux over the surface in service, W/m².</summary>
    HeatFlux = 7,
    /// <summary>Driving force with boiling at half the liquor's height, K.</summary>
    HeadCorrectedDrivingForce = 8,
    /// <summary>Dissolved solids of the leaving liquor, mass fraction.</summary>
    Solids = 9,
    /// <summary>Feed of the line as read, kg/s.</summary>
    FeedFlow = 10,
    /// <summary>Apparent coefficient on a run with water, W/(m²·K).</summary>
    WaterRunCoefficient = 11,
}

/// <summary>One quantity of one effect over one hour of production.</summary>
/// <param name="Hour">Start of the hour, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="Quantity">The quantity.</param>
/// <param name="Count">Windows that entered; at least 1.</param>
/// <param name="Mean">Mean of the windows, with the random part reduced by averaging and the systematic part as it is.</param>
/// <param name="Lowest">Lowest window.</param>
/// <param name="Highest">Highest window.</param>
/// <param name="Median">Median of the windows.</param>
public sealed record EffectHour(long Hour, HourQuantity Quantity, int Count, Measured Mean, double Lowest, double Highest, double Median)
{
    private static readonly HourQuantity[] Quantities = Enum.GetValues<HourQuantity>();

    /// <summary>Sums up the windows of an effect by the hour. Only windows that <see cref="Counts">count</see> enter.</summary>
    /// <param name="windows">Windows in ascending order; whole hours.</param>
    public static IEnumerable<EffectHour> Summarise(IEnumerable<EffectWindow> windows)
    {
        foreach (IGrouping<long, EffectWindow> hour in windows.Where(window => Counts(window) || IsWaterTest(window))
            .GroupBy(window => window.At - Milliseconds.Modulo(window.At, Milliseconds.Hour)))
        {
            foreach (HourQuantity quantity in Quantities)
            {
                bool water = quantity == HourQuantity.WaterRunCoefficient;
                Measured[] values = [.. hour.Where(window => IsWaterTest(window) == water).Select(window => Of(window, quantity)).Where(value => value.IsPresent)];
                if (values.Length > 0) yield return Summarise(hour.Key, quantity, values);
            }
        }
    }

    /// <summary>True when a window speaks of the surface: in production and steady (or not known to be otherwise), with a coefficient.</summary>
    public static bool Counts(EffectWindow window) =>
        window.State is RunningState.Producing or RunningState.Unknown && window.Steady != false && window.Coefficient.IsPresent;

    /// <summary>True for a window on water, which tells of the surface without solids or elevation.</summary>
    public static bool IsWaterTest(EffectWindow window) => window.State is RunningState.WaterRun && window.Steady != false && window.Coefficient.IsPresent;

    /// <summary>The quantity of a window.</summary>
    public static Measured Of(EffectWindow window, HourQuantity quantity) => quantity switch
    {
        HourQuantity.Coefficient => window.Coefficient,
        HourQuantity.DrivingForce => window.DrivingForce,
        HourQuantity.Duty => window.Duty,
        HourQuantity.HeatingTemperature => window.HeatingTemperature,
        HourQuantity.BoilingTemperature => window.BoilingTemperature,
        HourQuantity.Elevation => window.Elevation,
        HourQuantity.HeatFlux => Flux(window),
        HourQuantity.HeadCorrectedDrivingForce => window.HeadCorrectedDrivingForce,
        HourQuantity.Solids => new Measured(window.Solids, 0, 0),
        HourQuantity.FeedFlow => new Measured(window.FeedFlow, 0, 0),
        HourQuantity.WaterRunCoefficient => window.Coefficient,
        _ => throw new ArgumentOutOfRangeException(nameof(quantity), quantity, null),
    };

    /// <summary>Q/A is U·(Ts − Tb): so the surface in service counts, not all that is listed.</summary>
    private static Measured Flux(EffectWindow window)
    {
        double flux = window.Coefficient.Value * window.DrivingForce.Value, share = flux / window.Duty.Value;
        return double.IsFinite(flux) && double.IsFinite(share) ? new(flux, share * window.Duty.Systematic, share * window.Duty.Random) : Measured.Absent;
    }

    private static EffectHour Summarise(long hour, HourQuantity quantity, Measured[] values)
    {
        double[] sorted = [.. values.Select(value => value.Value).Order()];
        int half = sorted.Length / 2;
        double median = sorted.Length % 2 == 1 ? sorted[half] : (sorted[half - 1] + sorted[half]) / 2;
        double randomSquares = values.Sum(value => value.Random * value.Random);
        return new EffectHour(
            hour, quantity, values.Length,
            new Measured(sorted.Average(), values.Average(value => value.Systematic), double.Sqrt(randomSquares) / values.Length),
            sorted[0], sorted[^1], median);
    }
}
