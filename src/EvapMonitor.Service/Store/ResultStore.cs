using Dapper;
using EvapMonitor.Core;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using Npgsql;
using NpgsqlTypes;

namespace EvapMonitor.Service.Store;

/// <summary>Results of a part of a day, ready to be written.</summary>
/// <param name="Line">The line.</param>
/// <param name="Day">The UTC day.</param>
/// <param name="From">Start of the first hour that is replaced; everything of the day from here on is.</param>
/// <param name="Windows">The windows, whole hours but for the last.</param>
/// <param name="Again">From when the day must be evaluated once more though nothing new comes: values still held at the end of the last window; null when done.</param>
/// <param name="Step">Length of a window.</param>
public sealed record DayResult(LinePlace Line, DateOnly Day, DateTimeOffset From, IReadOnlyList<LineWindow> Windows, DateTimeOffset? Again, TimeSpan Step);

/// <summary>Writes the results of a day: windows, balances, hours and the day's mark in one transaction, so that a killed run never shows half of them.</summary>
public sealed class ResultStore(NpgsqlDataSource database, LeaseStore leases, TimeProvider clock)
{
    /// <summary>Replaces the results of a day from an hour on and gives back the mark that was taken.</summary>
    /// <exception cref="LeaseLostException">Another process evaluates the line now; nothing was written.</exception>
    public async Task WriteAsync(DayResult result, int revisionId, long fence, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        int line = result.Line.LineId;
        await leases.CheckAsync(connection, line, fence);
        DateTime from = result.From.UtcDateTime, to = result.Day.ToDateTime(TimeOnly.MinValue, DateTimeKind.Utc).AddDays(1);
        await connection.ExecuteAsync(
            """
            SELECT ensure_month('effect_window', @from), ensure_month('line_window', @from), ensure_month('balance_window', @from);
            DELETE FROM effect_window WHERE line_id = @line AND at >= @from AND at < @to AND revision_id = @revision;
            DELETE FROM line_window WHERE line_id = @line AND at >= @from AND at < @to AND revision_id = @revision;
            DELETE FROM balance_window WHERE line_id = @line AND at >= @from AND at < @to AND revision_id = @revision;
            DELETE FROM effect_hour WHERE line_id = @line AND hour >= @from AND hour < @to AND revision_id = @revision;
            DELETE FROM balance_hour WHERE line_id = @line AND hour >= @from AND hour < @to AND revision_id = @revision
            """,
            new { line, from, to, revision = revisionId });
        WriteLine(connection, line, revisionId, result.Windows);
        WriteWindows(connection, result.Line, revisionId, result.Windows);
        WriteHours(connection, result.Line, revisionId, result.Windows);
        StretchWriter.Write(connection, result, revisionId);
        await BalanceWriter.WriteAsync(connection, line, revisionId, result.Windows);
        await connection.ExecuteAsync(
            """
            UPDATE line_day SET superseded_at = CASE WHEN shown_revision <> @revision THEN @now ELSE superseded_at END, shown_revision = @revision, taken_from = NULL, result_version = result_version + 1, changed_from = least(changed_from, @again),
                evaluated_through = @through, model = @model
            WHERE line_id = @line AND day = @day
            """,
            new
            {
                line, day = result.Day, revision = revisionId, again = result.Again?.UtcDateTime, model = (short)LineEvaluation.ModelNumber,
                through = result.Windows.Count == 0 ? from : Instant.FromMilliseconds(result.Windows[^1].At), now = clock.GetUtcNow().UtcDateTime,
            });
        if (from == to.AddDays(-1)) await RecomputationStore.DayDoneAsync(connection, line, result.Day);
        KillPoint.Pass("evaluation-before-commit");
        await transaction.CommitAsync(stop);
    }

    /// <summary>Shows no results of a day any more: the plant in force then does not have the line.</summary>
    /// <exception cref="LeaseLostException">Another process evaluates the line now; nothing was written.</exception>
    public async Task HideAsync(int lineId, DateOnly day, long fence, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        await leases.CheckAsync(connection, lineId, fence);
        await connection.ExecuteAsync(
            """
            UPDATE line_day SET superseded_at = CASE WHEN shown_revision IS NOT NULL THEN @now ELSE superseded_at END, shown_revision = NULL, taken_from = NULL,
                result_version = result_version + 1
            WHERE line_id = @lineId AND day = @day
            """,
            new { lineId, day, now = clock.GetUtcNow().UtcDateTime });
        await RecomputationStore.DayDoneAsync(connection, lineId, day);
        await transaction.CommitAsync(stop);
    }

    private static void WriteLine(NpgsqlConnection connection, int lineId, int revisionId, IReadOnlyList<LineWindow> windows)
    {
        using NpgsqlBinaryImporter copy = connection.BeginBinaryImport("COPY line_window (line_id, at, revision_id, state, evaporation_kg_s) FROM STDIN (FORMAT BINARY)");
        foreach (LineWindow window in windows)
        {
            copy.StartRow();
            copy.Write(lineId, NpgsqlDbType.Integer);
            copy.Write(Instant.FromMilliseconds(window.At), NpgsqlDbType.TimestampTz);
            copy.Write(revisionId, NpgsqlDbType.Integer);
            copy.Write((short)window.State, NpgsqlDbType.Smallint);
            WriteNumber(copy, window.Evaporation);
        }

        copy.Complete();
    }

    private static void WriteWindows(NpgsqlConnection connection, LinePlace line, int revisionId, IReadOnlyList<LineWindow> windows)
    {
        using NpgsqlBinaryImporter copy = connection.BeginBinaryImport(
            """
            COPY effect_window (line_id, effect_id, at, revision_id, model, state, heating_temperature_k, heating_temperature_u, boiling_temperature_k,
                boiling_temperature_u, elevation_k, elevation_u, driving_force_k, driving_force_u, duty_w, duty_u, coefficient_w_m2k, coefficient_systematic,
                coefficient_random, solids, heating_from, boiling_from, duty_from, extrapolated, reason, steady,
                head_corrected_driving_force_k, head_corrected_driving_force_u) FROM STDIN (FORMAT BINARY)
            """);
        foreach (LineWindow window in windows)
        {
            for (int i = 0; i < window.Effects.Count; i++) WriteWindow(copy, line, i, revisionId, window.Effects[i]);
        }

        copy.Complete();
    }

    private static void WriteWindow(NpgsqlBinaryImporter copy, LinePlace line, int effect, int revisionId, EffectWindow window)
    {
        copy.StartRow();
        copy.Write(line.LineId, NpgsqlDbType.Integer);
        copy.Write(line.EffectIds[effect], NpgsqlDbType.Integer);
        copy.Write(Instant.FromMilliseconds(window.At), NpgsqlDbType.TimestampTz);
        copy.Write(revisionId, NpgsqlDbType.Integer);
        copy.Write((short)LineEvaluation.ModelNumber, NpgsqlDbType.Smallint);
        copy.Write((short)window.State, NpgsqlDbType.Smallint);
        foreach (Measured quantity in (ReadOnlySpan<Measured>)[window.HeatingTemperature, window.BoilingTemperature, window.Elevation, window.DrivingForce, window.Duty])
        {
            WriteNumber(copy, quantity.Value);
            WriteNumber(copy, quantity.Standard);
        }

        WriteNumber(copy, window.Coefficient.Value);
        WriteNumber(copy, window.Coefficient.Systematic);
        WriteNumber(copy, window.Coefficient.Random);
        WriteNumber(copy, window.Solids);
        copy.Write((short)window.HeatingFrom, NpgsqlDbType.Smallint);
        copy.Write((short)window.BoilingFrom, NpgsqlDbType.Smallint);
        copy.Write((short)window.DutyFrom, NpgsqlDbType.Smallint);
        copy.Write(window.Extrapolated, NpgsqlDbType.Boolean);
        if (window.Reason is null) copy.WriteNull();
        else copy.Write(window.Reason, NpgsqlDbType.Text);
        if (window.Steady is { } steady) copy.Write(steady, NpgsqlDbType.Boolean);
        else copy.WriteNull();
        WriteNumber(copy, window.HeadCorrectedDrivingForce.Value);
        WriteNumber(copy, window.HeadCorrectedDrivingForce.Standard);
    }

    private static void WriteHours(NpgsqlConnection connection, LinePlace line, int revisionId, IReadOnlyList<LineWindow> windows)
    {
        using NpgsqlBinaryImporter copy = connection.BeginBinaryImport(
            """
            COPY effect_hour (line_id, effect_id, quantity, hour, revision_id, n, mean, lowest, highest, median, systematic, random)
            FROM STDIN (FORMAT BINARY)
            """);
        for (int i = 0; i < line.EffectIds.Count; i++)
        {
            int effect = i;
            foreach (EffectHour hour in EffectHour.Summarise(windows.Select(window => window.Effects[effect])))
            {
                copy.StartRow();
                copy.Write(line.LineId, NpgsqlDbType.Integer);
                copy.Write(line.EffectIds[effect], NpgsqlDbType.Integer);
                copy.Write((short)hour.Quantity, NpgsqlDbType.Smallint);
                copy.Write(Instant.FromMilliseconds(hour.Hour), NpgsqlDbType.TimestampTz);
                copy.Write(revisionId, NpgsqlDbType.Integer);
                copy.Write(hour.Count, NpgsqlDbType.Integer);
                foreach (double value in (ReadOnlySpan<double>)[hour.Mean.Value, hour.Lowest, hour.Highest, hour.Median, hour.Mean.Systematic, hour.Mean.Random])
                    copy.Write(value, NpgsqlDbType.Double);
            }
        }

        copy.Complete();
    }

    private static void WriteNumber(NpgsqlBinaryImporter copy, double value)
    {
        if (double.IsFinite(value)) copy.Write(value, NpgsqlDbType.Double);
        else copy.WriteNull();
    }
}
