namespace EvapMonitor.Core.Readings;

/// <summary>Consecutive evaluation windows of one length on the UTC grid.</summary>
/// <param name="Start">Start of the first window, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="Step">Length of a window, ms; divides an hour.</param>
/// <param name="Count">Number of windows.</param>
public readonly record struct WindowGrid(long Start, long Step, int Count)
{
    /// <summary>End of the last window.</summary>
    public long End => Start + (Step * Count);

    /// <summary>Start of a window.</summary>
    public long StartOf(int window) => Start + (Step * window);

    /// <summary>Number of windows in an hour.</summary>
    public int PerHour => (int)(Milliseconds.Hour / Step);

    /// <summary>The grid between two instants; both are moved outward to the grid.</summary>
    public static WindowGrid Between(long from, long to, TimeSpan window)
    {
        long step = (long)window.TotalMilliseconds;
        long start = from - Milliseconds.Modulo(from, step);
        return new WindowGrid(start, step, (int)((to - start + step - 1) / step));
    }
}

/// <summary>Spans in milliseconds, the resolution of every instant in the inner loops.</summary>
public static class Milliseconds
{
    /// <summary>One minute.</summary>
    public const long Minute = 60_000;

    /// <summary>One hour.</summary>
    public const long Hour = 60 * Minute;

    /// <summary>One day.</summary>
    public const long Day = 24 * Hour;

    /// <summary>Remainder that is never negative, so that instants before 1970 fall on the same grid.</summary>
    public static long Modulo(long value, long step) => ((value % step) + step) % step;

    /// <summary>Start of the UTC day that holds an instant.</summary>
    public static long DayOf(long at) => at - Modulo(at, Day);
}
