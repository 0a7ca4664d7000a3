using Dapper;
using EvapMonitor.Core;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>Why days are computed anew.</summary>
public enum RecomputationCause
{
    /// <summary>A plant revision was accepted.</summary>
    PlantRevision,
    /// <summary>The results are of an older computation.</summary>
    OlderModel,
    /// <summary>A person asked for it.</summary>
    Asked,
}

/// <summary>A recomputation to begin.</summary>
/// <param name="Cause">Why.</param>
/// <param name="Author">Who caused it.</param>
/// <param name="Now">The time.</param>
/// <param name="From">First UTC day.</param>
/// <param name="End">The day after the last; null without an end.</param>
public sealed record NewRecomputation(RecomputationCause Cause, string Author, DateTimeOffset Now, DateOnly From, DateOnly? End)
{
    /// <summary>The line; null for all.</summary>
    public int? LineId { get; init; }

    /// <summary>The revision accepted.</summary>
    public int? Revision { get; init; }

    /// <summary>The model whose results are wanted: only days of an older one, and none that a person took back from it.</summary>
    public int? Model { get; init; }
}

/// <summary>A recomputation and how far it is.</summary>
/// <param name="Id">Key.</param>
/// <param name="Cause">Why.</param>
/// <param name="Revision">The revision accepted; null for other causes.</param>
/// <param name="LineId">The line; null for all.</param>
/// <param name="FirstDay">First of its UTC days.</param>
/// <param name="LastDay">The last.</param>
/// <param name="DaysTotal">Days of lines to compute: a day of two lines counts twice.</param>
/// <param name="DaysLeft">Those not computed yet.</param>
/// <param name="Author">Who caused it.</param>
/// <param name="State">running, done or cancelled.</param>
/// <param name="StartedAt">When it began.</param>
/// <param name="EndedAt">When it ended; null while it runs.</param>
public sealed record Recomputation(
    int Id, RecomputationCause Cause, int? Revision, int? LineId, DateOnly FirstDay, DateOnly LastDay, int DaysTotal, int DaysLeft, string Author, string State,
    DateTimeOffset StartedAt, DateTimeOffset? EndedAt)
{
    /// <summary>States.</summary>
    public const string Running = "running", Done = "done", Cancelled = "cancelled";

    /// <summary>Days computed.</summary>
    public int DaysDone => DaysTotal - DaysLeft;
}

/// <summary>
/// Recomputations: which days wait to be computed anew, and why. The waiting days are marked in line_day like any other, so that a killed process changes nothing;
/// a day leaves its recomputation in the transaction that writes its results.
/// </summary>
public sealed class RecomputationStore(NpgsqlDataSource database, TimeProvider clock)
{
    private const int MostListed = 200;

    private const string Select =
        """
        SELECT recomputation_id, cause, revision_id, line_id, first_day, last_day, days_total,
            (SELECT count(*)::integer FROM recomputation_day d WHERE d.recomputation_id = r.recomputation_id) days_left, author, state, started_at, ended_at FROM recomputation r
        """;

    /// <summary>The recomputations, newest first.</summary>
    public async Task<IReadOnlyList<Recomputation>> ListAsync(CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return [.. (await connection.QueryAsync<Row>(new CommandDefinition($"{Select} ORDER BY recomputation_id DESC LIMIT {MostListed}", cancellationToken: stop))).Select(row => row.ToRecomputation())];
    }

    /// <summary>One; null when there is none.</summary>
    public async Task<Recomputation?> FindAsync(int id, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await FindAsync(connection, id);
    }

    /// <summary>Begins one that a person asked for. The same wish while it runs is the same recomputation.</summary>
    /// <returns>The recomputation and whether it is new; null when no line has a day with readings there.</returns>
    public async Task<(Recomputation One, bool IsNew)?> AskAsync(int? lineId, DateOnly? from, DateOnly? to, string author, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        await connection.ExecuteAsync("LOCK TABLE recomputation IN SHARE ROW EXCLUSIVE MODE");
        var wish = new NewRecomputation(RecomputationCause.Asked, author, clock.GetUtcNow(), from ?? DateOnly.MinValue, to?.AddDays(1)) { LineId = lineId };
        int? running = await connection.QuerySingleOrDefaultAsync<int?>(
            $"""
             WITH days AS ({Days})
             SELECT recomputation_id FROM recomputation WHERE cause = @cause AND state = 'running' AND line_id IS NOT DISTINCT FROM @LineId
               AND first_day = (SELECT min(day) FROM days) AND last_day = (SELECT max(day) FROM days) LIMIT 1
             """,
            Parameters(wish));
        if ((running ?? await StartAsync(connection, wish)) is not { } id) return null;
        Recomputation one = (await FindAsync(connection, id))!;
        await transaction.CommitAsync(stop);
        return (one, running is null);
    }

    /// <summary>Marks the days whose results are of an older model, but for those of which a person has stopped that.</summary>
    public async Task StartForModelAsync(string author, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        await connection.ExecuteAsync("LOCK TABLE recomputation IN SHARE ROW EXCLUSIVE MODE");
        await StartAsync(connection, new NewRecomputation(RecomputationCause.OlderModel, author, clock.GetUtcNow(), DateOnly.MinValue, null) { Model = LineEvaluation.ModelNumber });
        await transaction.CommitAsync(stop);
    }

    /// <summary>Marks the days of a recomputation within the caller's transaction.</summary>
    /// <returns>Its key; null when it would have no day.</returns>
    public static async Task<int?> StartAsync(NpgsqlConnection connection, NewRecomputation wish)
    {
        // Locked in the order in which readings mark days, so that the two never wait for each other in a circle.
        return await connection.QuerySingleOrDefaultAsync<int?>(
            $"""
             WITH days AS MATERIALIZED ({Days} ORDER BY line_id, day FOR UPDATE),
             one AS (INSERT INTO recomputation (cause, revision_id, model, line_id, first_day, last_day, days_total, author, state, started_at)
                     SELECT @cause, @Revision, @Model, @LineId, min(day), max(day), count(*), @Author, 'running', @now FROM days HAVING count(*) > 0
                     RETURNING recomputation_id),
             listed AS (INSERT INTO recomputation_day (line_id, day, recomputation_id) SELECT line_id, day, recomputation_id FROM days CROSS JOIN one),
             marked AS (UPDATE line_day d SET anew = true FROM days WHERE d.line_id = days.line_id AND d.day = days.day)
             SELECT recomputation_id FROM one
             """,
            Parameters(wish));
    }

    /// <summary>Stops one: the days not computed yet keep the results that are shown.</summary>
    /// <returns>It as it is then; null when there is none.</returns>
    public Task<Recomputation?> CancelAsync(int id, CancellationToken stop) => TurnAsync(
        id, Recomputation.Running, Recomputation.Cancelled,
        """
        UPDATE line_day d SET anew = false FROM
            (SELECT d.line_id, d.day FROM recomputation_day r JOIN line_day d USING (line_id, day) WHERE r.recomputation_id = @id AND NOT EXISTS (
                SELECT 1 FROM recomputation_day o JOIN recomputation c USING (recomputation_id)
                WHERE o.line_id = r.line_id AND o.day = r.day AND o.recomputation_id <> @id AND c.state = 'running')
            ORDER BY d.line_id, d.day FOR UPDATE OF d) own
        WHERE d.line_id = own.line_id AND d.day = own.day
        """,
        stop);

    /// <summary>Goes on with one that was stopped.</summary>
    /// <returns>It as it is then; null when there is none.</returns>
    public Task<Recomputation?> ResumeAsync(int id, CancellationToken stop) => TurnAsync(
        id, Recomputation.Cancelled, Recomputation.Running,
        """
        UPDATE line_day d SET anew = true FROM
            (SELECT d.line_id, d.day FROM recomputation_day r JOIN line_day d USING (line_id, day) WHERE r.recomputation_id = @id ORDER BY d.line_id, d.day FOR UPDATE OF d) own
        WHERE d.line_id = own.line_id AND d.day = own.day
        """,
        stop);

    /// <summary>Ends those of which every day is computed.</summary>
    /// <returns>Their keys.</returns>
    public async Task<IReadOnlyList<int>> EndAsync(CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return [.. await connection.QueryAsync<int>(new CommandDefinition(
            """
            UPDATE recomputation r SET state = 'done', ended_at = @now
            WHERE state <> 'done' AND NOT EXISTS (SELECT 1 FROM recomputation_day d WHERE d.recomputation_id = r.recomputation_id) RETURNING recomputation_id
            """,
            new { now = clock.GetUtcNow().UtcDateTime }, cancellationToken: stop))];
    }

    /// <summary>
    /// Takes a day that was computed as a whole out of its recomputations, within the transaction that writes its results, unless it was marked anew meanwhile.
    /// </summary>
    public static Task DayDoneAsync(NpgsqlConnection connection, int lineId, DateOnly day) => connection.ExecuteAsync(
        """
        DELETE FROM recomputation_day WHERE line_id = @lineId AND day = @day
          AND NOT (SELECT anew FROM line_day WHERE line_id = @lineId AND day = @day)
        """,
        new { lineId, day });

    private const string Days =
        """
        SELECT line_id, day FROM line_day l
        WHERE (@LineId::integer IS NULL OR line_id = @LineId) AND day >= @From AND (@End::date IS NULL OR day < @End) AND day <= @today
          AND (@Model::smallint IS NULL OR (model < @Model AND shown_revision IS NOT NULL AND NOT anew AND NOT EXISTS (
              SELECT 1 FROM recomputation_day r JOIN recomputation c USING (recomputation_id)
              WHERE r.line_id = l.line_id AND r.day = l.day AND c.state = 'cancelled' AND c.model = @Model)))
        """;

    private static object Parameters(NewRecomputation wish) => new
    {
        wish.LineId, wish.Revision, Model = (short?)wish.Model, wish.From, wish.End, wish.Author, cause = wish.Cause.ToString(), now = wish.Now.UtcDateTime,
        // Readings of the evening have marked tomorrow, which looks back at them; it comes by itself.
        today = DateOnly.FromDateTime(wish.Now.UtcDateTime),
    };

    private async Task<Recomputation?> TurnAsync(int id, string from, string to, string marks, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        int turned = await connection.ExecuteAsync(
            "UPDATE recomputation SET state = @to, ended_at = CASE WHEN @to = 'running' THEN NULL ELSE @now END WHERE recomputation_id = @id AND state = @from",
            new { id, from, to, now = clock.GetUtcNow().UtcDateTime });
        if (turned > 0) await connection.ExecuteAsync(marks, new { id });
        Recomputation? one = await FindAsync(connection, id);
        await transaction.CommitAsync(stop);
        return one;
    }

    private static async Task<Recomputation?> FindAsync(NpgsqlConnection connection, int id) =>
        (await connection.QuerySingleOrDefaultAsync<Row>($"{Select} WHERE recomputation_id = @id", new { id }))?.ToRecomputation();

    private sealed record Row(
        int recomputation_id, string cause, int? revision_id, int? line_id, DateOnly first_day, DateOnly last_day, int days_total, int days_left, string author, string state,
        DateTime started_at, DateTime? ended_at)
    {
        public Recomputation ToRecomputation() => new(
            recomputation_id, Enum.Parse<RecomputationCause>(cause), revision_id, line_id, first_day, last_day, days_total, days_left, author, state,
            new DateTimeOffset(started_at, TimeSpan.Zero), ended_at is { } end ? new DateTimeOffset(end, TimeSpan.Zero) : null);
    }
}
