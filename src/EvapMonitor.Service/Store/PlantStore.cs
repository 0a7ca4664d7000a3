using System.Security.Cryptography;
using System.Text;
using Dapper;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.PlantFile;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>An accepted plant revision without its text.</summary>
/// <param name="RevisionId">Its number: they grow in the order of acceptance.</param>
/// <param name="AcceptedAt">When it was accepted.</param>
/// <param name="InForceFrom">From when it holds.</param>
/// <param name="Author">Who gave it.</param>
/// <param name="Sha256">SHA-256 of its text in UTF-8, lower-case hexadecimal.</param>
public sealed record PlantRevision(int RevisionId, DateTimeOffset AcceptedAt, DateTimeOffset InForceFrom, string Author, string Sha256);

/// <summary>What became of a plant file that was given.</summary>
public enum AcceptOutcome
{
    /// <summary>It is a new revision.</summary>
    Accepted,
    /// <summary>The same text holds at that time already, or the request came before; nothing changed.</summary>
    Known,
    /// <summary>The request key came before with another file or start.</summary>
    KeyTaken,
}

/// <summary>An accepted text can no longer be read by this program.</summary>
public sealed class UnreadableRevisionException(int revision, IReadOnlyList<PlantFileProblem> problems)
    : InvalidOperationException(string.Join(Environment.NewLine, problems.Select(problem => problem.ToLine(Invariant($"accepted revision {revision}")))));

/// <summary>Plant revisions: accepted, listed, read.</summary>
public sealed class PlantStore(NpgsqlDataSource database, TimeProvider clock)
{
    private const string Columns = "revision_id RevisionId, accepted_at AcceptedAt, in_force_from InForceFrom, author, sha256";

    /// <summary>All revisions, newest first, each with the number of days whose shown results were computed under it.</summary>
    public async Task<IReadOnlyList<(PlantRevision Revision, int Days)>> ListAsync(CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        var days = (await connection.QueryAsync<(int Revision, int Days)>(
            "SELECT shown_revision, count(*)::integer FROM line_day WHERE shown_revision IS NOT NULL GROUP BY 1")).ToDictionary(row => row.Revision, row => row.Days);
        return [.. (await RevisionsAsync(connection)).OrderByDescending(one => one.RevisionId).Select(one => (one, days.GetValueOrDefault(one.RevisionId)))];
    }

    /// <summary>A revision with its text; null when there is none with that number.</summary>
    public async Task<(PlantRevision Revision, string Text)?> FindAsync(int revision, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        Row? row = await connection.QuerySingleOrDefaultAsync<Row>($"SELECT {Columns} FROM plant_revision WHERE revision_id = @revision", new { revision });
        return row is null ? null : (row.ToRevision(), await TextAsync(connection, revision));
    }

    /// <summary>Number of the revision accepted last; 0 before the first.</summary>
    public async Task<int> NewestAsync(CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        return await connection.ExecuteScalarAsync<int>(new CommandDefinition("SELECT coalesce(max(revision_id), 0) FROM plant_revision", cancellationToken: stop));
    }

    /// <summary>The plant of one revision, whether it is in force at some time or not; null when there is none with that number.</summary>
    /// <exception cref="UnreadableRevisionException">Its text can no longer be read.</exception>
    public async Task<PlantInForce?> PlantAsync(int revision, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        Row? row = await connection.QuerySingleOrDefaultAsync<Row>($"SELECT {Columns} FROM plant_revision WHERE revision_id = @revision", new { revision });
        return row is null ? null : await PlantAsync(connection, row.ToRevision(), await HomesAsync(connection));
    }

    /// <summary>Which revision is in force when; null before the first was accepted.</summary>
    /// <param name="known">What was loaded before: revisions never change, so those of it are taken over.</param>
    /// <param name="stop">Cancels.</param>
    /// <exception cref="UnreadableRevisionException">A revision that is in force at some time can no longer be read.</exception>
    public async Task<PlantTimeline?> LoadAsync(PlantTimeline? known, CancellationToken stop)
    {
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        // Revisions and signals as of one moment: another process may accept one in between.
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(System.Data.IsolationLevel.RepeatableRead, stop);
        IReadOnlyList<PlantRevision> all = await RevisionsAsync(connection);
        if (all.Count == 0) return null;
        Dictionary<string, (int Id, int Home)> homes = await HomesAsync(connection);
        var eras = new List<PlantInForce>();
        foreach (PlantRevision revision in InForce(all))
            eras.Add(known?.Eras.FirstOrDefault(era => era.RevisionId == revision.RevisionId) ?? await PlantAsync(connection, revision, homes));
        await transaction.CommitAsync(stop);
        return new PlantTimeline(eras, homes.Select(home => (home.Key, home.Value.Id, home.Value.Home)), all.Max(revision => revision.RevisionId));
    }

    /// <summary>
    /// Accepts a plant file that was read without problems. A new revision marks the days from its start up to the next revision's start, to be computed anew under it.
    /// </summary>
    /// <param name="site">The plant.</param>
    /// <param name="text">The file.</param>
    /// <param name="author">Who gave it.</param>
    /// <param name="from">
    /// From when it holds, a UTC midnight; null: it corrects the revision in force now, and holds from that one's start. The first revision holds from history-from.
    /// </param>
    /// <param name="requestKey">A retry with the same key never accepts twice; null without one.</param>
    /// <param name="stop">Cancels.</param>
    public async Task<(AcceptOutcome Outcome, int Revision)> AcceptAsync(Site site, string text, string author, DateTimeOffset? from, string? requestKey, CancellationToken stop)
    {
        string sha256 = Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text)));
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        await using NpgsqlTransaction transaction = await connection.BeginTransactionAsync(stop);
        // One at a time: what a revision marks depends on its neighbours.
        await connection.ExecuteAsync("LOCK TABLE plant_revision IN SHARE ROW EXCLUSIVE MODE");
        IReadOnlyList<PlantRevision> all = await RevisionsAsync(connection);
        if (requestKey is not null
            && await connection.QuerySingleOrDefaultAsync<int?>("SELECT revision_id FROM plant_revision WHERE request_key = @requestKey", new { requestKey }) is { } before)
        {
            PlantRevision then = all.Single(one => one.RevisionId == before);
            return (then.Sha256 == sha256 && (from is null || from == then.InForceFrom) ? AcceptOutcome.Known : AcceptOutcome.KeyTaken, before);
        }

        PlantRevision[] eras = [.. InForce(all)];
        PlantRevision? Holding(DateTimeOffset instant) => eras.LastOrDefault(era => era.InForceFrom <= instant) ?? eras.FirstOrDefault();
        DateTimeOffset start = eras.Length == 0 ? site.HistoryFrom : from ?? Holding(clock.GetUtcNow().UtcDateTime.Date)!.InForceFrom;
        if (Holding(start) is { } same && same.Sha256 == sha256) return (AcceptOutcome.Known, same.RevisionId);
        int revision = await connection.QuerySingleAsync<int>(
            """
            INSERT INTO plant_revision (accepted_at, in_force_from, author, body, sha256, request_key) VALUES (@now, @start, @author, @text, @sha256, @requestKey)
            RETURNING revision_id
            """,
            new { now = clock.GetUtcNow().UtcDateTime, start = start.UtcDateTime, author, text, sha256, requestKey });
        await PlantKeys.SignalsAsync(connection, site, await PlantKeys.GiveAsync(connection, revision, site), await HomesAsync(connection));
        DateOnly firstDay = Array.Exists(eras, era => era.InForceFrom < start) ? PlantTimeline.FirstDay(start) : DateOnly.MinValue;
        DateOnly? end = eras.FirstOrDefault(era => era.InForceFrom > start) is { } next ? PlantTimeline.FirstDay(next.InForceFrom) : null;
        await RecomputationStore.StartAsync(connection, new NewRecomputation(RecomputationCause.PlantRevision, author, clock.GetUtcNow(), firstDay, end) { Revision = revision });
        await transaction.CommitAsync(stop);
        return (AcceptOutcome.Accepted, revision);
    }

    /// <summary>
    /// Accepts the plant file that the program was started with, as a correction of the revision in force now. A file unchanged since the last start is left as it
    /// is, and so is one that is in force at another time: a service that starts again with the file it once began with must not undo what was accepted since.
    /// </summary>
    /// <returns>The revision that the file is.</returns>
    public async Task<int> AcceptAtStartAsync(Site site, string text, string author, CancellationToken stop)
    {
        string sha256 = Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(text)));
        await using NpgsqlConnection connection = await database.OpenConnectionAsync(stop);
        int? lastGiven = await connection.QuerySingleOrDefaultAsync<int?>(
            "SELECT revision_id FROM plant_revision WHERE given = (SELECT max(given) FROM plant_revision) AND sha256 = @sha256",
            new { sha256 });
        int revision = lastGiven ?? InForce(await RevisionsAsync(connection)).LastOrDefault(era => era.Sha256 == sha256)?.RevisionId
            ?? (await AcceptAsync(site, text, author, null, null, stop)).Revision;
        await connection.ExecuteAsync("UPDATE plant_revision SET given = (SELECT coalesce(max(given), 0) + 1 FROM plant_revision) WHERE revision_id = @revision", new { revision });
        return revision;
    }

    /// <summary>Of revisions those that are in force at some time, in order of time.</summary>
    public static IEnumerable<PlantRevision> InForce(IEnumerable<PlantRevision> all) => PlantTimeline.InForce(all, one => one.InForceFrom, one => one.RevisionId);

    private static async Task<IReadOnlyList<PlantRevision>> RevisionsAsync(NpgsqlConnection connection) =>
        [.. (await connection.QueryAsync<Row>($"SELECT {Columns} FROM plant_revision ORDER BY revision_id")).Select(row => row.ToRevision())];

    private static async Task<Dictionary<string, (int Id, int Home)>> HomesAsync(NpgsqlConnection connection) =>
        (await connection.QueryAsync<(string Name, int Id, int Home)>("SELECT name, signal_id, home_line_id FROM signal")).ToDictionary(row => row.Name, row => (row.Id, row.Home));

    private static Task<string> TextAsync(NpgsqlConnection connection, int revision) =>
        connection.QuerySingleAsync<string>("SELECT body FROM plant_revision WHERE revision_id = @revision", new { revision });

    private static async Task<PlantInForce> PlantAsync(NpgsqlConnection connection, PlantRevision revision, Dictionary<string, (int Id, int Home)> homes)
    {
        string text = await TextAsync(connection, revision.RevisionId);
        PlantFileResult read = PlantFileReader.Read(text);
        if (read.Site is not { } site) throw new UnreadableRevisionException(revision.RevisionId, read.Problems);
        IReadOnlyList<LinePlace> lines = await PlantKeys.FindAsync(connection, revision.RevisionId, site) ?? await PlantKeys.GiveAsync(connection, revision.RevisionId, site);
        return new PlantInForce(revision.RevisionId, revision.AcceptedAt, revision.InForceFrom, revision.Author, text, site, lines, await PlantKeys.SignalsAsync(connection, site, lines, homes));
    }

    private sealed record Row(int RevisionId, DateTime AcceptedAt, DateTime InForceFrom, string Author, string Sha256)
    {
        public PlantRevision ToRevision() => new(RevisionId, new(AcceptedAt, TimeSpan.Zero), new(InForceFrom, TimeSpan.Zero), Author, Sha256);
    }
}
