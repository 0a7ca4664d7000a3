using System.Security.Cryptography;
using System.Text;
using Dapper;
using EvapMonitor.Core;
using EvapMonitor.Core.Plant;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>Plant revisions, and the keys of their lines, effects and signals.</summary>
public sealed class PlantStore(NpgsqlDataSource database, TimeProvider clock)
{
    /// <summary>The plant file last accepted; null before the first.</summary>
    public async Task<string?> LastAcceptedTextAsync(CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.QuerySingleOrDefaultAsync<string>("SELECT body FROM plant_revision ORDER BY revision_id DESC LIMIT 1");
    }

    /// <summary>
    /// Accepts a plant file that was read without problems. The same text as the last one is not a new revision. A new one marks every day that has
    /// readings, so that all results are computed anew under it. With the same text, days that an older program evaluated are marked.
    /// </summary>
    public async Task<PlantInForce> AcceptAsync(Site site, string text, string author, CancellationToken stop)
    {
        string sha256 = Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text)));
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        var last = await connection.QuerySingleOrDefaultAsync<Revision>(
            "SELECT revision_id RevisionId, accepted_at AcceptedAt, in_force_from InForceFrom, author, sha256 FROM plant_revision ORDER BY revision_id DESC LIMIT 1");
        bool isNew = last is null || last.Sha256 != sha256;
        if (isNew)
        {
            last = await connection.QuerySingleAsync<Revision>(
                """
                INSERT INTO plant_revision (accepted_at, in_force_from, author, body, sha256) VALUES (@now, @from, @author, @text, @sha256)
                RETURNING revision_id RevisionId, accepted_at AcceptedAt, in_force_from InForceFrom, author, sha256
                """,
                new { now = clock.GetUtcNow(), from = site.HistoryFrom, author, text, sha256 });
        }

        var lines = new List<LinePlace>();
        foreach (Line line in site.Lines) lines.Add(await KeysOfAsync(connection, line));
        var signals = new Dictionary<string, SignalPlace>();
        foreach ((string signal, IReadOnlyList<string> users) in PlantInForce.SignalsOf(site))
        {
            int[] userIds = [.. users.Select(user => lines.Single(line => line.Line.Name == user).LineId)];
            (int signalId, int home) = await connection.QuerySingleAsync<(int, int)>(
                """
                INSERT INTO signal (name, home_line_id) VALUES (@signal, @home)
                ON CONFLICT (name) DO UPDATE SET name = excluded.name RETURNING signal_id, home_line_id
                """,
                new { signal, home = userIds[0] });
            signals[signal] = new SignalPlace(signalId, home, userIds);
        }

        await connection.ExecuteAsync(
            """
            UPDATE line_day SET data_version = data_version + 1, changed_from = day::timestamp AT TIME ZONE 'UTC', changed_at = clock_timestamp()
            WHERE @isNew OR (model < @model AND shown_revision IS NOT NULL)
            """,
            new { isNew, model = (short)LineEvaluation.ModelNumber });
        await transaction.CommitAsync(stop);
        return new PlantInForce(last!.RevisionId, new(last.AcceptedAt), new(last.InForceFrom), last.Author, text, site, lines, signals);
    }

    private static async Task<LinePlace> KeysOfAsync(NpgsqlConnection connection, Line line)
    {
        // A renamed line keeps its key, and so its history.
        foreach (string former in line.Formerly)
        {
            await connection.ExecuteAsync(
                "UPDATE line SET name = @name WHERE name = @former AND NOT EXISTS (SELECT 1 FROM line WHERE name = @name)", new { name = line.Name, former });
        }

        int lineId = await connection.QuerySingleAsync<int>(
            "INSERT INTO line (name) VALUES (@name) ON CONFLICT (name) DO UPDATE SET name = excluded.name RETURNING line_id", new { name = line.Name });
        var effectIds = new List<int>();
        foreach (Effect effect in line.Effects)
        {
            foreach (string former in effect.Formerly)
            {
                await connection.ExecuteAsync(
                    """
                    UPDATE effect SET name = @name WHERE line_id = @lineId AND name = @former
                      AND NOT EXISTS (SELECT 1 FROM effect WHERE line_id = @lineId AND name = @name)
                    """,
                    new { lineId, name = effect.Name, former });
            }

            effectIds.Add(await connection.QuerySingleAsync<int>(
                """
                INSERT INTO effect (line_id, effect_id, name)
                VALUES (@lineId, (SELECT coalesce(max(effect_id), 0) + 1 FROM effect WHERE line_id = @lineId), @name)
                ON CONFLICT (line_id, name) DO UPDATE SET name = excluded.name RETURNING effect_id
                """,
                new { lineId, name = effect.Name }));
        }

        return new LinePlace(lineId, line, effectIds);
    }

    private sealed record Revision(int RevisionId, DateTime AcceptedAt, DateTime InForceFrom, string Author, string Sha256);
}
