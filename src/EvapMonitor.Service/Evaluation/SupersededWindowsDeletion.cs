using EvapMonitor.Service.Store;
using Npgsql;

namespace EvapMonitor.Service.Evaluation;

/// <summary>Once a day deletes superseded windows that are due.</summary>
public sealed class SupersededWindowsDeletion(SupersededWindows windows, TimeProvider clock, ILogger<SupersededWindowsDeletion> log) : BackgroundService
{
    private static readonly TimeSpan AfterStart = TimeSpan.FromMinutes(2), Every = TimeSpan.FromDays(1), AfterFailure = TimeSpan.FromMinutes(10);

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        TimeSpan pause = AfterStart;
        while (!stoppingToken.IsCancellationRequested)
        {
            await Task.Delay(pause, clock, stoppingToken).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
            if (stoppingToken.IsCancellationRequested) return;
            try
            {
                int days = await windows.DeleteAsync(stoppingToken);
                if (days > 0) log.SupersededDeleted(days);
                pause = Every;
            }
            catch (NpgsqlException error)
            {
                log.DatabaseAway(error, "deleting superseded windows");
                pause = AfterFailure;
            }
            catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
            {
                return;
            }
        }
    }
}
