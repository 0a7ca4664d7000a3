using EvapMonitor.Core.Balances;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.AspNetCore.Mvc;

namespace EvapMonitor.Service.Api;

/// <summary>The log of instruments: not to be believed for a time, or set right.</summary>
internal static class InstrumentLogHandlers
{
    private const int LongestNote = 2000, LongestKey = 200;

    public static async Task<Results<Ok<InstrumentLogWire>, ProblemHttpResult>> List(InstrumentLogStore store, PlantHolder plant, CancellationToken stop, string? signal = null)
    {
        PlantInForce inForce = plant.Current;
        if (signal is not null && !inForce.Signals.ContainsKey(signal)) return NoSignal(signal);
        IEnumerable<SignalPlace> wanted = signal is null ? inForce.Signals.Values : [inForce.Signals[signal]];
        var names = inForce.Signals.ToDictionary(one => one.Value.SignalId, one => one.Key);
        return TypedResults.Ok(new InstrumentLogWire([.. (await store.ListAsync(wanted, stop)).Select(one => WireOf(one, names[one.SignalId]))]));
    }

    public static async Task<Results<Created<InstrumentEventWire>, Ok<InstrumentEventWire>, ProblemHttpResult>> Log(
        NewInstrumentEventWire body, [FromHeader(Name = "Idempotency-Key")] string? key, InstrumentLogStore store, PlantHolder plant, EvaluationSignal evaluation, LiveEvents events,
        TimeProvider clock, CancellationToken stop)
    {
        PlantInForce inForce = plant.Current;
        DateTimeOffset now = clock.GetUtcNow();
        if (WhyWrong(body, key, inForce, now) is { } wrong) return wrong;
        SignalPlace place = inForce.Signals[body.Signal!];
        var logged = new InstrumentEvent(Guid.CreateVersion7(now), place.SignalId, body.Kind!, body.Start!.Value.ToUniversalTime(), body.End?.ToUniversalTime(), body.Note?.Trim() ?? "", now);
        (LogOutcome outcome, InstrumentEvent stands) = await store.LogAsync(logged, place, inForce.Reach, key!, stop);
        InstrumentEventWire wire = WireOf(stands, body.Signal!);
        if (outcome == LogOutcome.Overlaps) return Problems.Conflict($"It overlaps what is logged already of {body.Signal}: {stands.Kind} from {stands.Start:O} to {stands.End?.ToString("O") ?? "further notice"}.");
        if (outcome == LogOutcome.KeyTaken) return Problems.KeyTaken();
        if (outcome == LogOutcome.Repeated) return TypedResults.Ok(wire);
        evaluation.Wake();
        events.Publish("instruments", new InstrumentLogChangedWire(body.Signal!));
        return TypedResults.Created($"/api/v1/instrument-log/{stands.Id}", wire);
    }

    public static async Task<Results<NoContent, ProblemHttpResult>> Withdraw(
        Guid id, InstrumentLogStore store, PlantHolder plant, EvaluationSignal evaluation, LiveEvents events, CancellationToken stop)
    {
        PlantInForce inForce = plant.Current;
        var names = inForce.Signals.ToDictionary(one => one.Value.SignalId, one => one.Key);
        InstrumentEvent? gone = await store.WithdrawAsync(id, signal => names.TryGetValue(signal, out string? name) ? inForce.Signals[name] : null, inForce.Reach, stop);
        if (gone is null) return Problems.NotFound($"The log of instruments has no entry {id}.");
        evaluation.Wake();
        if (names.TryGetValue(gone.SignalId, out string? signal)) events.Publish("instruments", new InstrumentLogChangedWire(signal));
        return TypedResults.NoContent();
    }

    private static ProblemHttpResult? WhyWrong(NewInstrumentEventWire body, string? key, PlantInForce plant, DateTimeOffset now)
    {
        if (string.IsNullOrWhiteSpace(key) || key.Length > LongestKey) return Problems.Wrong($"The header Idempotency-Key is missing or over {LongestKey} letters: it lets a retry never log twice.");
        if (body.Signal is null || !plant.Signals.ContainsKey(body.Signal)) return NoSignal(body.Signal ?? "");
        if (body.Kind is not (InstrumentLogStore.Excluded or InstrumentLogStore.Recalibrated))
            return Problems.Wrong($"kind is '{body.Kind}'; allowed: {InstrumentLogStore.Excluded}, {InstrumentLogStore.Recalibrated}.");
        if (plant.Lines.All(line => new LineInstruments(line.Line).All.All(instrument => instrument.Signal != body.Signal)))
            return Problems.Wrong($"{body.Signal} is not an instrument of a balance: leaving it out would change nothing.");
        if (body.Start is not { } start) return Problems.Wrong("start is missing: an RFC 3339 time.");
        if (start > now.AddMinutes(10)) return Problems.Wrong($"start ({start:O}) is in the future; this is a log of what was found.");
        if (start < plant.Site.HistoryFrom) return Problems.Wrong($"start ({start:O}) is before the plant file's history-from.");
        if (body.End is { } end && body.Kind == InstrumentLogStore.Recalibrated) return Problems.Wrong($"A recalibration is an instant; leave end ({end:O}) out.");
        if (body.End <= start) return Problems.Wrong($"end ({body.End:O}) must be after start.");
        return body.Note?.Length > LongestNote ? Problems.Wrong($"note is over {LongestNote} letters.") : null;
    }

    private static ProblemHttpResult NoSignal(string signal) => Problems.NotFound($"There is no signal '{signal}' in the plant file.");

    private static InstrumentEventWire WireOf(InstrumentEvent one, string signal) => new(one.Id, signal, one.Kind, one.Start, one.End, one.Note, one.LoggedAt);
}
