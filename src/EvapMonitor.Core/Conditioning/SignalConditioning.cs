using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>
/// Turns the readings of one signal into window means with two-part uncertainty.
/// A value holds (or is joined by a straight line) to the next reading, but never longer than the signal's stale-after; nothing after a window's end can
/// change that window, so that a live window and a recomputed one are the same.
/// </summary>
internal sealed class SignalConditioning
{
    /// <summary>Least share of good time for a window to have a value.</summary>
    public const double MinimumGoodShare = 0.6;

    private readonly Instrument _instrument;
    private readonly WindowGrid _grid;
    private readonly ConditionedSignal _result;
    private readonly double[] _weighted;
    private readonly double[] _goodTime;
    private readonly double[] _uncertainTime;
    private readonly double[] _squares;
    private readonly int[] _pairs;

    private SignalConditioning(Instrument instrument, WindowGrid grid)
    {
        _instrument = instrument;
        _grid = grid;
        _result = new ConditionedSignal(instrument, grid);
        _weighted = new double[grid.Count];
        _goodTime = new double[grid.Count];
        _uncertainTime = new double[grid.Count];
        _squares = new double[grid.Count];
        _pairs = new int[grid.Count];
    }

    /// <summary>Conditions one signal.</summary>
    /// <param name="instrument">The instrument.</param>
    /// <param name="readings">Its readings, at least from stale-after before the grid.</param>
    /// <param name="grid">The windows.</param>
    /// <param name="isFrozen">Says of a reading (its instant, still since) whether the neighbours prove it frozen.</param>
    public static ConditionedSignal Condition(Instrument instrument, ReadingSeries readings, WindowGrid grid, Func<long, long, bool> isFrozen)
    {
        var work = new SignalConditioning(instrument, grid);
        work.Walk(readings, isFrozen);
        work.Close();
        return work._result;
    }

    private void Walk(ReadingSeries readings, Func<long, long, bool> isFrozen)
    {
        long stale = (long)_instrument.StaleAfter.TotalMilliseconds;
        int from = readings.IndexFrom(_grid.Start - stale), to = readings.IndexFrom(_grid.End);
        long[] still = ReadingVerdicts.StillSince(_instrument, readings, from, to);
        double previous = double.NaN;
        long previousAt = long.MinValue;
        for (int i = from; i < to; i++)
        {
            long at = readings.At[i];
            long next = i + 1 < to ? readings.At[i + 1] : long.MaxValue;
            long until = long.Min(long.Min(next, at + stale), _grid.End);
            Rejection? rejection = ReadingVerdicts.Judge(_instrument, readings.Value[i], readings.Quality[i])
                ?? (isFrozen(at, still[i - from]) ? Rejection.Frozen : null);
            int window = WindowOf(at);
            if (rejection is { } reason)
            {
                if (window >= 0) _result.Rejected[window, (int)reason]++;
                previous = double.NaN;
                continue;
            }

            double value = _instrument.Unit.ToSi(readings.Value[i]);
            if (window >= 0)
            {
                _result.Samples[window]++;
                if (at - previousAt <= stale && double.IsFinite(previous))
                {
                    double difference = value - previous;
                    _squares[window] += difference * difference;
                    _pairs[window]++;
                }
            }

            double target = Target(readings, i, to, at + stale);
            Spread(at, until, next, value, target, readings.Quality[i] == Quality.Uncertain);
            (previous, previousAt) = (value, at);
        }
    }

    /// <summary>The value toward which a linear signal moves: the next reading if it is good and near; NaN to hold.</summary>
    private double Target(ReadingSeries readings, int i, int to, long limit)
    {
        if (_instrument.Interpolation != Interpolation.Linear || i + 1 >= to || readings.At[i + 1] > limit) return double.NaN;
        return ReadingVerdicts.Judge(_instrument, readings.Value[i + 1], readings.Quality[i + 1]) is null
            ? _instrument.Unit.ToSi(readings.Value[i + 1])
            : double.NaN;
    }

    private void Spread(long at, long until, long next, double value, double target, bool uncertain)
    {
        for (int window = int.Max(WindowOf(at), 0); window < _grid.Count; window++)
        {
            long start = long.Max(at, _grid.StartOf(window)), end = long.Min(until, _grid.StartOf(window) + _grid.Step);
            if (end <= start)
            {
                if (_grid.StartOf(window) >= until) break;
                continue;
            }

            double span = end - start;
            // A reading beyond this window's end must not move this window: hold there instead of joining.
            bool joined = double.IsFinite(target) && next < _grid.StartOf(window) + _grid.Step;
            double mean = joined ? value + ((target - value) * (((start + end) / 2.0) - at) / (next - at)) : value;
            _weighted[window] += mean * span;
            _goodTime[window] += span;
            if (uncertain) _uncertainTime[window] += span;
        }
    }

    private void Close()
    {
        for (int window = 0; window < _grid.Count; window++)
        {
            double share = _goodTime[window] / _grid.Step;
            _result.GoodShare[window] = (float)share;
            if (share < MinimumGoodShare)
            {
                _result.Mean[window] = _result.Systematic[window] = _result.Random[window] = double.NaN;
                continue;
            }

            double mean = _weighted[window] / _goodTime[window];
            _result.Mean[window] = mean;
            _result.Systematic[window] = _instrument.Accuracy.Standard(mean);
            _result.Random[window] = Scatter(window, mean)
                / double.Sqrt(int.Max(1, _result.Samples[window]))
                * (1 + (2 * _uncertainTime[window] / _goodTime[window]));
        }
    }

    /// <summary>
    /// Scatter of single readings from the mean square successive difference (von Neumann 1941), which a slow drift of the process does not enter. The median
    /// over the windows of the trailing hour is taken, so that one step of the process (a start, a change of load) does not count as an hour of noise; its
    /// known distance from the mean for few pairs is made good (Wilson and Hilferty 1931). With too few readings the accuracy stands in.
    /// </summary>
    private double Scatter(int window, double mean)
    {
        Span<double> variances = stackalloc double[_grid.PerHour];
        int count = 0;
        for (int back = int.Max(0, window - _grid.PerHour + 1); back <= window; back++)
        {
            int pairs = _pairs[back];
            if (pairs == 0) continue;
            double toMedian = 1 - (2.0 / (9 * pairs));
            variances[count++] = _squares[back] / (2 * pairs * toMedian * toMedian * toMedian);
        }

        if (count < 3) return _instrument.Accuracy.Standard(mean);
        variances = variances[..count];
        variances.Sort();
        return double.Sqrt(count % 2 == 1 ? variances[count / 2] : (variances[(count / 2) - 1] + variances[count / 2]) / 2);
    }

    private int WindowOf(long at) => at < _grid.Start ? -1 : (int)((at - _grid.Start) / _grid.Step);
}
