using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.AspNetCore.Mvc;

namespace EvapMonitor.Service.Api;

/// <summary>The log of cleanings.</summary>
internal static class CleaningHandlers
{
    private const int LongestKind = 60, LongestNote = 2000, LongestKey = 200;

    public static async Task<Results<Ok<CleaningsWire>, ProblemHttpResult>> List(
        CleaningStore store, PlantHolder plant, CancellationToken stop, string? line = null, string? effect = null)
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
        return TypedResults.Ok(new CleaningsWire([.. logged.Select(cleaning => WireOf(inForce, cleaning)).OfType<CleaningWire>()]));
    }

    public static async Task<Results<Created<CleaningWire>, Ok<CleaningWire>, ProblemHttpResult>> Log(
        NewCleaningWire body, [FromHeader(Name = "Idempotency-Key")] string? key, CleaningStore store, PlantHolder plant, EvaluationSignal evaluation, LiveEvents events,
        TimeProvider clock, CancellationToken stop)
    {
        PlantInForce inForce = plant.Current;
        if (WhyWrong(body, key, inForce, clock.GetUtcNow()) is { } wrong) return wrong;
        LinePlace line = inForce.Find(body.Line!)!;
        (Effect effect, int effectId) = line.Find(body.Effect!)!.Value;
        var cleaning = new LoggedCleaning(
            Guid.CreateVersion7(clock.GetUtcNow()), line.LineId, effectId, body.Start!.Value.ToUniversalTime(), body.End?.ToUniversalTime(), body.Kind!.Trim(), body.Note?.Trim() ?? "",
            clock.GetUtcNow());
        (LogOutcome outcome, LoggedCleaning stands) = await store.LogAsync(cleaning, key!, stop);
        CleaningWire wire = EffectStates.WireOf(stands, line.Line.Name, effect.Name);
        if (outcome == LogOutcome.Overlaps) return Problems.Conflict($"It overlaps the cleaning of {effect.Name} from {stands.Start:O} to {stands.End?.ToString("O") ?? "now"}.");
        if (outcome == LogOutcome.KeyTaken) return Problems.KeyTaken();
        if (outcome == LogOutcome.Repeated) return TypedResults.Ok(wire);
        evaluation.Wake();
        events.Publish("cleanings", new CleaningsChangedWire(line.Line.Name, effect.Name));
        return TypedResults.Created($"/api/v1/cleanings/{stands.Id}", wire);
    }

    public static async Task<Results<NoContent, ProblemHttpResult>> Withdraw(
        Guid id, CleaningStore store, PlantHolder plant, EvaluationSignal evaluation, LiveEvents events, CancellationToken stop)
    {
        if (await store.WithdrawAsync(id, stop) is not { } cleaning) return Problems.NotFound($"There is no cleaning {id}.");
        evaluation.Wake();
        if (WireOf(plant.Current, cleaning) is { } wire) events.Publish("cleanings", new CleaningsChangedWire(wire.Line, wire.Effect));
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
        if (string.IsNullOrWhiteSpace(body.Kind) || body.Kind.Length > LongestKind) return Problems.Wrong($"kind is missing or over {LongestKind} letters: the plant's word, such as boil-out.");
        return body.Note?.Length > LongestNote ? Problems.Wrong($"note is over {LongestNote} letters.") : null;
    }

    private static CleaningWire? WireOf(PlantInForce plant, LoggedCleaning cleaning)
    {
        if (plant.Lines.FirstOrDefault(line => line.LineId == cleaning.LineId) is not { } line) return null;
        int i = line.EffectIds.ToList().IndexOf(cleaning.EffectId);
        return i < 0 ? null : EffectStates.WireOf(cleaning, line.Line.Name, line.Line.Effects[i].Name);
    }
}
