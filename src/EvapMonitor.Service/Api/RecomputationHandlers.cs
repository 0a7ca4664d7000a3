using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Http.HttpResults;

namespace EvapMonitor.Service.Api;

/// <summary>Recomputations: why, which days, how far; begin, stop, go on.</summary>
internal static class RecomputationHandlers
{
    public static async Task<Ok<RecomputationsWire>> List(RecomputationStore store, RecomputationWatch watch, PlantHolder plant, CancellationToken stop) =>
        TypedResults.Ok(new RecomputationsWire([.. (await store.ListAsync(stop)).Select(one => WireOf(watch.PaceOf(one), plant.Timeline))]));

    public static async Task<Results<Ok<RecomputationWire>, ProblemHttpResult>> Find(int id, RecomputationStore store, RecomputationWatch watch, PlantHolder plant, CancellationToken stop) =>
        Told(id, await store.FindAsync(id, stop), watch, plant);

    public static async Task<Results<Created<RecomputationWire>, Ok<RecomputationWire>, ProblemHttpResult>> Begin(
        NewRecomputationWire body, HttpContext context, RecomputationStore store, RecomputationWatch watch, PlantHolder plant, EvaluationSignal evaluation, RecomputationSignal signal,
        CancellationToken stop)
    {
        int? line = null;
        if (body.Line is { } name)
        {
            if (plant.Current.Find(name) is not { } place) return Problems.NoLine(plant.Current, name);
            line = place.LineId;
        }

        if (body.From > body.To) return Problems.Wrong($"from ({body.From:yyyy-MM-dd}) must not be after to ({body.To:yyyy-MM-dd}): the first and the last UTC day.");
        if (await store.AskAsync(line, body.From, body.To, context.User.Identity?.Name ?? "unknown", stop) is not var (one, isNew))
            return Problems.Wrong("There is no day with readings in that span.");
        RecomputationWire wire = WireOf(watch.PaceOf(one), plant.Timeline);
        if (!isNew) return TypedResults.Ok(wire);
        evaluation.Wake();
        signal.Wake();
        return TypedResults.Created($"/api/v1/recomputations/{one.Id}", wire);
    }

    public static async Task<Results<Ok<RecomputationWire>, ProblemHttpResult>> Cancel(
        int id, RecomputationStore store, RecomputationWatch watch, PlantHolder plant, RecomputationSignal signal, CancellationToken stop)
    {
        Recomputation? one = await store.CancelAsync(id, stop);
        signal.Wake();
        return Told(id, one, watch, plant);
    }

    public static async Task<Results<Ok<RecomputationWire>, ProblemHttpResult>> Resume(
        int id, RecomputationStore store, RecomputationWatch watch, PlantHolder plant, EvaluationSignal evaluation, RecomputationSignal signal, CancellationToken stop)
    {
        Recomputation? one = await store.ResumeAsync(id, stop);
        evaluation.Wake();
        signal.Wake();
        return Told(id, one, watch, plant);
    }

    /// <summary>A recomputation as it goes out.</summary>
    public static RecomputationWire WireOf(RecomputationPace pace, PlantTimeline plant)
    {
        Recomputation one = pace.One;
        string? line = one.LineId is { } id ? plant.Eras.SelectMany(era => era.Lines).LastOrDefault(place => place.LineId == id)?.Line.Name : null;
        (string cause, string why) = one.Cause switch
        {
            RecomputationCause.PlantRevision => ("plant revision", Invariant($"Plant revision {one.Revision} was accepted.")),
            RecomputationCause.OlderModel => ("older model", "The program computes in a newer way."),
            _ => ("asked", $"Asked for by {one.Author}."),
        };
        return new RecomputationWire(
            one.Id, cause, why, one.Revision, line, one.FirstDay, one.LastDay, one.DaysTotal, one.DaysDone, one.DaysLeft, one.State, pace.DaysPerMinute, pace.SecondsLeft,
            one.StartedAt, one.EndedAt, one.Author);
    }

    private static Results<Ok<RecomputationWire>, ProblemHttpResult> Told(int id, Recomputation? one, RecomputationWatch watch, PlantHolder plant) =>
        one is null ? Problems.NotFound($"There is no recomputation {id}.") : TypedResults.Ok(WireOf(watch.PaceOf(one), plant.Timeline));
}
