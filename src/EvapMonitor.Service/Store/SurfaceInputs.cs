using Dapper;
using EvapMonitor.Core;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Plant;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>Reads what the surfaces of a line are computed from, all of one moment.</summary>
public sealed class SurfaceInputs(NpgsqlDataSource database)
{
    private static readonly HourQuantity[] Needed =
    [
        HourQuantity.Coefficient, HourQuantity.DrivingForce, HourQuantity.BoilingTemperature, HourQuantity.HeatFlux, HourQuantity.Solids, HourQuantity.FeedFlow, HourQuantity.WaterRunCoefficient,
    ];

    /// <summary>Versions of all that enters, as one text.</summary>
    public async Task<string> VersionAsync(int lineId, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await VersionAsync(connection, lineId, stop);
    }

    /// <summary>True while past days of a line wait for evaluation: what was logged may not have reached them yet.</summary>
    public async Task<bool> IsBehindAsync(int lineId, DateOnly today, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.ExecuteScalarAsync<bool>(new CommandDefinition(
            "SELECT EXISTS (SELECT 1 FROM line_day WHERE line_id = @lineId AND day < @today AND (changed_from IS NOT NULL OR taken_from IS NOT NULL OR anew))",
            new { lineId, today }, cancellationToken: stop));
    }

    /// <summary>The records of a line's effects, in plant-file order, and their version.</summary>
    public async Task<(string Version, IReadOnlyList<EffectRecord> Effects)> ReadAsync(PlantTimeline plants, PlantInForce plant, LinePlace line, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction moment = await connection.BeginTransactionAsync(System.Data.IsolationLevel.RepeatableRead, stop);
        string version = await VersionAsync(connection, line.LineId, stop);
        ILookup<int, EffectCleaning> cleanings = await CleaningsAsync(connection, line.LineId, stop);
        ILookup<string, long> recalibrations = await RecalibrationsAsync(connection, plant, line, stop);
        var records = new List<EffectRecord>();
        for (int i = 0; i < line.EffectIds.Count; i++)
        {
            Effect effect = line.Line.Effects[i];
            records.Add(new EffectRecord(
                effect, await HoursAsync(connection, line.LineId, line.EffectIds[i], stop), TrendStore.Stretches(connection, line.LineId, line.EffectIds[i], DateTimeOffset.MinValue, DateTimeOffset.MaxValue),
                [.. cleanings[line.EffectIds[i]]],
                [.. Behind(line.Line, effect).SelectMany(signal => recalibrations[signal]).Concat(Rebuilt(plants, line.LineId, line.EffectIds[i])).Distinct().Order()]));
        }

        return (version, records);
    }

    /// <summary>
    /// Signals of the instruments behind an effect's coefficient, for which a recalibration counts: its own, those of the effects that heat it or that it heats, and
    /// those of the line as a whole.
    /// </summary>
    internal static IEnumerable<string> Behind(Line line, Effect effect)
    {
        IEnumerable<Effect> near = line.Effects.Where(other => other == effect || effect.Heating.Any(way => way.VapourOf == other.Name) || other.Heating.Any(way => way.VapourOf == effect.Name));
        IEnumerable<Instrument?> whole =
            [line.Feed.Flow, line.Feed.Solids, line.Feed.Temperature, line.Product.Flow, line.Product.Solids, line.Steam.Flow, line.Steam.Pressure, line.Steam.Temperature];
        return near.SelectMany(one => new[]
        {
            one.Chest.Pressure, one.Chest.Temperature, one.Chest.CondensateFlow, one.Chest.CondensateTemperature, one.Vapour.Pressure, one.Vapour.Temperature,
            one.Leaving.Flow, one.Leaving.Solids, one.Leaving.Temperature, one.PressureDifference,
        }).Concat(whole).OfType<Instrument>().Select(instrument => instrument.Signal).Distinct();
    }

    /// <summary>When a plant revision gave an effect, or a body of its line, another surface: what was before is no measure for it.</summary>
    private static IEnumerable<long> Rebuilt(PlantTimeline plants, int lineId, int effectId)
    {
        (double Area, IEnumerable<Body> Bodies)? SurfaceUnder(PlantInForce era)
        {
            LinePlace? place = era.Lines.FirstOrDefault(place => place.LineId == lineId);
            return place?.Find(effectId) is { } effect ? (effect.Area, place.Line.Bodies) : null;
        }

        for (int k = 1; k < plants.Eras.Count; k++)
        {
            if (SurfaceUnder(plants.Eras[k - 1]) is not var (area, bodies) || SurfaceUnder(plants.Eras[k]) is not var (later, others)) continue;
            bool same = area == later && bodies.All(body => others.All(other => other.Name != body.Name || other.Area == body.Area));
            if (!same) yield return PlantTimeline.Midnight(PlantTimeline.FirstDay(plants.Eras[k].InForceFrom)).ToUnixTimeMilliseconds();
        }
    }

    private static Task<string> VersionAsync(NpgsqlConnection connection, int lineId, CancellationToken stop) => connection.ExecuteScalarAsync<string>(new CommandDefinition(
        """
        SELECT concat_ws(' ', @model,
            (SELECT coalesce(sum(result_version), 0) || '/' || coalesce(sum(shown_revision), 0) FROM line_day WHERE line_id = @lineId),
            (SELECT count(*) || '-' || count(withdrawn_at) FROM cleaning WHERE line_id = @lineId),
            (SELECT count(*) || '-' || count(withdrawn_at) FROM instrument_event WHERE kind = @recalibrated))
        """,
        new { lineId, model = LineEvaluation.ModelNumber, recalibrated = InstrumentLogStore.Recalibrated }, cancellationToken: stop))!;

    private static async Task<ILookup<int, EffectCleaning>> CleaningsAsync(NpgsqlConnection connection, int lineId, CancellationToken stop)
    {
        var rows = await connection.QueryAsync<(int Effect, DateTime Start, DateTime? End, string Kind, string? Body, bool Rejected, Guid Id)>(new CommandDefinition(
            "SELECT effect_id, starts_at, ends_at, kind, body, rejected, cleaning_id FROM cleaning WHERE line_id = @lineId AND withdrawn_at IS NULL ORDER BY starts_at, cleaning_id",
            new { lineId }, cancellationToken: stop));
        return rows.ToLookup(row => row.Effect, row => new EffectCleaning(
            Instant.ToMilliseconds(row.Start), row.End is { } end ? Instant.ToMilliseconds(end) : long.MaxValue, row.Kind, row.Body, row.Rejected, row.Id));
    }

    private static async Task<ILookup<string, long>> RecalibrationsAsync(NpgsqlConnection connection, PlantInForce plant, LinePlace line, CancellationToken stop)
    {
        var names = plant.Signals.Where(signal => signal.Value.Users.Contains(line.LineId)).ToDictionary(signal => signal.Value.SignalId, signal => signal.Key);
        var rows = await connection.QueryAsync<(int Signal, DateTime At)>(new CommandDefinition(
            "SELECT signal_id, starts_at FROM instrument_event WHERE signal_id = ANY(@signals) AND kind = @kind AND withdrawn_at IS NULL",
            new { signals = names.Keys.ToArray(), kind = InstrumentLogStore.Recalibrated }, cancellationToken: stop));
        return rows.ToLookup(row => names[row.Signal], row => Instant.ToMilliseconds(row.At));
    }

    private static async Task<IReadOnlyList<EffectHour>> HoursAsync(NpgsqlConnection connection, int lineId, int effectId, CancellationToken stop)
    {
        await using var command = new NpgsqlCommand(
            """
            SELECT h.hour, h.quantity, n, mean, systematic, random
            FROM effect_hour h JOIN line_day d ON d.line_id = h.line_id AND d.day = (h.hour AT TIME ZONE 'UTC')::date AND d.shown_revision = h.revision_id
            WHERE h.line_id = $1 AND h.effect_id = $2 AND h.quantity = ANY($3)
            """, connection)
        {
            Parameters = { new() { Value = lineId }, new() { Value = effectId }, new() { Value = Needed.Select(quantity => (short)quantity).ToArray() } },
        };
        await using NpgsqlDataReader reader = await command.ExecuteReaderAsync(stop);
        var hours = new List<EffectHour>();
        while (await reader.ReadAsync(stop))
        {
            var mean = new Measured(reader.GetDouble(3), reader.GetDouble(4), reader.GetDouble(5));
            hours.Add(new EffectHour(Instant.ToMilliseconds(reader.GetDateTime(0)), (HourQuantity)reader.GetInt16(1), reader.GetInt32(2), mean, mean.Value, mean.Value, mean.Value));
        }

        return hours;
    }
}
