using System.Collections.Concurrent;
using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Coefficients;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>A stored balance.</summary>
/// <param name="At">Start of the window, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="Balance">The balance.</param>
public sealed record StoredBalance(long At, BalanceWindow Balance);

/// <summary>What was said of the instruments in a window.</summary>
/// <param name="At">Start of the window, ms.</param>
/// <param name="Suspects">Sets of signals of which one is wrong.</param>
/// <param name="LeftOut">Signals that did not count.</param>
public sealed record WindowVerdicts(long At, IReadOnlyList<IReadOnlyList<string>> Suspects, IReadOnlyList<string> LeftOut);

/// <summary>What the balance wanted to add to a reading in a window.</summary>
/// <param name="At">Start of the window, ms.</param>
/// <param name="InStandards">In standard uncertainties of the reading; NaN when there was none.</param>
/// <param name="Wanted">In its SI unit.</param>
/// <param name="Checked">True when something checked the reading.</param>
/// <param name="LeftOut">True when the reading did not count.</param>
public readonly record struct WantedCorrection(long At, double InStandards, double Wanted, bool Checked, bool LeftOut);

/// <summary>Reads stored balances: those of the revision shown for a day, or of another that is asked for, where they still stand.</summary>
public sealed class BalanceStore(NpgsqlDataSource database)
{
    private const string From = """
        FROM balance_window w JOIN line_day d ON d.line_id = w.line_id AND d.day = (w.at AT TIME ZONE 'UTC')::date AND w.revision_id = coalesce($4, d.shown_revision)
        WHERE w.line_id = $1
        """;

    private readonly ConcurrentDictionary<(int Line, int Revision, long Layout), BalanceLayout> _layouts = new();

    /// <summary>The last balance of a line up to an instant; null when there is none in the day before it.</summary>
    /// <param name="lineId">The line.</param>
    /// <param name="upTo">The window starts at or before this.</param>
    /// <param name="after">And after this.</param>
    /// <param name="stop">Cancels.</param>
    /// <param name="revision">Of this plant revision, where it still stands; null: of that shown for its day.</param>
    public async Task<StoredBalance?> LastAsync(int lineId, DateTimeOffset upTo, DateTimeOffset after, CancellationToken stop, int? revision = null)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using var command = new NpgsqlCommand(
            $"""
            SELECT w.at, w.revision_id, layout, measured, reconciled, standard, class, correction, wanted, test, chi2, degrees, suspect, left_out
            {From} AND w.at <= $2 AND w.at > $3 ORDER BY w.at DESC LIMIT 1
            """, connection) { Parameters = { new() { Value = lineId }, new() { Value = upTo.UtcDateTime }, new() { Value = after.UtcDateTime }, Revision(revision) } };
        var found = (await ReadAsync(command, stop)).FirstOrDefault();
        return found is null ? null : await WithLayoutAsync(connection, lineId, found, stop);
    }

    /// <summary>The balances of a line in [from, to), ascending.</summary>
    public async Task<IReadOnlyList<StoredBalance>> WindowsAsync(int lineId, DateTimeOffset from, DateTimeOffset to, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using var command = new NpgsqlCommand(
            $"""
            SELECT w.at, w.revision_id, layout, measured, reconciled, standard, class, correction, wanted, test, chi2, degrees, suspect, left_out
            {From} AND w.at >= $2 AND w.at < $3 ORDER BY w.at
            """, connection) { Parameters = { new() { Value = lineId }, new() { Value = from.UtcDateTime }, new() { Value = to.UtcDateTime }, Revision(null) } };
        var all = new List<StoredBalance>();
        foreach (Row row in await ReadAsync(command, stop)) all.Add(await WithLayoutAsync(connection, lineId, row, stop));
        return all;
    }

    /// <summary>What was said of the instruments of a line up to a window, newest first, back to an instant; ends when the caller has heard enough.</summary>
    public async IAsyncEnumerable<WindowVerdicts> VerdictsAsync(int lineId, DateTimeOffset upTo, DateTimeOffset after, [System.Runtime.CompilerServices.EnumeratorCancellation] CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop), other = await database.OpenConnectionAsync(stop);
        await using var command = new NpgsqlCommand($"SELECT w.at, w.revision_id, layout, suspect, left_out {From} AND w.at <= $2 AND w.at > $3 ORDER BY w.at DESC", connection)
        {
            Parameters = { new() { Value = lineId }, new() { Value = upTo.UtcDateTime }, new() { Value = after.UtcDateTime }, Revision(null) },
        };
        await using NpgsqlDataReader reader = await command.ExecuteReaderAsync(stop);
        while (await reader.ReadAsync(stop))
        {
            BalanceLayout layout = await LayoutAsync(other, lineId, reader.GetInt32(1), reader.GetInt64(2), stop);
            yield return new WindowVerdicts(
                Instant.ToMilliseconds(reader.GetDateTime(0)),
                [.. BalanceRow.Lists(reader.GetFieldValue<short[]>(3)).Select(set => (IReadOnlyList<string>)[.. set.Select(one => layout.Signals[one])])],
                [.. reader.GetFieldValue<short[]>(4).Select(one => layout.Signals[one])]);
        }
    }

    /// <summary>What the balance wanted to add to the readings of one signal in [from, to), ascending.</summary>
    public async Task<IReadOnlyList<WantedCorrection>> CorrectionsAsync(int lineId, string signal, DateTimeOffset from, DateTimeOffset to, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using var command = new NpgsqlCommand(
            $"""
            SELECT w.at, w.correction[l.place], w.wanted[l.place], w.test[l.place], (l.place - 1)::smallint = ANY(w.left_out)
            FROM balance_window w JOIN line_day d ON d.line_id = w.line_id AND d.day = (w.at AT TIME ZONE 'UTC')::date AND d.shown_revision = w.revision_id
            JOIN (SELECT revision_id, layout, array_position(signal, $4) place FROM balance_layout WHERE line_id = $1) l ON l.revision_id = w.revision_id AND l.layout = w.layout
            WHERE w.line_id = $1 AND w.at >= $2 AND w.at < $3 AND l.place IS NOT NULL ORDER BY w.at
            """, connection)
        {
            Parameters = { new() { Value = lineId }, new() { Value = from.UtcDateTime }, new() { Value = to.UtcDateTime }, new() { Value = signal } },
        };
        await using NpgsqlDataReader reader = await command.ExecuteReaderAsync(stop);
        var all = new List<WantedCorrection>();
        while (await reader.ReadAsync(stop))
            all.Add(new WantedCorrection(Instant.ToMilliseconds(reader.GetDateTime(0)), reader.GetFloat(1), reader.GetFloat(2), !float.IsNaN(reader.GetFloat(3)), reader.GetBoolean(4)));
        return all;
    }

    /// <summary>What the others wanted to add to the readings of each signal of a line, by the hour, in [from, to), ascending.</summary>
    public async Task<IReadOnlyList<CorrectionHour>> HoursAsync(int lineId, DateTimeOffset from, DateTimeOffset to, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using var command = new NpgsqlCommand(
            """
            SELECT h.hour, signal, n, difference FROM balance_hour h
            JOIN line_day d ON d.line_id = h.line_id AND d.day = (h.hour AT TIME ZONE 'UTC')::date AND d.shown_revision = h.revision_id
            WHERE h.line_id = $1 AND h.hour >= $2 AND h.hour < $3 ORDER BY h.hour
            """, connection) { Parameters = { new() { Value = lineId }, new() { Value = from.UtcDateTime }, new() { Value = to.UtcDateTime } } };
        await using NpgsqlDataReader reader = await command.ExecuteReaderAsync(stop);
        var hours = new List<CorrectionHour>();
        while (await reader.ReadAsync(stop))
        {
            hours.Add(new CorrectionHour(
                Instant.ToMilliseconds(reader.GetDateTime(0)), reader.GetFieldValue<string[]>(1), [.. reader.GetFieldValue<short[]>(2).Select(count => (int)count)],
                BalanceRow.Long(reader.GetFieldValue<float[]>(3))));
        }

        return hours;
    }

    private static NpgsqlParameter Revision(int? revision) => new() { Value = (object?)revision ?? DBNull.Value, NpgsqlDbType = NpgsqlTypes.NpgsqlDbType.Integer };

    private static async Task<List<Row>> ReadAsync(NpgsqlCommand command, CancellationToken stop)
    {
        await using NpgsqlDataReader reader = await command.ExecuteReaderAsync(stop);
        var rows = new List<Row>();
        while (await reader.ReadAsync(stop))
        {
            rows.Add(new Row(
                Instant.ToMilliseconds(reader.GetDateTime(0)), reader.GetInt32(1), reader.GetInt64(2), reader.GetFieldValue<float[]>(3), reader.GetFieldValue<float[]>(4),
                reader.GetFieldValue<float[]>(5), reader.GetFieldValue<byte[]>(6), reader.GetFieldValue<float[]>(7), reader.GetFieldValue<float[]>(8),
                reader.GetFieldValue<float[]>(9), reader.GetDouble(10), reader.GetInt16(11), reader.GetFieldValue<short[]>(12), reader.GetFieldValue<short[]>(13)));
        }

        return rows;
    }

    private async Task<StoredBalance> WithLayoutAsync(NpgsqlConnection connection, int lineId, Row row, CancellationToken stop) => new(row.At, new BalanceWindow
    {
        Layout = await LayoutAsync(connection, lineId, row.Revision, row.Layout, stop),
        Measured = BalanceRow.Long(row.Measured), Reconciled = BalanceRow.Long(row.Reconciled), Standard = BalanceRow.Long(row.Standard), Class = Array.ConvertAll(row.Class, one => (VariableClass)one),
        Correction = BalanceRow.Long(row.Correction), Wanted = BalanceRow.Long(row.Wanted), Test = BalanceRow.Long(row.Test), ChiSquare = row.ChiSquare, Degrees = row.Degrees,
        Suspects = BalanceRow.Lists(row.Suspect), LeftOut = [.. row.LeftOut.Select(one => (int)one)],
    });

    /// <summary>Layouts never change, so each is read once.</summary>
    private async Task<BalanceLayout> LayoutAsync(NpgsqlConnection connection, int lineId, int revision, long layout, CancellationToken stop)
    {
        if (_layouts.TryGetValue((lineId, revision, layout), out BalanceLayout? known)) return known;
        await using var command = new NpgsqlCommand("SELECT variable, instruments, signal FROM balance_layout WHERE line_id = $1 AND revision_id = $2 AND layout = $3", connection)
        {
            Parameters = { new() { Value = lineId }, new() { Value = revision }, new() { Value = layout } },
        };
        await using NpgsqlDataReader reader = await command.ExecuteReaderAsync(stop);
        if (!await reader.ReadAsync(stop)) throw new InvalidOperationException($"The layout {layout} of line {lineId}, revision {revision}, is missing: a balance refers to it.");
        VariableKey[] variables = [.. reader.GetFieldValue<string[]>(0).Select(name => BalanceRow.KeyOf(name)
            ?? throw new InvalidOperationException($"'{name}' is no variable of this program: the results are of a later one."))];
        return _layouts[(lineId, revision, layout)] = new BalanceLayout(variables, BalanceRow.Lists(reader.GetFieldValue<short[]>(1)), reader.GetFieldValue<string[]>(2));
    }

    private sealed record Row(
        long At, int Revision, long Layout, float[] Measured, float[] Reconciled, float[] Standard, byte[] Class, float[] Correction, float[] Wanted, float[] Test,
        double ChiSquare, short Degrees, short[] Suspect, short[] LeftOut);
}
