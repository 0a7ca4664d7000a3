using Dapper;
using EvapMonitor.Core.Plant;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>Gives the lines, effects and signals of a revision their keys in the store. A renamed line or effect keeps its key, and so its history.</summary>
internal static class PlantKeys
{
    /// <summary>Gives keys within the transaction that accepts a revision, and notes under which names it knows them.</summary>
    public static async Task<IReadOnlyList<LinePlace>> GiveAsync(NpgsqlConnection connection, int revision, Site site)
    {
        var lines = new List<LinePlace>();
        foreach (Line line in site.Lines)
        {
            LinePlace place = await GiveAsync(connection, line);
            lines.Add(place);
            await connection.ExecuteAsync(
                "INSERT INTO revision_line (line_id, revision_id, name, effect, effect_id) VALUES (@LineId, @revision, @name, @effects, @ids) ON CONFLICT DO NOTHING",
                new { place.LineId, revision, name = line.Name, effects = line.Effects.Select(effect => effect.Name).ToArray(), ids = place.EffectIds.ToArray() });
        }

        return lines;
    }

    /// <summary>The keys that an accepted revision was given; null when a program that did not note them accepted it.</summary>
    public static async Task<IReadOnlyList<LinePlace>?> FindAsync(NpgsqlConnection connection, int revision, Site site)
    {
        var noted = (await connection.QueryAsync<(int LineId, string Name, string[] Effects, int[] Ids)>(
            "SELECT line_id, name, effect, effect_id FROM revision_line WHERE revision_id = @revision", new { revision })).ToDictionary(row => row.Name);
        if (!site.Lines.All(line => noted.ContainsKey(line.Name))) return null;
        return [.. site.Lines.Select(line =>
        {
            (int id, _, string[] effects, int[] ids) = noted[line.Name];
            return new LinePlace(id, line, [.. line.Effects.Select(effect => ids[Array.IndexOf(effects, effect.Name)])]);
        })];
    }

    /// <summary>
    /// Where the readings of the signals of a site are kept. One that has no place yet is given one under the first line that uses it: a newer program may need more
    /// signals of an accepted file than the one that accepted it.
    /// </summary>
    public static async Task<IReadOnlyDictionary<string, SignalPlace>> SignalsAsync(
        NpgsqlConnection connection, Site site, IReadOnlyList<LinePlace> lines, Dictionary<string, (int Id, int Home)> homes)
    {
        var places = new Dictionary<string, SignalPlace>();
        foreach ((string signal, IReadOnlyList<string> users) in PlantInForce.SignalsOf(site))
        {
            int[] userIds = [.. users.Select(user => lines.Single(line => line.Line.Name == user).LineId)];
            if (!homes.TryGetValue(signal, out (int Id, int Home) home))
            {
                homes[signal] = home = await connection.QuerySingleAsync<(int, int)>(
                    """
                    INSERT INTO signal (name, home_line_id) VALUES (@signal, @home)
                    ON CONFLICT (name) DO UPDATE SET name = excluded.name RETURNING signal_id, home_line_id
                    """,
                    new { signal, home = userIds[0] });
            }

            places[signal] = new SignalPlace(home.Id, home.Home, userIds);
        }

        return places;
    }

    private static async Task<LinePlace> GiveAsync(NpgsqlConnection connection, Line line)
    {
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
}
