using System.Collections.Concurrent;
using EvapMonitor.Service.Ingest.Spool;
using EvapMonitor.Service.Live;
using Microsoft.Data.Sqlite;

namespace EvapMonitor.Service.Ingest;

/// <summary>What became of readings given to the intake.</summary>
/// <param name="Accepted">Readings that are on disk now.</param>
/// <param name="OutOfTime">Readings left out because of their time.</param>
/// <param name="Unknown">Readings left out because the plant does not name their signal.</param>
/// <param name="Refusal">Null, or why nothing was kept: the source is to come again later.</param>
public readonly record struct IntakeAnswer(int Accepted, int OutOfTime, int Unknown, string? Refusal);

/// <summary>
/// The one door for readings that arrive. They wait in a bounded queue; one thread commits them to the spool, up to <see cref="BatchReadings"/> in one commit
/// or what came within <see cref="GatherLimit"/>; the commit answers the source. What was answered survives a kill.
/// </summary>
public sealed class Intake : IDisposable
{
    /// <summary>Readings after which a commit waits for no more.</summary>
    public const int BatchReadings = 500;

    /// <summary>Most readings that wait in memory; more are refused.</summary>
    public const int MostWaiting = 200_000;

    /// <summary>Longest wait for more readings before a commit.</summary>
    public static readonly TimeSpan GatherLimit = TimeSpan.FromMilliseconds(20);

    /// <summary>
    /// Shortest wait after which no more are expected: a source that waits for its answer before it sends more must not wait the whole limit each time. On a
    /// slow disk the wait grows to half of what the last commit took, because a small commit costs as much as a large one.
    /// </summary>
    private const int QuietMilliseconds = 2;

    private static readonly TimeSpan TryAgainAfter = TimeSpan.FromSeconds(1);

    private const string FullNotice = "spool-full", FailedNotice = "spool-failed";

    private readonly BlockingCollection<Submission> _queue = [];
    private readonly Admission _admission;
    private readonly SpoolSettings _settings;
    private readonly SpoolFile _spool;
    private readonly DiskSpace _disk;
    private readonly Notices _notices;
    private readonly TimeProvider _clock;
    private readonly ILogger<Intake> _log;
    private readonly Thread _writer;
    private readonly Lock _removalGate = new();
    private readonly List<long> _damaged = [];
    private long _removeThrough, _removeBytes;
    private int _waiting;
    private TimeSpan _lastCommit;
    private bool _inTrouble;
    private long _refusedAt;
    private volatile string? _refusal;

    /// <summary>Opens the spool and starts the thread that writes it.</summary>
    /// <exception cref="IOException">The spool can neither be opened nor made.</exception>
    public Intake(SpoolSettings settings, Admission admission, Notices notices, TimeProvider clock, ILogger<Intake> log)
    {
        ArgumentNullException.ThrowIfNull(settings);
        (_settings, _admission, _notices, _clock, _log) = (settings, admission, notices, clock, log);
        string? setAside;
        try
        {
            _spool = SpoolFile.Open(settings.Folder, out setAside);
        }
        catch (Exception error) when (error is SqliteException or UnauthorizedAccessException)
        {
            throw new IOException($"The spool in {settings.Folder} cannot be used: {error.Message}", error);
        }

        if (setAside is not null)
        {
            notices?.Raise("spool-damaged", $"The spool could not be read and was set aside as {setAside}; readings that waited in it are missing.");
            log.SpoolSetAside(setAside);
        }

        _disk = new DiskSpace(settings.Folder, settings.Reserve, clock);
        _writer = new Thread(Write) { Name = "spool", IsBackground = true };
        _writer.Start();
    }

    /// <summary>Rings when there is something to drain.</summary>
    internal WakeUp Kept { get; } = new();

    /// <summary>Bytes that wait in the spool.</summary>
    public long SpooledBytes => _spool.Bytes;

    /// <summary>Why readings are refused now; null while they are taken.</summary>
    public string? Refusal => _refusal;

    /// <summary>Keeps readings: all that are admitted, or none.</summary>
    /// <param name="source">Where they come from.</param>
    /// <param name="readings">The readings; not changed afterwards.</param>
    /// <param name="alone">True when the source sends nothing more before it is answered, so that waiting for more is of no use.</param>
    /// <returns>Completes when they are on disk or refused.</returns>
    public Task<IntakeAnswer> KeepAsync(SourceState source, IReadOnlyList<IncomingReading> readings, bool alone = false)
    {
        ArgumentNullException.ThrowIfNull(source);
        IReadOnlyList<IncomingReading> admitted = _admission.Admit(source, readings, out int outOfTime, out int unknown);
        if (admitted.Count == 0) return Task.FromResult(new IntakeAnswer(0, outOfTime, unknown, null));
        var submission = new Submission(source, new IncomingBatch(source.Name, admitted), new IntakeAnswer(admitted.Count, outOfTime, unknown, null), alone);
        if (Enqueue(submission) is { } refusal)
        {
            source.CountRefused();
            return Task.FromResult(new IntakeAnswer(0, outOfTime, unknown, refusal));
        }

        return submission.Answer;
    }

    /// <summary>Keeps readings that have no promise; false when they were dropped.</summary>
    public bool TryKeep(SourceState source, IReadOnlyList<IncomingReading> readings)
    {
        ArgumentNullException.ThrowIfNull(source);
        IReadOnlyList<IncomingReading> admitted = _admission.Admit(source, readings, out int outOfTime, out int unknown);
        if (admitted.Count == 0) return true;
        if (Enqueue(new Submission(source, new IncomingBatch(source.Name, admitted), new IntakeAnswer(admitted.Count, outOfTime, unknown, null), false)) is null) return true;
        source.CountShed();
        return false;
    }

    /// <summary>The oldest of what waits after a row of the spool.</summary>
    internal SpoolPortion Read(long after, int readings) => _spool.Read(after, readings);

    /// <summary>Rows set aside because they were damaged.</summary>
    internal long CountDamaged() => _spool.CountDamaged();

    /// <summary>Lets go of what is in the database. The removal rides with a coming commit; lost with a kill, it is done again and changes nothing.</summary>
    internal void Remove(SpoolPortion portion)
    {
        lock (_removalGate)
        {
            _removeThrough = portion.LastId;
            _removeBytes += portion.Bytes;
            _damaged.AddRange(portion.Damaged);
        }

        if (portion.Damaged.Count > 0)
        {
            _notices.Raise("spool-damaged", $"{portion.Damaged.Count} batches of the spool could not be read and were set aside in {_spool.Path}; their readings are missing.");
            _log.SpoolRowsDamaged(portion.Damaged.Count);
        }

        if (!_queue.IsAddingCompleted) _queue.TryAdd(Submission.WakeUp);
    }

    /// <summary>Commits what waits, then closes the spool.</summary>
    public void Dispose()
    {
        if (_queue.IsAddingCompleted) return;
        _queue.CompleteAdding();
        _writer.Join();
        _spool.Dispose();
        _queue.Dispose();
    }

    private string? Enqueue(Submission submission)
    {
        int readings = submission.Batch!.Readings.Count;
        // While nothing can be kept, one in a while is let through to see whether it can again.
        if (_refusal is { } refusal && _clock.GetElapsedTime(Interlocked.Read(ref _refusedAt)) < TryAgainAfter) return refusal;
        // A single batch larger than the limit is taken when nothing else waits.
        int waiting = Interlocked.Add(ref _waiting, readings);
        string? why = waiting > MostWaiting && waiting > readings ? $"{MostWaiting} readings wait to be written already." : null;
        try
        {
            if (why is null && !_queue.IsAddingCompleted)
            {
                _queue.Add(submission);
                return null;
            }
        }
        catch (InvalidOperationException)
        {
            // Closed in between.
        }

        Interlocked.Add(ref _waiting, -readings);
        return why ?? "The service is stopping.";
    }

    private void Write()
    {
        var gathered = new List<Submission>();
        while (_queue.TryTake(out Submission? first, Timeout.Infinite))
        {
            Gather(first, gathered);
            Commit(gathered);
            gathered.Clear();
        }
    }

    private void Gather(Submission first, List<Submission> gathered)
    {
        int readings = 0;
        bool alone = false;
        long began = _clock.GetTimestamp();
        int quiet = int.Clamp((int)(_lastCommit.TotalMilliseconds / 2), QuietMilliseconds, (int)GatherLimit.TotalMilliseconds);
        for (Submission? next = first; next is not null;)
        {
            if (next.Batch is { } batch)
            {
                gathered.Add(next);
                readings += batch.Readings.Count;
                alone |= next.Alone;
            }

            if (readings >= BatchReadings || _clock.GetElapsedTime(began) >= GatherLimit) return;
            if (!_queue.TryTake(out next, alone ? 0 : quiet)) return;
        }
    }

    private void Commit(List<Submission> gathered)
    {
        long removeThrough, removeBytes;
        long[] damaged;
        lock (_removalGate)
        {
            (removeThrough, removeBytes, damaged) = (_removeThrough, _removeBytes, [.. _damaged]);
            (_removeThrough, _removeBytes) = (0, 0);
            _damaged.Clear();
        }

        byte[]? blob = gathered.Count == 0 ? null : SpoolBlob.Write([.. gathered.Select(submission => submission.Batch!)]);
        string? refusal = blob is null ? null : WhyFull(blob.Length, removeBytes);
        try
        {
            long began = _clock.GetTimestamp();
            if (refusal is null || removeThrough > 0) _spool.Commit(refusal is null ? blob : null, damaged, removeThrough, removeBytes);
            _lastCommit = _clock.GetElapsedTime(began);
            if (blob is not null && refusal is null)
            {
                KillPoint.Pass("spool-after-commit");
                if (_inTrouble) Better();
            }
        }
        catch (SqliteException error)
        {
            lock (_removalGate)
            {
                if (_removeThrough == 0) _removeThrough = removeThrough;
                _removeBytes += removeBytes;
                _damaged.AddRange(damaged);
            }

            refusal = error.SqliteErrorCode == SQLitePCL.raw.SQLITE_FULL ? "The disk of the spool is full." : $"The spool cannot be written: {error.Message}";
            if (_notices.Raise(FailedNotice, refusal + " Readings are refused until that is mended.")) _log.SpoolFailed(error);
        }

        if (refusal is not null)
        {
            _inTrouble = true;
            Interlocked.Exchange(ref _refusedAt, _clock.GetTimestamp());
        }

        // Space that came free lets those that come next try again.
        if (blob is not null || removeThrough > 0) _refusal = refusal;
        foreach (Submission submission in gathered)
        {
            Interlocked.Add(ref _waiting, -submission.Batch!.Readings.Count);
            submission.Complete(refusal);
        }

        if (blob is not null && refusal is null) Kept.Wake();
    }

    private string? WhyFull(long more, long less)
    {
        string? why = _spool.Bytes + more - less > _settings.Quota ? Invariant($"The spool is full: {_settings.Quota >> 20} MiB wait for the database.")
            : _disk.WhyFull();
        if (why is not null && _notices.Raise(FullNotice, why + " Readings are refused until there is room.")) _log.SpoolFull(why);
        return why;
    }

    private void Better()
    {
        _inTrouble = false;
        _log.SpoolTakesAgain();
        _notices.Clear(FullNotice);
        _notices.Clear(FailedNotice);
    }

    private sealed class Submission(SourceState? source, IncomingBatch? batch, IntakeAnswer answer, bool alone)
    {
        private readonly TaskCompletionSource<IntakeAnswer> _answered = new(TaskCreationOptions.RunContinuationsAsynchronously);

        public static Submission WakeUp { get; } = new(null, null, default, alone: false);

        public IncomingBatch? Batch => batch;

        public bool Alone => alone;

        public Task<IntakeAnswer> Answer => _answered.Task;

        public void Complete(string? refusal)
        {
            if (refusal is null) source!.CountAccepted(answer.Accepted);
            else source!.CountRefused();
            _answered.SetResult(refusal is null ? answer : answer with { Accepted = 0, Refusal = refusal });
        }
    }
}
