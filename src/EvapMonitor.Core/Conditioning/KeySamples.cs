using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>Samples by the minute of the signals that tell whether a line is steady: the value in force at each full minute of UTC, of readings before it alone.</summary>
internal sealed class KeySamples(IReadOnlyList<Instrument> instruments)
{
    private double[][] _values = [.. instruments.Select(_ => Array.Empty<double>())];
    private long _first;

    /// <summary>The instruments.</summary>
    public IReadOnlyList<Instrument> Instruments => instruments;

    /// <summary>Keeps the samples of (start, end] and no others.</summary>
    public void Keep(long start, long end)
    {
        long first = NumberOf(start) + 1, last = long.Min(NumberOf(end), _first + Count - 1);
        if (Count == 0 || first < _first || first > last) (_first, _values) = (first, [.. instruments.Select(_ => Array.Empty<double>())]);
        else (_values, _first) = ([.. _values.Select(one => one[(int)(first - _first)..(int)(last - _first + 1)])], first);
    }

    /// <summary>Adds those that are missing up to an instant.</summary>
    public void Add(IReadOnlyDictionary<string, ReadingSeries> readings, long end)
    {
        long next = _first + Count, last = NumberOf(end);
        if (last < next) return;
        for (int i = 0; i < _values.Length; i++)
        {
            ReadingSeries series = readings.TryGetValue(instruments[i].Signal, out ReadingSeries? found) ? found : new ReadingSeries();
            var added = new double[last - next + 1];
            for (int k = 0; k < added.Length; k++) added[k] = Sample(instruments[i], series, (next + k) * Milliseconds.Minute);
            _values[i] = [.. _values[i], .. added];
        }
    }

    /// <summary>The samples of a signal in (from, to], and the number of the first.</summary>
    public ReadOnlySpan<double> Between(int signal, long from, long to, out long first)
    {
        first = long.Max(NumberOf(from) + 1, _first);
        long end = long.Min(NumberOf(to) + 1, _first + Count);
        return end <= first ? [] : _values[signal].AsSpan((int)(first - _first), (int)(end - first));
    }

    /// <summary>Number of the last full minute at or before an instant.</summary>
    public static long NumberOf(long at) => (at - Milliseconds.Modulo(at, Milliseconds.Minute)) / Milliseconds.Minute;

    private int Count => _values.Length == 0 ? 0 : _values[0].Length;

    private static double Sample(Instrument instrument, ReadingSeries readings, long at)
    {
        int last = readings.IndexFrom(at) - 1;
        if (last < 0 || at - readings.At[last] > instrument.StaleAfter.TotalMilliseconds) return double.NaN;
        return SignalPartials.Judge(instrument, readings.Value[last], readings.Quality[last]) is null ? instrument.Unit.ToSi(readings.Value[last]) : double.NaN;
    }
}
