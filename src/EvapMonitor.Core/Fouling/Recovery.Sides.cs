using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Readings;
using MathNet.Numerics.Distributions;

namespace EvapMonitor.Core.Fouling;

/// <content>The two sides, brought together.</content>
internal sealed partial record Recovery
{
    /// <summary>What ln U may fall or rise in an hour where no growth could be drawn, as a standard deviation.</summary>
    private const double UsualGrowth = 0.02 / 24;

    /// <summary>Variance of the Hodges-Lehmann shift to that of means, where the scatter is normal: π/3.</summary>
    private const double Efficiency = double.Pi / 3;

    private sealed class Sides(SurfaceTable table, int[] growth, int[] before, int[] after, CleanReference one, CleanReference other, bool changed)
    {
        private readonly SurfaceConditions _mean = Mean(table, before);
        private double _slope;

        public Recovery Compare()
        {
            double[] served = [.. growth.Select(i => table.Served[i])];
            bool drawn = growth.Length >= 12;
            if (drawn) _slope = Robust.Slope(served, [.. growth.Select(i => Normal(i, one))]).Slope;
            double turn = table.Served[before[^1]] + 0.5;
            double[] left = [.. before.Select(i => Carried(i, one, turn))], right = [.. after.Select(i => Carried(i, other, turn))];
            double rise = Robust.Shift(left, right);
            double own = Variance(served, turn, drawn, sideBefore: true, sideAfter: true);
            double conditions = changed ? Level(before, one) + Level(after, other) : one.StepVariance(_mean, Mean(table, after));
            double standard = double.Sqrt(own + conditions);
            double statistic = rise / standard;
            double freedom = one.HourScatter > 0 ? 60 : double.Max(before.Length + after.Length - 4, 3);
            double beforeLog = Robust.Location(left), afterLog = beforeLog + rise;
            double clean = Knows(other) ? double.Exp(-other.Level) : double.NaN;
            return new Recovery
            {
                Test = new RecoveryTest(new Measured(rise, 0, standard), statistic, StudentT.CDF(0, 1, freedom, -statistic), before.Length, after.Length),
                Before = Inverse(beforeLog, Variance(served, turn, drawn, sideBefore: true, sideAfter: false)),
                After = Inverse(afterLog, Variance(served, turn, drawn, sideBefore: false, sideAfter: true)),
                Clean = new Measured(clean, 0, clean * other.LevelUncertainty),
            };
        }

        /// <summary>ln of the coefficient at the conditions of the other side's reference, or at the mean conditions before.</summary>
        private double Normal(int i, CleanReference reference)
        {
            SurfaceConditions at = SurfaceConditions.From(table.ConditionsOf(i));
            if (Knows(other) && Knows(reference))
            {
                double whole = double.Exp(-table.LogCoefficient[i]) - double.Exp(-reference.Expect(at).LogCoefficient) + double.Exp(-other.Level);
                if (whole > 0) return -double.Log(whole);
            }

            double log = table.LogCoefficient[i];
            for (int t = 0; t < SurfaceTable.Terms; t++)
            {
                double step = reference.Held(at[t], t) - reference.Held(_mean[t], t);
                if (double.IsFinite(step)) log -= reference.Slopes[t] * step;
            }

            return log;
        }

        private double Carried(int i, CleanReference reference, double turn) => Normal(i, reference) - (_slope * (table.Served[i] - turn));

        /// <summary>Variance from the scatter of the hours: each side is the mean of its hours, both carried to the turn by one slope.</summary>
        private double Variance(double[] served, double turn, bool drawn, bool sideBefore, bool sideAfter)
        {
            double[] weights = new double[growth.Length + after.Length], hours = [.. growth.Concat(after).Select(i => table.At[i] / (double)Milliseconds.Hour)];
            double distance = 0;
            for (int k = 0; sideBefore && k < before.Length; k++)
            {
                weights[growth.Length - before.Length + k] -= 1.0 / before.Length;
                distance += (table.Served[before[k]] - turn) / before.Length;
            }

            for (int k = 0; sideAfter && k < after.Length; k++)
            {
                weights[growth.Length + k] += 1.0 / after.Length;
                distance -= (table.Served[after[k]] - turn) / after.Length;
            }

            double[] slope = Lines.Slope(served);
            for (int k = 0; drawn && k < growth.Length; k++) weights[k] += distance * slope[k];
            double assumed = drawn ? 0 : distance * UsualGrowth;
            return (Efficiency * Noise().Variance(weights, hours)) + (assumed * assumed);
        }

        private HourNoise Noise()
        {
            double[] left = [.. before.Select(i => Carried(i, one, 0))], right = [.. after.Select(i => Carried(i, other, 0))];
            double scatter = double.Sqrt(((left.Length * double.Pow(Robust.Spread(left), 2)) + (right.Length * double.Pow(Robust.Spread(right), 2))) / (left.Length + right.Length));
            double random = before.Concat(after).Average(i => table.Random[i]);
            return new HourNoise(double.Max(double.Max(scatter, random), one.HourScatter), one.SlowShare, true);
        }

        private double Level(int[] hours, CleanReference reference)
        {
            (double log, double standard, _) = reference.Expect(Mean(table, hours));
            double share = standard * double.Exp(other.Level - log);
            return share * share;
        }

        private static Measured Inverse(double log, double variance) => new(double.Exp(-log), 0, double.Exp(-log) * double.Sqrt(variance));

        private static SurfaceConditions Mean(SurfaceTable table, int[] hours)
        {
            double[] mean = new double[SurfaceTable.Terms];
            for (int t = 0; t < mean.Length; t++)
            {
                double[] known = [.. hours.Select(i => table.Condition[t][i]).Where(double.IsFinite)];
                mean[t] = known.Length > 0 ? known.Average() : double.NaN;
            }

            return SurfaceConditions.From(mean);
        }
    }
}
