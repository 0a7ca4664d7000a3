using System.Net;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Api;

/// <summary>The balance of a line whose feed flow begins to read a tenth too much.</summary>
public sealed class BalanceTests(FaultyService faulty) : IClassFixture<FaultyService>
{
    private const string Path = "/api/v1/lines/north/balance", FeedFlow = "N.FT-10";

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    private RunningService Service => faulty.Service;

    [PostgreSqlFact]
    public async Task InstrumentAtFault_IsLeftOut_AndTheOthersTellItsValue()
    {
        BalanceWire balance = await Service.GetAsync<BalanceWire>(Path);
        Assert.Equal(ApiService.End.AddMinutes(-5), balance.At);
        BalanceVariableWire feed = Of(balance, "feed_flow");
        Assert.Equal(("feed", "flow", "t/h", "checked by others"), (feed.Place, feed.What, feed.Unit, Of(balance, "product_flow").Class));
        Assert.Equal("follows from others", feed.Class);
        Assert.Equal($"{FeedFlow} left out", feed.Suspicion);
        Assert.InRange(feed.Measured!.Value / feed.Reconciled!.Value, 1.08, 1.12);
        Assert.Equal(feed.Reconciled!.Value - feed.Measured.Value, feed.Correction!.Value, 6);
        Assert.InRange(feed.Standard!.Value, 0.1, 5);
        SuspectsWire suspect = Assert.Single(balance.Suspects);
        Assert.True(suspect.LeftOut);
        Assert.Equal([FeedFlow], suspect.Signals);
        // It has to be suspect for an hour before it is left out.
        Assert.InRange((suspect.Since - FaultyService.Fault).TotalMinutes, 50, 90);
        Assert.Equal($"{FeedFlow} does not fit the other readings and is left out of the balance.", suspect.Sentence);
        Assert.True(balance.Fits);
        Assert.StartsWith("The readings fit together: chi-square ", balance.Check);
    }

    [PostgreSqlFact]
    public async Task EarlyInTheFault_ItIsNamed_AndTheReadingsDoNotFit()
    {
        BalanceWire balance = await Service.GetAsync<BalanceWire>($"{Path}?at={FaultyService.Fault.AddMinutes(32):yyyy-MM-ddTHH:mm:ssZ}");
        Assert.Equal(FaultyService.Fault.AddMinutes(30), balance.At);
        Assert.False(balance.Fits);
        FitWire fit = balance.Signals.Single(one => one.Signal == FeedFlow).Fit;
        Assert.Equal("does not fit", fit.State);
        Assert.InRange((fit.Since!.Value - FaultyService.Fault).TotalMinutes, -5, 15);
        double measured = Of(balance, "feed_flow").Measured!.Value;
        Assert.InRange(fit.Wanted!.Value / measured, -0.11, -0.07);
        Assert.Matches(@"^does not fit the others: the others want −\d+ t/h \(\d+\.\d standard uncertainties\)$", fit.Words);
    }

    [PostgreSqlFact]
    public async Task BeforeTheFault_EverythingFits_AndTemperaturesAreInTheirUnit()
    {
        BalanceWire balance = await Service.GetAsync<BalanceWire>($"{Path}?at=2026-03-02T10:00:00Z");
        Assert.Empty(balance.Suspects);
        // The laboratory's first sample of the day is not known yet.
        Assert.All(balance.Signals.Where(one => one.Signal != "N.LAB-90"), one => Assert.Contains(one.Fit.State, new[] { "fits", "not checked" }));
        Assert.Equal("fits the others", balance.Signals.Single(one => one.Signal == FeedFlow).Fit.Words);
        BalanceVariableWire boiling = Of(balance, "boiling_temperature N1");
        Assert.Equal("degC", boiling.Unit);
        Assert.InRange(boiling.Reconciled!.Value, 90, 130);
        Assert.All(balance.Variables.Where(one => one.Class == "cannot be told"), one => Assert.Null(one.Reconciled));
    }

    [PostgreSqlFact]
    public async Task SignalsAndNotices_SayTheSame()
    {
        SignalsWire signals = await Service.GetAsync<SignalsWire>("/api/v1/signals");
        FitWire fit = signals.Signals.Single(signal => signal.Name == FeedFlow).Fit!;
        Assert.Equal("left out", fit.State);
        Assert.StartsWith("left out of the balance: the others want −", fit.Words);
        NoticeWire notice = Assert.Single((await Service.GetAsync<SiteWire>("/api/v1/site")).Notices, one => one.Key == $"instruments/north/{FeedFlow}");
        Assert.Equal($"Line north: {FeedFlow} does not fit the other readings and is left out of the balance.", notice.Sentence);
        Assert.Equal(fit.Since, notice.Since);
    }

    [PostgreSqlFact]
    public async Task Corrections_ShowWhenItBegan_WithinThePointsAskedFor()
    {
        string path = $"/api/v1/signals/{FeedFlow}/corrections?from=2026-03-02T00:00:00Z&to=2026-03-04T00:00:00Z";
        CorrectionsWire whole = await Service.GetAsync<CorrectionsWire>(path);
        Assert.Equal((FeedFlow, "north", "t/h", 300), (whole.Signal, whole.Line, whole.Unit, whole.StepS));
        Assert.Equal(576, whole.Wanted.Count(one => one is not null));
        double[] before = [.. Enumerable.Range(0, whole.OffsetS.Count).Where(i => whole.Start.AddSeconds(whole.OffsetS[i]) < FaultyService.Fault).Select(i => whole.Wanted[i]!.Value)];
        Assert.InRange(before.Average(), -3, 3);
        Assert.InRange(whole.Wanted[^1]!.Value, -30, -10);
        Assert.Equal("left out", whole.Mark[^1]);
        CorrectionsWire thin = await Service.GetAsync<CorrectionsWire>(path + "&points=60");
        Assert.InRange(thin.Wanted.Count, 40, 63);
        Assert.Equal(whole.Wanted.Min(), thin.Wanted.Min());
        Assert.Equal(whole.Wanted.Max(), thin.Wanted.Max());
    }

    [PostgreSqlFact]
    public async Task Ways_CarryTheirFlowByBalance()
    {
        FlowSheetWire sheet = await Service.GetAsync<FlowSheetWire>("/api/v1/lines/north/flow-sheet");
        BalanceWire balance = await Service.GetAsync<BalanceWire>(Path);
        BalanceFlowWire Way(string from, string to) => sheet.Ways.Single(way => way.From == from && way.To == to && way.Kind != "vapour").Balance!;
        Assert.Equal(Of(balance, "feed_flow").Reconciled!.Value, Way("feed", "effect/N1").Value, 6);
        Assert.False(Way("feed", "effect/N1").Agrees);
        Assert.True(Way("effect/N4", "product").Agrees);
        Assert.Null(Way("effect/N1", "effect/N2").Agrees);
        Assert.Equal(Of(balance, "heating_flow N1 to N2").Reconciled!.Value, sheet.Ways.Single(way => way is { From: "effect/N1", To: "effect/N2", Kind: "vapour" }).Balance!.Value, 6);
        // What is left in a flash pot is no variable of its own.
        Assert.All(sheet.Ways.Where(way => !way.From.StartsWith("flash/", StringComparison.Ordinal)), way => Assert.InRange(way.Balance!.Value, 0.1, 300));
    }

    [PostgreSqlFact]
    public async Task Csv_AndEntityTag_AreAsForSeries()
    {
        using HttpResponseMessage answer = await AskAsync(Path, "text/csv");
        string[] rows = (await answer.Content.ReadAsStringAsync(Stop)).Split("\r\n", StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal("time,line,variable,unit,measured,reconciled,standard,correction_in_standards,class,suspect", rows[0]);
        Assert.Matches($"^2026-03-03T23:55:00Z,north,feed_flow,kg/s,[0-9.]+,[0-9.]+,[0-9.]+,-[0-9.]+,follows from others,{FeedFlow} left out$", rows[1]);
        using HttpResponseMessage again = await AskAsync(Path, "text/csv", answer.Headers.ETag!.Tag);
        Assert.Equal(HttpStatusCode.NotModified, again.StatusCode);
    }

    [PostgreSqlTheory]
    [InlineData(Path + "?at=2026-03-10T00:00:00Z", HttpStatusCode.NotFound, "Line north has no balance at 2026-03-10T00:00:00Z: no readings reach into that window.")]
    [InlineData(Path + "?at=2026-03-02T10:00:00", HttpStatusCode.BadRequest, "at is '2026-03-02T10:00:00'; allowed: an RFC 3339 time")]
    [InlineData("/api/v1/lines/south/balance", HttpStatusCode.NotFound, "There is no line 'south'")]
    [InlineData("/api/v1/signals/N.FT-99/corrections", HttpStatusCode.NotFound, "There is no signal 'N.FT-99' in the plant file.")]
    [InlineData("/api/v1/signals/N.FT-10/corrections?points=5", HttpStatusCode.BadRequest, "points is 5; allowed: 10 to 10000.")]
    [InlineData("/api/v1/signals/N.FT-10/corrections?from=2020-01-01T00:00:00Z", HttpStatusCode.BadRequest, "allowed: 400.")]
    public async Task WrongQuestion_IsToldWhatIsAllowed(string path, HttpStatusCode status, string told)
    {
        using HttpResponseMessage answer = await AskAsync(path, "application/json");
        string text = await answer.Content.ReadAsStringAsync(Stop);
        Assert.True(status == answer.StatusCode, text);
        using var problem = System.Text.Json.JsonDocument.Parse(text);
        Assert.Contains(told, problem.RootElement.GetProperty("detail").GetString());
    }

    private static BalanceVariableWire Of(BalanceWire balance, string variable) => balance.Variables.Single(one => one.Variable == variable);

    private async Task<HttpResponseMessage> AskAsync(string path, string accept, string? known = null)
    {
        using var request = new HttpRequestMessage(HttpMethod.Get, path);
        request.Headers.TryAddWithoutValidation("Accept", accept);
        if (known is not null) request.Headers.TryAddWithoutValidation("If-None-Match", known);
        return await Service.Http.SendAsync(request, Stop);
    }
}
