namespace EvapMonitor.Service.Evaluation;

/// <summary>Days that could not be evaluated. Each is tried again after a while, later each time, so that it stops neither its line nor another.</summary>
internal sealed class DaysSetAside(TimeProvider clock)
{
    private static readonly TimeSpan First = TimeSpan.FromSeconds(5), Longest = TimeSpan.FromMinutes(10);

    private readonly Dictionary<(int Line, DateOnly Day), (long Since, TimeSpan Wait)> _days = [];

    /// <summary>The days of a line that are not to be tried now.</summary>
    public IReadOnlyCollection<DateOnly> Of(int line) => [.. _days.Where(pair => pair.Key.Line == line && clock.GetElapsedTime(pair.Value.Since) < pair.Value.Wait).Select(pair => pair.Key.Day)];

    /// <summary>Sets a day aside.</summary>
    /// <returns>For how long.</returns>
    public TimeSpan Add(int line, DateOnly day)
    {
        TimeSpan wait = _days.TryGetValue((line, day), out var before) ? TimeSpan.FromTicks(long.Min(2 * before.Wait.Ticks, Longest.Ticks)) : First;
        _days[(line, day)] = (clock.GetTimestamp(), wait);
        return wait;
    }

    /// <summary>A day was evaluated.</summary>
    public void Remove(int line, DateOnly day) => _days.Remove((line, day));
}
