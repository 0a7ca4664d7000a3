using System.Globalization;

namespace EvapMonitor.Core.Fouling;

/// <summary>Makes clean expectations of slopes and of the levels after cleanings.</summary>
internal static class CleanLevels
{
    /// <summary>What cleanings differ in at least, as a share: it keeps one lucky level from outweighing the rest.</summary>
    private const double LeastScatter = 0.003;

    /// <summary>Conditions may leave those of the level by this much where no range was learnt: ln solids, K, ln flux.</summary>
    private static readonly double[] Nearby = [0.05, 1, 0.05];

    /// <summary>
    /// The level of one sample. Fouling grows from the first hour on: the hours are carried back to the start of production along their own slope (Theil-Sen), and
    /// their middle is that of Hodges and Lehmann.
    /// </summary>
    public static CleanLevel? Of(SurfaceTable table, LevelSample sample, ConditionSlopes slopes)
    {
        int n = sample.Hours.Length;
        double[] at = new double[SurfaceTable.Terms], y = new double[n], time = new double[n];
        for (int t = 0; t < SurfaceTable.Terms; t++)
        {
            int known = 0;
            double sum = 0;
            foreach (int i in sample.Hours)
            {
                if (double.IsNaN(table.Condition[t][i])) continue;
                sum += table.Condition[t][i];
                known++;
            }

            at[t] = known > 0 ? sum / known : double.NaN;
        }

        double random = 0;
        for (int k = 0; k < n; k++)
        {
            int i = sample.Hours[k];
            time[k] = table.Served[i] - sample.Origin;
            y[k] = table.LogCoefficient[i];
            random += table.Random[i] / n;
            for (int t = 0; t < SurfaceTable.Terms; t++)
            {
                if (double.IsFinite(table.Condition[t][i])) y[k] -= slopes.Slopes[t] * (table.Condition[t][i] - at[t]);
            }
        }

        double slope = Robust.Slope(time, y).Slope;
        for (int k = 0; k < n; k++) y[k] -= slope * time[k];
        HourNoise noise = slopes.Noise.Learnt ? slopes.Noise : slopes.Noise with { Sigma = Robust.Spread(y) };
        noise = noise with { Sigma = double.Max(noise.Sigma, random) };
        double level = Robust.Location(y), whole = double.Exp(-level), clean = whole - sample.Carried.Value;
        double own = whole * double.Sqrt(1.1 * noise.Variance(Lines.Intercept(time), time));
        // More scale than there is resistance cannot be: then these hours tell nothing.
        return clean > 0.1 * whole ? new CleanLevel(-double.Log(clean), double.Hypot(own, sample.Carried.Random) / clean, at) : null;
    }

    /// <summary>The expectation from the levels after the latest cleanings: the mean of those that cannot be told from the best one. Null when none tells anything.</summary>
    public static CleanReference? Combine(CleanReference frame, SurfaceTable table, IReadOnlyList<LevelSample> samples, ConditionSlopes slopes)
    {
        CleanLevel[] levels = [.. samples.Select(sample => Of(table, sample, slopes)).OfType<CleanLevel>()];
        if (levels.Length == 0) return null;
        CleanLevel[] chosen = [.. Best(levels, slopes)];
        double weights = 0, level = 0;
        double[] at = new double[SurfaceTable.Terms];
        foreach (CleanLevel one in chosen)
        {
            double weight = Weight(one);
            weights += weight;
            level += weight * one.Value;
            for (int t = 0; t < at.Length; t++) at[t] += weight * one.At[t];
        }

        level /= weights;
        for (int t = 0; t < at.Length; t++) at[t] /= weights;
        double own = 0, spread = 0;
        foreach (CleanLevel one in chosen)
        {
            double weight = Weight(one) / weights, away = one.Value - level;
            for (int t = 0; t < at.Length; t++) away -= double.IsFinite(at[t]) ? slopes.Slopes[t] * (one.At[t] - at[t]) : 0;
            own += weight * weight * one.Standard * one.Standard;
            spread += weight * weight * away * away;
        }

        string conditions = slopes.Enough ? Words(slopes) : string.Create(CultureInfo.InvariantCulture,
            $"conditions not yet learnt ({slopes.Hours} hours of {slopes.Days} days before; needs {ConditionSlopes.FewestHours} of {ConditionSlopes.FewestDays})");
        return WithRange(frame, table, samples, slopes, at) with
        {
            Basis = slopes.Enough ? ReferenceBasis.Conditions : ReferenceBasis.Level,
            Source = (samples[^1].Before is { } before
                ? string.Create(CultureInfo.InvariantCulture, $"level carried over from product {before} at {chosen.Length} of the last {levels.Length} changes, for want of hours with this product after a cleaning")
                : string.Create(CultureInfo.InvariantCulture, $"level of {chosen.Length} of the last {levels.Length} cleanings with this product, the last on {Day(samples[^1].CleanedAt)}")) + "; " + conditions,
            Level = level,
            LevelUncertainty = double.Sqrt(double.Max(own, chosen.Length > 1 ? spread * chosen.Length / (chosen.Length - 1) : 0)),
            At = SurfaceConditions.From(at),
        };
    }

    /// <summary>A day in plain words.</summary>
    public static string Day(long instant) => DateTimeOffset.FromUnixTimeMilliseconds(instant).ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    private static IEnumerable<CleanLevel> Best(CleanLevel[] levels, ConditionSlopes slopes)
    {
        double Common(CleanLevel level)
        {
            double value = level.Value;
            for (int t = 0; t < SurfaceTable.Terms; t++)
            {
                double step = levels[^1].At[t] - level.At[t];
                if (double.IsFinite(step)) value += slopes.Slopes[t] * step;
            }

            return value;
        }

        CleanLevel best = levels.MaxBy(Common)!;
        foreach (CleanLevel level in levels)
        {
            double variance = (best.Standard * best.Standard) + (level.Standard * level.Standard);
            for (int i = 0; i < SurfaceTable.Terms; i++)
            {
                for (int j = 0; j < SurfaceTable.Terms; j++)
                {
                    double product = (best.At[i] - level.At[i]) * (best.At[j] - level.At[j]) * slopes.Covariance[i, j];
                    if (double.IsFinite(product)) variance += product;
                }
            }

            if (Common(best) - Common(level) <= 2 * double.Sqrt(double.Max(variance, 0))) yield return level;
        }
    }

    private static double Weight(CleanLevel level) => 1 / ((level.Standard * level.Standard) + (LeastScatter * LeastScatter));

    private static CleanReference WithRange(CleanReference frame, SurfaceTable table, IReadOnlyList<LevelSample> samples, ConditionSlopes slopes, double[] at)
    {
        double[] lowest = [.. slopes.Lowest], highest = [.. slopes.Highest];
        for (int t = 0; t < SurfaceTable.Terms; t++)
        {
            if (double.IsFinite(lowest[t]) && slopes.Learnt[t]) continue;
            foreach (int i in samples.SelectMany(sample => sample.Hours))
            {
                double value = table.Condition[t][i];
                if (double.IsNaN(value)) continue;
                lowest[t] = double.MinNumber(lowest[t], value - Nearby[t]);
                highest[t] = double.MaxNumber(highest[t], value + Nearby[t]);
            }
        }

        return frame with { Lowest = SurfaceConditions.From(lowest), Highest = SurfaceConditions.From(highest) };
    }

    private static string Words(ConditionSlopes slopes)
    {
        string[] names = ["solids", "boiling temperature", "flux"];
        string each = string.Join(", ", names.Select((name, t) => string.Create(CultureInfo.InvariantCulture,
            $"{name} {(slopes.Learnt[t] ? $"{slopes.Slopes[t]:0.####} ± {double.Sqrt(slopes.Covariance[t, t]):0.####}" : "0")}{(slopes.Remarks[t].Length > 0 ? $" ({slopes.Remarks[t]})" : "")}")));
        return string.Create(CultureInfo.InvariantCulture, $"conditions learnt from {slopes.Hours} hours of {slopes.Days} days: {each}");
    }
}
