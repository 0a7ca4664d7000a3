using Dapper;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>A day of a line that is to be evaluated, taken for that.</summary>
/// <param name="LineId">The line.</param>
/// <param name="Day">The UTC day.</param>
/// <param name="From">The first instant that changed.</param>
/// <param name="Shown">The revision under which its shown results were computed; null when it has none.</param>
/// <param name="Model">The computation that computed them.</param>
/// <param name="Newest">The revision accepted last, as of the taking.</param>
public sealed record TakenDay(int LineId, DateOnly Day, DateTime From, int? Shown, short Model, int Newest);

/// <summary>The days that wait for evaluation.</summary>
public sealed class DayStore(NpgsqlDataSource database)
{
    /// <summary>A day waits because readings or events changed, because it was taken by a process that died, or because it is to be computed anew.</summary>
    private const string Waits = "(changed_from IS NOT NULL OR taken_from IS NOT NULL OR anew)";

    /// <summary>Since when it waits: what is computed anew is so from its begin on.</summary>
    private const string Since = "least(changed_from, taken_from, CASE WHEN anew THEN day::timestamp AT TIME ZONE 'UTC' END)";

    private const string Ready = $"{Waits} AND {Since} < @closed AND (day = @today OR changed_at < clock_timestamp() - @rest)";

    /// <summary>The lines that have a day to evaluate, each with whether it is today's.</summary>
    /// <param name="lines">The lines asked for.</param>
    /// <param name="closed">End of the last closed window.</param>
    /// <param name="rest">How long a past day must have been left alone.</param>
    /// <param name="stop">Cancels.</param>
    public async Task<IReadOnlyList<(int Line, bool Today)>> WaitingLinesAsync(IReadOnlyCollection<int> lines, DateTimeOffset closed, TimeSpan rest, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return [.. await connection.QueryAsync<(int, bool)>(new CommandDefinition(
            $"SELECT line_id, bool_or(day = @today) FROM line_day WHERE line_id = ANY(@lines) AND {Ready} GROUP BY line_id",
            new { lines = lines.ToArray(), closed = closed.UtcDateTime, today = Today(closed), rest },
            cancellationToken: stop))];
    }

    /// <summary>
    /// Takes the next waiting day of a line: today first, so that live windows never wait for a backlog, then what has changed, then what is computed anew, each the
    /// oldest first. A past day is taken when nothing has touched it for a moment, so that a running import does not have each day computed once a batch.
    /// </summary>
    /// <param name="lineId">The line.</param>
    /// <param name="closed">End of the last closed window: only what changed before it can be evaluated.</param>
    /// <param name="rest">How long a past day must have been left alone.</param>
    /// <param name="aside">Days that are not to be taken now.</param>
    /// <param name="stop">Cancels.</param>
    public async Task<TakenDay?> TakeAsync(int lineId, DateTimeOffset closed, TimeSpan rest, IReadOnlyCollection<DateOnly> aside, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.QueryFirstOrDefaultAsync<TakenDay>(new CommandDefinition(
            $"""
             WITH next AS (
                 SELECT line_id, day FROM line_day WHERE line_id = @lineId AND {Ready} AND day <> ALL(@aside)
                 ORDER BY day = @today DESC, changed_from IS NULL AND taken_from IS NULL, day LIMIT 1 FOR UPDATE)
             UPDATE line_day d SET taken_from = {Since.Replace("day::", "d.day::", StringComparison.Ordinal)}, changed_from = NULL, anew = false
             FROM next WHERE d.line_id = next.line_id AND d.day = next.day
             RETURNING d.line_id LineId, d.day, d.taken_from "From", d.shown_revision Shown, d.model, (SELECT max(revision_id) FROM plant_revision) Newest
             """,
            new { lineId, closed = closed.UtcDateTime, today = Today(closed), rest, aside = aside.ToArray() },
            cancellationToken: stop));
    }

    /// <summary>Number of days that wait, all lines together, because something changed before an instant.</summary>
    public async Task<int> WaitingAsync(DateTimeOffset before, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.ExecuteScalarAsync<int>(new CommandDefinition(
            $"SELECT count(*) FROM line_day WHERE {Waits} AND {Since} < @before", new { before = before.UtcDateTime }, cancellationToken: stop));
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

    /// <summary>The day of the last closed window.</summary>
    private static DateOnly Today(DateTimeOffset closed) => DateOnly.FromDateTime(closed.UtcDateTime.AddTicks(-1));
}
