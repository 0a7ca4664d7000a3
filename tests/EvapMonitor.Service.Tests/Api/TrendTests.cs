using System.Net;
using EvapMonitor.Service.Api;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;
using EvapMonitor.Service.Wording;

namespace EvapMonitor.Service.Tests.Api;

public sealed class TrendTests(ApiService api) : IClassFixture<ApiService>
{
    private const string Path = "/api/v1/lines/north/effects/N4/trend";
    private const string Span = "from=2026-03-02T00:00:00Z&to=2026-03-04T00:00:00Z";

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    [PostgreSqlFact]
    public async Task Windows_ComeAsColumns()
    {
        TrendWire trend = await api.Service.GetAsync<TrendWire>($"{Path}?{Span}");
        Assert.Equal(("north", "N4", "coefficient", "W/(m2.K)", "window", 300), (trend.Line, trend.Effect, trend.Quantity, trend.Unit, trend.Resolution, trend.StepS));
        Assert.Equal(ApiService.Start, trend.Start);
        Assert.Equal(576, trend.Value.Count);
        Assert.Equal(Enumerable.Range(0, 576).Select(i => 300L * i), trend.OffsetS);
        Assert.All([trend.U.Count, trend.URandom.Count, trend.Mark.Count, trend.Reason.Count, trend.Steady.Count], count => Assert.Equal(576, count));
        // The demo's last effect has 980 W/(m²·K) clean and fouls from its first day on; the uncertainty of one window is a few per cent.
        Assert.All(trend.Value.OfType<double>(), value => Assert.InRange(value, 850, 1100));
        Assert.All(trend.U.OfType<double>(), u => Assert.InRange(u, 1, 120));
    }

    [PostgreSqlTheory]
    [InlineData("cleanliness", "1", 0.85, 1.15)]
    [InlineData("fouling_resistance", "m2.K/W", -1.5e-4, 2e-4)]
    [InlineData("clean_coefficient", "W/(m2.K)", 980, 980)]
    [InlineData("driving_force", "K", 5, 40)]
    [InlineData("duty", "kW", 10_000, 60_000)]
    [InlineData("heat_flux", "kW/m2", 8, 45)]
    [InlineData("heating_temperature", "degC", 60, 130)]
    [InlineData("boiling_temperature", "degC", 55, 110)]
    [InlineData("elevation", "K", 0.5, 6)]
    public async Task EveryQuantity_HasItsUnitAndSize(string quantity, string unit, double low, double high)
    {
        TrendWire trend = await api.Service.GetAsync<TrendWire>($"{Path}?{Span}&quantity={quantity}");
        Assert.Equal(unit, trend.Unit);
        Assert.All(trend.Value.OfType<double>(), value => Assert.InRange(value, low, high));
        Assert.True(trend.Value.Count(value => value is not null) > 500);
    }

    [PostgreSqlFact]
    public async Task LongSpans_ComeByTheHour()
    {
        TrendWire trend = await api.Service.GetAsync<TrendWire>($"{Path}?from=2026-01-20T00:00:00Z&to=2026-03-04T00:00:00Z");
        Assert.Equal(("hour", 3600, 48), (trend.Resolution, trend.StepS, trend.Value.Count));
    }

    [PostgreSqlFact]
    public async Task ThinnedSeries_KeepsItsExtremes()
    {
        TrendWire all = await api.Service.GetAsync<TrendWire>($"{Path}?{Span}"), thin = await api.Service.GetAsync<TrendWire>($"{Path}?{Span}&points=50");
        Assert.InRange(thin.Value.Count, 20, 50);
        Assert.Equal((all.Value.Min(), all.Value.Max()), (thin.Value.Min(), thin.Value.Max()));
    }

    [PostgreSqlTheory]
    [InlineData("points=9", "points is 9; allowed: 10 to 10000.")]
    [InlineData("points=10001", "points is 10001; allowed: 10 to 10000.")]
    [InlineData("points=many", "points is 'many'; allowed: a whole number.")]
    [InlineData("quantity=beauty", "quantity 'beauty' is not known; allowed: coefficient, clean_coefficient, cleanliness,")]
    [InlineData("from=yesterday", "from is 'yesterday'; allowed: an RFC 3339 time such as 2026-03-01T14:05:00Z.")]
    [InlineData("from=2026-03-01T10:00:00", "from is '2026-03-01T10:00:00'; allowed: an RFC 3339 time with its offset")]
    [InlineData("from=2026-03-03T00:00:00Z&to=2026-03-03T00:00:00Z", "must be before to")]
    [InlineData("from=2010-01-01T00:00:00Z&to=2026-03-03T00:00:00Z", "The span is 5905 days; allowed: 3660.")]
    public async Task WrongQuestion_IsToldWhatIsAllowed(string question, string told) =>
        Assert.Contains(told, await api.ProblemAsync(HttpStatusCode.BadRequest, $"{Path}?{question}"));

    [PostgreSqlFact]
    public async Task UnknownNames_AreToldWhichThereAre()
    {
        Assert.Equal("There is no line 'south'; the plant file has north.", await api.ProblemAsync(HttpStatusCode.NotFound, "/api/v1/lines/south/effects/N4/trend"));
        Assert.Equal("Line north has no effect 'N9'; it has N1, N2, N3, N4.", await api.ProblemAsync(HttpStatusCode.NotFound, "/api/v1/lines/north/effects/N9/trend"));
    }

    [PostgreSqlTheory]
    [InlineData("text/csv", true)]
    [InlineData("text/csv, */*;q=0.1", true)]
    [InlineData("application/json;q=0.5, text/csv", true)]
    [InlineData("application/json, text/csv;q=0.5", false)]
    [InlineData("text/csv;q=0, */*", false)]
    [InlineData("*/*", false)]
    [InlineData("text/html", false)]
    public async Task Accept_Decides(string accept, bool csv)
    {
        using HttpResponseMessage answer = await AskAsync($"{Path}?{Span}", accept);
        Assert.Equal(csv ? "text/csv" : "application/json", answer.Content.Headers.ContentType?.MediaType);
    }

    [PostgreSqlFact]
    public async Task Csv_HoldsTheSameNumbers()
    {
        TrendWire trend = await api.Service.GetAsync<TrendWire>($"{Path}?{Span}");
        using HttpResponseMessage answer = await AskAsync($"{Path}?{Span}", "text/csv");
        string[] rows = (await answer.Content.ReadAsStringAsync(Stop)).Split("\r\n", StringSplitOptions.RemoveEmptyEntries);
        Assert.Equal("north-N4-coefficient.csv", answer.Content.Headers.ContentDisposition?.FileName);
        Assert.Equal("time,line,effect,quantity,unit,value,u,u_random,mark,reason,steady", rows[0]);
        Assert.Equal(577, rows.Length);
        Assert.Equal(FormattableString.Invariant($"2026-03-02T01:00:00Z,north,N4,coefficient,W/(m2.K),{trend.Value[12]},{trend.U[12]},{trend.URandom[12]},,,"), rows[13]);
    }

    [Theory]
    [InlineData("plain", "plain")]
    [InlineData("=1+1", "'=1+1")]
    [InlineData("+1", "'+1")]
    [InlineData("-1", "'-1")]
    [InlineData("@SUM(A1)", "'@SUM(A1)")]
    [InlineData("=HYPERLINK(\"http://x\",\"y\")", "\"'=HYPERLINK(\"\"http://x\"\",\"\"y\"\")\"")]
    [InlineData("a,b", "\"a,b\"")]
    [InlineData("\tx", "'\tx")]
    public void Cell_IsNeverAFormula(string text, string cell) => Assert.Equal(cell, Csv.Cell(text));

    [PostgreSqlFact]
    public async Task EntityTag_SparesWhatHasNotChanged()
    {
        using HttpResponseMessage first = await AskAsync($"{Path}?{Span}", "application/json");
        string tag = first.Headers.ETag!.Tag;
        foreach (string known in new[] { tag, $"\"other\", {tag}", "W/" + tag, "*" })
        {
            using HttpResponseMessage second = await AskAsync($"{Path}?{Span}", "application/json", known);
            Assert.Equal((HttpStatusCode.NotModified, tag), (second.StatusCode, second.Headers.ETag?.Tag));
            Assert.Empty(await second.Content.ReadAsByteArrayAsync(Stop));
        }

        using HttpResponseMessage csv = await AskAsync($"{Path}?{Span}", "text/csv", tag);
        Assert.Equal(HttpStatusCode.OK, csv.StatusCode);
    }

    private async Task<HttpResponseMessage> AskAsync(string path, string accept, string? known = null)
    {
        using var request = new HttpRequestMessage(HttpMethod.Get, path);
        request.Headers.TryAddWithoutValidation("Accept", accept);
        if (known is not null) request.Headers.TryAddWithoutValidation("If-None-Match", known);
        return await api.Http.SendAsync(request, Stop);
    }
}
