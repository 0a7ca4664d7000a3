using Dapper;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>What was logged of an instrument.</summary>
/// <param name="Id">Key.</param>
/// <param name="SignalId">Its signal.</param>
/// <param name="Kind"><see cref="InstrumentLogStore.Excluded"/> or <see cref="InstrumentLogStore.Recalibrated"/>.</param>
/// <param name="Start">From when it is not to be believed, or when it was set right.</param>
/// <param name="End">Until when it is not to be believed; null: until further notice, or a recalibration.</param>
/// <param name="Note">Free text.</param>
/// <param name="LoggedAt">When it was logged.</param>
public sealed record InstrumentEvent(Guid Id, int SignalId, string Kind, DateTimeOffset Start, DateTimeOffset? End, string Note, DateTimeOffset LoggedAt)
{
    /// <summary>True when another says the same, whenever it was logged. The store keeps microseconds.</summary>
    public bool Says(InstrumentEvent other) => Kind == other.Kind && Note == other.Note && Instant.AreSame(Start, other.Start) && Instant.AreSame(End, other.End);
}

/// <summary>
/// The log of instruments. An exclusion marks the days that it covers, as far as its readings reach; a recalibration moves no window, but what is compared across it.
/// </summary>
public sealed class InstrumentLogStore(NpgsqlDataSource database, TimeProvider clock)
{
    /// <summary>The readings do not count from start to end.</summary>
    public const string Excluded = "instrument-excluded";

    /// <summary>It was set right: comparisons with earlier readings end there.</summary>
    public const string Recalibrated = "recalibration";

    private const string Columns = "event_id, signal_id, kind, starts_at, ends_at, note, logged_at";

    /// <summary>Events that stand, newest first.</summary>
    public async Task<IReadOnlyList<InstrumentEvent>> ListAsync(IEnumerable<SignalPlace> signals, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        int[] lines = [.. signals.Select(signal => signal.HomeLineId)], ids = [.. signals.Select(signal => signal.SignalId)];
        IEnumerable<Row> rows = await connection.QueryAsync<Row>(new CommandDefinition(
            $"""
             SELECT {Columns} FROM instrument_event JOIN unnest(@lines, @ids) AS wanted(line, id) ON line_id = wanted.line AND signal_id = wanted.id
             WHERE withdrawn_at IS NULL ORDER BY starts_at DESC LIMIT 5000
             """,
            new { lines, ids }, cancellationToken: stop));
        return [.. rows.Select(row => row.ToEvent())];
    }

    /// <summary>Grows with each event that is logged or withdrawn.</summary>
    public async Task<long> VersionAsync(CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.ExecuteScalarAsync<long>(new CommandDefinition("SELECT count(*) + count(withdrawn_at) FROM instrument_event", cancellationToken: stop));
    }

    /// <summary>Logs an event. The same request key never logs twice.</summary>
    /// <param name="logged">What is to be logged.</param>
    /// <param name="signal">Its signal.</param>
    /// <param name="reach">How long after its instant a reading may move results.</param>
    /// <param name="requestKey">Told by the caller.</param>
    /// <param name="stop">Cancels.</param>
    public async Task<(LogOutcome Outcome, InstrumentEvent Event)> LogAsync(InstrumentEvent logged, SignalPlace signal, TimeSpan reach, string requestKey, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        await connection.ExecuteAsync("SELECT 1 FROM signal WHERE signal_id = @SignalId FOR UPDATE", new { signal.SignalId });
        var key = new { line = signal.HomeLineId, signal.SignalId, requestKey };
        Row? before = await connection.QuerySingleOrDefaultAsync<Row>(
            $"SELECT {Columns} FROM instrument_event WHERE line_id = @line AND signal_id = @SignalId AND request_key = @requestKey", key);
        if (before is not null) return (before.ToEvent().Says(logged) ? LogOutcome.Repeated : LogOutcome.KeyTaken, before.ToEvent());
        Row? other = await connection.QueryFirstOrDefaultAsync<Row>(
            $"""
             SELECT {Columns} FROM instrument_event WHERE line_id = @line AND signal_id = @SignalId AND withdrawn_at IS NULL AND kind = @Kind
               AND tstzrange(starts_at, CASE WHEN kind = @Recalibrated THEN starts_at ELSE ends_at END, '[]')
                && tstzrange(@start, CASE WHEN kind = @Recalibrated THEN @start ELSE @end END, '[]') LIMIT 1
             """,
            new { line = signal.HomeLineId, signal.SignalId, logged.Kind, Recalibrated, start = logged.Start.UtcDateTime, end = logged.End?.UtcDateTime });
        if (other is not null) return (LogOutcome.Overlaps, other.ToEvent());
        await connection.ExecuteAsync(
            """
            INSERT INTO instrument_event (line_id, signal_id, event_id, kind, starts_at, ends_at, note, logged_at, request_key)
            VALUES (@line, @SignalId, @Id, @Kind, @start, @end, @Note, @logged, @requestKey)
            """,
            new
            {
                line = signal.HomeLineId, signal.SignalId, logged.Id, logged.Kind, logged.Note, requestKey,
                start = logged.Start.UtcDateTime, end = logged.End?.UtcDateTime, logged = logged.LoggedAt.UtcDateTime,
            });
        await MarkAsync(connection, logged, signal, reach);
        await transaction.CommitAsync(stop);
        return (LogOutcome.Logged, logged);
    }

    /// <summary>Withdraws an event; the row stays for the record.</summary>
    /// <returns>The event, or null when there is none that stands.</returns>
    public async Task<InstrumentEvent?> WithdrawAsync(Guid id, Func<int, SignalPlace?> placeOf, TimeSpan reach, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        Row? row = await connection.QuerySingleOrDefaultAsync<Row>(
            $"UPDATE instrument_event SET withdrawn_at = @now WHERE event_id = @id AND withdrawn_at IS NULL RETURNING {Columns}", new { id, now = clock.GetUtcNow().UtcDateTime });
        if (row is null) return null;
        if (placeOf(row.signal_id) is { } signal) await MarkAsync(connection, row.ToEvent(), signal, reach);
        await transaction.CommitAsync(stop);
        return row.ToEvent();
    }

    private async Task MarkAsync(NpgsqlConnection connection, InstrumentEvent logged, SignalPlace signal, TimeSpan reach)
    {
        if (logged.Kind != Excluded) return;
        foreach (int line in signal.Users) await DayStore.MarkAsync(connection, line, logged.Start, (logged.End ?? clock.GetUtcNow()) + reach);
    }

    private sealed record Row(Guid event_id, int signal_id, string kind, DateTime starts_at, DateTime? ends_at, string note, DateTime logged_at)
    {
        public InstrumentEvent ToEvent() => new(event_id, signal_id, kind, Utc(starts_at), ends_at is { } end ? Utc(end) : null, note, Utc(logged_at));

        private static DateTimeOffset Utc(DateTime time) => new(time, TimeSpan.Zero);
    }
}
