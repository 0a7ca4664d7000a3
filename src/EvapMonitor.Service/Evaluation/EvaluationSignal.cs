namespace EvapMonitor.Service.Evaluation;

/// <summary>Wakes the evaluation when days may wait. A wake-up that is lost costs a pause, no result: the days' marks are in the database.</summary>
public sealed class EvaluationSignal
{
    private readonly SemaphoreSlim _wake = new(0, 1);

    /// <summary>Tells that days may wait.</summary>
    public void Wake()
    {
        try
        {
            if (_wake.CurrentCount == 0) _wake.Release();
        }
        catch (SemaphoreFullException)
        {
            // Somebody else was first: just as well.
        }
    }

    /// <summary>Waits for a wake-up or the end of a pause.</summary>
    public Task WaitAsync(TimeSpan pause, CancellationToken stop) => _wake.WaitAsync(pause, stop);
}
