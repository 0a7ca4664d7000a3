using System.Collections.Concurrent;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;
using Npgsql;

namespace EvapMonitor.Service.Ingest.Files;

/// <summary>Where an import is and how fast it goes.</summary>
/// <param name="Import">The import as committed.</param>
/// <param name="RowsPerSecond">Readings taken per second since it began in this run; null before the first batch.</param>
/// <param name="SecondsLeft">Time left at that rate; null when unknown.</param>
public sealed record ImportPace(ImportFile Import, double? RowsPerSecond, double? SecondsLeft);

/// <summary>Takes waiting files into the store, one after the other. A failed file never stops the next.</summary>
public sealed class ImportWorker(
    NpgsqlDataSource database, ImportStore imports, Uploads uploads, PlantHolder plant, EvaluationSignal evaluation, LiveEvents events, TimeProvider clock,
    ILogger<ImportWorker> log)
    : BackgroundService
{
    private static readonly TimeSpan Pause = TimeSpan.FromSeconds(2);

    private readonly WakeUp _bell = new();
    private readonly ConcurrentDictionary<string, CancellationTokenSource> _running = new();
    private readonly ConcurrentDictionary<string, ImportPace> _paces = new();

    /// <summary>Tells the worker that a file waits.</summary>
    public void Wake() => _bell.Wake();

    /// <summary>The pace of a running import; null when it does not run.</summary>
    public ImportPace? PaceOf(string sha256) => _paces.GetValueOrDefault(sha256);

    /// <summary>Stops a running or waiting import. What is stored stays.</summary>
    public async Task CancelAsync(string sha256, CancellationToken stop)
    {
        if (_running.TryGetValue(sha256, out CancellationTokenSource? running)) await running.CancelAsync();
        else if (await imports.FindAsync(sha256, stop) is { State: ImportState.Waiting } waiting) await EndAsync(waiting, ImportState.Cancelled, null);
    }

    /// <inheritdoc/>
    public override async Task StartAsync(CancellationToken cancellationToken)
    {
        uploads.RemoveAllBut(await imports.StoredAsync(cancellationToken));
        await base.StartAsync(cancellationToken);
    }

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        bool away = false;
        while (!stoppingToken.IsCancellationRequested)
        {
            try
            {
                if (await imports.NextAsync(stoppingToken) is { } next) await RunAsync(next, stoppingToken);
                else await _bell.WaitAsync(Pause, stoppingToken);
                away = false;
            }
            catch (NpgsqlException error)
            {
                // Once for each absence: it may last for hours.
                if (!away) log.DatabaseAway(error, "import");
                away = true;
                await Task.Delay(Pause, clock, stoppingToken).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
            }
            catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
            {
                return;
            }
        }
    }

    private async Task RunAsync(ImportFile next, CancellationToken stop)
    {
        using var cancel = CancellationTokenSource.CreateLinkedTokenSource(stop);
        long began = clock.GetTimestamp(), announced = 0;
        var run = new ImportRun(database, plant.Timeline, next with { State = ImportState.Running, StartedAt = clock.GetUtcNow().UtcDateTime }, clock);
        try
        {
            _running[next.Sha256] = cancel;
            if (!await imports.StartAsync(next.Sha256, stop)) return;
            log.ImportStarted(next.Name, next.BytesTotal, next.CommittedOffset);
            await run.RunAsync(progress =>
            {
                ImportPace pace = PaceOf(next, progress, clock.GetElapsedTime(began));
                _paces[next.Sha256] = pace;
                evaluation.Wake();
                if (announced != 0 && clock.GetElapsedTime(announced) < TimeSpan.FromMilliseconds(300)) return;
                announced = clock.GetTimestamp();
                events.Publish("import", pace);
            }, cancel.Token);
            KillPoint.Pass("import-before-end");
            await EndAsync(run.Progress, ImportState.Done, null);
            log.ImportEnded(next.Name, run.Progress.Accepted, run.Progress.Repeated, run.Progress.Rejected, clock.GetElapsedTime(began).TotalSeconds);
        }
        catch (ReadingFileException error)
        {
            await EndAsync(run.Progress, ImportState.Failed, error.Message);
            log.ImportFailed(next.Name, error.Message);
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            await EndAsync(run.Progress, ImportState.Failed, "The upload could not be read: " + error.Message);
            log.ImportFailed(next.Name, error.Message);
        }
        catch (OperationCanceledException) when (!stop.IsCancellationRequested)
        {
            await EndAsync(run.Progress, ImportState.Cancelled, null);
        }
        catch (Exception error) when (error is not (NpgsqlException or OperationCanceledException) || IsOfTheData(error))
        {
            // Unforeseen: this file fails, the next has its turn.
            await EndAsync(run.Progress, ImportState.Failed, "The readings could not be stored: " + error.Message);
            log.ImportBroke(error, next.Name);
        }
        finally
        {
            _running.TryRemove(next.Sha256, out _);
            _paces.TryRemove(next.Sha256, out _);
        }
    }

    /// <summary>True when the database refused the data themselves (SQLSTATE classes 22 and 23): trying again would go on for ever.</summary>
    private static bool IsOfTheData(Exception error) => error is PostgresException { SqlState: ['2', '2' or '3', ..] };

    private static ImportPace PaceOf(ImportFile start, ImportFile now, TimeSpan elapsed)
    {
        double seconds = double.Max(elapsed.TotalSeconds, 1e-3);
        double rows = (now.Accepted + now.Repeated + now.Differing + now.NotInPlant - start.Accepted - start.Repeated - start.Differing - start.NotInPlant) / seconds;
        double bytes = (now.BytesRead - start.BytesRead) / seconds;
        return new ImportPace(now, rows, bytes > 0 ? (now.BytesTotal - now.BytesRead) / bytes : null);
    }

    private async Task EndAsync(ImportFile import, string state, string? error)
    {
        await imports.EndAsync(import.Sha256, state, error);
        if (import.StoredAs is not null) File.Delete(import.StoredAs);
        if (await imports.FindAsync(import.Sha256, CancellationToken.None) is { } ended) events.Publish("import", new ImportPace(ended, null, null));
        evaluation.Wake();
    }
}
