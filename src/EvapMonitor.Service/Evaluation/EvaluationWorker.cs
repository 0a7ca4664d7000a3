using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;
using Npgsql;

namespace EvapMonitor.Service.Evaluation;

/// <summary>What open pages are told when results have changed.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="From">First window that may have changed.</param>
/// <param name="To">End of the last.</param>
public sealed record WindowsChanged(string Line, DateTimeOffset From, DateTimeOffset To);

/// <summary>
/// Turns stored readings into stored results. Live, late, imported, recomputed: all of it comes as marked days, one at a time for each line, today first.
/// A line is evaluated by the one process that holds its lease.
/// </summary>
public sealed class EvaluationWorker(
    DayStore days, ReadingStore readings, ResultStore results, LineLogs logs, LeaseStore leases, PlantHolder plant, EvaluationSignal signal, LiveEvents events,
    TimeProvider clock, ILogger<EvaluationWorker> log)
    : BackgroundService
{
    private static readonly TimeSpan Pause = TimeSpan.FromMilliseconds(500);
    private static readonly TimeSpan Rest = TimeSpan.FromSeconds(1);
    private static readonly TimeSpan RenewEvery = TimeSpan.FromSeconds(5);

    private readonly Dictionary<int, LineWork> _work = [];
    private Dictionary<int, long> _fences = [];
    private long _renewed;

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        bool away = false;
        while (!stoppingToken.IsCancellationRequested)
        {
            try
            {
                PlantInForce inForce = plant.Current;
                await RenewAsync(inForce, stoppingToken);
                bool any = false;
                foreach (LinePlace line in inForce.Lines.Where(line => _fences.ContainsKey(line.LineId))) any |= await EvaluateNextAsync(inForce, line, stoppingToken);
                away = false;
                if (!any) await signal.WaitAsync(Pause, stoppingToken);
            }
            catch (NpgsqlException error)
            {
                // Once for each absence: it may last for hours.
                if (!away) log.DatabaseAway(error, "evaluation");
                away = true;
                await Task.Delay(RenewEvery, clock, stoppingToken).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
            }
            catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
            {
                break;
            }
        }

        await ReleaseAsync();
    }

    private async Task RenewAsync(PlantInForce inForce, CancellationToken stop)
    {
        if (_renewed != 0 && clock.GetElapsedTime(_renewed) < RenewEvery) return;
        Dictionary<int, long> held = await leases.HoldAsync(inForce.Lines.Select(line => line.LineId), stop);
        foreach ((int line, long fence) in held)
        {
            if (_fences.GetValueOrDefault(line) != fence) _work.Remove(line);
        }

        (_fences, _renewed) = (held, clock.GetTimestamp());
    }

    private async Task<bool> EvaluateNextAsync(PlantInForce inForce, LinePlace line, CancellationToken stop)
    {
        if (!_work.TryGetValue(line.LineId, out LineWork? work) || work.Plant != inForce) work = _work[line.LineId] = new LineWork(inForce, line, readings);
        long closed = work.ClosedAt(clock.GetUtcNow());
        if (await days.TakeAsync(line.LineId, DateTimeOffset.FromUnixTimeMilliseconds(closed), Rest, stop) is not { } taken) return false;
        try
        {
            long began = clock.GetTimestamp();
            DayResult result = work.Evaluate(taken, closed, await logs.OfAsync(inForce, line, stop));
            await results.WriteAsync(result, inForce.RevisionId, _fences[line.LineId], stop);
            log.DayEvaluated(line.Line.Name, taken.Day, result.Windows.Count, clock.GetElapsedTime(began).TotalMilliseconds);
            DateTimeOffset to = result.Windows.Count == 0 ? result.From : DateTimeOffset.FromUnixTimeMilliseconds(result.Windows[^1].At) + inForce.Site.Window;
            events.Publish("windows", new WindowsChanged(line.Line.Name, result.From, to));
            return true;
        }
        catch (LeaseLostException)
        {
            log.LeaseLost(line.Line.Name);
            _fences.Remove(line.LineId);
            return false;
        }
        catch (Exception error) when (error is not NpgsqlException and not OperationCanceledException)
        {
            // One line that fails must not stop the others; its mark stays, so that it is tried again.
            log.EvaluationFailed(error, line.Line.Name);
            work.Forget();
            return false;
        }
    }

    private async Task ReleaseAsync()
    {
        try
        {
            await leases.ReleaseAsync();
        }
        catch (NpgsqlException error)
        {
            log.DatabaseAway(error, "giving back the lines");
        }
    }
}
