using System.Threading.Channels;

namespace EvapMonitor.Service.Live;

/// <summary>Wakes a worker that has nothing to do. A wake-up that is lost costs a pause, no work: what is to be done stands in the database.</summary>
public class WakeUp
{
    private readonly Channel<bool> _bell = Channel.CreateBounded<bool>(new BoundedChannelOptions(1) { FullMode = BoundedChannelFullMode.DropWrite });

    /// <summary>Wakes the worker, now or when it next waits.</summary>
    public void Wake() => _bell.Writer.TryWrite(true);

    /// <summary>Waits for a wake-up or the end of a pause.</summary>
    public async Task WaitAsync(TimeSpan pause, CancellationToken stop)
    {
        using var limit = CancellationTokenSource.CreateLinkedTokenSource(stop);
        limit.CancelAfter(pause);
        try
        {
            await _bell.Reader.ReadAsync(limit.Token);
        }
        catch (OperationCanceledException) when (!stop.IsCancellationRequested)
        {
            // The pause is over.
        }
    }
}
