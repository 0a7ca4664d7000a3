using Dapper;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>A logged cleaning.</summary>
/// <param name="Id">Key.</param>
/// <param name="LineId">The line.</param>
/// <param name="EffectId">The effect.</param>
/// <param name="Start">When it began.</param>
/// <param name="End">When it ended; null while it goes on.</param>
/// <param name="Kind">The plant's word for it.</param>
/// <param name="Note">Free text.</param>
/// <param name="LoggedAt">When it was logged.</param>
/// <param name="Body">The body that was cleaned; null: the one that served.</param>
/// <param name="Rejected">True: there was none in this time, whatever was recognised.</param>
public sealed record LoggedCleaning(
    Guid Id, int LineId, int EffectId, DateTimeOffset Start, DateTimeOffset? End, string Kind, string Note, DateTimeOffset LoggedAt, string? Body = null, bool Rejected = false)
{
    /// <summary>True when another says the same, whenever it was logged. The store keeps microseconds.</summary>
    public bool Says(LoggedCleaning other) => Instant.AreSame(Start, other.Start) && Instant.AreSame(End, other.End) && (Kind, Note, Body, Rejected) == (other.Kind, other.Note, other.Body, other.Rejected);
}

/// <summary>What became of an attempt to log a cleaning.</summary>
public enum LogOutcome
{
    /// <summary>Logged now.</summary>
    Logged,
    /// <summary>Logged before, with the same request key.</summary>
    Repeated,
    /// <summary>It overlaps another of the effect.</summary>
    Overlaps,
    /// <summary>The request key came before with another cleaning.</summary>
    KeyTaken,
}

/// <summary>Logged cleanings. Logging or withdrawing one marks the days it covers or unsettles, so that their results are computed anew.</summary>
public sealed class CleaningStore(NpgsqlDataSource database, TimeProvider clock)
{
    private const string Columns = "cleaning_id, line_id, effect_id, starts_at, ends_at, kind, note, logged_at, body, rejected";

    /// <summary>Entries that stand, rejections among them, newest first; null line or effect means all.</summary>
    public async Task<IReadOnlyList<LoggedCleaning>> ListAsync(int? lineId, int? effectId, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        IEnumerable<Row> rows = await connection.QueryAsync<Row>(new CommandDefinition(
            $"""
             SELECT {Columns} FROM cleaning WHERE withdrawn_at IS NULL AND (@lineId::int IS NULL OR line_id = @lineId) AND (@effectId::int IS NULL OR effect_id = @effectId)
             ORDER BY starts_at DESC LIMIT 5000
             """,
            new { lineId, effectId }, cancellationToken: stop));
        return [.. rows.Select(row => row.ToCleaning())];
    }

    /// <summary>Logs a cleaning. The same request key never logs twice.</summary>
    public Task<(LogOutcome Outcome, LoggedCleaning Cleaning)> LogAsync(LoggedCleaning cleaning, string requestKey, CancellationToken stop) => LogAsync(cleaning, requestKey, stop, null);

    private async Task<(LogOutcome Outcome, LoggedCleaning Cleaning)> LogAsync(
        LoggedCleaning cleaning, string requestKey, CancellationToken stop, LoggedCleaning? replaced = null, bool onlyRepeat = false)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        // One log at a time for an effect, so that two overlapping ones cannot both pass the check.
        await connection.ExecuteAsync(
            "SELECT 1 FROM effect WHERE line_id = @LineId AND effect_id = @EffectId FOR UPDATE", new { cleaning.LineId, cleaning.EffectId });
        var key = new { cleaning.LineId, cleaning.EffectId, requestKey };
        Row? before = await connection.QuerySingleOrDefaultAsync<Row>(
            $"SELECT {Columns} FROM cleaning WHERE line_id = @LineId AND effect_id = @EffectId AND request_key = @requestKey", key);
        if (before is not null) return (before.ToCleaning().Says(cleaning) ? LogOutcome.Repeated : LogOutcome.KeyTaken, before.ToCleaning());
        if (onlyRepeat) return (LogOutcome.KeyTaken, cleaning);
        if (replaced is not null)
        {
            await connection.ExecuteAsync("UPDATE cleaning SET withdrawn_at = @now WHERE cleaning_id = @Id AND withdrawn_at IS NULL", new { replaced.Id, now = clock.GetUtcNow().UtcDateTime });
            await MarkAsync(connection, replaced);
        }

        Row? other = await connection.QueryFirstOrDefaultAsync<Row>(
            $"""
             SELECT {Columns} FROM cleaning WHERE line_id = @LineId AND effect_id = @EffectId AND withdrawn_at IS NULL AND rejected = @Rejected
               AND body IS NOT DISTINCT FROM @Body AND cleaning_id <> @Id AND tstzrange(starts_at, ends_at) && tstzrange(@start, @end) LIMIT 1
             """,
            new { cleaning.LineId, cleaning.EffectId, cleaning.Id, cleaning.Body, cleaning.Rejected, start = cleaning.Start.UtcDateTime, end = cleaning.End?.UtcDateTime });
        if (other is not null) return (LogOutcome.Overlaps, other.ToCleaning());
        await connection.ExecuteAsync(
            """
            INSERT INTO cleaning (line_id, effect_id, cleaning_id, starts_at, ends_at, kind, note, logged_at, request_key, body, rejected)
            VALUES (@LineId, @EffectId, @Id, @start, @end, @Kind, @Note, @logged, @requestKey, @Body, @Rejected)
            """,
            new
            {
                cleaning.LineId, cleaning.EffectId, cleaning.Id, cleaning.Kind, cleaning.Note, requestKey, cleaning.Body, cleaning.Rejected,
                start = cleaning.Start.UtcDateTime, end = cleaning.End?.UtcDateTime, logged = cleaning.LoggedAt.UtcDateTime,
            });
        await MarkAsync(connection, cleaning);
        await transaction.CommitAsync(stop);
        return (LogOutcome.Logged, cleaning);
    }

    /// <summary>Puts another entry in the place of one; the old row stays for the record, withdrawn.</summary>
    /// <returns>The outcome with what stands; null when there is no such entry.</returns>
    public async Task<(LogOutcome Outcome, LoggedCleaning Cleaning)?> CorrectAsync(Guid id, LoggedCleaning corrected, string requestKey, CancellationToken stop)
    {
        if (await FindAsync(id, stop) is not { } before)
        {
            // A retry of a correction that was made finds the old entry gone and its own in its place.
            (LogOutcome outcome, LoggedCleaning stands) = await LogAsync(corrected, requestKey, stop, onlyRepeat: true);
            return outcome == LogOutcome.Repeated ? (outcome, stands) : null;
        }

        return await LogAsync(corrected, requestKey, stop, before);
    }

    private async Task<LoggedCleaning?> FindAsync(Guid id, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return (await connection.QuerySingleOrDefaultAsync<Row>($"SELECT {Columns} FROM cleaning WHERE cleaning_id = @id AND withdrawn_at IS NULL", new { id }))?.ToCleaning();
    }

    /// <summary>Withdraws a cleaning; the row stays for the record.</summary>
    /// <returns>The cleaning, or null when there is none that stands.</returns>
    public async Task<LoggedCleaning?> WithdrawAsync(Guid id, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        Row? row = await connection.QuerySingleOrDefaultAsync<Row>(
            $"UPDATE cleaning SET withdrawn_at = @now WHERE cleaning_id = @id AND withdrawn_at IS NULL RETURNING {Columns}", new { id, now = clock.GetUtcNow().UtcDateTime });
        if (row is null) return null;
        LoggedCleaning cleaning = row.ToCleaning();
        await MarkAsync(connection, cleaning);
        await transaction.CommitAsync(stop);
        return cleaning;
    }

    /// <summary>Marks the days of a cleaning, and of the time in which the line settles after it.</summary>
    private Task MarkAsync(NpgsqlConnection connection, LoggedCleaning cleaning) => cleaning.Rejected ? Task.CompletedTask
        : DayStore.MarkAsync(connection, cleaning.LineId, cleaning.Start, (cleaning.End ?? clock.GetUtcNow()) + Core.Plant.Line.LongestSettlingTime);

    private sealed record Row(Guid cleaning_id, int line_id, int effect_id, DateTime starts_at, DateTime? ends_at, string kind, string note, DateTime logged_at, string? body, bool rejected)
    {
        public LoggedCleaning ToCleaning() =>
            new(cleaning_id, line_id, effect_id, Utc(starts_at), ends_at is { } end ? Utc(end) : null, kind, note, Utc(logged_at), body, rejected);

        private static DateTimeOffset Utc(DateTime time) => new(time, TimeSpan.Zero);
    }
}
