using System.Text.Json;
using Dapper;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>States of an import, as stored and shown.</summary>
public static class ImportState
{
    /// <summary>In the queue.</summary>
    public const string Waiting = "waiting";

    /// <summary>Being read.</summary>
    public const string Running = "running";

    /// <summary>All rows read.</summary>
    public const string Done = "done";

    /// <summary>Could not be read to the end; the reason is in the error.</summary>
    public const string Failed = "failed";

    /// <summary>Stopped by somebody; what was stored stays.</summary>
    public const string Cancelled = "cancelled";
}

/// <summary>A row of a file that was not used.</summary>
/// <param name="Line">Line number in the file; the header is 1.</param>
/// <param name="Reason">Why.</param>
public sealed record RejectedRow(long Line, string Reason);

/// <summary>A signal that the plant does not name.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Count">How many readings came.</param>
public sealed record UnknownSignal(string Name, long Count);

/// <summary>One import.</summary>
public sealed record ImportFile
{
    /// <summary>SHA-256 of the file, lower-case hexadecimal.</summary>
    public required string Sha256 { get; init; }

    /// <summary>The name under which it came.</summary>
    public required string Name { get; init; }

    /// <summary>Where the upload lies; null once done.</summary>
    public string? StoredAs { get; init; }

    /// <summary>One of <see cref="ImportState"/>.</summary>
    public required string State { get; init; }

    /// <summary>True to override stored values that differ.</summary>
    public bool Replace { get; init; }

    /// <summary>Size of the file as it came.</summary>
    public long BytesTotal { get; init; }

    /// <summary>Bytes read so far.</summary>
    public long BytesRead { get; init; }

    /// <summary>Lines whose readings are committed.</summary>
    public long CommittedOffset { get; init; }

    /// <summary>Readings stored.</summary>
    public long Accepted { get; init; }

    /// <summary>Readings that were there already.</summary>
    public long Repeated { get; init; }

    /// <summary>Readings that were there with another value, which stays.</summary>
    public long Differing { get; init; }

    /// <summary>Rows or cells not used.</summary>
    public long Rejected { get; init; }

    /// <summary>Readings of signals that the plant does not name.</summary>
    public long NotInPlant { get; init; }

    /// <summary>When it came.</summary>
    public DateTime ReceivedAt { get; init; }

    /// <summary>When reading began.</summary>
    public DateTime? StartedAt { get; init; }

    /// <summary>When it ended.</summary>
    public DateTime? EndedAt { get; init; }

    /// <summary>Why it failed.</summary>
    public string? Error { get; init; }

    /// <summary>The first hundred rejected rows.</summary>
    public IReadOnlyList<RejectedRow> Problems { get; init; } = [];

    /// <summary>Signals that the plant does not name, most frequent first.</summary>
    public IReadOnlyList<UnknownSignal> UnknownSignals { get; init; } = [];
}

/// <summary>Lets Dapper read a jsonb column into a list.</summary>
internal sealed class JsonList<T> : SqlMapper.TypeHandler<IReadOnlyList<T>>
{
    public override IReadOnlyList<T> Parse(object value) => JsonSerializer.Deserialize<List<T>>((string)value) ?? [];

    public override void SetValue(System.Data.IDbDataParameter parameter, IReadOnlyList<T>? value) => parameter.Value = JsonSerializer.Serialize(value);
}

/// <summary>Imports and their progress. The counts of a batch are committed with its readings, so that a killed import goes on where it was.</summary>
public sealed class ImportStore(NpgsqlDataSource database, TimeProvider clock)
{
    static ImportStore()
    {
        SqlMapper.AddTypeHandler(new JsonList<RejectedRow>());
        SqlMapper.AddTypeHandler(new JsonList<UnknownSignal>());
    }

    private const string Columns =
        """
        sha256, name, stored_as StoredAs, state, replace_existing Replace, bytes_total BytesTotal, bytes_read BytesRead, committed_offset CommittedOffset,
        accepted, repeated, differing, rejected, not_in_plant NotInPlant, received_at ReceivedAt, started_at StartedAt, ended_at EndedAt, error,
        problems, unknown_signals UnknownSignals
        """;

    /// <summary>
    /// Puts a file into the queue. One that waits or runs already is left as it is; one that has ended is taken again from the start, which stores nothing twice.
    /// </summary>
    /// <returns>The import, and whether the upload was taken (and so must be kept).</returns>
    public async Task<(ImportFile Import, bool Taken)> EnqueueAsync(string sha256, string name, string storedAs, long bytes, bool replace, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        int taken = await connection.ExecuteAsync(
            """
            INSERT INTO import_file (sha256, name, stored_as, state, replace_existing, bytes_total, received_at)
            VALUES (@sha256, @name, @storedAs, 'waiting', @replace, @bytes, @now)
            ON CONFLICT (sha256) DO UPDATE SET name = excluded.name, stored_as = excluded.stored_as, state = 'waiting', replace_existing = excluded.replace_existing,
                bytes_read = 0, committed_offset = 0, accepted = 0, repeated = 0, differing = 0, rejected = 0, not_in_plant = 0, received_at = excluded.received_at,
                started_at = NULL, ended_at = NULL, error = NULL, problems = '[]', unknown_signals = '[]'
            WHERE import_file.state NOT IN ('waiting', 'running')
            """,
            new { sha256, name, storedAs, replace, bytes, now = clock.GetUtcNow().UtcDateTime });
        return ((await FindAsync(sha256, stop))!, taken == 1);
    }

    /// <summary>The import to work on: one that ran when the program ended, else the oldest that waits.</summary>
    public async Task<ImportFile?> NextAsync(CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.QueryFirstOrDefaultAsync<ImportFile>(
            $"SELECT {Columns} FROM import_file WHERE state IN ('running', 'waiting') ORDER BY state = 'running' DESC, received_at LIMIT 1");
    }

    /// <summary>An import by its key.</summary>
    public async Task<ImportFile?> FindAsync(string sha256, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.QuerySingleOrDefaultAsync<ImportFile>($"SELECT {Columns} FROM import_file WHERE sha256 = @sha256", new { sha256 });
    }

    /// <summary>The last hundred imports, newest first.</summary>
    public async Task<IReadOnlyList<ImportFile>> ListAsync(CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return [.. (await connection.QueryAsync<ImportFile>($"SELECT {Columns} FROM import_file ORDER BY received_at DESC LIMIT 100"))];
    }

    /// <summary>Where the uploads lie that an import still needs.</summary>
    public async Task<IReadOnlyList<string>> StoredAsync(CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return [.. await connection.QueryAsync<string>("SELECT stored_as FROM import_file WHERE stored_as IS NOT NULL")];
    }

    /// <summary>Notes that reading has begun.</summary>
    /// <returns>False when somebody cancelled it meanwhile.</returns>
    public async Task<bool> StartAsync(string sha256, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.ExecuteAsync(
            "UPDATE import_file SET state = 'running', started_at = coalesce(started_at, @now) WHERE sha256 = @sha256 AND state IN ('running', 'waiting')",
            new { sha256, now = clock.GetUtcNow().UtcDateTime }) == 1;
    }

    /// <summary>Stores the progress within the transaction that stores the readings.</summary>
    public static Task SaveProgressAsync(NpgsqlConnection connection, ImportFile progress) =>
        connection.ExecuteAsync(
            """
            UPDATE import_file SET bytes_read = @BytesRead, committed_offset = @CommittedOffset, accepted = @Accepted, repeated = @Repeated, differing = @Differing,
                rejected = @Rejected, not_in_plant = @NotInPlant, problems = @problems::jsonb, unknown_signals = @unknown::jsonb
            WHERE sha256 = @Sha256
            """,
            new
            {
                progress.Sha256, progress.BytesRead, progress.CommittedOffset, progress.Accepted, progress.Repeated, progress.Differing, progress.Rejected, progress.NotInPlant,
                problems = JsonSerializer.Serialize(progress.Problems),
                unknown = JsonSerializer.Serialize(progress.UnknownSignals),
            });

    /// <summary>Notes how an import ended.</summary>
    public async Task EndAsync(string sha256, string state, string? error)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync();
        await connection.ExecuteAsync(
            "UPDATE import_file SET state = @state, error = @error, stored_as = NULL, ended_at = @now WHERE sha256 = @sha256",
            new { sha256, state, error, now = clock.GetUtcNow().UtcDateTime });
    }
}
