using System.Data;
using Dapper;
using EvapMonitor.Core.Readings;
using Npgsql;
using NpgsqlTypes;

namespace EvapMonitor.Service.Store;

/// <summary>A reading with the keys under which it is stored.</summary>
public readonly record struct PlacedReading(SignalPlace Place, Reading Reading);

/// <summary>What became of a batch of readings.</summary>
/// <param name="Accepted">Stored now (or, when replacing, changed).</param>
/// <param name="Repeated">There already with the same value.</param>
/// <param name="Differing">There already with another value, which stays unless replacing was asked for.</param>
public readonly record struct InsertCount(long Accepted, long Repeated, long Differing)
{
    /// <summary>Adds two counts.</summary>
    public static InsertCount operator +(InsertCount a, InsertCount b) =>
        new(a.Accepted + b.Accepted, a.Repeated + b.Repeated, a.Differing + b.Differing);

    /// <inheritdoc cref="op_Addition"/>
    public static InsertCount Add(InsertCount left, InsertCount right) => left + right;
}

/// <summary>Readings in bulk, in and out. Inserting marks the days that the readings touch in the same transaction.</summary>
public sealed class ReadingStore(NpgsqlDataSource database)
{
    /// <summary>
    /// Inserts a batch within the caller's transaction and marks the days touched. The first value of an instant wins, unless <paramref name="replace"/>.
    /// </summary>
    /// <param name="connection">An open connection with a transaction.</param>
    /// <param name="transaction">The transaction.</param>
    /// <param name="batch">The readings.</param>
    /// <param name="replace">True to override stored values that differ.</param>
    /// <param name="leadIn">How far a reading's influence reaches past its day, at most.</param>
    /// <param name="stop">Cancels.</param>
    public static async Task<InsertCount> InsertAsync(
        NpgsqlConnection connection, NpgsqlTransaction transaction, IReadOnlyList<PlacedReading> batch, bool replace, TimeSpan leadIn, CancellationToken stop)
    {
        if (batch.Count == 0) return default;
        if (!replace && await TryCopyAsync(connection, transaction, batch, stop))
        {
            var marks = new DayMarks(leadIn);
            foreach (PlacedReading placed in batch) marks.Add(placed.Place, placed.Reading.At);
            await marks.WriteAsync(connection, stop);
            return new InsertCount(batch.Count, 0, 0);
        }

        return await StageAsync(connection, batch, replace, leadIn, stop);
    }

    /// <summary>Reads the readings of some signals over a span, each in ascending order. Synchronous on the caller's thread: twice as fast in bulk.</summary>
    public Dictionary<string, ReadingSeries> Read(IReadOnlyDictionary<string, SignalPlace> signals, DateTimeOffset from, DateTimeOffset to)
    {
        var result = new Dictionary<string, ReadingSeries>(signals.Count);
        using NpgsqlConnection connection = database.OpenConnection();
        foreach (IGrouping<int, KeyValuePair<string, SignalPlace>> home in signals.GroupBy(pair => pair.Value.HomeLineId))
        {
            var names = home.ToDictionary(pair => pair.Value.SignalId, pair => pair.Key);
            using var command = new NpgsqlCommand(
                "SELECT signal_id, at, value, quality FROM reading WHERE line_id = $1 AND signal_id = ANY($2) AND at >= $3 AND at < $4 ORDER BY signal_id, at", connection);
            command.Parameters.Add(new() { Value = home.Key });
            command.Parameters.Add(new() { Value = names.Keys.ToArray() });
            command.Parameters.Add(new() { Value = from.UtcDateTime });
            command.Parameters.Add(new() { Value = to.UtcDateTime });
            using NpgsqlDataReader reader = command.ExecuteReader(CommandBehavior.SequentialAccess);
            int current = -1;
            ReadingSeries series = new();
            while (reader.Read())
            {
                int signal = reader.GetInt32(0);
                if (signal != current) (current, series) = (signal, result[names[signal]] = new ReadingSeries());
                long at = Instant.ToMilliseconds(reader.GetDateTime(1));
                double value = reader.IsDBNull(2) ? double.NaN : reader.GetDouble(2);
                series.Add(new Reading(at, value, (Quality)reader.GetInt16(3)));
            }
        }

        return result;
    }

    /// <summary>The last reading of each signal.</summary>
    public async Task<Dictionary<int, (DateTime At, double? Value, short Quality)>> LatestAsync(IEnumerable<SignalPlace> signals, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        var rows = new Dictionary<int, (DateTime, double?, short)>();
        foreach (IGrouping<int, SignalPlace> home in signals.GroupBy(signal => signal.HomeLineId))
        {
            IEnumerable<(int Id, DateTime At, double? Value, short Quality)> found = await connection.QueryAsync<(int, DateTime, double?, short)>(
                """
                SELECT s.id, r.at, r.value, r.quality FROM unnest(@ids) AS s(id)
                CROSS JOIN LATERAL (SELECT at, value, quality FROM reading WHERE line_id = @line AND signal_id = s.id ORDER BY at DESC LIMIT 1) r
                """,
                new { line = home.Key, ids = home.Select(signal => signal.SignalId).ToArray() });
            foreach ((int id, DateTime at, double? value, short quality) in found) rows[id] = (at, value, quality);
        }

        return rows;
    }

    private static async Task<bool> TryCopyAsync(NpgsqlConnection connection, NpgsqlTransaction transaction, IReadOnlyList<PlacedReading> batch, CancellationToken stop)
    {
        await transaction.SaveAsync("batch", stop);
        try
        {
            Copy(connection, "COPY reading (line_id, signal_id, at, value, quality) FROM STDIN (FORMAT BINARY)", batch);
            await transaction.ReleaseAsync("batch", stop);
            return true;
        }
        catch (PostgresException error) when (error.SqlState == PostgresErrorCodes.UniqueViolation)
        {
            await transaction.RollbackAsync("batch", stop);
            return false;
        }
    }

    private static void Copy(NpgsqlConnection connection, string statement, IReadOnlyList<PlacedReading> batch)
    {
        using NpgsqlBinaryImporter copy = connection.BeginBinaryImport(statement);
        foreach (PlacedReading placed in batch)
        {
            copy.StartRow();
            copy.Write(placed.Place.HomeLineId, NpgsqlDbType.Integer);
            copy.Write(placed.Place.SignalId, NpgsqlDbType.Integer);
            copy.Write(Instant.FromMilliseconds(placed.Reading.At), NpgsqlDbType.TimestampTz);
            if (double.IsNaN(placed.Reading.Value)) copy.WriteNull();
            else copy.Write(placed.Reading.Value, NpgsqlDbType.Double);
            copy.Write((short)placed.Reading.Quality, NpgsqlDbType.Smallint);
        }

        copy.Complete();
    }

    private static async Task<InsertCount> StageAsync(
        NpgsqlConnection connection, IReadOnlyList<PlacedReading> batch, bool replace, TimeSpan leadIn, CancellationToken stop)
    {
        await connection.ExecuteAsync(
            """
            CREATE TEMP TABLE IF NOT EXISTS staged (n integer GENERATED ALWAYS AS IDENTITY, line_id integer, signal_id integer, at timestamptz,
                value double precision, quality smallint) ON COMMIT DELETE ROWS;
            TRUNCATE staged
            """);
        Copy(connection, "COPY staged (line_id, signal_id, at, value, quality) FROM STDIN (FORMAT BINARY)", batch);
        // Within the batch too the first value of an instant wins, or the last when replacing.
        string first = $"SELECT DISTINCT ON (line_id, signal_id, at) * FROM staged ORDER BY line_id, signal_id, at, n {(replace ? "DESC" : "ASC")}";
        string onConflict = replace
            ? """
              DO UPDATE SET value = excluded.value, quality = excluded.quality
                WHERE (reading.value, reading.quality) IS DISTINCT FROM (excluded.value, excluded.quality)
              """
            : "DO NOTHING";
        // Those that differ are counted against what stands before the insert; repeats within the batch against its first.
        long differing = await connection.ExecuteScalarAsync<long>(
            $"""
             WITH first AS ({first})
             SELECT count(*) FROM staged s JOIN first f USING (line_id, signal_id, at) LEFT JOIN reading r USING (line_id, signal_id, at)
             WHERE (s.value, s.quality) IS DISTINCT FROM (CASE WHEN r.at IS NULL THEN f.value ELSE r.value END, CASE WHEN r.at IS NULL THEN f.quality ELSE r.quality END)
             """);
        var inserted = await connection.QueryAsync<(int Signal, DateTime Day, DateTime First, DateTime Last, long Count)>(
            $"""
             WITH first AS ({first}),
             put AS (INSERT INTO reading (line_id, signal_id, at, value, quality)
                     SELECT line_id, signal_id, at, value, quality FROM first ON CONFLICT (line_id, signal_id, at) {onConflict}
                     RETURNING signal_id, at)
             SELECT signal_id, date_trunc('day', at, 'UTC'), min(at), max(at), count(*) FROM put GROUP BY 1, 2
             """);
        Dictionary<int, SignalPlace> places = batch.Select(placed => placed.Place).DistinctBy(place => place.SignalId).ToDictionary(place => place.SignalId);
        var marks = new DayMarks(leadIn);
        long accepted = 0;
        foreach ((int signal, _, DateTime from, DateTime last, long count) in inserted)
        {
            accepted += count;
            marks.Add(places[signal], Instant.ToMilliseconds(from));
            marks.Add(places[signal], Instant.ToMilliseconds(last));
        }

        await marks.WriteAsync(connection, stop);
        if (replace) return new InsertCount(accepted, batch.Count - accepted, 0);
        return new InsertCount(accepted, batch.Count - accepted - differing, differing);
    }
}
