using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using Dapper;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>Reads stored results: those of the revision shown for a day, or of another that is asked for, where they still stand.</summary>
public sealed class TrendStore(NpgsqlDataSource database)
{
    /// <summary>The windows of an effect in [from, to), ascending, as evaluation left them.</summary>
    public IReadOnlyList<EffectWindow> Windows(int lineId, int effectId, DateTimeOffset from, DateTimeOffset to, int? revision = null)
    {
        using NpgsqlConnection connection = database.OpenConnection();
        using var command = new NpgsqlCommand(
            """
            SELECT w.at, w.state, heating_temperature_k, heating_temperature_u, boiling_temperature_k, boiling_temperature_u, elevation_k, elevation_u,
                driving_force_k, driving_force_u, duty_w, duty_u, coefficient_w_m2k, coefficient_systematic, coefficient_random, solids,
                heating_from, boiling_from, duty_from, extrapolated, reason, steady, head_corrected_driving_force_k, head_corrected_driving_force_u
            FROM effect_window w JOIN line_day d ON d.line_id = w.line_id AND d.day = (w.at AT TIME ZONE 'UTC')::date AND w.revision_id = coalesce($5, d.shown_revision)
            WHERE w.line_id = $1 AND w.effect_id = $2 AND w.at >= $3 AND w.at < $4 ORDER BY w.at
            """, connection);
        AddSpan(command, lineId, effectId, from, to, revision);
        using NpgsqlDataReader reader = command.ExecuteReader();
        var windows = new List<EffectWindow>();
        while (reader.Read()) windows.Add(WindowOf(reader));
        return windows;
    }

    /// <summary>Hours of one quantity of an effect in [from, to), ascending.</summary>
    public IReadOnlyList<EffectHour> Hours(int lineId, int effectId, HourQuantity quantity, DateTimeOffset from, DateTimeOffset to, int? revision = null)
    {
        using NpgsqlConnection connection = database.OpenConnection();
        using var command = new NpgsqlCommand(
            """
            SELECT h.hour, n, mean, lowest, highest, median, systematic, random
            FROM effect_hour h JOIN line_day d ON d.line_id = h.line_id AND d.day = (h.hour AT TIME ZONE 'UTC')::date AND h.revision_id = coalesce($5, d.shown_revision)
            WHERE h.line_id = $1 AND h.effect_id = $2 AND h.hour >= $3 AND h.hour < $4 AND h.quantity = $6 ORDER BY h.hour
            """, connection);
        AddSpan(command, lineId, effectId, from, to, revision);
        command.Parameters.Add(new() { Value = (short)quantity });
        using NpgsqlDataReader reader = command.ExecuteReader();
        var hours = new List<EffectHour>();
        while (reader.Read())
        {
            hours.Add(new EffectHour(
                Instant.ToMilliseconds(reader.GetDateTime(0)), quantity, reader.GetInt32(1),
                new Measured(reader.GetDouble(2), reader.GetDouble(6), reader.GetDouble(7)), reader.GetDouble(3), reader.GetDouble(4), reader.GetDouble(5)));
        }

        return hours;
    }

    /// <summary>What an effect did in [from, to), ascending.</summary>
    public IReadOnlyList<EffectStretch> Stretches(int lineId, int effectId, DateTimeOffset from, DateTimeOffset to)
    {
        using NpgsqlConnection connection = database.OpenConnection();
        return Stretches(connection, lineId, effectId, from, to);
    }

    internal static IReadOnlyList<EffectStretch> Stretches(NpgsqlConnection connection, int lineId, int effectId, DateTimeOffset from, DateTimeOffset to)
    {
        using var command = new NpgsqlCommand(
            """
            SELECT s.starts_at, s.ends_at, s.state, s.product, s.bodies
            FROM effect_stretch s JOIN line_day d ON d.line_id = s.line_id AND d.day = (s.starts_at AT TIME ZONE 'UTC')::date AND d.shown_revision = s.revision_id
            WHERE s.line_id = $1 AND s.effect_id = $2 AND s.starts_at >= $3 AND s.starts_at < $4 ORDER BY s.starts_at
            """, connection);
        // Stretches do not cross an hour.
        DateTimeOffset hour = from > DateTimeOffset.MinValue.AddHours(1) ? from.AddHours(-1) : from;
        foreach (object value in (object[])[lineId, effectId, hour.UtcDateTime, to.UtcDateTime]) command.Parameters.Add(new() { Value = value });
        using NpgsqlDataReader reader = command.ExecuteReader();
        var stretches = new List<EffectStretch>();
        while (reader.Read())
        {
            stretches.Add(new EffectStretch(
                Instant.ToMilliseconds(reader.GetDateTime(0)), Instant.ToMilliseconds(reader.GetDateTime(1)), (RunningState)reader.GetInt16(2),
                reader.IsDBNull(3) ? null : string.Intern(reader.GetString(3)), reader.IsDBNull(4) ? null : string.Intern(reader.GetString(4))));
        }

        return stretches;
    }

    /// <summary>Start of the last stored window of an effect; null without any.</summary>
    public async Task<DateTimeOffset?> LastWindowAsync(int lineId, int effectId, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        DateTime? last = await connection.ExecuteScalarAsync<DateTime?>(new CommandDefinition(
            """
            SELECT w.at FROM effect_window w
            JOIN line_day d ON d.line_id = w.line_id AND d.day = (w.at AT TIME ZONE 'UTC')::date AND d.shown_revision = w.revision_id
            WHERE w.line_id = @lineId AND w.effect_id = @effectId ORDER BY w.at DESC LIMIT 1
            """,
            new { lineId, effectId }, cancellationToken: stop));
        return last is { } at ? new DateTimeOffset(at, TimeSpan.Zero) : null;
    }

    /// <summary>State and evaporation of a line in its last stored hour: the last window's state, the mean of the evaporation.</summary>
    public async Task<(DateTimeOffset At, RunningState State, double? Evaporation)?> LineNowAsync(int lineId, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        var rows = (await connection.QueryAsync<(DateTime At, short State, double? Evaporation)>(new CommandDefinition(
            """
            SELECT w.at, w.state, w.evaporation_kg_s FROM line_window w
            JOIN line_day d ON d.line_id = w.line_id AND d.day = (w.at AT TIME ZONE 'UTC')::date AND d.shown_revision = w.revision_id
            WHERE w.line_id = @lineId ORDER BY w.at DESC LIMIT 12
            """,
            new { lineId }, cancellationToken: stop))).ToList();
        if (rows.Count == 0) return null;
        return (new DateTimeOffset(rows[0].At, TimeSpan.Zero), (RunningState)rows[0].State, rows.Where(row => row.At > rows[0].At.AddHours(-1)).Average(row => row.Evaporation));
    }

    /// <summary>Version of a line's results: grows when any day of it was computed or changed.</summary>
    public async Task<long> DataVersionAsync(int lineId, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.ExecuteScalarAsync<long>(new CommandDefinition(
            "SELECT coalesce(sum(data_version + result_version), 0)::bigint FROM line_day WHERE line_id = @lineId",
            new { lineId }, cancellationToken: stop));
    }

    private static void AddSpan(NpgsqlCommand command, int lineId, int effectId, DateTimeOffset from, DateTimeOffset to, int? revision)
    {
        command.Parameters.Add(new() { Value = lineId });
        command.Parameters.Add(new() { Value = effectId });
        command.Parameters.Add(new() { Value = from.UtcDateTime });
        command.Parameters.Add(new() { Value = to.UtcDateTime });
        command.Parameters.Add(new() { Value = (object?)revision ?? DBNull.Value, NpgsqlDbType = NpgsqlTypes.NpgsqlDbType.Integer });
    }

    private static EffectWindow WindowOf(NpgsqlDataReader reader)
    {
        double Number(int column) => reader.IsDBNull(column) ? double.NaN : reader.GetDouble(column);
        // Only the coefficient is stored in two parts; of the others the standard uncertainty stands as systematic.
        Measured Whole(int column) => new(Number(column), Number(column + 1), 0);
        return new EffectWindow
        {
            At = Instant.ToMilliseconds(reader.GetDateTime(0)),
            State = (RunningState)reader.GetInt16(1),
            HeatingTemperature = Whole(2),
            BoilingTemperature = Whole(4),
            Elevation = Whole(6),
            DrivingForce = Whole(8),
            Duty = Whole(10),
            Coefficient = new Measured(Number(12), Number(13), Number(14)),
            Solids = Number(15),
            HeatingFrom = (Core.Balances.HeatingTemperatureSource)reader.GetInt16(16),
            BoilingFrom = (Core.Balances.BoilingTemperatureSource)reader.GetInt16(17),
            DutyFrom = (Core.Balances.DutySource)reader.GetInt16(18),
            Extrapolated = reader.GetBoolean(19),
            Reason = reader.IsDBNull(20) ? null : reader.GetString(20),
            Steady = reader.IsDBNull(21) ? null : reader.GetBoolean(21),
            HeadCorrectedDrivingForce = Whole(22),
        };
    }
}
