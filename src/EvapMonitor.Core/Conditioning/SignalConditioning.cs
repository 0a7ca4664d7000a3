using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>Turns the partials of one signal into window means with two-part uncertainty.</summary>
internal static class SignalConditioning
{
    /// <summary>Least share of good time for a window to have a value.</summary>
    public const double MinimumGoodShare = 0.6;

    private const double PerSecond = 1000;

    /// <summary>Fewest readings in a window that tell how fast a signal rises.</summary>
    private const int FewestForRate = 3;

    /// <summary>Conditions one signal.</summary>
    /// <param name="instrument">The instrument.</param>
    /// <param name="partials">Its partials on the memory's grid.</param>
    /// <param name="memory">Grid of the partials.</param>
    /// <param name="grid">The windows to condition: a part of the memory's grid, with an hour before it.</param>
    /// <param name="isFrozen">Says of a window (index in the memory's grid) whether the neighbours prove the signal frozen.</param>
    public static ConditionedSignal Condition(Instrument instrument, WindowPartial[] partials, WindowGrid memory, WindowGrid grid, Func<int, bool> isFrozen)
    {
        var result = new ConditionedSignal(instrument, grid);
        int offset = (int)((grid.Start - memory.Start) / grid.Step);
        for (int window = 0; window < grid.Count; window++)
        {
            int at = window + offset;
            ref readonly WindowPartial partial = ref partials[at];
            double share = partial.GoodTime / grid.Step;
            bool frozen = isFrozen(at);
            result.GoodShare[window] = frozen ? 0 : (float)share;
            result.Samples[window] = frozen ? 0 : partial.Samples;
            result.Rejected[window, (int)Rejection.BadQuality] = partial.Bad;
            result.Rejected[window, (int)Rejection.NotANumber] = partial.NotANumber;
            result.Rejected[window, (int)Rejection.OutOfRange] = partial.OutOfRange;
            result.Rejected[window, (int)Rejection.Frozen] = frozen ? int.Max(1, partial.Samples) : 0;
            if (frozen || share < MinimumGoodShare)
            {
                result.Mean[window] = result.Systematic[window] = result.Random[window] = result.Rate[window] = result.RateRandom[window] = double.NaN;
                continue;
            }

            double mean = partial.Weighted / partial.GoodTime;
            result.Mean[window] = mean;
            result.Systematic[window] = instrument.Accuracy.Standard(mean);
            result.Random[window] = Scatter(instrument, partials, at, grid.PerHour, mean)
                / double.Sqrt(int.Max(1, partial.Samples))
                * (1 + (2 * partial.UncertainTime / partial.GoodTime));
            (result.Rate[window], result.RateRandom[window]) = partial.Samples < FewestForRate ? (double.NaN, double.NaN)
                : (partial.Slope * PerSecond, result.Random[window] / double.Sqrt(partial.TimeVariance) * PerSecond);
        }

        return result;
    }

    /// <summary>
    /// Scatter of single readings from the mean square successive difference (von Neumann 1941), which a slow drift of the process does not enter. The median
    /// over the windows of the trailing hour is taken, so that one step of the process (a start, a change of load) does not count as an hour of noise; its
    /// known distance from the mean for few pairs is made good (Wilson and Hilferty 1931). With too few readings the accuracy stands in.
    /// </summary>
    private static double Scatter(Instrument instrument, WindowPartial[] partials, int window, int perHour, double mean)
    {
        Span<double> variances = stackalloc double[perHour];
        int count = 0;
        for (int back = int.Max(0, window - perHour + 1); back <= window; back++)
        {
            int pairs = partials[back].Pairs;
            if (pairs == 0) continue;
            double toMedian = 1 - (2.0 / (9 * pairs));
            variances[count++] = partials[back].Squares / (2 * pairs * toMedian * toMedian * toMedian);
        }

        if (count < 3) return instrument.Accuracy.Standard(mean);
        variances = variances[..count];
        variances.Sort();
        return double.Sqrt(count % 2 == 1 ? variances[count / 2] : (variances[(count / 2) - 1] + variances[count / 2]) / 2);
    }
}
