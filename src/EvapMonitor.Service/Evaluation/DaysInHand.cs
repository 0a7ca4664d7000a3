using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Evaluation;

/// <summary>The days that are being evaluated now: none is taken twice.</summary>
public sealed class DaysInHand : IDisposable
{
    private readonly SemaphoreSlim _one = new(1, 1);
    private readonly HashSet<(int Line, DateOnly Day)> _days = [];

    /// <summary>Takes another day of a line.</summary>
    /// <param name="line">The line.</param>
    /// <param name="take">Takes one, but none of those given.</param>
    /// <param name="stop">Cancels.</param>
    public async Task<TakenDay?> TakeAsync(int line, Func<IEnumerable<DateOnly>, Task<TakenDay?>> take, CancellationToken stop)
    {
        await _one.WaitAsync(stop);
        try
        {
            DateOnly[] others;
            lock (_days) others = [.. _days.Where(one => one.Line == line).Select(one => one.Day)];
            if (await take(others) is not { } taken) return null;
            lock (_days) _days.Add((line, taken.Day));
            return taken;
        }
        finally
        {
            _one.Release();
        }
    }

    /// <summary>A day has been evaluated, or not.</summary>
    public void PutBack(int line, DateOnly day)
    {
        lock (_days) _days.Remove((line, day));
    }

    /// <inheritdoc/>
    public void Dispose() => _one.Dispose();
}
