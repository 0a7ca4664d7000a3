using System.Text;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.PlantFile;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.AspNetCore.Mvc;

namespace EvapMonitor.Service.Api;

/// <summary>Plant revisions: what the program assumes, from when on.</summary>
internal static class RevisionHandlers
{
    private const int LongestKey = 200, MostContext = 1000;

    /// <summary>How far ahead a change of the plant may be told.</summary>
    private static readonly TimeSpan FurthestAhead = TimeSpan.FromDays(400);

    public static async Task<Ok<RevisionsWire>> List(PlantStore store, PlantHolder plant, CancellationToken stop) => TypedResults.Ok(new RevisionsWire(await AllAsync(store, plant, stop)));

    public static async Task<Results<Ok<PlantWire>, ProblemHttpResult>> Find(int id, PlantStore store, CancellationToken stop) =>
        await store.FindAsync(id, stop) is var (one, text) ? TypedResults.Ok(new PlantWire(one.RevisionId, one.AcceptedAt, one.InForceFrom, one.Author, text)) : NoRevision(id);

    public static async Task<Results<Ok<DifferencesWire>, ProblemHttpResult>> Differences(int id, PlantStore store, CancellationToken stop, int? from = null, int context = 3)
    {
        if (context is < 0 or > MostContext) return Problems.Wrong($"context is {context}; allowed: 0 to {MostContext} lines.");
        if (await store.FindAsync(id, stop) is not var (_, text)) return NoRevision(id);
        int other = from ?? id - 1;
        if (from is null && other < 1) return Problems.Wrong("from is missing: the first revision has none before it.");
        if (await store.FindAsync(other, stop) is not var (_, before)) return NoRevision(other);
        IReadOnlyList<ComparedLine> lines = TextDifferences.Compare(before, text);
        return TypedResults.Ok(new DifferencesWire(
            other, id, lines.Count(line => line.Change == LineChange.Added), lines.Count(line => line.Change == LineChange.Removed),
            [.. TextDifferences.Stretches(lines, context).Select(stretch => new DifferentStretchWire([.. stretch.Select(WireOf)]))]));
    }

    public static async Task<Results<Created<AcceptedRevisionWire>, Ok<AcceptedRevisionWire>, ProblemHttpResult>> Accept(
        HttpRequest request, PlantStore store, PlantHolder plant, RecomputationStore recomputations, RecomputationWatch watch, EvaluationSignal evaluation, RecomputationSignal signal,
        LiveEvents events, TimeProvider clock, [FromHeader(Name = "Idempotency-Key")] string? key, CancellationToken stop, [FromQuery(Name = "in_force_from")] DateTimeOffset? inForceFrom = null)
    {
        if (request.ContentType?.Split(';')[0].Trim() is not ("application/yaml" or "text/yaml" or "application/x-yaml" or "text/x-yaml" or "text/plain"))
            return TypedResults.Problem($"Content-Type is '{request.ContentType}'; allowed: application/yaml, text/yaml.", statusCode: StatusCodes.Status415UnsupportedMediaType, title: "Unsupported content");
        if (key is { Length: 0 or > LongestKey }) return Problems.Wrong($"The header Idempotency-Key is empty or over {LongestKey} letters.");
        if (TrendHandlers.WhyNoTime(request, "in_force_from") is { } wrong) return Problems.Wrong(wrong);
        using var body = new MemoryStream();
        await request.Body.CopyToAsync(body, stop);
        PlantFileResult read = PlantFileReader.Read(body.GetBuffer().AsSpan(0, (int)body.Length));
        if (read.Site is not { } site) return NotSound(read.Problems);
        if (inForceFrom is { } start && WhyWrong(start, site, clock.GetUtcNow()) is { } reason) return Problems.Wrong(reason);
        string text = Encoding.UTF8.GetString(body.GetBuffer(), 0, (int)body.Length).TrimStart('\uFEFF');
        (AcceptOutcome outcome, int revision) = await store.AcceptAsync(site, text, request.HttpContext.User.Identity?.Name ?? "unknown", inForceFrom?.ToUniversalTime(), key, stop);
        if (outcome == AcceptOutcome.KeyTaken) return Problems.KeyTaken();
        if (await store.LoadAsync(plant.Timeline, stop) is { } timeline) plant.Timeline = timeline;
        Recomputation? recomputation = (await recomputations.ListAsync(stop)).FirstOrDefault(one => one.Revision == revision);
        var wire = new AcceptedRevisionWire(
            (await AllAsync(store, plant, stop)).Single(one => one.Revision == revision), outcome == AcceptOutcome.Accepted,
            recomputation is null ? null : RecomputationHandlers.WireOf(watch.PaceOf(recomputation), plant.Timeline));
        if (outcome == AcceptOutcome.Known) return TypedResults.Ok(wire);
        evaluation.Wake();
        signal.Wake();
        events.Publish("plant", new PlantChangedWire(revision));
        return TypedResults.Created($"/api/v1/plant/revisions/{revision}", wire);
    }

    public static ProblemHttpResult NoRevision(int id) => Problems.NotFound($"There is no plant revision {id}; GET /api/v1/plant/revisions lists them.");

    /// <summary>The plant whose results are asked for, with the revisions by which they are to be read: those in force over time, or the one asked for.</summary>
    public static async Task<(PlantInForce Plant, IReadOnlyList<PlantInForce> Eras)?> AskedAsync(PlantHolder plant, PlantStore store, int? revision, CancellationToken stop)
    {
        if (revision is not { } asked) return (plant.Current, plant.Timeline.Eras);
        if ((plant.Timeline.Eras.FirstOrDefault(era => era.RevisionId == asked) ?? await store.PlantAsync(asked, stop)) is not { } one) return null;
        return (one, [one]);
    }

    private static async Task<IReadOnlyList<RevisionWire>> AllAsync(PlantStore store, PlantHolder plant, CancellationToken stop)
    {
        IReadOnlyList<(PlantRevision Revision, int Days)> all = await store.ListAsync(stop);
        PlantRevision[] eras = [.. PlantStore.InForce(all.Select(one => one.Revision))];
        return [.. all.Select(one =>
        {
            int place = Array.IndexOf(eras, one.Revision);
            int? replacedBy = place >= 0 ? null : eras.Single(era => era.InForceFrom == one.Revision.InForceFrom).RevisionId;
            DateTimeOffset? until = place >= 0 && place + 1 < eras.Length ? eras[place + 1].InForceFrom : null;
            int now = Array.FindIndex(eras, era => era.RevisionId == plant.Current.RevisionId);
            string state = place < 0 ? "replaced" : place == now ? "in force" : place < now ? "past" : "coming";
            return new RevisionWire(
                one.Revision.RevisionId, one.Revision.AcceptedAt, one.Revision.InForceFrom, until, state, replacedBy, one.Revision.Author, one.Revision.Sha256, one.Days);
        })];
    }

    private static string? WhyWrong(DateTimeOffset start, Core.Plant.Site site, DateTimeOffset now)
    {
        if (!PlantTimeline.IsMidnight(start))
        {
            DateTime day = start.UtcDateTime.Date;
            return Invariant($"in_force_from is {start.UtcDateTime:yyyy-MM-ddTHH:mm:ssZ}; a revision begins with a UTC day, because a day is computed as a whole: {day:yyyy-MM-dd}T00:00:00Z or {day.AddDays(1):yyyy-MM-dd}T00:00:00Z.");
        }

        if (start < site.HistoryFrom.UtcDateTime.Date) return Invariant($"in_force_from is {start.UtcDateTime:yyyy-MM-ddTHH:mm:ssZ}, before the file's history-from; allowed: from {site.HistoryFrom.UtcDateTime.Date:yyyy-MM-dd}T00:00:00Z on.");
        return start > now + FurthestAhead ? Invariant($"in_force_from is {start.UtcDateTime:yyyy-MM-ddTHH:mm:ssZ}; allowed: up to {FurthestAhead.TotalDays:0} days ahead.") : null;
    }

    private static ProblemHttpResult NotSound(IReadOnlyList<PlantFileProblem> problems) => TypedResults.Problem(
        $"The plant file has {problems.Count} {(problems.Count == 1 ? "mistake" : "mistakes")}; nothing was applied.", statusCode: StatusCodes.Status422UnprocessableEntity, title: "Plant file not sound",
        extensions: new Dictionary<string, object?> { ["problems"] = problems.Select(one => new PlantProblemWire(one.Line, one.Column, one.Path, one.Found, one.Allowed)).ToArray() });

    private static DifferentLineWire WireOf(ComparedLine line) => new(
        line.Change switch { LineChange.Added => "added", LineChange.Removed => "removed", _ => "same" }, line.FromLine == 0 ? null : line.FromLine, line.ToLine == 0 ? null : line.ToLine, line.Text);
}
