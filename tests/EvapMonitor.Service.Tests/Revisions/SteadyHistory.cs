using System.Globalization;
using System.Net.Http.Headers;
using System.Net.Http.Json;
using System.Text;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Revisions;

/// <summary>Days of the small plant in which nothing changes, so that every coefficient is alike; and what the tests of revisions ask of the service.</summary>
internal static class SteadyHistory
{
    /// <summary>The first day.</summary>
    public static readonly DateTimeOffset Start = new(2026, 4, 14, 0, 0, 0, TimeSpan.Zero);

    /// <summary>The columns of its files.</summary>
    public const string Header = "time,FT-1,TT-1,DT-1,FT-2,PT-2,PT-1\n";

    /// <summary>The small plant with another area, on juice, so that it is in production.</summary>
    public static string Plant(int area = 100) => SmallPlant.Text
        .Replace("area: 100 m2", $"area: {area} m2", StringComparison.Ordinal)
        .Replace("lines:\n", "liquors: {juice: {kind: sucrose, purity: 91 %}}\nlines:\n", StringComparison.Ordinal)
        .Replace("liquor: water", "liquor: juice", StringComparison.Ordinal)
        .Replace("    feed:\n", "    feed:\n      solids: {signal: DT-1, unit: \"%\"}\n", StringComparison.Ordinal);

    /// <summary>A reading of each signal every two minutes. The last ones reach into one more day, which has a few windows.</summary>
    public static string Days(int days)
    {
        var text = new StringBuilder(Header);
        for (DateTimeOffset at = Start; at < Start.AddDays(days); at = at.AddMinutes(2)) text.Append(Row(at));
        return text.ToString();
    }

    public static string Row(DateTimeOffset at, string feed = "60") => string.Create(CultureInfo.InvariantCulture, $"{at:yyyy-MM-ddTHH:mm:ssZ},{feed},80,15,20,1.5,1.1\n");

    /// <summary>Sends a plant file.</summary>
    public static async Task<HttpResponseMessage> PostPlantAsync(this HttpClient http, string text, string? from = null, string? key = null)
    {
        using var request = new HttpRequestMessage(HttpMethod.Post, "/api/v1/plant/revisions" + (from is null ? "" : "?in_force_from=" + Uri.EscapeDataString(from)));
        request.Content = new StringContent(text, Encoding.UTF8, "application/yaml");
        if (key is not null) request.Headers.Add("Idempotency-Key", key);
        return await http.SendAsync(request, TestContext.Current.CancellationToken);
    }

    /// <summary>Sends a plant file that must be taken.</summary>
    public static async Task<AcceptedRevisionWire> AcceptAsync(this HttpClient http, string text, DateTimeOffset? from = null)
    {
        using HttpResponseMessage answer = await http.PostPlantAsync(text, from?.ToString("yyyy-MM-ddTHH:mm:ssZ", CultureInfo.InvariantCulture));
        Assert.True(answer.IsSuccessStatusCode, await answer.Content.ReadAsStringAsync(TestContext.Current.CancellationToken));
        return (await answer.Content.ReadFromJsonAsync<AcceptedRevisionWire>(RunningService.Json, TestContext.Current.CancellationToken))!;
    }

    /// <summary>Sends a request without a body, or with a JSON one, to an address that answers with a recomputation.</summary>
    public static async Task<RecomputationWire> RecomputationAsync(this HttpClient http, string path, string json = "")
    {
        using var body = new StringContent(json, new MediaTypeHeaderValue("application/json"));
        using HttpResponseMessage answer = await http.PostAsync("/api/v1/recomputations" + path, json.Length == 0 ? null : body, TestContext.Current.CancellationToken);
        Assert.True(answer.IsSuccessStatusCode, await answer.Content.ReadAsStringAsync(TestContext.Current.CancellationToken));
        return (await answer.Content.ReadFromJsonAsync<RecomputationWire>(RunningService.Json, TestContext.Current.CancellationToken))!;
    }

    /// <summary>Waits until a recomputation is done.</summary>
    public static Task<RecomputationWire> RecomputedAsync(this RunningService service, int id) => Poll.UntilAsync("the end of the recomputation", async () =>
        await service.GetAsync<RecomputationWire>($"/api/v1/recomputations/{id}") is { State: "done" } done ? done : null, 60);

    /// <summary>The coefficients of a day by window, as they are shown.</summary>
    public static async Task<double[]> CoefficientsAsync(this RunningService service, DateTimeOffset day, string more = "")
    {
        TrendWire trend = await service.GetAsync<TrendWire>($"/api/v1/lines/one/effects/E1/trend?from={day:yyyy-MM-ddTHH:mm:ssZ}&to={day.AddDays(1):yyyy-MM-ddTHH:mm:ssZ}{more}");
        return [.. trend.Value.OfType<double>()];
    }
}
