using System.Text;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Http.HttpResults;

namespace EvapMonitor.Service.Api;

/// <summary>Series for charts and for other programs.</summary>
internal static class TrendHandlers
{
    public static async Task<Results<Ok<TrendWire>, FileContentHttpResult, StatusCodeHttpResult, ProblemHttpResult>> Trend(
        string line, string effect, HttpContext context, Trends trends, TrendStore store, PlantHolder plant, TimeProvider clock, CancellationToken stop,
        string quantity = "coefficient", DateTimeOffset? from = null, DateTimeOffset? to = null, int points = 2000)
    {
        PlantInForce inForce = plant.Current;
        if (inForce.Find(line) is not { } place) return Problems.NoLine(inForce, line);
        if (place.Find(effect) is not var (found, id)) return Problems.NoEffect(place.Line, effect);
        if (!Trends.Quantities.ContainsKey(quantity)) return Problems.Wrong($"quantity '{quantity}' is not known; allowed: {string.Join(", ", Trends.Quantities.Keys)}.");
        if (points is < 10 or > 10_000) return Problems.Wrong($"points is {points}; allowed: 10 to 10000.");
        DateTimeOffset end = to ?? clock.GetUtcNow(), start = from ?? end.AddDays(-30);
        if (start >= end) return Problems.Wrong($"from ({start:O}) must be before to ({end:O}).");
        if (end - start > Trends.LongestSpan) return Problems.Wrong($"The span is {(end - start).TotalDays:0} days; allowed: {Trends.LongestSpan.TotalDays:0}.");

        long version = await store.DataVersionAsync(place.LineId, stop);
        string tag = $"\"{inForce.RevisionId}-{version}\"";
        if (context.Request.Headers.IfNoneMatch == tag) return TypedResults.StatusCode(StatusCodes.Status304NotModified);
        TrendWire trend = trends.Of(place, found, id, quantity, start.ToUniversalTime(), end.ToUniversalTime(), points, inForce.Site.Window, version);
        context.Response.Headers.ETag = tag;
        context.Response.Headers.CacheControl = "no-cache";
        context.Response.Headers.Vary = "Accept";
        if (!context.Request.Headers.Accept.ToString().Contains("text/csv", StringComparison.OrdinalIgnoreCase)) return TypedResults.Ok(trend);
        return TypedResults.File(Encoding.UTF8.GetBytes(TrendCsv.Of(trend)), "text/csv; charset=utf-8", $"{place.Line.Name}-{found.Name}-{quantity}.csv");
    }
}
