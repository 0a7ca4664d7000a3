namespace EvapMonitor.Core.Conditioning;

/// <summary>
/// Which instruments were suspect in which window of the recent past. A reading is left out once its instrument has been suspect in every window that could be judged
/// for long enough: a passing disturbance must not cost an instrument.
/// </summary>
public sealed class Suspicions(long step, TimeSpan longEnough)
{
    private readonly SortedList<long, int[]> _windows = [];

    /// <summary>True when a window has been judged.</summary>
    internal bool Knows(long at) => _windows.ContainsKey(at);

    /// <summary>Keeps the verdict on a window.</summary>
    internal void Keep(long at, int[] suspects) => _windows[at] = suspects;

    /// <summary>Forgets the windows from an instant on, and those that are long past before another.</summary>
    internal void Forget(long from, long before = long.MinValue)
    {
        while (_windows.Count > 0 && _windows.GetKeyAtIndex(_windows.Count - 1) >= from) _windows.RemoveAt(_windows.Count - 1);
        while (_windows.Count > 0 && _windows.GetKeyAtIndex(0) < before) _windows.RemoveAt(0);
    }

    /// <summary>The instruments that have been suspect for long enough at the window that starts at an instant.</summary>
    internal IReadOnlyList<int> LeftOutAt(long at)
    {
        long span = (long)longEnough.TotalMilliseconds;
        int needed = int.Max(1, (int)(span / step / 2)), judged = 0;
        List<int>? all = null;
        for (long window = at; window > at - span; window -= step)
        {
            if (!_windows.TryGetValue(window, out int[]? suspects)) continue;
            judged++;
            if (all is null) all = [.. suspects];
            else all.RemoveAll(one => !suspects.Contains(one));
            if (all.Count == 0) return [];
        }

        return judged >= needed ? all! : [];
    }
}
