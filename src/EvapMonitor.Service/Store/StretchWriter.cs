using EvapMonitor.Core.Fouling;
using Dapper;
using Npgsql;
using NpgsqlTypes;

namespace EvapMonitor.Service.Store;

/// <summary>Writes what the effects of a line did, as stretches.</summary>
internal static class StretchWriter
{
    public static void Write(NpgsqlConnection connection, DayResult result, int revisionId)
    {
        (int line, DateTime from, DateTime to) = (result.Line.LineId, result.From.UtcDateTime, result.Day.ToDateTime(TimeOnly.MinValue, DateTimeKind.Utc).AddDays(1));
        connection.Execute(
            "DELETE FROM effect_stretch WHERE line_id = @line AND starts_at >= @from AND starts_at < @to AND revision_id = @revisionId",
            new { line, from, to, revisionId });
        using NpgsqlBinaryImporter copy = connection.BeginBinaryImport(
            "COPY effect_stretch (line_id, effect_id, starts_at, revision_id, ends_at, state, product, bodies) FROM STDIN (FORMAT BINARY)");
        for (int i = 0; i < result.Line.EffectIds.Count; i++)
        {
            int effect = i;
            foreach (EffectStretch stretch in EffectStretch.Of(result.Windows.Select(window => window.Effects[effect]), (long)result.Step.TotalMilliseconds))
            {
                copy.StartRow();
                copy.Write(line, NpgsqlDbType.Integer);
                copy.Write(result.Line.EffectIds[i], NpgsqlDbType.Integer);
                copy.Write(Instant.FromMilliseconds(stretch.Start), NpgsqlDbType.TimestampTz);
                copy.Write(revisionId, NpgsqlDbType.Integer);
                copy.Write(Instant.FromMilliseconds(stretch.End), NpgsqlDbType.TimestampTz);
                copy.Write((short)stretch.State, NpgsqlDbType.Smallint);
                WriteText(copy, stretch.Product);
                WriteText(copy, stretch.Bodies);
            }
        }

        copy.Complete();
    }

    private static void WriteText(NpgsqlBinaryImporter copy, string? text)
    {
        if (text is null) copy.WriteNull();
        else copy.Write(text, NpgsqlDbType.Text);
    }
}
