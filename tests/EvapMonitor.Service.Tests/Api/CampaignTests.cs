using System.Net;
using System.Net.Http.Json;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Api;

/// <summary>Campaigns and cleanings of a line with two days of history, in which nothing was cleaned: what is logged ends one campaign and begins another.</summary>
public sealed class CampaignTests(ApiService api) : IClassFixture<ApiService>
{
    private const string Path = "/api/v1/lines/north/effects/N2/campaigns";

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    [PostgreSqlFact]
    public async Task LoggedCleaning_PartsTheCampaigns_AndWithdrawnGivesTheSameBits()
    {
        CampaignsWire before = await api.Service.GetAsync<CampaignsWire>(Path);
        CampaignWire only = Assert.Single(before.Campaigns);
        Assert.Equal(("N2", "N2", "first data", null), (before.Surface, only.Surface, only.StartedBy, only.End));
        Assert.InRange(only.ProductionHours, 40, 48);
        Assert.StartsWith("design value", Assert.Single(before.CleanReferences).Source);
        string bits = await BitsAsync();

        DateTimeOffset start = ApiService.Start.AddHours(20), end = ApiService.Start.AddHours(24);
        CleaningWire logged = await SendAsync(HttpMethod.Post, "/api/v1/cleanings", Body("N2", start, end), "campaign-1");
        await api.Service.SurfacesAsync();
        CampaignsWire parted = await api.Service.GetAsync<CampaignsWire>(Path);
        Assert.Equal([("logged", end, (DateTimeOffset?)null), ("first data", only.Start, start)], parted.Campaigns.Select(one => (one.StartedBy, one.Start, one.End)));
        // Nothing was cleaned: the clean expectation is now the level after it, and what it removed is nothing.
        CleaningWire listed = (await api.Service.GetAsync<CleaningsWire>("/api/v1/cleanings?line=north&effect=N2")).Cleanings.Single(one => one.Id == logged.Id);
        Assert.Equal(("logged", "N2"), (listed.KnownBy, listed.Result!.Surface));
        Assert.Contains(listed.Result.Verdict, new[] { "did not clean", "cannot be told" });
        EffectWire effect = await api.Service.GetAsync<EffectWire>("/api/v1/lines/north/effects/N2");
        Assert.Equal(("logged", end), (effect.Campaign!.StartedBy, effect.LastCleaning!.End!.Value));

        // Corrected: it took two hours more.
        CleaningWire corrected = await SendAsync(HttpMethod.Put, $"/api/v1/cleanings/{logged.Id}", Body("N2", start, end.AddHours(2)), "campaign-2");
        Assert.NotEqual(logged.Id, corrected.Id);
        Assert.Equal(corrected.Id, (await SendAsync(HttpMethod.Put, $"/api/v1/cleanings/{logged.Id}", Body("N2", start, end.AddHours(2)), "campaign-2")).Id);
        await api.Service.SurfacesAsync();
        Assert.Equal(end.AddHours(2), (await api.Service.GetAsync<CampaignsWire>(Path)).Campaigns[0].Start);

        using HttpResponseMessage gone = await api.Http.DeleteAsync($"/api/v1/cleanings/{corrected.Id}", Stop);
        Assert.Equal(HttpStatusCode.NoContent, gone.StatusCode);
        await api.Service.SurfacesAsync();
        Assert.Equal(bits, await BitsAsync());
    }

    [PostgreSqlFact]
    public async Task Recalibration_EndsTheBaselineOfTheEffectsBehindWhichItStands()
    {
        using var request = ApiService.Keyed(HttpMethod.Post, "/api/v1/instrument-log", """{"signal":"N4.DT-2","kind":"recalibration","start":"2026-03-03T00:00:00Z"}""", "recalibrated");
        using HttpResponseMessage answer = await api.Http.SendAsync(request, Stop);
        Assert.Equal(HttpStatusCode.Created, answer.StatusCode);
        await api.Service.SurfacesAsync();
        CampaignsWire near = await api.Service.GetAsync<CampaignsWire>("/api/v1/lines/north/effects/N4/campaigns"), far = await api.Service.GetAsync<CampaignsWire>("/api/v1/lines/north/effects/N1/campaigns");
        Assert.Contains(near.CleanReferences, one => one.Source.Contains("changed, on 2026-03-03", StringComparison.Ordinal));
        Assert.DoesNotContain(far.CleanReferences, one => one.Source.Contains("recalibrated", StringComparison.Ordinal));
    }

    [PostgreSqlFact]
    public async Task Rejection_IsKeptInTheLog_AndAsksForItsEnd()
    {
        DateTimeOffset start = ApiService.Start.AddHours(30);
        CleaningWire kept = await SendAsync(
            HttpMethod.Post, "/api/v1/cleanings", $$"""{"line":"north","effect":"N3","start":"{{start:O}}","end":"{{start.AddHours(1):O}}","rejected":true}""", "rejected-1");
        Assert.Equal("rejected", kept.KnownBy);
        Assert.Null((await api.Service.GetAsync<EffectWire>("/api/v1/lines/north/effects/N3")).LastCleaning);
        using var request = ApiService.Keyed(HttpMethod.Post, "/api/v1/cleanings", $$"""{"line":"north","effect":"N3","start":"{{start:O}}","rejected":true}""", "rejected-2");
        Assert.Contains("end is missing", await api.ProblemAsync(HttpStatusCode.BadRequest, request));
        using var body = ApiService.Keyed(HttpMethod.Post, "/api/v1/cleanings", $$"""{"line":"north","effect":"N3","start":"{{start:O}}","kind":"rinse","body":"B7"}""", "rejected-3");
        Assert.Contains("has no body 'B7'", await api.ProblemAsync(HttpStatusCode.BadRequest, body));
    }

    [PostgreSqlFact]
    public async Task CleanTrend_ByHourAndByWindow_SaysTheSame()
    {
        // Ten days and less come by window, more by the hour. An hour is the mean of its steady windows, of which a few may be missing: a window scatters by some 0.5 %, twelve by a third of that.
        TrendWire windows = await api.Service.GetAsync<TrendWire>("/api/v1/lines/north/effects/N1/trend?quantity=cleanliness&from=2026-03-02T06:00:00Z&to=2026-03-02T07:00:00Z");
        TrendWire hours = await api.Service.GetAsync<TrendWire>("/api/v1/lines/north/effects/N1/trend?quantity=cleanliness&from=2026-02-01T00:00:00Z&to=2026-03-04T00:00:00Z&points=10000");
        double hour = hours.Value[hours.OffsetS.ToList().IndexOf((long)(new DateTimeOffset(2026, 3, 2, 6, 0, 0, TimeSpan.Zero) - hours.Start).TotalSeconds)]!.Value;
        Assert.Equal(hour, windows.Value.Average()!.Value, 0.002);
    }

    private Task<string> BitsAsync() => api.Service.TextAsync(
        "SELECT md5(string_agg(md5(h::text), '' ORDER BY hour)) FROM clean_hour h WHERE effect_id = (SELECT effect_id FROM effect WHERE name = 'N2')");

    private static string Body(string effect, DateTimeOffset start, DateTimeOffset end) => $$"""{"line":"north","effect":"{{effect}}","start":"{{start:O}}","end":"{{end:O}}","kind":"boil-out"}""";

    private async Task<CleaningWire> SendAsync(HttpMethod method, string path, string body, string key)
    {
        using HttpRequestMessage request = ApiService.Keyed(method, path, body, key);
        using HttpResponseMessage answer = await api.Http.SendAsync(request, Stop);
        Assert.True(answer.IsSuccessStatusCode, await answer.Content.ReadAsStringAsync(Stop));
        return (await answer.Content.ReadFromJsonAsync<CleaningWire>(RunningService.Json, Stop))!;
    }
}
