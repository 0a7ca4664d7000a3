using System.Net;
using System.Text.Json;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Api;

public sealed class SiteTests(ApiService api) : IClassFixture<ApiService>
{
    [PostgreSqlFact]
    public async Task Site_TellsTheStateOfItsData()
    {
        SiteWire site = await api.Service.GetAsync<SiteWire>("/api/v1/site");
        Assert.Equal(("Fennholm", "Europe/Copenhagen", "live", 300, 0, 0), (site.Name, site.TimeZone, site.Readings, site.WindowS, site.ImportsRunning, site.DaysWaiting));
        Assert.Equal(ApiService.End.AddMinutes(-2), site.LatestReadingAt);
        Assert.InRange(site.Now, ApiService.End, ApiService.End.AddMinutes(10));
    }

    [PostgreSqlFact]
    public async Task Lines_HaveTheirEffectsInPlantFileOrder()
    {
        LineWire line = Assert.Single((await api.Service.GetAsync<LinesWire>("/api/v1/lines")).Lines);
        Assert.Equal(("north", "juice", "producing", "live"), (line.Name, line.Liquor, line.State, line.Readings));
        Assert.Equal(["N1", "N2", "N3", "N4"], line.Effects.Select(effect => effect.Name));
        Assert.Equal(142 / 3.6, line.RequiredEvaporationKgS!.Value, 1e-6);
        Assert.InRange(line.EvaporationKgS!.Value, 36, 46);
        Assert.Equal(ApiService.End, line.AsOf);
        LineWire same = await api.Service.GetAsync<LineWire>("/api/v1/lines/north");
        Assert.Equal(line.EvaporationKgS, same.EvaporationKgS);
    }

    [PostgreSqlFact]
    public async Task Effect_HasOneNumberForSentencePictureAndTable()
    {
        EffectWire effect = await api.Service.GetAsync<EffectWire>("/api/v1/lines/north/effects/N4");
        EffectNowWire now = effect.Now!;
        Assert.Null(now.Reason);
        Assert.Equal((ApiService.End.AddHours(-1), 1.0), (now.At, now.Hours));
        Assert.InRange(now.CoefficientWM2k!.Value, 880, 1050);
        Assert.Equal(now.CoefficientWM2k.Value / 980, now.Cleanliness!.Value, 1e-9);
        Assert.Equal((1 / now.CoefficientWM2k.Value) - (1 / 980.0), now.FoulingResistanceM2kW!.Value, 1e-12);
        Assert.Equal(now.DutyKw!.Value / 1350, now.HeatFluxKwM2!.Value, 1e-9);
        Assert.Equal(now.CoefficientWM2k.Value, now.DutyKw.Value * 1000 / 1350 / now.DrivingForceK!.Value, now.CoefficientWM2k.Value * 0.01);
        Assert.True(now.CoefficientURandom < now.CoefficientU);
        Assert.Equal((720.0, 900.0), (effect.Limits.CoefficientWM2k!.Value, effect.Limits.HoursSinceCleaning!.Value));
        Assert.Equal(0.7, effect.Limits.Cleanliness!.Value, 1e-12);
        Assert.Equal("not due", effect.Due.State);
        Assert.StartsWith("N4 is not due: coefficient ", effect.Due.Sentence);
        Assert.Equal(["coefficient", "cleanliness", "hours"], effect.Due.Evidence.Select(one => one.Limit));
    }

    [PostgreSqlFact]
    public async Task CleaningDue_ListsEveryEffect()
    {
        CleaningDueWire due = await api.Service.GetAsync<CleaningDueWire>("/api/v1/cleaning-due");
        Assert.Equal(["N1", "N2", "N3", "N4"], due.Effects.Select(effect => effect.Effect).Order());
    }

    [PostgreSqlFact]
    public async Task Signals_HaveTheirLastReading()
    {
        SignalsWire signals = await api.Service.GetAsync<SignalsWire>("/api/v1/signals");
        Assert.Equal(34, signals.Signals.Count);
        SignalWire feed = signals.Signals.Single(signal => signal.Name == "N.FT-10");
        Assert.Equal(("north", "t/h", "good"), (feed.Line, feed.Unit, feed.LatestQuality));
        Assert.Equal(ApiService.End.AddMinutes(-2), feed.LatestAt);
        Assert.InRange(feed.LatestValue!.Value, 100, 250);
        Assert.Empty(signals.Unknown);
    }

    [PostgreSqlFact]
    public async Task Plant_IsTheFileAsItCame()
    {
        PlantWire plant = await api.Service.GetAsync<PlantWire>("/api/v1/plant");
        Assert.Equal((1, ApiService.Plant), (plant.Revision, plant.Text));
    }

    [PostgreSqlFact]
    public async Task Times_GoOutInUtcWithZ()
    {
        using JsonDocument site = JsonDocument.Parse(await api.Http.GetStringAsync("/api/v1/site", TestContext.Current.CancellationToken));
        Assert.Equal("2026-03-03T23:58:00Z", site.RootElement.GetProperty("latest_reading_at").GetString());
    }

    [PostgreSqlTheory]
    [InlineData("/api/v1/lines/south", "There is no line 'south'; the plant file has north.")]
    [InlineData("/api/v1/lines/north/effects/N9", "Line north has no effect 'N9'; it has N1, N2, N3, N4.")]
    [InlineData("/api/v1/imports/none", "There is no import 'none'.")]
    [InlineData("/api/v1/nothing", "There is no such address; /openapi/v1.json describes those there are.")]
    [InlineData("/api/v2/site", "There is no such address; /openapi/v1.json describes those there are.")]
    public async Task UnknownAddress_IsNotFound(string path, string told) => Assert.Equal(told, await api.ProblemAsync(HttpStatusCode.NotFound, path));

    [PostgreSqlTheory]
    [InlineData("DELETE", "/api/v1/site", "GET, HEAD")]
    [InlineData("PUT", "/api/v1/cleanings", "GET, HEAD, POST")]
    [InlineData("POST", "/api/v1/lines/north/effects/N1", "GET, HEAD")]
    [InlineData("PATCH", "/api/v1/cleanings/01a2b3c4-0000-7000-8000-000000000000", "DELETE, PUT")]
    public async Task WrongMethod_IsToldWhichThereAre(string method, string path, string allowed)
    {
        using var request = new HttpRequestMessage(new HttpMethod(method), path);
        using HttpResponseMessage answer = await api.Http.SendAsync(request, TestContext.Current.CancellationToken);
        Assert.Equal((HttpStatusCode.MethodNotAllowed, allowed), (answer.StatusCode, string.Join(", ", answer.Content.Headers.Allow)));
    }

    [PostgreSqlTheory]
    [InlineData("/api/v1/site")]
    [InlineData("/api/v1/lines/north/effects/N1/trend")]
    [InlineData("/health/live")]
    public async Task Head_AnswersWithoutABody(string path)
    {
        using var request = new HttpRequestMessage(HttpMethod.Head, path);
        using HttpResponseMessage answer = await api.Http.SendAsync(request, TestContext.Current.CancellationToken);
        Assert.Equal(HttpStatusCode.OK, answer.StatusCode);
        Assert.Empty(await answer.Content.ReadAsByteArrayAsync(TestContext.Current.CancellationToken));
    }

    [PostgreSqlFact]
    public async Task Health_IsLiveAndReady()
    {
        foreach (string path in new[] { "/health/live", "/health/ready" })
        {
            using HttpResponseMessage answer = await api.Http.GetAsync(path, TestContext.Current.CancellationToken);
            Assert.Equal(HttpStatusCode.OK, answer.StatusCode);
        }
    }
}
