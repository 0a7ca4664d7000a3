using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>
/// Learns what hours scatter from stretches of three days without an interruption, conditions and a straight drift taken out: the scatter of hours, and that of the
/// means of twelve, which the slow part governs. What taking out the drift removes of each part is known exactly and given back.
/// </summary>
internal static class NoiseLearning
{
    private const int Stretch = 72, Block = 12, FewestHours = 30, FewestInBlock = 4, FewestStretches = 4;

    /// <summary>What is left of a variance of 1 in hours and in means of twelve: for noise that is new every hour, and for slow noise.</summary>
    private static readonly (double Hours, double Blocks) KeptOfFast = Kept(new HourNoise(1, 0, true)), KeptOfSlow = Kept(new HourNoise(1, 1, true));

    /// <summary>Learns from the hours of one use; what residuals within days show, where there are no such stretches.</summary>
    public static HourNoise Of(SurfaceTable table, SurfaceUse use, int from, int limit, int[] segment, bool[] settled, double[] slopes, HourNoise withinDays)
    {
        List<double> hours = [], blocks = [];
        double thinner = 0;
        int stretches = 0;
        for (int start = from; start < limit;)
        {
            long end = table.At[start] + (Stretch * Milliseconds.Hour);
            int stop = start;
            while (stop < limit && table.At[stop] < end && segment[stop] == segment[start]) stop++;
            int[] rows = [.. Enumerable.Range(start, stop - start).Where(i => settled[i] && table.Use[i] == use)];
            if (rows.Length >= FewestHours && Residuals(table, rows, slopes) is { } left)
            {
                stretches++;
                hours.AddRange(left);
                foreach (IGrouping<long, int> block in Enumerable.Range(0, rows.Length).GroupBy(k => (table.At[rows[k]] - table.At[rows[0]]) / (Block * Milliseconds.Hour)))
                {
                    int count = block.Count();
                    if (count < FewestInBlock) continue;
                    blocks.Add(block.Average(k => left[k]));
                    thinner += Block / (double)count;
                }
            }

            // A stretch that was cut short is of no use to the next one.
            start = int.Max(stop, start + 1);
        }

        return stretches < FewestStretches || blocks.Count < 2 * FewestStretches ? withinDays : Solve(Square(hours), Square(blocks), thinner / blocks.Count);
    }

    /// <param name="ofHours">Mean square of the hours.</param>
    /// <param name="ofBlocks">Mean square of the means of blocks.</param>
    /// <param name="thinner">How many times fewer hours the blocks have than they could: the fast part of their means is larger by so much.</param>
    private static HourNoise Solve(double ofHours, double ofBlocks, double thinner)
    {
        double fastBlocks = KeptOfFast.Blocks * thinner, determinant = (KeptOfFast.Hours * KeptOfSlow.Blocks) - (fastBlocks * KeptOfSlow.Hours);
        double fast = ((ofHours * KeptOfSlow.Blocks) - (ofBlocks * KeptOfSlow.Hours)) / determinant;
        double slow = ((KeptOfFast.Hours * ofBlocks) - (fastBlocks * ofHours)) / determinant;
        if (slow <= 0) return new HourNoise(double.Sqrt(ofHours / KeptOfFast.Hours), 0, true);
        if (fast <= 0) return new HourNoise(double.Sqrt(ofBlocks / KeptOfSlow.Blocks), 1, true);
        return new HourNoise(double.Sqrt(fast + slow), slow / (fast + slow), true);
    }

    private static double[]? Residuals(SurfaceTable table, int[] rows, double[] slopes)
    {
        double[] one = new double[rows.Length], time = new double[rows.Length], y = new double[rows.Length];
        for (int k = 0; k < rows.Length; k++)
        {
            one[k] = 1;
            time[k] = (table.At[rows[k]] - table.At[rows[0]]) / (double)Milliseconds.Hour;
            y[k] = table.LogCoefficient[rows[k]];
            for (int t = 0; t < SurfaceTable.Terms; t++)
            {
                if (slopes[t] != 0) y[k] -= slopes[t] * table.Condition[t][rows[k]];
            }

            if (double.IsNaN(y[k])) return null;
        }

        if (OrthogonalFit.Solve([one, time], y) is not { } line) return null;
        for (int k = 0; k < rows.Length; k++) y[k] -= line.Coefficients[0] + (line.Coefficients[1] * time[k]);
        double limit = 3 * Robust.Spread(y);
        for (int k = 0; k < rows.Length; k++) y[k] = double.Clamp(y[k], -limit, limit);
        return y;
    }

    private static double Square(List<double> values) => values.Sum(value => value * value) / values.Count;

    private static (double Hours, double Blocks) Kept(HourNoise noise)
    {
        double[] times = [.. Enumerable.Range(0, Stretch).Select(i => (double)i)];
        double hours = 0, blocks = 0;
        for (int i = 0; i < Stretch; i++)
        {
            double[] left = Lines.At(times, i);
            for (int k = 0; k < Stretch; k++) left[k] = (k == i ? 1 : 0) - left[k];
            hours += noise.Variance(left, times) / Stretch;
        }

        for (int b = 0; b < Stretch / Block; b++)
        {
            // The mean of a block less the line at its middle.
            double[] left = Lines.At(times, (b * Block) + ((Block - 1) / 2.0));
            for (int k = 0; k < Stretch; k++) left[k] = (k / Block == b ? 1.0 / Block : 0) - left[k];
            blocks += noise.Variance(left, times) / (Stretch / Block);
        }

        return (hours, blocks);
    }
}
