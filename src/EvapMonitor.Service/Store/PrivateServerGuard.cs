namespace EvapMonitor.Service.Store;

/// <summary>Starts the private server again when it has died: its data are durable, so the only loss would be the time until somebody notices.</summary>
internal sealed class PrivateServerGuard(PrivateServer server, Npgsql.NpgsqlDataSource database, TimeProvider clock, ILogger<PrivateServerGuard> log) : BackgroundService
{
    private static readonly TimeSpan Pause = TimeSpan.FromSeconds(2);

    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        using var timer = new PeriodicTimer(Pause, clock);
        while (await timer.WaitForNextTickAsync(stoppingToken).AsTask().ContinueWith(tick => tick.IsCompletedSuccessfully && tick.Result, TaskScheduler.Default))
        {
            try
            {
                // A connection from the pool tells nothing until it is used.
                await using Npgsql.NpgsqlCommand question = database.CreateCommand("SELECT 1");
                await question.ExecuteScalarAsync(stoppingToken);
            }
            catch (Exception error) when (error is Npgsql.NpgsqlException or InvalidOperationException && !stoppingToken.IsCancellationRequested)
            {
                await RestartAsync(stoppingToken);
            }
            catch (OperationCanceledException)
            {
                return;
            }
        }
    }

    private async Task RestartAsync(CancellationToken stop)
    {
        try
        {
            await server.EnsureRunningAsync(stop);
            Npgsql.NpgsqlConnection.ClearAllPools();
            log.DatabaseRestarted();
        }
        catch (Exception error) when (error is InvalidOperationException or IOException or UnauthorizedAccessException)
        {
            log.DatabaseAway(error, "everything");
        }
    }
}
