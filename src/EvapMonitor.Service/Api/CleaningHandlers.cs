using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Wording;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.AspNetCore.Mvc;

namespace EvapMonitor.Service.Api;

/// <summary>The log of cleanings.</summary>
internal static class CleaningHandlers
{
    private const int LongestKind = 60, LongestNote = 2000, LongestKey = 200;

    public static async Task<Results<Ok<CleaningsWire>, ProblemHttpResult>> List(
        CleaningStore store, SurfaceStates surfaces, PlantHolder plant, CancellationToken stop, string? line = null, string? effect = null)
    {
        PlantInForce inForce = plant.Current;
        LinePlace? place = null;
        int? effectId = null;
        if (line is not null && (place = inForce.Find(line)) is null) return Problems.NoLine(inForce, line);
        if (effect is not null)
        {
            if (place is null) return Problems.Wrong("effect needs line: effects are named within their line.");
            if (place.Find(effect) is not var (_, id)) return Problems.NoEffect(place.Line, effect);
            effectId = id;
        }

        IReadOnlyList<LoggedCleaning> logged = await store.ListAsync(place?.LineId, effectId, stop);
        var all = new List<CleaningWire>();
        foreach (LinePlace one in place is null ? inForce.Lines : [place])
        {
            IReadOnlyList<Surface> its = (await surfaces.OfAsync(one.LineId, stop)).Surfaces;
            all.AddRange(logged.Where(cleaning => cleaning.LineId == one.LineId).Select(cleaning => WireOf(one, cleaning, its)).OfType<CleaningWire>());
            // What nobody logged stands with the effect in which the surface serves.
            all.AddRange(its.Where(surface => effect is null || surface.Effect == effect)
                .SelectMany(surface => surface.History.Cleanings.Where(cleaning => cleaning.Ids.Count == 0).Select(cleaning => Unlogged(one, surface, cleaning))));
        }

        return TypedResults.Ok(new CleaningsWire([.. all.OrderByDescending(cleaning => cleaning.Start)]));
    }

    public static async Task<Results<Created<CleaningWire>, Ok<CleaningWire>, ProblemHttpResult>> Log(
        NewCleaningWire body, [FromHeader(Name = "Idempotency-Key")] string? key, CleaningStore store, PlantHolder plant, EvaluationSignal evaluation, LiveEvents events,
        TimeProvider clock, CancellationToken stop)
    {
        PlantInForce inForce = plant.Current;
        if (WhyWrong(body, key, inForce, clock.GetUtcNow()) is { } wrong) return wrong;
        (LinePlace line, Effect effect, LoggedCleaning cleaning) = Entry(body, inForce, clock.GetUtcNow());
        (LogOutcome outcome, LoggedCleaning stands) = await store.LogAsync(cleaning, key!, stop);
        CleaningWire wire = WireOf(line, stands, [])!;
        if (outcome == LogOutcome.Overlaps) return Problems.Conflict($"It overlaps the cleaning of {effect.Name} from {stands.Start:O} to {stands.End?.ToString("O") ?? "now"}.");
        if (outcome == LogOutcome.KeyTaken) return Problems.KeyTaken();
        if (outcome == LogOutcome.Repeated) return TypedResults.Ok(wire);
        evaluation.Wake();
        events.Publish("cleanings", new CleaningsChangedWire(line.Line.Name, effect.Name));
        return TypedResults.Created($"/api/v1/cleanings/{stands.Id}", wire);
    }

    public static async Task<Results<Ok<CleaningWire>, ProblemHttpResult>> Correct(
        Guid id, NewCleaningWire body, [FromHeader(Name = "Idempotency-Key")] string? key, CleaningStore store, PlantHolder plant, EvaluationSignal evaluation, LiveEvents events,
        TimeProvider clock, CancellationToken stop)
    {
        PlantInForce inForce = plant.Current;
        if (WhyWrong(body, key, inForce, clock.GetUtcNow()) is { } wrong) return wrong;
        (LinePlace line, Effect effect, LoggedCleaning cleaning) = Entry(body, inForce, clock.GetUtcNow());
        if (await store.CorrectAsync(id, cleaning, key!, stop) is not var (outcome, stands)) return Problems.NotFound($"There is no cleaning {id}.");
        if (outcome == LogOutcome.Overlaps) return Problems.Conflict($"It overlaps the cleaning of {effect.Name} from {stands.Start:O} to {stands.End?.ToString("O") ?? "now"}.");
        if (outcome == LogOutcome.KeyTaken) return Problems.KeyTaken();
        if (outcome == LogOutcome.Logged)
        {
            evaluation.Wake();
            events.Publish("cleanings", new CleaningsChangedWire(line.Line.Name, effect.Name));
        }

        return TypedResults.Ok(WireOf(line, stands, [])!);
    }

    public static async Task<Results<NoContent, ProblemHttpResult>> Withdraw(
        Guid id, CleaningStore store, PlantHolder plant, EvaluationSignal evaluation, LiveEvents events, CancellationToken stop)
    {
        if (await store.WithdrawAsync(id, stop) is not { } cleaning) return Problems.NotFound($"There is no cleaning {id}.");
        evaluation.Wake();
        if (plant.Current.Lines.FirstOrDefault(line => line.LineId == cleaning.LineId) is { } place && WireOf(place, cleaning, []) is { } wire) events.Publish("cleanings", new CleaningsChangedWire(wire.Line, wire.Effect));
        return TypedResults.NoContent();
    }

    private static ProblemHttpResult? WhyWrong(NewCleaningWire body, string? key, PlantInForce plant, DateTimeOffset now)
    {
        if (string.IsNullOrWhiteSpace(key) || key.Length > LongestKey) return Problems.Wrong($"The header Idempotency-Key is missing or over {LongestKey} letters: it lets a retry never log twice.");
        if (body.Line is null || plant.Find(body.Line) is not { } line) return Problems.NoLine(plant, body.Line ?? "");
        if (body.Effect is null || line.Find(body.Effect) is null) return Problems.NoEffect(line.Line, body.Effect ?? "");
        if (body.Start is not { } start) return Problems.Wrong("start is missing: an RFC 3339 time.");
        if (start > now.AddMinutes(10)) return Problems.Wrong($"start ({start:O}) is in the future; this is a log of what was done.");
        if (start < plant.Site.HistoryFrom) return Problems.Wrong($"start ({start:O}) is before the plant file's history-from.");
        if (body.End is { } end && (end <= start || end > now.AddMinutes(10))) return Problems.Wrong($"end ({end:O}) must be after start and not in the future.");
        if (body.Rejected && body.End is null) return Problems.Wrong("end is missing: a rejection is of the time in which a cleaning was recognised.");
        if (body.Body is { } name && line.Line.Bodies.All(one => one.Name != name))
            return Problems.Wrong($"Line {line.Line.Name} has no body '{name}'; it has {(line.Line.Bodies.Count == 0 ? "none" : string.Join(", ", line.Line.Bodies.Select(one => one.Name)))}.");
        if ((string.IsNullOrWhiteSpace(body.Kind) && !body.Rejected) || body.Kind?.Length > LongestKind) return Problems.Wrong($"kind is missing or over {LongestKind} letters: the plant's word, such as boil-out.");
        return body.Note?.Length > LongestNote ? Problems.Wrong($"note is over {LongestNote} letters.") : null;
    }

    private static (LinePlace Line, Effect Effect, LoggedCleaning Cleaning) Entry(NewCleaningWire body, PlantInForce plant, DateTimeOffset now)
    {
        LinePlace line = plant.Find(body.Line!)!;
        (Effect effect, int effectId) = line.Find(body.Effect!)!.Value;
        return (line, effect, new LoggedCleaning(
            Guid.CreateVersion7(now), line.LineId, effectId, body.Start!.Value.ToUniversalTime(), body.End?.ToUniversalTime(), body.Kind?.Trim() ?? "", body.Note?.Trim() ?? "", now,
            body.Body, body.Rejected));
    }

    /// <summary>A logged cleaning as it goes out, with what it brought.</summary>
    internal static CleaningWire? WireOf(LinePlace line, LoggedCleaning cleaning, IReadOnlyList<Surface> surfaces)
    {
        if (line.Find(cleaning.EffectId) is not { } effect) return null;
        var found = surfaces.SelectMany(surface => surface.History.Cleanings.Select(one => (surface.Name, Cleaning: one))).FirstOrDefault(one => one.Cleaning.Ids.Contains(cleaning.Id));
        return new CleaningWire(
            cleaning.Id, line.Line.Name, effect.Name, cleaning.Body, cleaning.Start, cleaning.End, cleaning.Kind, cleaning.Note, cleaning.LoggedAt,
            cleaning.Rejected ? "rejected" : "logged", found.Cleaning is null ? null : CampaignStates.ResultOf(found.Name, found.Cleaning));
    }

    private static CleaningWire Unlogged(LinePlace line, Surface surface, SurfaceCleaning cleaning) => new(
        null, line.Line.Name, surface.Effect, surface.Name == surface.Effect ? null : surface.Name, DateTimeOffset.FromUnixTimeMilliseconds(cleaning.Start),
        cleaning.End is { } end ? CampaignStates.Open(end) : null, "", "", null, Words.Of(cleaning.Source), CampaignStates.ResultOf(surface.Name, cleaning));
}
