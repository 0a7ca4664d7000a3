using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Coefficients;

/// <summary>An instrument that no longer agrees with the others as it used to.</summary>
/// <param name="Since">About the first day of the change, some days early where it is small, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="Change">By how much more (or less) the others now want to add than before, SI unit.</param>
/// <param name="Scatter">Day-to-day standard deviation of that before the change, same unit.</param>
public sealed record CorrectionChange(long Since, double Change, double Scatter)
{
    /// <summary>Days of the past against which a day is held.</summary>
    public const int Baseline = 30;

    /// <summary>Days that there must be before anything is said.</summary>
    public const int LeastDays = 15;

    /// <summary>Hours that make a day.</summary>
    public const int LeastHours = 4;

    /// <summary>A difference counts up to this many standard deviations, so that one wild day raises nothing.</summary>
    private const double MostInStandards = 4;

    /// <summary>Reference value of the cumulative sum, in standard deviations: half of the change that it finds soonest.</summary>
    private const double Reference = 0.5;

    /// <summary>
    /// A scatter and a median of n days are uncertain themselves, which shortens the runs between false alarms: the scatter is widened by 1 + 4/n, found by simulation.
    /// </summary>
    private const double FewDays = 4;

    /// <summary>Within this many standard deviations of a day a value is back where it was.</summary>
    private const double BackWithin = 1;

    /// <summary>A change under this share of a reading's standard uncertainty is not worth a word, however sure it is.</summary>
    private const double WorthAWord = 0.25;

    /// <summary>1 % of a reading's uncertainty is the least scatter that is believed: a smaller one is rounding.</summary>
    private const double LeastScatterShare = 0.01;

    /// <summary>
    /// Holds each day's median against the median of the 30 days before it, by cumulative sums (Page 1954). The limit is chosen for one false alarm per line and
    /// year by Siegmund's approximation of the run length, ARL ≈ (e^(2kb) − 2kb − 1)/(2k²), b = h + 1.166 (Siegmund 1985; from memory), k = ½, both directions.
    /// It informs and never alters a result.
    /// </summary>
    /// <param name="hours">Differences by the hour, ascending: start of the hour, SI unit.</param>
    /// <param name="standard">Standard uncertainty of a reading, same unit, as a size.</param>
    /// <param name="recalibrated">When the instrument was last set right: nothing before counts; null: never.</param>
    /// <param name="signals">How many instruments of the line are judged so.</param>
    /// <returns>The change that stands at the end; null when there is none.</returns>
    public static CorrectionChange? Find(IReadOnlyList<(long Hour, double Difference)> hours, double standard, long? recalibrated, int signals)
    {
        (long Day, double Median)[] days = [.. hours.Where(hour => recalibrated is not { } from || hour.Hour >= from)
            .GroupBy(hour => Milliseconds.DayOf(hour.Hour)).Where(day => day.Count() >= LeastHours).Select(day => (day.Key, Median(day.Select(hour => hour.Difference))))];
        double limit = Limit(signals), up = 0, down = 0, upBefore = 0, downBefore = 0, scatterBefore = 0;
        double stood = 0;
        long upSince = 0, downSince = 0;
        CorrectionChange? stands = null;
        for (int i = 0; i < days.Length; i++)
        {
            double[] past = [.. days[..i].Where(day => day.Day >= days[i].Day - (Baseline * Milliseconds.Day)).Select(day => day.Median)];
            if (past.Length < LeastDays) continue;
            double middle = Median(past), scatter = double.Max(ScatterOf(past, middle) * (1 + (FewDays / past.Length)), LeastScatterShare * standard);
            double off = double.Clamp((days[i].Median - middle) / scatter, -MostInStandards, MostInStandards);
            if (up == 0) (upSince, upBefore, scatterBefore) = (days[i].Day, middle, scatter);
            if (down == 0) (downSince, downBefore, scatterBefore) = (days[i].Day, middle, up == 0 ? scatter : scatterBefore);
            up = double.Max(0, up + off - Reference);
            down = double.Max(0, down - off - Reference);
            if (stands is null && up <= limit && down <= limit) continue;
            (long since, double before) = stands is not null ? (stands.Since, stood) : up > limit ? (upSince, upBefore) : (downSince, downBefore);
            stood = before;
            stands = new CorrectionChange(since, Median(days[int.Max(0, i - 2)..(i + 1)].Select(day => day.Median)) - before, stands?.Scatter ?? scatterBefore);
            // What was put right again is no change any more.
            if (double.Abs(stands.Change) < BackWithin * stands.Scatter) (stands, up, down) = (null, 0, 0);
        }

        return stands is not null && double.Abs(stands.Change) >= WorthAWord * standard ? stands : null;
    }

    /// <summary>The sum at which a change is told, in standard deviations of a day.</summary>
    /// <param name="signals">How many instruments are judged.</param>
    public static double Limit(int signals)
    {
        // Two directions for each instrument share one false alarm in a year.
        double wanted = 365.0 * 2 * int.Max(1, signals), b = 1;
        for (int i = 0; i < 60; i++) b = double.Log((wanted * 2 * Reference * Reference) + (2 * Reference * b) + 1) / (2 * Reference);
        return b - 1.166;
    }

    private static double ScatterOf(double[] values, double middle) => 1.4826 * Median(values.Select(value => double.Abs(value - middle)));

    private static double Median(IEnumerable<double> values)
    {
        double[] sorted = [.. values.Order()];
        return sorted.Length % 2 == 1 ? sorted[sorted.Length / 2] : (sorted[(sorted.Length / 2) - 1] + sorted[sorted.Length / 2]) / 2;
    }
}
