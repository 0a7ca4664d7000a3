using Dapper;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>A reading that the database would not take.</summary>
/// <param name="RefusedAt">When it was refused.</param>
/// <param name="Signal">Name of the signal.</param>
/// <param name="At">Instant of the reading.</param>
/// <param name="Value">Its value in the plant's unit; null when the source gave none.</param>
/// <param name="Quality">Its quality as stored.</param>
/// <param name="Source">Where it came from.</param>
/// <param name="Reason">What the database said.</param>
public sealed record RefusedReading(DateTime RefusedAt, string Signal, DateTime At, double? Value, short Quality, string Source, string Reason);

/// <summary>Readings that the database would not take: at most <see cref="Most"/>, the oldest go.</summary>
public sealed class RefusedStore(NpgsqlDataSource database)
{
    /// <summary>Most that are kept.</summary>
    public const int Most = 10_000;

    /// <summary>Keeps a refused reading. The same reading again changes nothing.</summary>
    public async Task AddAsync(RefusedReading refused, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        await connection.ExecuteAsync(new CommandDefinition(
            """
            INSERT INTO refused_reading (signal, at, value, quality, source, reason) VALUES (@Signal, @At, @Value, @Quality, @Source, @Reason)
            ON CONFLICT (signal, at, source) DO NOTHING;
            DELETE FROM refused_reading WHERE refused_id <= (SELECT max(refused_id) FROM refused_reading) - @Most
            """,
            new { refused.Signal, refused.At, refused.Value, refused.Quality, refused.Source, refused.Reason, Most }, cancellationToken: stop));
        await transaction.CommitAsync(stop);
    }

    /// <summary>The last ones, newest first.</summary>
    public async Task<IReadOnlyList<RefusedReading>> ListAsync(int most, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return [.. await connection.QueryAsync<RefusedReading>(new CommandDefinition(
            "SELECT refused_at RefusedAt, signal, at, value, quality, source, reason FROM refused_reading ORDER BY refused_id DESC LIMIT @most",
            new { most }, cancellationToken: stop))];
    }
}
