using System.Text.Json;
using System.Text.Json.Serialization;
using Dapper;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Readings;
using Npgsql;
using NpgsqlTypes;

namespace EvapMonitor.Service.Store;

/// <summary>The surfaces of a line as stored; their hours stand apart.</summary>
/// <param name="Version">Grows when they change; 0 before they were first computed.</param>
/// <param name="Surfaces">The surfaces.</param>
public sealed record StoredSurfaces(long Version, IReadOnlyList<Surface> Surfaces);

/// <summary>An hour of an effect held against what it would be if clean.</summary>
/// <param name="Surface">The surface that served.</param>
/// <param name="Clean">How clean it was.</param>
public sealed record StoredCleanHour(string Surface, CleanHour Clean);

/// <summary>What the hours tell of the surfaces: written as a whole, hours only where a day has changed.</summary>
public sealed class SurfaceStore(NpgsqlDataSource database, TimeProvider clock)
{
    // Absent numbers are NaN, which JSON has no number for.
    private static readonly JsonSerializerOptions Json = new() { NumberHandling = JsonNumberHandling.AllowNamedFloatingPointLiterals };

    /// <summary>What the surfaces of a line were computed from; null before they first were.</summary>
    public async Task<string?> InputAsync(int lineId, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.ExecuteScalarAsync<string?>(new CommandDefinition("SELECT input FROM surface_state WHERE line_id = @lineId", new { lineId }, cancellationToken: stop));
    }

    /// <summary>Version of the surfaces of a line; 0 before they were first computed.</summary>
    public async Task<long> VersionAsync(int lineId, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.ExecuteScalarAsync<long?>(new CommandDefinition("SELECT version FROM surface_state WHERE line_id = @lineId", new { lineId }, cancellationToken: stop)) ?? 0;
    }

    /// <summary>The surfaces of a line.</summary>
    public async Task<StoredSurfaces> ReadAsync(int lineId, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction moment = await connection.BeginTransactionAsync(System.Data.IsolationLevel.RepeatableRead, stop);
        long version = await connection.ExecuteScalarAsync<long?>(new CommandDefinition("SELECT version FROM surface_state WHERE line_id = @lineId", new { lineId }, cancellationToken: stop)) ?? 0;
        var rows = await connection.QueryAsync<(string Surface, string Effect, DateTime Until, string Body)>(new CommandDefinition(
            "SELECT surface, effect, served_until, body FROM surface_history WHERE line_id = @lineId ORDER BY place", new { lineId }, cancellationToken: stop));
        return new StoredSurfaces(version, [.. rows.Select(row => new Surface(row.Surface, row.Effect, Instant.ToMilliseconds(row.Until), JsonSerializer.Deserialize<SurfaceHistory>(row.Body, Json)!))]);
    }

    /// <summary>The hours of an effect in [from, to), ascending.</summary>
    public IReadOnlyList<StoredCleanHour> Hours(int lineId, int effectId, DateTimeOffset from, DateTimeOffset to)
    {
        using NpgsqlConnection connection = database.OpenConnection();
        using var command = new NpgsqlCommand(
            """
            SELECT hour, surface, campaign, reference, clean, clean_u, cleanliness, cleanliness_u, resistance, resistance_u, at_reference, at_reference_u, clamped
            FROM clean_hour WHERE line_id = $1 AND effect_id = $2 AND hour >= $3 AND hour < $4 ORDER BY hour
            """, connection)
        {
            Parameters = { new() { Value = lineId }, new() { Value = effectId }, new() { Value = from.UtcDateTime }, new() { Value = to.UtcDateTime } },
        };
        using NpgsqlDataReader reader = command.ExecuteReader();
        var hours = new List<StoredCleanHour>();
        Measured Pair(int column) => reader.IsDBNull(column) ? Measured.Absent : new Measured(reader.GetDouble(column), 0, reader.GetDouble(column + 1));
        while (reader.Read())
        {
            hours.Add(new StoredCleanHour(reader.GetString(1), new CleanHour(
                Instant.ToMilliseconds(reader.GetDateTime(0)), reader.GetInt32(2), reader.GetInt32(3), Pair(4), Pair(6), Pair(8), Pair(10), reader.GetBoolean(12))));
        }

        return hours;
    }

    /// <summary>Replaces the surfaces of a line.</summary>
    /// <param name="line">The line.</param>
    /// <param name="input">What they were computed from.</param>
    /// <param name="surfaces">The surfaces.</param>
    /// <param name="days">By effect and day (ms) the hours that have changed since they were last written; all other days stay.</param>
    /// <param name="all">True: every stored hour is replaced.</param>
    /// <param name="stop">Cancels.</param>
    /// <returns>The new version.</returns>
    public async Task<long> WriteAsync(
        LinePlace line, string input, IReadOnlyList<Surface> surfaces, IReadOnlyDictionary<(int Effect, long Day), IReadOnlyList<StoredCleanHour>> days, bool all, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        // One writer at a time for a line.
        long version = await connection.ExecuteScalarAsync<long>(
            """
            INSERT INTO surface_state (line_id, input, computed_at, version) VALUES (@LineId, @input, @now, 1)
            ON CONFLICT (line_id) DO UPDATE SET input = @input, computed_at = @now, version = surface_state.version + 1 RETURNING version
            """,
            new { line.LineId, input, now = clock.GetUtcNow().UtcDateTime });
        await connection.ExecuteAsync("DELETE FROM surface_history WHERE line_id = @LineId", new { line.LineId });
        for (int place = 0; place < surfaces.Count; place++)
        {
            Surface surface = surfaces[place];
            await connection.ExecuteAsync(
                "INSERT INTO surface_history (line_id, surface, place, effect, served_until, body) VALUES (@LineId, @Name, @place, @Effect, @until, @body)",
                new { line.LineId, surface.Name, place, surface.Effect, until = Instant.FromMilliseconds(surface.ServedUntil), body = JsonSerializer.Serialize(surface.History with { Hours = [] }, Json) });
        }

        if (all) await connection.ExecuteAsync("DELETE FROM clean_hour WHERE line_id = @LineId", new { line.LineId });
        else
        {
            await connection.ExecuteAsync(
                """
                DELETE FROM clean_hour h USING unnest(@effects, @starts) AS gone(effect_id, start)
                WHERE h.line_id = @LineId AND h.effect_id = gone.effect_id AND h.hour >= gone.start AND h.hour < gone.start + interval '1 day'
                """,
                new { line.LineId, effects = days.Keys.Select(day => day.Effect).ToArray(), starts = days.Keys.Select(day => Instant.FromMilliseconds(day.Day)).ToArray() });
        }

        WriteHours(connection, line.LineId, days);
        await transaction.CommitAsync(stop);
        return version;
    }

    private static void WriteHours(NpgsqlConnection connection, int lineId, IReadOnlyDictionary<(int Effect, long Day), IReadOnlyList<StoredCleanHour>> days)
    {
        using NpgsqlBinaryImporter copy = connection.BeginBinaryImport(
            """
            COPY clean_hour (line_id, effect_id, hour, surface, campaign, reference, clean, clean_u, cleanliness, cleanliness_u, resistance, resistance_u,
                at_reference, at_reference_u, clamped) FROM STDIN (FORMAT BINARY)
            """);
        foreach (((int effect, _), IReadOnlyList<StoredCleanHour> hours) in days)
        {
            foreach ((string surface, CleanHour hour) in hours)
            {
                copy.StartRow();
                copy.Write(lineId, NpgsqlDbType.Integer);
                copy.Write(effect, NpgsqlDbType.Integer);
                copy.Write(Instant.FromMilliseconds(hour.Hour), NpgsqlDbType.TimestampTz);
                copy.Write(surface, NpgsqlDbType.Text);
                copy.Write(hour.Campaign, NpgsqlDbType.Integer);
                copy.Write(hour.Reference, NpgsqlDbType.Integer);
                foreach (Measured value in (ReadOnlySpan<Measured>)[hour.CleanCoefficient, hour.Cleanliness, hour.Resistance, hour.AtReference])
                {
                    foreach (double number in (ReadOnlySpan<double>)[value.Value, value.Random])
                    {
                        if (double.IsFinite(value.Value) && double.IsFinite(number)) copy.Write(number, NpgsqlDbType.Double);
                        else copy.WriteNull();
                    }
                }

                copy.Write(hour.Clamped, NpgsqlDbType.Boolean);
            }
        }

        copy.Complete();
    }
}
