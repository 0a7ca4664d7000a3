using Dapper;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>A day of a line whose readings have changed since it was evaluated.</summary>
/// <param name="LineId">The line.</param>
/// <param name="Day">The UTC day.</param>
/// <param name="DataVersion">Grows with every change; a result is for one version.</param>
public sealed record WaitingDay(int LineId, DateOnly Day, long DataVersion);

/// <summary>The days that wait for evaluation.</summary>
public sealed class DayStore(NpgsqlDataSource database)
{
    /// <summary>
    /// The oldest waiting day of a line that has come to rest: nothing has touched it for a moment, so that a running import does not have each day computed
    /// once a batch. A day that is touched without end is taken after a limit all the same.
    /// </summary>
    public async Task<WaitingDay?> NextAsync(int lineId, DateTimeOffset now, TimeSpan rest, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.QueryFirstOrDefaultAsync<WaitingDay>(new CommandDefinition(
            """
            SELECT line_id LineId, day, data_version DataVersion FROM line_day
            WHERE line_id = @lineId AND changed_from IS NOT NULL AND day <= @today AND changed_at < clock_timestamp() - @rest
            ORDER BY day LIMIT 1
            """,
            new { lineId, today = DateOnly.FromDateTime(now.UtcDateTime), rest },
            cancellationToken: stop));
    }

    /// <summary>Number of days that wait, all lines together, up to a day.</summary>
    public async Task<int> WaitingAsync(DateTimeOffset now, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.ExecuteScalarAsync<int>(new CommandDefinition(
            "SELECT count(*) FROM line_day WHERE changed_from IS NOT NULL AND day <= @today",
            new { today = DateOnly.FromDateTime(now.UtcDateTime) },
            cancellationToken: stop));
    }

    /// <summary>Marks the days of an interval, after a logged event has changed.</summary>
    public static Task MarkAsync(NpgsqlConnection connection, int lineId, DateTimeOffset from, DateTimeOffset to) =>
        connection.ExecuteAsync(
            """
            UPDATE line_day SET data_version = data_version + 1, changed_at = clock_timestamp(),
                changed_from = least(coalesce(changed_from, day::timestamp AT TIME ZONE 'UTC'), day::timestamp AT TIME ZONE 'UTC')
            WHERE line_id = @lineId AND day BETWEEN (@from AT TIME ZONE 'UTC')::date AND (@to AT TIME ZONE 'UTC')::date
            """,
            new { lineId, from = from.UtcDateTime, to = to.UtcDateTime });
}
