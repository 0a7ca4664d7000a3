using System.Net;
using System.Net.Http.Json;
using System.Text;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Api;

/// <summary>The log of cleanings. The present is 2026-04-20 12:00 UTC; the one effect's limit is 100 hours since its cleaning.</summary>
public sealed class CleaningTests(PostgresServer server) : IAsyncLifetime
{
    private RunningService? _service;

    private RunningService Service => _service!;

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    public async ValueTask InitializeAsync()
    {
        if (Prerequisites.HasPostgreSql) _service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
    }

    public async ValueTask DisposeAsync()
    {
        if (_service is not null) await _service.DisposeAsync();
    }

    [PostgreSqlFact]
    public async Task LoggedCleaning_IsListedNewestFirst()
    {
        (HttpStatusCode status, CleaningWire? first) = await LogAsync(Body("2026-04-10T06:00:00+02:00", "2026-04-10T10:00:00Z"), "k1");
        Assert.Equal(HttpStatusCode.Created, status);
        Assert.Equal(("one", "E1", "boil-out", "two passes"), (first!.Line, first.Effect, first.Kind, first.Note));
        Assert.Equal(new DateTimeOffset(2026, 4, 10, 4, 0, 0, TimeSpan.Zero), first.Start);
        await LogAsync(Body("2026-04-12T06:00:00Z", "2026-04-12T10:00:00Z"), "k2");
        IReadOnlyList<CleaningWire> listed = (await Service.GetAsync<CleaningsWire>("/api/v1/cleanings?line=one&effect=E1")).Cleanings;
        Assert.Equal([12, 10], listed.Select(cleaning => cleaning.Start.Day));
        Assert.Equal(first, listed[1]);
    }

    [PostgreSqlFact]
    public async Task OnlyTheNecessaryMembers_AreAsked()
    {
        (HttpStatusCode status, CleaningWire? running) = await LogAsync("""{"line":"one","effect":"E1","start":"2026-04-20T11:00:00Z","kind":"rinse"}""", "k1");
        Assert.Equal((HttpStatusCode.Created, null, ""), (status, running!.End, running.Note));
        EffectWire effect = await Service.GetAsync<EffectWire>("/api/v1/lines/one/effects/E1");
        Assert.Equal((running.Start, null), (effect.CleaningSince, effect.LastCleaning));
    }

    [PostgreSqlFact]
    public async Task SameKey_NeverLogsTwice()
    {
        string body = Body("2026-04-10T06:00:00.1234567Z", "2026-04-10T10:00:00Z");
        CleaningWire first = (await LogAsync(body, "k1")).Cleaning!;
        (HttpStatusCode status, CleaningWire? second) = await LogAsync(body, "k1");
        Assert.Equal((HttpStatusCode.OK, first.Id), (status, second!.Id));
        Assert.Contains("needs a new key", await RefusedAsync(HttpStatusCode.UnprocessableEntity, Body("2026-04-15T06:00:00Z", "2026-04-15T10:00:00Z"), "k1"));
        Assert.Single((await Service.GetAsync<CleaningsWire>("/api/v1/cleanings")).Cleanings);
    }

    [PostgreSqlFact]
    public async Task ManyAtOnce_LogOne()
    {
        var answers = await Task.WhenAll(Enumerable.Range(0, 8).Select(i => LogAsync(Body("2026-04-10T06:00:00Z", "2026-04-10T10:00:00Z"), i < 4 ? "same" : $"other-{i}")));
        Assert.Single(answers, answer => answer.Status == HttpStatusCode.Created);
        Assert.Single((await Service.GetAsync<CleaningsWire>("/api/v1/cleanings")).Cleanings);
    }

    [PostgreSqlTheory]
    [InlineData("2026-04-10T07:00:00Z", "2026-04-10T09:00:00Z", true)]
    [InlineData("2026-04-10T05:00:00Z", "2026-04-10T06:00:01Z", true)]
    [InlineData("2026-04-10T09:59:59Z", null, true)]
    [InlineData("2026-04-10T10:00:00Z", "2026-04-10T11:00:00Z", false)]
    [InlineData("2026-04-10T05:00:00Z", "2026-04-10T06:00:00Z", false)]
    public async Task Overlap_IsRefused_TouchingIsNot(string start, string? end, bool overlaps)
    {
        await LogAsync(Body("2026-04-10T06:00:00Z", "2026-04-10T10:00:00Z"), "k1");
        if (overlaps) Assert.StartsWith("It overlaps the cleaning of E1 from 2026-04-10T06:00:00", await RefusedAsync(HttpStatusCode.Conflict, Body(start, end), "k2"));
        else Assert.Equal(HttpStatusCode.Created, (await LogAsync(Body(start, end), "k2")).Status);
    }

    [PostgreSqlTheory]
    [InlineData("start", "\"2026-04-20T12:30:00Z\"", "is in the future")]
    [InlineData("start", "\"2025-08-01T00:00:00Z\"", "is before the plant file's history-from")]
    [InlineData("start", "null", "start is missing")]
    [InlineData("start", "\"last week\"", "The body's start, line 1, is not of the kind")]
    [InlineData("start", "\"2026-04-10T06:00:00\"", "The body's start, line 1, is not of the kind")]
    [InlineData("start", "17", "The body's start, line 1, is not of the kind")]
    [InlineData("end", "\"2026-04-10T06:00:00Z\"", "must be after start")]
    [InlineData("end", "\"2026-04-21T06:00:00Z\"", "must be after start and not in the future")]
    [InlineData("kind", "\" \"", "kind is missing or over 60 letters")]
    [InlineData("kind", "5", "The body's kind, line 1, is not of the kind")]
    [InlineData("colour", "\"red\"", "has a member 'colour' that is not known")]
    [InlineData("note", "{\"a\":{\"a\":{\"a\":{\"a\":{\"a\":{\"a\":{\"a\":{\"a\":{\"a\":{\"a\":{\"a\":{\"a\":{\"a\":{\"a\":{\"a\":{\"a\":1}}}}}}}}}}}}}}}}", "The body")]
    public async Task WrongMember_IsTold(string member, string value, string told)
    {
        var members = new Dictionary<string, string>
        {
            ["line"] = "\"one\"", ["effect"] = "\"E1\"", ["start"] = "\"2026-04-10T06:00:00Z\"", ["end"] = "\"2026-04-10T10:00:00Z\"", ["kind"] = "\"rinse\"", [member] = value,
        };
        Assert.Contains(told, await RefusedAsync(HttpStatusCode.BadRequest, "{" + string.Join(",", members.Select(pair => $"\"{pair.Key}\":{pair.Value}")) + "}", "k1"));
        Assert.Empty((await Service.GetAsync<CleaningsWire>("/api/v1/cleanings")).Cleanings);
    }

    [PostgreSqlFact]
    public async Task WrongBodies_AreRefused()
    {
        Assert.Contains("not sound JSON", await RefusedAsync(HttpStatusCode.BadRequest, "{\"line\":", "k1"));
        Assert.NotEmpty(await RefusedAsync(HttpStatusCode.BadRequest, "", "k1"));
        Assert.NotEmpty(await RefusedAsync(HttpStatusCode.BadRequest, "null", "k1"));
        Assert.Contains("Idempotency-Key", await RefusedAsync(HttpStatusCode.BadRequest, Body("2026-04-10T06:00:00Z", null), null));
        Assert.Contains("no line 'two'", await RefusedAsync(HttpStatusCode.NotFound, """{"line":"two"}""", "k1"));
        Assert.Contains("no effect 'E2'; it has E1", await RefusedAsync(HttpStatusCode.NotFound, """{"line":"one","effect":"E2"}""", "k1"));
        Assert.Contains("allowed: application/json", await RefusedAsync(HttpStatusCode.UnsupportedMediaType, Body("2026-04-10T06:00:00Z", null), "k1", "text/plain"));
        await RefusedAsync(HttpStatusCode.RequestEntityTooLarge, "{\"note\":\"" + new string('n', 1 << 20) + "\"}", "k1");
        using HttpResponseMessage filter = await Service.Http.GetAsync("/api/v1/cleanings?effect=E1", Stop);
        Assert.Equal(HttpStatusCode.BadRequest, filter.StatusCode);
    }

    [PostgreSqlFact]
    public async Task Withdrawn_IsGone_ButRecorded()
    {
        CleaningWire logged = (await LogAsync(Body("2026-04-10T06:00:00Z", "2026-04-10T10:00:00Z"), "k1")).Cleaning!;
        using (HttpResponseMessage answer = await Service.Http.DeleteAsync($"/api/v1/cleanings/{logged.Id}", Stop)) Assert.Equal(HttpStatusCode.NoContent, answer.StatusCode);
        using (HttpResponseMessage answer = await Service.Http.DeleteAsync($"/api/v1/cleanings/{logged.Id}", Stop)) Assert.Equal(HttpStatusCode.NotFound, answer.StatusCode);
        using (HttpResponseMessage answer = await Service.Http.DeleteAsync("/api/v1/cleanings/x", Stop)) Assert.Equal(HttpStatusCode.NotFound, answer.StatusCode);
        Assert.Empty((await Service.GetAsync<CleaningsWire>("/api/v1/cleanings")).Cleanings);
        Assert.Equal(1, await Service.CountAsync("SELECT count(*) FROM cleaning WHERE withdrawn_at IS NOT NULL"));
        Assert.Equal(HttpStatusCode.Created, (await LogAsync(Body("2026-04-10T07:00:00Z", "2026-04-10T09:00:00Z"), "k2")).Status);
    }

    [PostgreSqlFact]
    public async Task Cleaning_TakesTheDueFlagDown()
    {
        async Task<DueWire> DueAsync() => (await Service.GetAsync<CleaningDueWire>("/api/v1/cleaning-due")).Effects.Single().Due;
        Assert.Equal("unknown", (await DueAsync()).State);
        await LogAsync(Body("2026-04-10T06:00:00Z", "2026-04-10T10:00:00Z"), "k1");
        DueWire due = await DueAsync();
        Assert.Equal(("due", "hours", "E1 is due for cleaning: 242 h since the last one, limit 100 h."), (due.State, due.Limit, due.Sentence));
        Assert.Equal(new DateTimeOffset(2026, 4, 14, 14, 0, 0, TimeSpan.Zero), due.Since);
        await LogAsync(Body("2026-04-19T06:00:00Z", "2026-04-19T10:00:00Z"), "k2");
        Assert.Equal(("not due", "E1 is not due: time since cleaning 26 h, limit 100 h."), ((await DueAsync()).State, (await DueAsync()).Sentence));
    }

    [PostgreSqlFact]
    public async Task Cleaning_HasItsDaysComputedAnew()
    {
        await Service.ImportAsync("time,FT-1\n" + string.Concat(Enumerable.Range(9, 3).Select(day => $"2026-04-{day:00}T08:00:00Z,60\n")));
        await Service.EvaluatedAsync();
        CleaningWire logged = (await LogAsync(Body("2026-04-10T06:00:00Z", "2026-04-10T10:00:00Z"), "k1")).Cleaning!;
        await Service.EvaluatedAsync();
        const string states = "SELECT string_agg(DISTINCT to_char(at, 'DD') || ':' || state, ' ' ORDER BY to_char(at, 'DD') || ':' || state) FROM effect_window WHERE at = date_trunc('day', at, 'UTC') + interval '8 hours'";
        string cleaning = ((int)Core.Coefficients.RunningState.Cleaning).ToString(), producing = ((int)Core.Coefficients.RunningState.WaterRun).ToString();
        Assert.Equal($"09:{producing} 10:{cleaning} 11:{producing}", await Service.TextAsync(states));
        using (HttpResponseMessage answer = await Service.Http.DeleteAsync($"/api/v1/cleanings/{logged.Id}", Stop)) answer.EnsureSuccessStatusCode();
        await Service.EvaluatedAsync();
        Assert.Equal($"09:{producing} 10:{producing} 11:{producing}", await Service.TextAsync(states));
    }

    private static string Body(string start, string? end) =>
        $$"""{"line":"one","effect":"E1","start":"{{start}}","end":{{(end is null ? "null" : $"\"{end}\"")}},"kind":"boil-out","note":"two passes"}""";

    private async Task<HttpResponseMessage> SendAsync(string body, string? key, string type = "application/json")
    {
        using var request = new HttpRequestMessage(HttpMethod.Post, "/api/v1/cleanings") { Content = new StringContent(body, Encoding.UTF8, type) };
        if (key is not null) request.Headers.Add("Idempotency-Key", key);
        // The service refuses a large body by its length; without this it may hang up while the body is still on its way.
        request.Headers.ExpectContinue = body.Length > 1 << 16;
        return await Service.Http.SendAsync(request, Stop);
    }

    private async Task<(HttpStatusCode Status, CleaningWire? Cleaning)> LogAsync(string body, string key)
    {
        using HttpResponseMessage answer = await SendAsync(body, key);
        return (answer.StatusCode, answer.IsSuccessStatusCode ? await answer.Content.ReadFromJsonAsync<CleaningWire>(RunningService.Json, Stop) : null);
    }

    private async Task<string> RefusedAsync(HttpStatusCode status, string body, string? key, string type = "application/json")
    {
        using HttpResponseMessage answer = await SendAsync(body, key, type);
        string text = await answer.Content.ReadAsStringAsync(Stop);
        Assert.True(status == answer.StatusCode, $"{(int)answer.StatusCode} {text}");
        using var problem = System.Text.Json.JsonDocument.Parse(text);
        return problem.RootElement.GetProperty("detail").GetString()!;
    }
}
