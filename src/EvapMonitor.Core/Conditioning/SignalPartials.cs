using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>
/// Spreads the readings of one signal over windows. A value holds (or is joined by a straight line) to the next reading, but never longer than the signal's
/// stale-after; nothing after a window's end can change that window, so that a live window and a recomputed one are the same.
/// </summary>
internal sealed class SignalPartials
{
    private readonly Instrument _instrument;
    private readonly WindowGrid _grid;
    private readonly WindowPartial[] _windows;

    private SignalPartials(Instrument instrument, WindowGrid grid)
    {
        _instrument = instrument;
        _grid = grid;
        _windows = new WindowPartial[grid.Count];
    }

    /// <summary>Computes the windows of a grid.</summary>
    /// <param name="instrument">The instrument.</param>
    /// <param name="readings">Its readings, at least from stale-after before the grid.</param>
    /// <param name="grid">The windows.</param>
    public static WindowPartial[] Of(Instrument instrument, ReadingSeries readings, WindowGrid grid)
    {
        var work = new SignalPartials(instrument, grid);
        work.Walk(readings);
        return work._windows;
    }

    /// <summary>The reason to leave a reading out by itself, or null. The value is in the signal's unit.</summary>
    public static Rejection? Judge(Instrument instrument, double value, Quality quality)
    {
        if (quality == Quality.Bad) return Rejection.BadQuality;
        if (!double.IsFinite(value)) return Rejection.NotANumber;
        if (instrument.Range is not { } range) return null;
        double si = instrument.Unit.ToSi(value);
        return si < range.Low || si > range.High ? Rejection.OutOfRange : null;
    }

    private void Walk(ReadingSeries readings)
    {
        long stale = (long)_instrument.StaleAfter.TotalMilliseconds;
        int from = readings.IndexFrom(_grid.Start - stale), to = readings.IndexFrom(_grid.End);
        double previous = double.NaN;
        long previousAt = long.MinValue / 2;
        for (int i = from; i < to; i++)
        {
            long at = readings.At[i];
            long next = i + 1 < to ? readings.At[i + 1] : long.MaxValue;
            long until = long.Min(long.Min(next, at + stale), _grid.End);
            int window = WindowOf(at);
            if (Judge(_instrument, readings.Value[i], readings.Quality[i]) is { } reason)
            {
                if (window >= 0) Reject(ref _windows[window], reason);
                previous = double.NaN;
                continue;
            }

            double value = _instrument.Unit.ToSi(readings.Value[i]);
            if (window >= 0)
            {
                ref WindowPartial partial = ref _windows[window];
                partial.Count(value, at - _grid.StartOf(window) - (_grid.Step / 2.0));
                if (at - previousAt <= stale && double.IsFinite(previous))
                {
                    partial.Squares += (value - previous) * (value - previous);
                    partial.Pairs++;
                }
            }

            Spread(at, until, next, value, Target(readings, i, to, at + stale), readings.Quality[i] == Quality.Uncertain);
            (previous, previousAt) = (value, at);
        }
    }

    private static void Reject(ref WindowPartial partial, Rejection reason)
    {
        if (reason == Rejection.BadQuality) partial.Bad++;
        else if (reason == Rejection.NotANumber) partial.NotANumber++;
        else partial.OutOfRange++;
    }

    /// <summary>The value toward which a linear signal moves: the next reading if it is good and near; NaN to hold.</summary>
    private double Target(ReadingSeries readings, int i, int to, long limit)
    {
        if (_instrument.Interpolation != Interpolation.Linear || i + 1 >= to || readings.At[i + 1] > limit) return double.NaN;
        return Judge(_instrument, readings.Value[i + 1], readings.Quality[i + 1]) is null ? _instrument.Unit.ToSi(readings.Value[i + 1]) : double.NaN;
    }

    private void Spread(long at, long until, long next, double value, double target, bool uncertain)
    {
        for (int window = int.Max(WindowOf(at), 0); window < _grid.Count && _grid.StartOf(window) < until; window++)
        {
            long start = long.Max(at, _grid.StartOf(window)), end = long.Min(until, _grid.StartOf(window) + _grid.Step);
            if (end <= start) continue;
            double span = end - start;
            // A reading beyond this window's end must not move this window: hold there instead of joining.
            bool joined = double.IsFinite(target) && next < _grid.StartOf(window) + _grid.Step;
            double mean = joined ? value + ((target - value) * (((start + end) / 2.0) - at) / (next - at)) : value;
            ref WindowPartial partial = ref _windows[window];
            partial.Extend(value);
            partial.Weighted += mean * span;
            partial.GoodTime += span;
            if (uncertain) partial.UncertainTime += span;
        }
    }

    private int WindowOf(long at) => at < _grid.Start ? -1 : (int)((at - _grid.Start) / _grid.Step);
}
