using System.Net;
using System.Net.Http.Json;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;
using Npgsql;

namespace EvapMonitor.Service.Tests.Api;

/// <summary>The log of instruments: what it moves, and that it can be taken back.</summary>
public sealed class InstrumentLogTests(ApiService api) : IClassFixture<ApiService>
{
    private const string Signal = "N1.FT-3";

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    private static DateTimeOffset Noon => ApiService.Start.AddHours(12);

    [PostgreSqlFact]
    public async Task Exclusion_RemovesTheReadingFromItsInterval_AndTakenBackGivesTheSameBits()
    {
        BalanceWire before = await BalanceAsync(Noon);
        Assert.NotNull(Reading(before));
        InstrumentEventWire entry = await LogAsync(Body("instrument-excluded", Noon.AddHours(-1), Noon.AddHours(1)), "exclude-1");
        await api.Service.EvaluatedAsync();
        BalanceWire without = await BalanceAsync(Noon);
        Assert.Null(Reading(without));
        Assert.NotNull(Reading(await BalanceAsync(Noon.AddHours(2))));
        Assert.Contains(entry, (await api.Service.GetAsync<InstrumentLogWire>($"/api/v1/instrument-log?signal={Signal}")).Events);

        using HttpResponseMessage gone = await api.Http.DeleteAsync($"/api/v1/instrument-log/{entry.Id}", Stop);
        Assert.Equal(HttpStatusCode.NoContent, gone.StatusCode);
        await api.Service.EvaluatedAsync();
        BalanceWire after = await BalanceAsync(Noon);
        Assert.Equal(before.ChiSquare, after.ChiSquare);
        Assert.Equal(before.Variables.Select(variable => variable.Reconciled), after.Variables.Select(variable => variable.Reconciled));
    }

    [PostgreSqlFact]
    public async Task Recalibration_MovesNoWindow()
    {
        await api.Service.EvaluatedAsync();
        BalanceWire before = await BalanceAsync(Noon);
        InstrumentEventWire entry = await LogAsync(Body("recalibration", Noon, null), "recalibrated-1");
        Assert.Equal((Noon, null), (entry.Start, entry.End));
        await api.Service.EvaluatedAsync();
        BalanceWire after = await BalanceAsync(Noon);
        Assert.Equal((before.ChiSquare, before.DataVersion), (after.ChiSquare, after.DataVersion));
    }

    [PostgreSqlFact]
    public async Task InstrumentThatHasMovedAgainstTheOthers_IsTold_UntilItIsRecalibrated()
    {
        // Two months of hours in which the others wanted to take 0.4 % off the reading, and nothing any more from 15 February on; days scatter by 0.02 %.
        await using (NpgsqlCommand past = api.Service.Database.CreateCommand(
            """
            INSERT INTO line_day (line_id, day, data_version, changed_at, shown_revision, model)
                SELECT 1, d, 1, now(), (SELECT max(revision_id) FROM plant_revision), 5 FROM generate_series(date '2026-01-05', '2026-03-01', '1 day') d ON CONFLICT DO NOTHING;
            INSERT INTO balance_hour (line_id, hour, revision_id, signal, n, difference)
                SELECT 1, h, (SELECT max(revision_id) FROM plant_revision), ARRAY['N4.DT-2'], ARRAY[12::smallint],
                    ARRAY[((CASE WHEN h < '2026-02-15Z' THEN -0.004 ELSE 0 END) + 0.0002 * sin(extract(doy FROM h) * 2.4))::real]
                FROM generate_series(timestamptz '2026-01-05Z', '2026-03-01T23:00Z', '1 hour') h
            """)) await past.ExecuteNonQueryAsync(Stop);
        SignalWire told = await SignalAsync();
        Assert.Matches(@"^reads 0\.\d+ % lower against the others than before$", told.Changed!.Words);
        Assert.InRange(told.Changed.Change, 0.3, 0.5);
        Assert.InRange(told.Changed.Since, new DateTimeOffset(2026, 2, 11, 0, 0, 0, TimeSpan.Zero), new DateTimeOffset(2026, 2, 17, 0, 0, 0, TimeSpan.Zero));

        await LogAsync("""{"signal":"N4.DT-2","kind":"recalibration","start":"2026-03-02T00:00:00Z"}""", "recalibrated-n4");
        Assert.Null((await SignalAsync()).Changed);
    }

    [PostgreSqlFact]
    public async Task SameKey_NeverLogsTwice_AndOverlapIsRefused()
    {
        string body = Body("instrument-excluded", Noon.AddHours(6), Noon.AddHours(7), "N2.FT-3");
        InstrumentEventWire first = await LogAsync(body, "twice");
        Assert.Equal(first.Id, (await LogAsync(body, "twice")).Id);
        Assert.Contains("overlaps", await RefusedAsync(HttpStatusCode.Conflict, Body("instrument-excluded", Noon.AddHours(6.5), null, "N2.FT-3"), "other"));
        Assert.Contains("needs a new key", await RefusedAsync(HttpStatusCode.UnprocessableEntity, Body("instrument-excluded", Noon.AddHours(9), null, "N2.FT-3"), "twice"));
    }

    [PostgreSqlTheory]
    [InlineData("""{"signal":"N9.XX-1","kind":"recalibration","start":"2026-03-02T12:00:00Z"}""", HttpStatusCode.NotFound, "There is no signal 'N9.XX-1'")]
    [InlineData("""{"signal":"N1.FT-3","kind":"broken","start":"2026-03-02T12:00:00Z"}""", HttpStatusCode.BadRequest, "allowed: instrument-excluded, recalibration")]
    [InlineData("""{"signal":"N1.FT-3","kind":"recalibration"}""", HttpStatusCode.BadRequest, "start is missing")]
    [InlineData("""{"signal":"N1.FT-3","kind":"recalibration","start":"2026-03-09T12:00:00Z"}""", HttpStatusCode.BadRequest, "in the future")]
    [InlineData("""{"signal":"N1.FT-3","kind":"recalibration","start":"2026-03-02T12:00:00Z","end":"2026-03-02T13:00:00Z"}""", HttpStatusCode.BadRequest, "leave end")]
    [InlineData("""{"signal":"N1.FT-3","kind":"instrument-excluded","start":"2026-03-02T12:00:00Z","end":"2026-03-02T11:00:00Z"}""", HttpStatusCode.BadRequest, "must be after start")]
    public async Task WrongEntry_SaysWhatAndWhatIsAllowed(string body, HttpStatusCode status, string words) => Assert.Contains(words, await RefusedAsync(status, body, "wrong"));

    private static string Body(string kind, DateTimeOffset start, DateTimeOffset? end, string signal = Signal) =>
        $$"""{"signal":"{{signal}}","kind":"{{kind}}","start":"{{start:O}}"{{(end is { } at ? $",\"end\":\"{at:O}\"" : "")}},"note":"span checked"}""";

    private async Task<SignalWire> SignalAsync() => (await api.Service.GetAsync<SignalsWire>("/api/v1/signals")).Signals.Single(signal => signal.Name == "N4.DT-2");

    private static double? Reading(BalanceWire balance) => balance.Variables.Single(variable => variable.Signals.Contains(Signal)).Measured;

    private Task<BalanceWire> BalanceAsync(DateTimeOffset at) => api.Service.GetAsync<BalanceWire>($"/api/v1/lines/north/balance?at={at.UtcDateTime:yyyy-MM-ddTHH:mm:ssZ}");

    private async Task<InstrumentEventWire> LogAsync(string body, string key)
    {
        using HttpResponseMessage answer = await api.Http.SendAsync(Post(body, key), Stop);
        Assert.True(answer.IsSuccessStatusCode, await answer.Content.ReadAsStringAsync(Stop));
        return (await answer.Content.ReadFromJsonAsync<InstrumentEventWire>(RunningService.Json, Stop))!;
    }

    private async Task<string> RefusedAsync(HttpStatusCode status, string body, string key)
    {
        using HttpRequestMessage request = Post(body, key);
        return await api.ProblemAsync(status, request);
    }

    private static HttpRequestMessage Post(string body, string key) => ApiService.Keyed(HttpMethod.Post, "/api/v1/instrument-log", body, key);
}
