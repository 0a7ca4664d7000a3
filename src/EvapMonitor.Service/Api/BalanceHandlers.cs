using System.Text;
using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Wording;
using Microsoft.AspNetCore.Http.HttpResults;

namespace EvapMonitor.Service.Api;

/// <summary>The reconciled balance of a line, and the corrections that it has wanted of an instrument.</summary>
internal static class BalanceHandlers
{
    /// <summary>Longest span of corrections in one request.</summary>
    private static readonly TimeSpan LongestSpan = TimeSpan.FromDays(400);

    public static async Task<Results<Ok<BalanceWire>, FileContentHttpResult, StatusCodeHttpResult, ProblemHttpResult>> Balance(
        string line, HttpContext context, BalanceStates states, BalanceStore balances, TrendStore trends, PlantHolder plant, PlantStore plants, CancellationToken stop,
        DateTimeOffset? at = null, int? revision = null)
    {
        PlantInForce inForce = plant.Current;
        if (inForce.Find(line) is not { } place) return Problems.NoLine(inForce, line);
        if (TrendHandlers.WhyNoTime(context.Request, "at") is { } wrong) return Problems.Wrong(wrong);
        if (revision is not null && at is null) return Problems.Wrong("revision needs at: the window whose balance under that revision is asked for.");
        LineFit now = await states.OfAsync(inForce, place, stop);
        if (TrendHandlers.IsKnown(context, inForce, now.Version, out bool csv)) return TypedResults.StatusCode(StatusCodes.Status304NotModified);
        LineFit? asked = now.Last is null ? null : now;
        if (at is { } instant)
        {
            // In the units, and by the instruments, of the plant as it was then.
            if (revision is null) inForce = plant.Timeline.On(DateOnly.FromDateTime(instant.UtcDateTime));
            else if (await RevisionHandlers.AskedAsync(plant, plants, revision, stop) is { Plant: { } wantedOne }) inForce = wantedOne;
            else return RevisionHandlers.NoRevision(revision.Value);
            place = inForce.Lines.FirstOrDefault(one => one.LineId == place.LineId) ?? place;
            long step = (long)inForce.Site.Window.TotalMilliseconds, wanted = instant.ToUnixTimeMilliseconds();
            wanted -= Milliseconds.Modulo(wanted, step);
            DateTimeOffset start = DateTimeOffset.FromUnixTimeMilliseconds(wanted);
            StoredBalance? then = await balances.LastAsync(place.LineId, start, start.AddMilliseconds(-1), stop, revision);
            if (then is null) return Problems.NotFound($"Line {line} has no balance at {start:yyyy-MM-ddTHH:mm:ssZ}: {WhyNone(trends, place, start)}.");
            // Since when something is suspect is only told of what is shown.
            asked = revision is not null ? BalanceStates.Judge(inForce, place, now.Version, then, new Dictionary<string, (long, long)>())
                : then.At == now.Last?.At ? now : BalanceStates.Judge(inForce, place, now.Version, then, await states.SinceAsync(place.LineId, then, stop));
        }

        if (asked is null) return Problems.NotFound($"Line {line} has no balance yet: no window of it could be evaluated.");
        if (!csv) return TypedResults.Ok(BalanceStates.WireOf(inForce, place, asked));
        return TypedResults.File(Encoding.UTF8.GetBytes(Csv(line, asked.Last!)), "text/csv; charset=utf-8", $"{line}-balance.csv");
    }

    public static async Task<Results<Ok<CorrectionsWire>, StatusCodeHttpResult, ProblemHttpResult>> Corrections(
        string signal, HttpContext context, BalanceStore balances, TrendStore trends, PlantHolder plant, TimeProvider clock, CancellationToken stop,
        DateTimeOffset? from = null, DateTimeOffset? to = null, int points = 1000)
    {
        PlantInForce inForce = plant.Current;
        if (!inForce.Signals.TryGetValue(signal, out SignalPlace? known)) return Problems.NotFound($"There is no signal '{signal}' in the plant file.");
        if (TrendHandlers.WhyNoTime(context.Request, "from", "to") is { } wrong) return Problems.Wrong(wrong);
        if (points is < 10 or > 10_000) return Problems.Wrong($"points is {points}; allowed: 10 to 10000.");
        DateTimeOffset end = to ?? clock.GetUtcNow(), start = from ?? end.AddDays(-30);
        if (start >= end) return Problems.Wrong($"from ({start:O}) must be before to ({end:O}).");
        if (end - start > LongestSpan) return Problems.Wrong($"The span is {(end - start).TotalDays:0} days; allowed: {LongestSpan.TotalDays:0}.");
        LinePlace line = inForce.Lines.First(one => one.LineId == known.Users[0]);
        long version = await trends.DataVersionAsync(line.LineId, stop);
        if (TrendHandlers.IsKnown(context, inForce, version, out _)) return TypedResults.StatusCode(StatusCodes.Status304NotModified);
        IReadOnlyList<WantedCorrection> all = await balances.CorrectionsAsync(line.LineId, signal, start, end, stop);
        return TypedResults.Ok(CorrectionSeries.Of(signal, line.Line, all, start, points, inForce.Site.Window, version));
    }

    private static string Csv(string line, StoredBalance stored)
    {
        var text = new StringWriter { NewLine = "\r\n" };
        using var file = new BalanceFile(text);
        file.WriteHeader();
        file.Write(line, stored.At, stored.Balance);
        return text.ToString();
    }

    private static string WhyNone(TrendStore trends, LinePlace line, DateTimeOffset start) =>
        trends.Windows(line.LineId, line.EffectIds[0], start, start.AddMilliseconds(1)) is [{ Reason: { } reason }] ? reason : "no readings reach into that window";
}
