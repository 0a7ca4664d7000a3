using Dapper;
using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Coefficients;
using Npgsql;
using NpgsqlTypes;

namespace EvapMonitor.Service.Store;

/// <summary>Writes the balances of a day within the transaction of its results.</summary>
internal static class BalanceWriter
{
    public static async Task WriteAsync(NpgsqlConnection connection, int lineId, int revisionId, IReadOnlyList<LineWindow> windows)
    {
        Dictionary<BalanceLayout, long> layouts = windows.Select(window => window.Balance?.Layout).OfType<BalanceLayout>().Distinct().ToDictionary(layout => layout, BalanceRow.KeyOf);
        // Always in the same order, so that two days written beside each other never wait for each other in a circle.
        foreach ((BalanceLayout layout, long key) in layouts.OrderBy(pair => pair.Value)) await WriteLayoutAsync(connection, lineId, revisionId, layout, key);
        if (layouts.Count > 0) WriteWindows(connection, lineId, revisionId, windows, layouts);
        WriteHours(connection, lineId, revisionId, windows);
    }

    private static void WriteHours(NpgsqlConnection connection, int lineId, int revisionId, IReadOnlyList<LineWindow> windows)
    {
        using NpgsqlBinaryImporter copy = connection.BeginBinaryImport("COPY balance_hour (line_id, hour, revision_id, signal, n, difference) FROM STDIN (FORMAT BINARY)");
        foreach (CorrectionHour hour in CorrectionHour.Summarise(windows))
        {
            copy.StartRow();
            copy.Write(lineId, NpgsqlDbType.Integer);
            copy.Write(Instant.FromMilliseconds(hour.Hour), NpgsqlDbType.TimestampTz);
            copy.Write(revisionId, NpgsqlDbType.Integer);
            copy.Write(hour.Signals.ToArray(), NpgsqlDbType.Array | NpgsqlDbType.Text);
            copy.Write(hour.Count.Select(count => (short)count).ToArray(), NpgsqlDbType.Array | NpgsqlDbType.Smallint);
            copy.Write(BalanceRow.Short([.. hour.Difference]), NpgsqlDbType.Array | NpgsqlDbType.Real);
        }

        copy.Complete();
    }

    private static Task<int> WriteLayoutAsync(NpgsqlConnection connection, int lineId, int revisionId, BalanceLayout layout, long key) => connection.ExecuteAsync(
        """
        INSERT INTO balance_layout (line_id, revision_id, layout, variable, unit, instruments, signal)
        VALUES (@lineId, @revisionId, @key, @variables, @units, @instruments, @signals) ON CONFLICT DO NOTHING
        """,
        new
        {
            lineId, revisionId, key,
            variables = layout.Variables.Select(BalanceRow.NameOf).ToArray(), units = layout.Variables.Select(variable => BalanceLayout.UnitOf(variable.Kind)).ToArray(),
            instruments = BalanceRow.Row(layout.Instruments), signals = layout.Signals.ToArray(),
        });

    private static void WriteWindows(NpgsqlConnection connection, int lineId, int revisionId, IReadOnlyList<LineWindow> windows, Dictionary<BalanceLayout, long> layouts)
    {
        using NpgsqlBinaryImporter copy = connection.BeginBinaryImport(
            """
            COPY balance_window (line_id, at, revision_id, layout, measured, reconciled, standard, class, correction, wanted, test, chi2, degrees, suspect, left_out)
            FROM STDIN (FORMAT BINARY)
            """);
        foreach (LineWindow window in windows)
        {
            if (window.Balance is not { } balance) continue;
            copy.StartRow();
            copy.Write(lineId, NpgsqlDbType.Integer);
            copy.Write(Instant.FromMilliseconds(window.At), NpgsqlDbType.TimestampTz);
            copy.Write(revisionId, NpgsqlDbType.Integer);
            copy.Write(layouts[balance.Layout], NpgsqlDbType.Bigint);
            foreach (double[] byVariable in (ReadOnlySpan<double[]>)[balance.Measured, balance.Reconciled, balance.Standard])
                copy.Write(BalanceRow.Short(byVariable), NpgsqlDbType.Array | NpgsqlDbType.Real);
            copy.Write(Array.ConvertAll(balance.Class, one => (byte)one), NpgsqlDbType.Bytea);
            foreach (double[] bySignal in (ReadOnlySpan<double[]>)[balance.Correction, balance.Wanted, balance.Test])
                copy.Write(BalanceRow.Short(bySignal), NpgsqlDbType.Array | NpgsqlDbType.Real);
            copy.Write(balance.ChiSquare, NpgsqlDbType.Double);
            copy.Write((short)balance.Degrees, NpgsqlDbType.Smallint);
            copy.Write(BalanceRow.Row(balance.Suspects), NpgsqlDbType.Array | NpgsqlDbType.Smallint);
            copy.Write(balance.LeftOut.Select(one => (short)one).ToArray(), NpgsqlDbType.Array | NpgsqlDbType.Smallint);
        }

        copy.Complete();
    }
}
