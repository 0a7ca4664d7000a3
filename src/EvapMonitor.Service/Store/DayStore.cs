using Dapper;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>A day of a line whose readings have changed since it was evaluated, taken for evaluation.</summary>
/// <param name="LineId">The line.</param>
/// <param name="Day">The UTC day.</param>
/// <param name="From">The first instant that changed.</param>
public sealed record TakenDay(int LineId, DateOnly Day, DateTime From);

/// <summary>The days that wait for evaluation.</summary>
public sealed class DayStore(NpgsqlDataSource database)
{
    /// <summary>
    /// Takes the next waiting day of a line: today first, so that live windows never wait for a backlog, then the oldest. A past day is taken when nothing has
    /// touched it for a moment, so that a running import does not have each day computed once a batch.
    /// </summary>
    /// <param name="lineId">The line.</param>
    /// <param name="closed">End of the last closed window: only what changed before it can be evaluated.</param>
    /// <param name="rest">How long a past day must have been left alone.</param>
    /// <param name="stop">Cancels.</param>
    public async Task<TakenDay?> TakeAsync(int lineId, DateTimeOffset closed, TimeSpan rest, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.QueryFirstOrDefaultAsync<TakenDay>(new CommandDefinition(
            """
            WITH next AS (
                SELECT line_id, day FROM line_day
                WHERE line_id = @lineId AND (changed_from IS NOT NULL OR taken_from IS NOT NULL) AND least(changed_from, taken_from) < @closed
                  AND (day = @today OR changed_at < clock_timestamp() - @rest)
                ORDER BY day = @today DESC, day LIMIT 1 FOR UPDATE)
            UPDATE line_day d SET taken_from = least(d.changed_from, d.taken_from), changed_from = NULL
            FROM next WHERE d.line_id = next.line_id AND d.day = next.day
            RETURNING d.line_id LineId, d.day, d.taken_from "From"
            """,
            new { lineId, closed = closed.UtcDateTime, today = DateOnly.FromDateTime(closed.UtcDateTime.AddTicks(-1)), rest },
            cancellationToken: stop));
    }

    /// <summary>Number of days that wait, all lines together, because something changed before an instant.</summary>
    public async Task<int> WaitingAsync(DateTimeOffset before, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.ExecuteScalarAsync<int>(new CommandDefinition(
            "SELECT count(*) FROM line_day WHERE (changed_from IS NOT NULL OR taken_from IS NOT NULL) AND least(changed_from, taken_from) < @before",
            new { before = before.UtcDateTime },
            cancellationToken: stop));
    }

    /// <summary>Marks the days of an interval, after a logged event has changed.</summary>
    public static Task MarkAsync(NpgsqlConnection connection, int lineId, DateTimeOffset from, DateTimeOffset to) =>
        connection.ExecuteAsync(
            """
            UPDATE line_day SET data_version = data_version + 1, changed_at = clock_timestamp(),
                changed_from = least(changed_from, greatest(@from, day::timestamp AT TIME ZONE 'UTC'))
            WHERE line_id = @lineId AND day BETWEEN (@from AT TIME ZONE 'UTC')::date AND (@to AT TIME ZONE 'UTC')::date
            """,
            new { lineId, from = from.UtcDateTime, to = to.UtcDateTime });
}
