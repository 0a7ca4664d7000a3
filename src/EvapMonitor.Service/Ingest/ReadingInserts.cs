using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;
using Npgsql;

namespace EvapMonitor.Service.Ingest;

/// <summary>A reading on its way from the spool to the database.</summary>
/// <param name="Placed">The reading with its keys.</param>
/// <param name="Signal">Name of its signal.</param>
/// <param name="Source">Where it came from.</param>
public readonly record struct SourcedReading(PlacedReading Placed, string Signal, string Source);

/// <summary>
/// Inserts readings and never gives up: what may pass is tried again for ever, ever more slowly; what the database will never take is narrowed down to the
/// single reading, which goes to the refused ones, so that it does not hold up the others.
/// </summary>
public sealed class ReadingInserts(NpgsqlDataSource database, PlantHolder plant, RefusedStore refused, Notices notices, TimeProvider clock, ILogger<ReadingInserts> log)
{
    /// <summary>Key of the notice that stands while the database takes no readings.</summary>
    internal const string AwayNotice = "database-away";

    private const string RefusedNotice = "readings-refused";
    private static readonly TimeSpan LongestPause = TimeSpan.FromSeconds(10);

    private long _awaySince;
    private long _refused;

    /// <summary>Readings that the database refused in this run of the program.</summary>
    public long Refused => Interlocked.Read(ref _refused);

    /// <summary>Inserts readings in one transaction, or in as many as it takes to leave out what the database refuses.</summary>
    /// <param name="readings">The readings.</param>
    /// <param name="intake">Tells how much waits, for the notice.</param>
    /// <param name="stop">Ends the attempts.</param>
    public async Task<InsertCount> InsertAsync(IReadOnlyList<SourcedReading> readings, Intake intake, CancellationToken stop)
    {
        ArgumentNullException.ThrowIfNull(readings);
        ArgumentNullException.ThrowIfNull(intake);
        if (readings.Count == 0) return default;
        for (int attempt = 1; ; attempt++)
        {
            try
            {
                InsertCount count = await OnceAsync(readings, stop);
                Back(intake);
                return count;
            }
            catch (Exception error) when (DatabaseErrors.IsOfTheData(error))
            {
                Back(intake);
                if (readings.Count > 1)
                {
                    IReadOnlyList<SourcedReading> first = [.. readings.Take(readings.Count / 2)], second = [.. readings.Skip(readings.Count / 2)];
                    return await InsertAsync(first, intake, stop) + await InsertAsync(second, intake, stop);
                }

                if (await TryRefuseAsync(readings[0], error, stop)) return default;
            }
            catch (Exception error) when (error is NpgsqlException or IOException or TimeoutException or InvalidOperationException && !stop.IsCancellationRequested)
            {
                Away(error, intake);
            }

            await Task.Delay(PauseAfter(attempt), clock, stop);
        }
    }

    private async Task<InsertCount> OnceAsync(IReadOnlyList<SourcedReading> readings, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        InsertCount count = await ReadingStore.InsertAsync(connection, transaction, [.. readings.Select(reading => reading.Placed)], replace: false, plant.Timeline.Reach, stop);
        await transaction.CommitAsync(stop);
        return count;
    }

    private async Task<bool> TryRefuseAsync(SourcedReading reading, Exception error, CancellationToken stop)
    {
        Core.Readings.Reading one = reading.Placed.Reading;
        string reason = error is PostgresException told ? told.MessageText : error.Message;
        try
        {
            await refused.AddAsync(
                new RefusedReading(
                    default, reading.Signal, Instant.FromMilliseconds(one.At), double.IsNaN(one.Value) ? null : one.Value, (short)one.Quality, reading.Source, reason), stop);
        }
        catch (NpgsqlException)
        {
            // Away just now: the reading is tried again as a whole.
            return false;
        }

        Interlocked.Increment(ref _refused);
        log.ReadingRefused(reading.Signal, reading.Source, reason);
        notices.Raise(RefusedNotice, $"The database refused {Refused} readings since the start; the last of {reading.Signal}: {reason}");
        return true;
    }

    private void Away(Exception error, Intake intake)
    {
        if (_awaySince == 0)
        {
            _awaySince = clock.GetTimestamp();
            log.DrainFailed(error);
        }

        string why = error is PostgresException told ? $"The database takes no readings ({told.MessageText})." : "The database cannot be reached.";
        notices.Raise(AwayNotice, why + Invariant($" Readings are kept in the spool: {intake.SpooledBytes / 1048576.0:0.0} MiB wait."));
    }

    private void Back(Intake intake)
    {
        if (_awaySince == 0) return;
        log.DrainTakesAgain(clock.GetElapsedTime(_awaySince).TotalSeconds, intake.SpooledBytes >> 20);
        _awaySince = 0;
        notices.Clear(AwayNotice);
    }

    /// <summary>Doubles from a quarter of a second, with up to a quarter more by chance, so that several programs do not knock in step.</summary>
    private static TimeSpan PauseAfter(int attempt) =>
        TimeSpan.FromSeconds(double.Min(0.25 * double.Pow(2, int.Min(attempt, 10) - 1), LongestPause.TotalSeconds) * (1 + (0.25 * Random.Shared.NextDouble())));
}
