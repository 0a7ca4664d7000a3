using System.Text;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.Net.Http.Headers;

namespace EvapMonitor.Service.Api;

/// <summary>Series for charts and for other programs.</summary>
internal static class TrendHandlers
{
    public static async Task<Results<Ok<TrendWire>, FileContentHttpResult, StatusCodeHttpResult, ProblemHttpResult>> Trend(
        string line, string effect, HttpContext context, Trends trends, TrendStore store, SurfaceStore surfaces, PlantHolder plant, PlantStore plants, TimeProvider clock, CancellationToken stop,
        string quantity = "coefficient", DateTimeOffset? from = null, DateTimeOffset? to = null, int points = 2000, int? revision = null)
    {
        if (await RevisionHandlers.AskedAsync(plant, plants, revision, stop) is not { Plant: { } inForce } asked) return RevisionHandlers.NoRevision(revision!.Value);
        if (inForce.Find(line) is not { } place) return Problems.NoLine(inForce, line);
        if (place.Find(effect) is not var (found, id)) return Problems.NoEffect(place.Line, effect);
        if (!Trends.Quantities.ContainsKey(quantity)) return Problems.Wrong($"quantity '{quantity}' is not known; allowed: {string.Join(", ", Trends.Quantities.Keys)}.");
        if (points is < 10 or > 10_000) return Problems.Wrong($"points is {points}; allowed: 10 to 10000.");
        if (WhyNoTime(context.Request, "from", "to") is { } wrong) return Problems.Wrong(wrong);

        DateTimeOffset end = to ?? clock.GetUtcNow(), start = from ?? end.AddDays(-30);
        if (start >= end) return Problems.Wrong($"from ({start:O}) must be before to ({end:O}).");
        if (end - start > Trends.LongestSpan) return Problems.Wrong($"The span is {(end - start).TotalDays:0} days; allowed: {Trends.LongestSpan.TotalDays:0}.");

        long version = await store.DataVersionAsync(place.LineId, stop) + await surfaces.VersionAsync(place.LineId, stop);
        if (IsKnown(context, inForce, version, out bool csv)) return TypedResults.StatusCode(StatusCodes.Status304NotModified);
        TrendWire trend = await trends.OfAsync(place, new EffectInTime(asked.Eras, place, found, id), quantity, start.ToUniversalTime(), end.ToUniversalTime(), points, revision, version, stop);
        if (!csv) return TypedResults.Ok(trend);
        return TypedResults.File(Encoding.UTF8.GetBytes(TrendCsv.Of(trend)), "text/csv; charset=utf-8", $"{place.Line.Name}-{found.Name}-{quantity}.csv");
    }

    /// <summary>Why parameters of the address are no times; null when they are, or absent.</summary>
    public static string? WhyNoTime(HttpRequest request, params ReadOnlySpan<string> names)
    {
        foreach (string name in names)
        {
            string? text = request.Query[name];
            if (!Rfc3339Converter.HasOffset(text)) return $"{name} is '{text}'; allowed: an RFC 3339 time with its offset, such as 2026-03-01T14:05:00Z.";
        }

        return null;
    }

    /// <summary>Tags the answer with the version of what it rests on; true when the one who asks has it already.</summary>
    public static bool IsKnown(HttpContext context, PlantInForce plant, long version, out bool csv)
    {
        csv = PrefersCsv(context.Request);
        var tag = new EntityTagHeaderValue($"\"{plant.RevisionId}-{version}{(csv ? "-csv" : "")}\"");
        context.Response.GetTypedHeaders().ETag = tag;
        context.Response.Headers.CacheControl = "no-cache";
        context.Response.Headers.Vary = "Accept";
        return context.Request.GetTypedHeaders().IfNoneMatch.Any(known => known.Equals(EntityTagHeaderValue.Any) || known.Compare(tag, useStrongComparison: false));
    }

    /// <summary>True when CSV is named and liked no less than JSON; whoever names neither gets JSON.</summary>
    private static bool PrefersCsv(HttpRequest request)
    {
        IList<MediaTypeHeaderValue> accepted = request.GetTypedHeaders().Accept;
        double Liking(string type) => accepted.Where(one => one.MediaType.Equals(type, StringComparison.OrdinalIgnoreCase)).Select(one => one.Quality ?? 1).DefaultIfEmpty(0).Max();
        double csv = Liking("text/csv");
        return csv > 0 && csv >= Liking("application/json");
    }
}
