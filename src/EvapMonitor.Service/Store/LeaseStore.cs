using Dapper;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>Another process evaluates the line now: what was computed must not be written.</summary>
public sealed class LeaseLostException() : Exception("Another process evaluates the line now.");

/// <summary>
/// Leases on lines, so that a second process on the same database is harmless, and takes over the lines of a dead one. Times are the database's own.
/// </summary>
public sealed class LeaseStore(NpgsqlDataSource database)
{
    private static readonly TimeSpan Length = TimeSpan.FromSeconds(15);
    private readonly Guid _owner = Guid.NewGuid();

    /// <summary>Takes or renews the leases of lines that nobody else holds.</summary>
    /// <returns>The fence of each line held.</returns>
    public async Task<Dictionary<int, long>> HoldAsync(IEnumerable<int> lines, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        IEnumerable<(int Line, long Fence)> held = await connection.QueryAsync<(int, long)>(new CommandDefinition(
            """
            INSERT INTO line_lease (line_id, owner, fence, until) SELECT l, @owner, 1, clock_timestamp() + @length FROM unnest(@lines) AS u(l) ORDER BY l
            ON CONFLICT (line_id) DO UPDATE SET owner = @owner, until = clock_timestamp() + @length,
                fence = line_lease.fence + CASE WHEN line_lease.owner = @owner THEN 0 ELSE 1 END
            WHERE line_lease.owner = @owner OR line_lease.until < clock_timestamp()
            RETURNING line_id, fence
            """,
            new { owner = _owner, lines = lines.ToArray(), length = Length },
            cancellationToken: stop));
        return held.ToDictionary(lease => lease.Line, lease => lease.Fence);
    }

    /// <summary>True while this process holds the lease of a line.</summary>
    public async Task<bool> IsOursAsync(int lineId, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.ExecuteScalarAsync<int?>(new CommandDefinition(
            "SELECT 1 FROM line_lease WHERE line_id = @lineId AND owner = @owner AND until > clock_timestamp()", new { lineId, owner = _owner }, cancellationToken: stop)) is not null;
    }

    /// <summary>Gives all leases back, so that another process need not wait for them to run out.</summary>
    public async Task ReleaseAsync()
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync();
        await connection.ExecuteAsync("UPDATE line_lease SET until = '-infinity' WHERE owner = @owner", new { owner = _owner });
    }

    /// <summary>Makes sure, within a transaction that writes results, that the line is still ours, and keeps it so until the commit.</summary>
    /// <exception cref="LeaseLostException">It is not.</exception>
    public async Task CheckAsync(NpgsqlConnection connection, int lineId, long fence)
    {
        int? ours = await connection.ExecuteScalarAsync<int?>(
            "SELECT 1 FROM line_lease WHERE line_id = @lineId AND owner = @owner AND fence = @fence FOR SHARE", new { lineId, owner = _owner, fence });
        if (ours is null) throw new LeaseLostException();
    }
}
