using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>Laboratory values: each is a point at the instant of its sample and may stand in for a limited time; no mean is made of them.</summary>
public static class Laboratory
{
    /// <summary>Conditions a laboratory signal: in each window the last good sample before its end, while that is valid.</summary>
    /// <param name="instrument">The laboratory's determination, with its accuracy.</param>
    /// <param name="readings">The samples, at least from <paramref name="validFor"/> before the grid.</param>
    /// <param name="validFor">How long a sample stands.</param>
    /// <param name="grid">The windows.</param>
    public static ConditionedSignal Condition(Instrument instrument, ReadingSeries readings, TimeSpan validFor, WindowGrid grid)
    {
        var result = new ConditionedSignal(instrument, grid);
        long valid = (long)validFor.TotalMilliseconds;
        int next = readings.IndexFrom(grid.Start - valid);
        double value = double.NaN;
        long sampledAt = long.MinValue;
        for (int window = 0; window < grid.Count; window++)
        {
            long end = grid.StartOf(window) + grid.Step;
            for (; next < readings.Count && readings.At[next] < end; next++)
            {
                if (SignalPartials.Judge(instrument, readings.Value[next], readings.Quality[next]) is { } reason)
                {
                    if (readings.At[next] >= grid.StartOf(window)) result.Rejected[window, (int)reason]++;
                    continue;
                }

                (value, sampledAt) = (instrument.Unit.ToSi(readings.Value[next]), readings.At[next]);
                if (sampledAt >= grid.StartOf(window)) result.Samples[window]++;
            }

            bool stands = sampledAt != long.MinValue && grid.StartOf(window) - sampledAt < valid;
            result.Mean[window] = stands ? value : double.NaN;
            result.Systematic[window] = stands ? instrument.Accuracy.Standard(value) : double.NaN;
            result.Rate[window] = result.RateRandom[window] = double.NaN;
            result.GoodShare[window] = stands ? 1 : 0;
        }

        return result;
    }
}
