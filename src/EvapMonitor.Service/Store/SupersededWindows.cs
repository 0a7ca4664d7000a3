using Dapper;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>Deletes windows of revisions that are no longer shown, ninety days after they were superseded. Hours, stretches and corrections by the hour stay for good.</summary>
public sealed class SupersededWindows(NpgsqlDataSource database, TimeProvider clock)
{
    /// <summary>How long they are kept.</summary>
    public static readonly TimeSpan Kept = TimeSpan.FromDays(90);

    /// <summary>Days in one transaction.</summary>
    private const int Batch = 20;

    /// <summary>Deletes what is due, a batch of days at a time.</summary>
    /// <returns>The number of days of lines of which windows were deleted.</returns>
    public async Task<int> DeleteAsync(CancellationToken stop)
    {
        int days = 0;
        for (int deleted = Batch; deleted == Batch; days += deleted) deleted = await DeleteBatchAsync(stop);
        return days;
    }

    private async Task<int> DeleteBatchAsync(CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        // Locked, so that no evaluation turns what is shown meanwhile.
        var due = (await connection.QueryAsync<(int Line, DateOnly Day, int Shown)>(
            """
            SELECT line_id, day, coalesce(shown_revision, 0) FROM line_day WHERE superseded_at < @before
            ORDER BY line_id, day LIMIT @Batch FOR UPDATE SKIP LOCKED
            """,
            new { before = (clock.GetUtcNow() - Kept).UtcDateTime, Batch })).ToList();
        foreach ((int line, DateOnly day, int shown) in due)
        {
            DateTime from = day.ToDateTime(TimeOnly.MinValue, DateTimeKind.Utc);
            await connection.ExecuteAsync(
                """
                DELETE FROM effect_window WHERE line_id = @line AND at >= @from AND at < @to AND revision_id <> @shown;
                DELETE FROM line_window WHERE line_id = @line AND at >= @from AND at < @to AND revision_id <> @shown;
                DELETE FROM balance_window WHERE line_id = @line AND at >= @from AND at < @to AND revision_id <> @shown;
                UPDATE line_day SET superseded_at = NULL, result_version = result_version + 1 WHERE line_id = @line AND day = @day
                """,
                new { line, day, shown, from, to = from.AddDays(1) });
        }

        await transaction.CommitAsync(stop);
        return due.Count;
    }
}
