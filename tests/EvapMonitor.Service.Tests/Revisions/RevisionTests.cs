using System.Net;
using System.Text.Json;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Tests.Support;
using Microsoft.Extensions.DependencyInjection;

namespace EvapMonitor.Service.Tests.Revisions;

/// <summary>Plant revisions over time.</summary>
public sealed class RevisionTests(PostgresServer server)
{
    private static readonly DateTimeOffset Change = SteadyHistory.Start.AddDays(2);

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    [PostgreSqlFact]
    public async Task AreaDoubledFromADay_HalvesTheCoefficientFromThatDayOnly()
    {
        await using RunningService service = await StartAsync();
        double[] before = await service.CoefficientsAsync(SteadyHistory.Start.AddDays(1));
        Assert.Equal(288, before.Length);
        AcceptedRevisionWire accepted = await service.Http.AcceptAsync(SteadyHistory.Plant(200), Change);
        Assert.Equal((2, true, "in force", 3), (accepted.Revision.Revision, accepted.IsNew, accepted.Revision.State, accepted.Recomputation!.DaysTotal));
        RecomputationWire done = await service.RecomputedAsync(accepted.Recomputation.Id);
        Assert.Equal(("plant revision", 2, 3, 0), (done.Cause, done.Revision, done.DaysDone, done.DaysLeft));
        Assert.Equal((new DateOnly(2026, 4, 16), new DateOnly(2026, 4, 18)), (done.From, done.To));
        Assert.Equal(before, await service.CoefficientsAsync(SteadyHistory.Start.AddDays(1)));
        foreach (int day in new[] { 2, 3 })
        {
            double[] after = await service.CoefficientsAsync(SteadyHistory.Start.AddDays(day));
            Assert.Equal(288, after.Length);
            Assert.All(after, value => Assert.Equal(before[100] / 2, value, 6));
            Assert.All(await service.CoefficientsAsync(SteadyHistory.Start.AddDays(day), "&revision=1"), value => Assert.Equal(before[100], value, 6));
        }

        Assert.Empty(await service.CoefficientsAsync(SteadyHistory.Start, "&revision=2"));
        RevisionsWire all = await service.GetAsync<RevisionsWire>("/api/v1/plant/revisions");
        Assert.Equal([(2, "in force", 3), (1, "past", 2)], all.Revisions.Select(one => (one.Revision, one.State, one.DaysComputed)));
        Assert.Equal(((DateTimeOffset?)null, (DateTimeOffset?)Change), (all.Revisions[0].InForceUntil, all.Revisions[1].InForceUntil));
        Assert.Equal(2, (await service.GetAsync<SiteWire>("/api/v1/site")).PlantRevision);
        Assert.Contains("area: 200 m2", (await service.GetAsync<PlantWire>("/api/v1/plant")).Text);
        Assert.Contains("area: 100 m2", (await service.GetAsync<PlantWire>("/api/v1/plant/revisions/1")).Text);
    }

    [PostgreSqlFact]
    public async Task EachRevision_IsComparedWithItsOwnCleanCoefficient()
    {
        await using RunningService service = await StartAsync();
        await service.Http.AcceptAsync(SteadyHistory.Plant().Replace("2000 W/(m2.K)", "1000 W/(m2.K)"), Change);
        await service.EvaluatedAsync();
        double[] old = await service.CoefficientsAsync(Change, "&quantity=clean_coefficient&revision=1"), now = await service.CoefficientsAsync(Change, "&quantity=clean_coefficient&revision=2");
        Assert.Equal((288, 288), (old.Length, now.Length));
        Assert.All(old, value => Assert.Equal(2000, value));
        Assert.All(now, value => Assert.Equal(1000, value));
    }

    [PostgreSqlFact]
    public async Task LateReading_IsEvaluatedUnderTheRevisionOfItsDay()
    {
        await using RunningService service = await StartAsync();
        await service.Http.AcceptAsync(SteadyHistory.Plant(200), Change);
        await service.EvaluatedAsync();
        string late = SteadyHistory.Header + SteadyHistory.Row(Change.AddHours(-12).AddMinutes(1), "61") + SteadyHistory.Row(Change.AddHours(12).AddMinutes(1), "61");
        Assert.Equal(12, (await service.ImportAsync(late)).Accepted);
        await service.EvaluatedAsync();
        Assert.Equal("1 288,1 288,2 288,2 288,2 3", await service.TextAsync(
            """
            SELECT string_agg(revision_id || ' ' || n, ',' ORDER BY day) FROM (
                SELECT w.revision_id, date_trunc('day', at, 'UTC') AS day, count(*) n FROM line_window w
                JOIN line_day d ON d.day = (w.at AT TIME ZONE 'UTC')::date AND d.shown_revision = w.revision_id GROUP BY 1, 2) shown
            """));
    }

    [PostgreSqlFact]
    public async Task RevisionBeforeAnother_HoldsUpToItsStart()
    {
        await using RunningService service = await StartAsync();
        await service.Http.AcceptAsync(SteadyHistory.Plant(200), SteadyHistory.Start.AddDays(3));
        await service.EvaluatedAsync();
        AcceptedRevisionWire middle = await service.Http.AcceptAsync(SteadyHistory.Plant(400), SteadyHistory.Start.AddDays(1));
        Assert.Equal((SteadyHistory.Start.AddDays(3), "past", 2), (middle.Revision.InForceUntil, middle.Revision.State, middle.Recomputation!.DaysTotal));
        await service.EvaluatedAsync();
        Assert.Equal("1,3,3,2,2", await service.TextAsync("SELECT string_agg(shown_revision::text, ',' ORDER BY day) FROM line_day"));
        // A correction of it, from the same start.
        AcceptedRevisionWire corrected = await service.Http.AcceptAsync(SteadyHistory.Plant(500), SteadyHistory.Start.AddDays(1));
        Assert.Equal(2, corrected.Recomputation!.DaysTotal);
        await service.EvaluatedAsync();
        Assert.Equal("1,4,4,2,2", await service.TextAsync("SELECT string_agg(shown_revision::text, ',' ORDER BY day) FROM line_day"));
        RevisionWire replaced = (await service.GetAsync<RevisionsWire>("/api/v1/plant/revisions")).Revisions.Single(one => one.Revision == 3);
        Assert.Equal(("replaced", 4, 0), (replaced.State, replaced.ReplacedBy, replaced.DaysComputed));
    }

    [PostgreSqlFact]
    public async Task SameFileAgain_IsNoNewRevision()
    {
        await using RunningService service = await StartAsync(days: 1);
        AcceptedRevisionWire same = await service.Http.AcceptAsync(SteadyHistory.Plant());
        Assert.Equal((1, false), (same.Revision.Revision, same.IsNew));
        using HttpResponseMessage first = await service.Http.PostPlantAsync(SteadyHistory.Plant(200), "2026-04-15T00:00:00Z", "a-key");
        using HttpResponseMessage retry = await service.Http.PostPlantAsync(SteadyHistory.Plant(200), "2026-04-15T00:00:00Z", "a-key");
        using HttpResponseMessage other = await service.Http.PostPlantAsync(SteadyHistory.Plant(300), "2026-04-15T00:00:00Z", "a-key");
        using HttpResponseMessage within = await service.Http.PostPlantAsync(SteadyHistory.Plant(200), "2026-04-16T00:00:00Z");
        Assert.Equal(
            [HttpStatusCode.Created, HttpStatusCode.OK, HttpStatusCode.UnprocessableEntity, HttpStatusCode.OK],
            new[] { first.StatusCode, retry.StatusCode, other.StatusCode, within.StatusCode });
        Assert.Equal(2, await service.CountAsync("SELECT count(*) FROM plant_revision"));
    }

    [PostgreSqlFact]
    public async Task FileWithMistakes_TellsThemAll_AndChangesNothing()
    {
        await using RunningService service = await StartAsync(days: 1);
        using HttpResponseMessage answer = await service.Http.PostPlantAsync(SteadyHistory.Plant().Replace("100 m2", "100", StringComparison.Ordinal).Replace("liquor: feed", "liquor: nowhere", StringComparison.Ordinal));
        Assert.Equal((HttpStatusCode.UnprocessableEntity, "application/problem+json"), (answer.StatusCode, answer.Content.Headers.ContentType?.MediaType));
        using JsonDocument problem = JsonDocument.Parse(await answer.Content.ReadAsStringAsync(Stop));
        Assert.Equal("The plant file has 2 mistakes; nothing was applied.", problem.RootElement.GetProperty("detail").GetString());
        JsonElement[] problems = [.. problem.RootElement.GetProperty("problems").EnumerateArray()];
        Assert.Equal(2, problems.Length);
        Assert.All(problems, one => Assert.True(one.GetProperty("line").GetInt32() > 10 && one.GetProperty("column").GetInt32() > 1));
        Assert.Contains(problems, one => one.GetProperty("path").GetString() == "lines.one.effects[0].area");
        Assert.Equal(1, await service.CountAsync("SELECT count(*) FROM plant_revision"));
    }

    [PostgreSqlTheory]
    [InlineData("2026-04-16T06:00:00Z", "2026-04-16T00:00:00Z or 2026-04-17T00:00:00Z")]
    [InlineData("2026-04-16T00:00:00+02:00", "2026-04-15T00:00:00Z or 2026-04-16T00:00:00Z")]
    [InlineData("2025-01-01T00:00:00Z", "from 2025-08-31T00:00:00Z on")]
    [InlineData("2029-01-01T00:00:00Z", "up to 400 days ahead")]
    [InlineData("2026-04-16", "an RFC 3339 time with its offset")]
    public async Task StartThatCannotBe_IsRefused_NamingWhatCan(string start, string allowed)
    {
        await using RunningService service = await RunningService.StartAsync(server, SteadyHistory.Plant(), SmallPlant.Now);
        using HttpResponseMessage answer = await service.Http.PostPlantAsync(SteadyHistory.Plant(200), start);
        Assert.Equal(HttpStatusCode.BadRequest, answer.StatusCode);
        Assert.Contains(allowed, await answer.Content.ReadAsStringAsync(Stop));
        Assert.Equal(1, await service.CountAsync("SELECT count(*) FROM plant_revision"));
    }

    [PostgreSqlFact]
    public async Task ComingRevision_IsInForceFromItsDayOn_AndItsSignalsAreKeptAtOnce()
    {
        string connection = await server.CreateDatabaseAsync(), coming = SteadyHistory.Plant().Replace("signal: PT-1,", "signal: PT-1B,", StringComparison.Ordinal);
        await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(), SmallPlant.Now))
        {
            AcceptedRevisionWire accepted = await service.Http.AcceptAsync(coming, new DateTimeOffset(2026, 4, 22, 0, 0, 0, TimeSpan.Zero));
            Assert.Equal(("coming", (RecomputationWire?)null), (accepted.Revision.State, accepted.Recomputation));
            Assert.Equal(1, (await service.GetAsync<SiteWire>("/api/v1/site")).PlantRevision);
            ImportWire import = await service.ImportAsync("time,signal,value\n2026-04-20T10:00:00Z,PT-1B,1.1\n2026-04-20T10:00:00Z,PT-1,1.1\n2026-04-20T10:00:00Z,PT-1C,1.1\n");
            Assert.Equal((2, 1), (import.Accepted, import.NotInPlant));
        }

        await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(), SmallPlant.Now.AddDays(2)))
            Assert.Equal(2, (await service.GetAsync<SiteWire>("/api/v1/site")).PlantRevision);
    }

    [PostgreSqlFact]
    public async Task FileGivenAtStart_CorrectsTheRevisionInForce_ButUndoesNoChangeInTime()
    {
        string connection = await server.CreateDatabaseAsync();
        await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(), SmallPlant.Now))
        {
            await service.ImportAsync(SteadyHistory.Days(4));
            await service.Http.AcceptAsync(SteadyHistory.Plant(200), Change);
            await service.EvaluatedAsync();
        }

        // The file it was once started with: in force before the change, and not after it.
        await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(), SmallPlant.Now))
            Assert.Equal((2, 2), (await service.CountAsync("SELECT count(*) FROM plant_revision"), (await service.GetAsync<SiteWire>("/api/v1/site")).PlantRevision));
        await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(210), SmallPlant.Now))
        {
            await service.EvaluatedAsync();
            Assert.Equal("1,1,3,3,3", await service.TextAsync("SELECT string_agg(shown_revision::text, ',' ORDER BY day) FROM line_day"));
            // Corrected in another way than by this file.
            await service.Http.AcceptAsync(SteadyHistory.Plant(220));
        }

        await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(210), SmallPlant.Now))
            Assert.Equal(4, (await service.GetAsync<SiteWire>("/api/v1/site")).PlantRevision);
        // An edited file is a new word, even when it says what was said before.
        await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(220), SmallPlant.Now))
            Assert.Equal(4, (await service.GetAsync<SiteWire>("/api/v1/site")).PlantRevision);
        await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(210), SmallPlant.Now))
            Assert.Equal(5, (await service.GetAsync<SiteWire>("/api/v1/site")).PlantRevision);
    }

    [PostgreSqlFact]
    public async Task RenamedLine_KeepsItsHistory_UnderBothRevisions()
    {
        await using RunningService service = await StartAsync();
        string renamed = SteadyHistory.Plant(200).Replace("  one:\n", "  first:\n    formerly: one\n", StringComparison.Ordinal).Replace("name: E1", "name: E9\n        formerly: E1", StringComparison.Ordinal);
        await service.Http.AcceptAsync(renamed, Change);
        await service.EvaluatedAsync();
        Assert.Equal("1,1,2,2,2", await service.TextAsync("SELECT string_agg(shown_revision::text, ',' ORDER BY day) FROM line_day"));
        TrendWire trend = await service.GetAsync<TrendWire>($"/api/v1/lines/first/effects/E9/trend?from={SteadyHistory.Start:yyyy-MM-dd}T00:00:00Z&to={SteadyHistory.Start.AddDays(4):yyyy-MM-dd}T00:00:00Z");
        Assert.Equal(4 * 288, trend.Value.Count(value => value is not null));
        // Loaded anew, the earlier revision still finds its line.
        PlantTimeline? again = await service.Services.GetRequiredService<PlantStore>().LoadAsync(null, Stop);
        Assert.Equal([1, 1], again!.Eras.Select(era => era.Lines.Single().LineId));
    }

    [PostgreSqlFact]
    public async Task LineThatLeavesThePlant_ShowsNoResultsFromThenOn()
    {
        string other = SteadyHistory.Plant().Replace("  one:\n", "  other:\n", StringComparison.Ordinal).Replace("-1,", "-9,", StringComparison.Ordinal).Replace("-2,", "-8,", StringComparison.Ordinal);
        await using RunningService service = await StartAsync();
        AcceptedRevisionWire accepted = await service.Http.AcceptAsync(other, Change);
        await service.RecomputedAsync(accepted.Recomputation!.Id);
        Assert.Equal("1,1,-,-,-", await service.TextAsync("SELECT string_agg(coalesce(shown_revision::text, '-'), ',' ORDER BY day) FROM line_day"));
    }

    [PostgreSqlFact]
    public async Task SupersededWindows_AreReadable_AndLeaveAfterNinetyDays_WhileHoursStay()
    {
        string connection = await server.CreateDatabaseAsync();
        await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(), SmallPlant.Now))
        {
            await service.ImportAsync(SteadyHistory.Days(4));
            await service.EvaluatedAsync();
            await service.Http.AcceptAsync(SteadyHistory.Plant(200), Change);
            await service.EvaluatedAsync();
            Assert.Equal(0, await service.Services.GetRequiredService<SupersededWindows>().DeleteAsync(Stop));
            BalanceWire then = await service.GetAsync<BalanceWire>($"/api/v1/lines/one/balance?at={Change.AddHours(3):yyyy-MM-ddTHH:mm:ssZ}&revision=1");
            Assert.Equal(Change.AddHours(3), then.At);
        }

        foreach ((int days, int deleted) in new[] { (89, 0), (91, 3), (91, 0) })
        {
            await using RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(200), SmallPlant.Now.AddDays(days));
            Assert.Equal(deleted, await service.Services.GetRequiredService<SupersededWindows>().DeleteAsync(Stop));
            if (deleted == 0) continue;
            Assert.Equal(2 * 288, await service.CountAsync("SELECT count(*) FROM effect_window WHERE revision_id = 1"));
            Assert.Equal(2 * 288, await service.CountAsync("SELECT count(*) FROM balance_window WHERE revision_id = 1"));
            Assert.Equal(2 * 288, await service.CountAsync("SELECT count(*) FROM line_window WHERE revision_id = 2 AND at < '2026-04-18Z'"));
            TrendWire trend = await service.GetAsync<TrendWire>($"/api/v1/lines/one/effects/E1/trend?from={Change:yyyy-MM-dd}T00:00:00Z&to={Change.AddDays(1):yyyy-MM-dd}T00:00:00Z&revision=1");
            Assert.Equal(("hour", 24), (trend.Resolution, trend.Value.Count(value => value is not null)));
        }
    }

    [PostgreSqlFact]
    public async Task Differences_AreToldByLine()
    {
        await using RunningService service = await StartAsync(days: 1);
        await service.Http.AcceptAsync(SteadyHistory.Plant(200), Change);
        DifferencesWire differences = await service.GetAsync<DifferencesWire>("/api/v1/plant/revisions/2/differences?from=1&context=1");
        Assert.Equal((1, 2, 1, 1), (differences.From, differences.To, differences.Added, differences.Removed));
        Assert.Equal(
            ["same liquor: feed", "removed area: 100 m2", "added area: 200 m2", "same clean-coefficient: 2000 W/(m2.K)"],
            Assert.Single(differences.Stretches).Lines.Select(line => $"{line.Change} {line.Text.Trim()}"));
        Assert.Equal(1, (await service.GetAsync<DifferencesWire>("/api/v1/plant/revisions/1/differences?from=2")).Added);
        using HttpResponseMessage missing = await service.Http.GetAsync("/api/v1/plant/revisions/7/differences", Stop);
        Assert.Equal(HttpStatusCode.NotFound, missing.StatusCode);
    }

    private async Task<RunningService> StartAsync(int days = 4)
    {
        RunningService service = await RunningService.StartAsync(server, SteadyHistory.Plant(), SmallPlant.Now);
        await service.ImportAsync(SteadyHistory.Days(days));
        await service.EvaluatedAsync();
        return service;
    }
}
