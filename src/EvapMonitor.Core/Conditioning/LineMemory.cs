using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>
/// The window partials of a line's signals over the recent past. A live evaluation keeps one and adds window by window; a day's evaluation fills a fresh one.
/// Either way a window comes out the same, because a partial depends on readings alone.
/// </summary>
public sealed class LineMemory
{
    private readonly IReadOnlyList<Instrument> _instruments;
    private readonly long _step, _suspectAfter, _lookBack;
    private WindowGrid _grid;
    private WindowPartial[][] _partials;

    /// <summary>An empty memory.</summary>
    /// <param name="instruments">The instruments, one for each signal.</param>
    /// <param name="window">Length of a window.</param>
    /// <param name="suspectAfter">How long an instrument must have been suspect to be left out.</param>
    /// <param name="keys">Those whose samples tell whether the line is steady; null: none.</param>
    /// <param name="lookBack">How far before a window the verdicts on what the line was doing look.</param>
    public LineMemory(IReadOnlyList<Instrument> instruments, TimeSpan window, TimeSpan suspectAfter, IReadOnlyList<Instrument>? keys = null, TimeSpan lookBack = default)
    {
        Keys = new KeySamples(keys ?? []);
        _lookBack = (long)lookBack.TotalMilliseconds;
        (_instruments, _suspectAfter) = (instruments, (long)suspectAfter.TotalMilliseconds);
        Suspicions = new Suspicions((long)window.TotalMilliseconds, suspectAfter);
        _step = (long)window.TotalMilliseconds;
        _grid = new WindowGrid(0, _step, 0);
        _partials = [.. instruments.Select(_ => Array.Empty<WindowPartial>())];
    }

    /// <summary>The windows that are known.</summary>
    internal WindowGrid Grid => _grid;

    /// <summary>Partials by signal and window of <see cref="Grid"/>.</summary>
    internal WindowPartial[][] Partials => _partials;

    /// <summary>Samples of the key signals over the same span.</summary>
    internal KeySamples Keys { get; }

    /// <summary>The verdicts on instruments.</summary>
    internal Suspicions Suspicions { get; }

    /// <summary>Start of the windows that must be judged before those from an instant on can be evaluated.</summary>
    internal long JudgedFrom(long from) => from - _suspectAfter - Milliseconds.Modulo(from - _suspectAfter, _step);

    /// <summary>Forgets all windows from the one that holds an instant: its readings have changed.</summary>
    public void Forget(long from)
    {
        Suspicions.Forget(from - Milliseconds.Modulo(from, _step));
        if (from < _grid.End) Keep(_grid.Start, long.Max(_grid.Start, from - Milliseconds.Modulo(from, _step)));
    }

    /// <summary>From which instant windows are missing before those of [from, to) can be evaluated; <paramref name="to"/> when none are.</summary>
    public long MissingFrom(long from, long to)
    {
        long start = StartFor(from);
        return _grid.Count == 0 || start < _grid.Start || start > _grid.End ? start : long.Min(_grid.End, to);
    }

    /// <summary>Adds the windows of [<see cref="MissingFrom"/>, to) and drops those that are no longer needed.</summary>
    /// <param name="readings">Readings by signal, from the longest stale-after before the missing windows on.</param>
    /// <param name="from">Start of the span that is to be evaluated.</param>
    /// <param name="to">Its end; on the grid.</param>
    public void Fill(IReadOnlyDictionary<string, ReadingSeries> readings, long from, long to)
    {
        long missing = MissingFrom(from, to), start = StartFor(from);
        Keep(start, missing);
        var added = WindowGrid.Between(missing, to, TimeSpan.FromMilliseconds(_step));
        if (added.Count == 0) return;
        Keys.Add(readings, added.End);
        for (int i = 0; i < _partials.Length; i++)
        {
            ReadingSeries series = readings.TryGetValue(_instruments[i].Signal, out ReadingSeries? found) ? found : new ReadingSeries();
            _partials[i] = [.. _partials[i], .. SignalPartials.Of(_instruments[i], series, added)];
        }

        _grid = new WindowGrid(start, _step, _partials.Length == 0 ? 0 : _partials[0].Length);
    }

    private long StartFor(long from)
    {
        long start = long.Min(JudgedFrom(from) - (long)LineConditioning.Memory.TotalMilliseconds, from - _lookBack);
        return start - Milliseconds.Modulo(start, _step);
    }

    private void Keep(long start, long end)
    {
        Keys.Keep(start, end);
        if (_grid.Count == 0 || start >= _grid.End || end <= _grid.Start || start < _grid.Start)
        {
            _partials = [.. _instruments.Select(_ => Array.Empty<WindowPartial>())];
            _grid = new WindowGrid(start, _step, 0);
            return;
        }

        int first = (int)((start - _grid.Start) / _step), count = (int)((long.Min(end, _grid.End) - start) / _step);
        for (int i = 0; i < _partials.Length; i++) _partials[i] = _partials[i][first..(first + count)];
        _grid = new WindowGrid(start, _step, count);
    }
}
