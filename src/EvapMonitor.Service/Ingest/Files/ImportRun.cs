using System.Threading.Channels;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Store;
using NodaTime;
using Npgsql;

namespace EvapMonitor.Service.Ingest.Files;

/// <summary>
/// Takes one file into the store. One thread reads and makes batches, the other writes them; between them at most two batches wait, so that memory does not
/// grow with the file. Each batch is one transaction: readings, day marks, and how far the file has come.
/// </summary>
internal sealed class ImportRun(NpgsqlDataSource database, PlantTimeline plant, ImportFile start, TimeProvider clock)
{
    private const int BatchSize = 50_000;
    private const int MostProblems = 100;
    private const int MostUnknown = 10_000;
    private static readonly TimeSpan AheadLimit = TimeSpan.FromMinutes(10);

    private ImportFile _progress = start;

    /// <summary>Where the run is, as committed.</summary>
    public ImportFile Progress => Volatile.Read(ref _progress);

    /// <summary>Reads the whole file.</summary>
    /// <exception cref="ReadingFileException">The file cannot be read.</exception>
    public async Task RunAsync(Action<ImportFile> committed, CancellationToken stop)
    {
        var batches = Channel.CreateBounded<Batch>(new BoundedChannelOptions(2) { SingleReader = true, SingleWriter = true });
        using var together = CancellationTokenSource.CreateLinkedTokenSource(stop);
        Task reading = Task.Run(() => ReadFile(batches.Writer, together.Token), CancellationToken.None);
        try
        {
            await foreach (Batch batch in batches.Reader.ReadAllAsync(together.Token))
            {
                await WriteAsync(batch, together.Token);
                committed(_progress);
            }
        }
        finally
        {
            // The file is let go before anybody deletes it. What ended the reading has come out of the channel.
            await together.CancelAsync();
            await reading;
        }
    }

    private void ReadFile(ChannelWriter<Batch> writer, CancellationToken stop)
    {
        try
        {
            using FileStream file = File.OpenRead(Progress.StoredAs ?? throw new ReadingFileException("The upload is gone; send the file again."));
            using var counted = new CountedStream(file);
            DateTimeZone zone = DateTimeZoneProviders.Tzdb[plant.At(clock.GetUtcNow()).Site.TimeZone];
            var sink = new BatchSink(plant, Progress, counted, writer, stop);
            long latest = (clock.GetUtcNow() + AheadLimit).ToUnixTimeMilliseconds();
            new ReadingFile(counted, zone, plant.HistoryFrom.ToUnixTimeMilliseconds(), latest, sink).Read();
            sink.Flush();
            writer.Complete();
        }
        catch (Exception error) when (error is not OutOfMemoryException)
        {
            writer.Complete(error is InvalidDataException ? new ReadingFileException($"The file is damaged: {error.Message}") : error);
        }
    }

    private async Task WriteAsync(Batch batch, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        InsertCount count = await ReadingStore.InsertAsync(connection, transaction, batch.Readings, _progress.Replace, plant.Reach, stop);
        ImportFile now = _progress;
        now = now with
        {
            BytesRead = batch.BytesRead,
            CommittedOffset = batch.LastLine,
            Accepted = now.Accepted + count.Accepted,
            Repeated = now.Repeated + count.Repeated,
            Differing = now.Differing + count.Differing,
            Rejected = now.Rejected + batch.Rejected,
            NotInPlant = now.NotInPlant + batch.Unknown.Values.Sum(),
            Problems = [.. now.Problems.Concat(batch.Problems).Take(MostProblems)],
            UnknownSignals = Merge(now.UnknownSignals, batch.Unknown),
        };
        await ImportStore.SaveProgressAsync(connection, now);
        KillPoint.Pass("import-before-commit");
        await transaction.CommitAsync(stop);
        Volatile.Write(ref _progress, now);
        KillPoint.Pass("import-after-commit");
    }

    private static UnknownSignal[] Merge(IReadOnlyList<UnknownSignal> known, Dictionary<string, long> more)
    {
        if (more.Count == 0) return [.. known];
        Dictionary<string, long> all = known.ToDictionary(signal => signal.Name, signal => signal.Count);
        foreach ((string name, long count) in more)
        {
            if (all.Count < MostUnknown || all.ContainsKey(name)) all[name] = all.GetValueOrDefault(name) + count;
        }

        return [.. all.OrderByDescending(pair => pair.Value).ThenBy(pair => pair.Key, StringComparer.Ordinal).Select(pair => new UnknownSignal(pair.Key, pair.Value))];
    }

    private sealed class Batch
    {
        public List<PlacedReading> Readings { get; } = new(BatchSize + 1024);

        public List<RejectedRow> Problems { get; } = [];

        public Dictionary<string, long> Unknown { get; } = [];

        public long Rejected { get; set; }

        public long LastLine { get; set; }

        public long BytesRead { get; set; }
    }

    /// <summary>
    /// Gathers batches. Lines up to the committed one are read again after a restart, so that the clock of local times stands as it did, but what they hold
    /// is dropped: it is in the store.
    /// </summary>
    private sealed class BatchSink(PlantTimeline plant, ImportFile import, CountedStream file, ChannelWriter<Batch> writer, CancellationToken stop) : IReadingSink
    {
        private readonly Dictionary<string, int> _keys = plant.Signals.Select((pair, i) => (pair.Key, i)).ToDictionary(pair => pair.Key, pair => pair.i);
        private readonly SignalPlace[] _places = [.. plant.Signals.Values];
        private Batch _batch = new();
        private bool _committed = import.CommittedOffset > 1;
        private long _line;

        public int KeyOf(string signal) => _keys.GetValueOrDefault(signal, -1);

        public void Take(int key, in Reading reading)
        {
            if (!_committed) _batch.Readings.Add(new PlacedReading(_places[key], reading));
        }

        public void TakeUnknown(string signal)
        {
            if (_committed) return;
            if (_batch.Unknown.Count < MostUnknown || _batch.Unknown.ContainsKey(signal)) _batch.Unknown[signal] = _batch.Unknown.GetValueOrDefault(signal) + 1;
        }

        public void Reject(long line, string reason)
        {
            if (_committed) return;
            _batch.Rejected++;
            if (_batch.Problems.Count < MostProblems) _batch.Problems.Add(new RejectedRow(line, reason));
        }

        public bool RowDone(long line)
        {
            _line = line;
            // The header is line 1; the first line after the committed one counts again.
            if (_committed)
            {
                _committed = line < import.CommittedOffset;
                return !stop.IsCancellationRequested;
            }

            if (_batch.Readings.Count >= BatchSize) Flush();
            return !stop.IsCancellationRequested;
        }

        public void Flush()
        {
            _batch.LastLine = long.Max(_line, import.CommittedOffset);
            _batch.BytesRead = file.BytesRead;
            // Blocks while two batches wait; the token ends the wait.
            writer.WriteAsync(_batch, stop).AsTask().GetAwaiter().GetResult();
            _batch = new Batch();
        }
    }
}
