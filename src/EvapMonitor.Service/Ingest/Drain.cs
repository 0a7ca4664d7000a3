using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Ingest.Spool;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;
using Npgsql;

namespace EvapMonitor.Service.Ingest;

/// <summary>
/// Takes the oldest readings of the spool into the database: one transaction with the marks of the days, then they leave the spool. A kill in between has them
/// inserted again, which changes nothing, because the first value of an instant stands. While the database is away everything waits in the spool.
/// </summary>
public sealed class Drain(
    Intake intake, ReadingInserts inserts, PlantHolder plant, UnknownSignals unknown, EvaluationSignal evaluation, Notices notices, TimeProvider clock, ILogger<Drain> log)
    : BackgroundService
{
    /// <summary>Most readings in one transaction, as far as they do not come in one piece.</summary>
    public const int PortionReadings = 20_000;

    private static readonly TimeSpan Pause = TimeSpan.FromSeconds(1);

    private long _accepted, _repeated, _differing;

    /// <summary>Readings stored in this run of the program.</summary>
    public long Accepted => Interlocked.Read(ref _accepted);

    /// <summary>Readings that were there already with the same value.</summary>
    public long Repeated => Interlocked.Read(ref _repeated);

    /// <summary>Readings that were there with another value, which stays.</summary>
    public long Differing => Interlocked.Read(ref _differing);

    /// <inheritdoc/>
    protected override Task ExecuteAsync(CancellationToken stoppingToken) => Task.Run(() => DrainAsync(stoppingToken), CancellationToken.None);

    private async Task DrainAsync(CancellationToken stop)
    {
        long after = 0;
        while (!stop.IsCancellationRequested)
        {
            try
            {
                SpoolPortion portion = intake.Read(after, PortionReadings);
                if (portion.LastId == 0)
                {
                    await intake.Kept.WaitAsync(Pause, stop);
                    continue;
                }

                await StoreAsync(portion, stop);
                KillPoint.Pass("drain-after-commit");
                intake.Remove(portion);
                after = portion.LastId;
                evaluation.Wake();
            }
            catch (OperationCanceledException) when (stop.IsCancellationRequested)
            {
                return;
            }
            catch (Microsoft.Data.Sqlite.SqliteException error)
            {
                if (notices.Raise("spool-unreadable", $"The spool cannot be read: {error.Message} Readings wait in it.")) log.DrainFailed(error);
                await Task.Delay(Pause, clock, stop).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
            }
        }
    }

    private async Task StoreAsync(SpoolPortion portion, CancellationToken stop)
    {
        IReadOnlyDictionary<string, SignalPlace> signals = plant.Timeline.Signals;
        var readings = new List<SourcedReading>(portion.Readings);
        foreach (IncomingBatch batch in portion.Batches)
        {
            foreach ((string signal, Reading reading) in batch.Readings)
            {
                // The plant file may have changed since they came.
                if (signals.TryGetValue(signal, out SignalPlace? place)) readings.Add(new SourcedReading(new PlacedReading(place, reading), signal, batch.Source));
                else unknown.Count(signal, batch.Source, clock.GetUtcNow());
            }
        }

        InsertCount count = await inserts.InsertAsync(readings, intake, stop);
        Interlocked.Add(ref _accepted, count.Accepted);
        Interlocked.Add(ref _repeated, count.Repeated);
        Interlocked.Add(ref _differing, count.Differing);
    }
}
