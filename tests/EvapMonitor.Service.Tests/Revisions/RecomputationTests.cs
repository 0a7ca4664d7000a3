using System.Net;
using EvapMonitor.Core;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;
using Npgsql;

namespace EvapMonitor.Service.Tests.Revisions;

/// <summary>Days computed anew: progress, stopping, going on, dying on the way.</summary>
public sealed class RecomputationTests(PostgresServer server)
{
    private const string Results =
        """
        SELECT md5(string_agg(t, '' ORDER BY t)) FROM (
            SELECT w::text t FROM effect_window w UNION ALL SELECT w::text FROM line_window w UNION ALL SELECT w::text FROM balance_window w UNION ALL SELECT h::text FROM effect_hour h) rows
        """;

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    [PostgreSqlFact]
    public async Task Asked_ComputesTheDaysOfTheSpanAnew_WithTheSameBits()
    {
        await using RunningService service = await StartAsync(4);
        string before = await service.TextAsync(Results);
        RecomputationWire asked = await service.Http.RecomputationAsync("", """{"line":"one","from":"2026-04-15","to":"2026-04-16"}""");
        Assert.Equal(("asked", "one", 2, "this machine"), (asked.Cause, asked.Line, asked.DaysTotal, asked.Author));
        RecomputationWire done = await service.RecomputedAsync(asked.Id);
        Assert.Equal((2, 0, true), (done.DaysDone, done.DaysLeft, done.EndedAt is not null));
        Assert.Equal("1,2,2,1,1", await service.TextAsync("SELECT string_agg(result_version::text, ',' ORDER BY day) FROM line_day"));
        Assert.Equal(before, await service.TextAsync(Results));
        Assert.Equal(done.Id, (await service.GetAsync<RecomputationsWire>("/api/v1/recomputations")).Recomputations[0].Id);
    }

    [PostgreSqlFact]
    public async Task DayThatHasNotBegun_IsNotWaitedFor()
    {
        await using RunningService service = await StartAsync(2);
        await using (NpgsqlCommand evening = service.Database.CreateCommand(
            "INSERT INTO line_day (line_id, day, data_version, changed_from, changed_at) SELECT 1, (@now AT TIME ZONE 'UTC')::date + 1, 1, @now, @now"))
        {
            evening.Parameters.AddWithValue("now", SmallPlant.Now.UtcDateTime);
            await evening.ExecuteNonQueryAsync(Stop);
        }

        RecomputationWire asked = await service.Http.RecomputationAsync("", "{}");
        Assert.Equal("done", (await service.RecomputedAsync(asked.Id)).State);
    }

    [PostgreSqlTheory]
    [InlineData("""{"line":"two"}""", HttpStatusCode.NotFound)]
    [InlineData("""{"from":"2026-05-01","to":"2026-04-01"}""", HttpStatusCode.BadRequest)]
    [InlineData("""{"from":"2026-05-01"}""", HttpStatusCode.BadRequest)]
    [InlineData("""{"from":"yesterday"}""", HttpStatusCode.BadRequest)]
    public async Task WishThatCannotBe_IsRefused(string wish, HttpStatusCode status)
    {
        await using RunningService service = await RunningService.StartAsync(server, SteadyHistory.Plant(), SmallPlant.Now);
        using var body = new StringContent(wish, System.Text.Encoding.UTF8, "application/json");
        using HttpResponseMessage answer = await service.Http.PostAsync("/api/v1/recomputations", body, Stop);
        Assert.Equal(status, answer.StatusCode);
        foreach (string what in new[] { "cancel", "resume" })
        {
            using HttpResponseMessage missing = await service.Http.PostAsync($"/api/v1/recomputations/77/{what}", null, Stop);
            Assert.Equal(HttpStatusCode.NotFound, missing.StatusCode);
        }
    }

    [PostgreSqlFact]
    public async Task Cancelled_LeavesTheOtherDaysAsTheyWere_AndGoesOnWhenResumed()
    {
        await using RunningService service = await StartAsync(4);
        AcceptedRevisionWire accepted;
        RecomputationWire cancelled;
        await using (NpgsqlConnection hold = await service.Database.OpenConnectionAsync(Stop))
        {
            // No result can be written while the lease is locked: days under way wait, as many as there are cores; the others stay.
            await using NpgsqlTransaction transaction = await hold.BeginTransactionAsync(Stop);
            await using (var command = new NpgsqlCommand("SELECT 1 FROM line_lease FOR UPDATE", hold)) await command.ExecuteNonQueryAsync(Stop);
            accepted = await service.Http.AcceptAsync(SteadyHistory.Plant(200));
            await Poll.UntilAsync("a day under evaluation", async () => await service.CountAsync("SELECT count(*) FROM line_day WHERE taken_from IS NOT NULL") > 0);
            cancelled = await service.Http.RecomputationAsync($"/{accepted.Recomputation!.Id}/cancel");
            await transaction.RollbackAsync(Stop);
        }

        Assert.Equal(("cancelled", 5, 0), (cancelled.State, cancelled.DaysLeft, cancelled.DaysDone));
        await service.EvaluatedAsync();
        Task<string> ShownAsync() => service.TextAsync("SELECT string_agg(shown_revision::text, ',' ORDER BY day) FROM line_day");
        string shown = await ShownAsync();
        Assert.InRange(shown.Count(one => one == '2'), 1, 4);
        Assert.Equal(shown.Count(one => one == '1'), (await service.GetAsync<RecomputationWire>($"/api/v1/recomputations/{cancelled.Id}")).DaysLeft);
        // A late reading brings the whole days that it touches under the revision in force, never half of one.
        await service.ImportAsync(SteadyHistory.Header + SteadyHistory.Row(SteadyHistory.Start.AddDays(2).AddHours(20).AddMinutes(1)));
        await service.EvaluatedAsync();
        shown = await ShownAsync();
        Assert.Equal("2,2", shown[4..7]);
        double[] whole = await service.CoefficientsAsync(SteadyHistory.Start.AddDays(2));
        Assert.Equal((288, 0.0), (whole.Length, double.Round(whole.Max() - whole.Min(), 6)));
        RecomputationWire resumed = await service.Http.RecomputationAsync($"/{cancelled.Id}/resume");
        Assert.Equal(shown.Count(one => one == '1'), resumed.DaysLeft);
        await service.RecomputedAsync(cancelled.Id);
        Assert.Equal("2,2,2,2,2", await ShownAsync());
    }

    [PostgreSqlFact]
    public async Task KilledOnTheWay_GoesOnByItself_WithTheSameBits()
    {
        string undisturbed;
        await using (RunningService service = await StartAsync(4))
        {
            await service.RecomputedAsync((await service.Http.AcceptAsync(SteadyHistory.Plant(200), SteadyHistory.Start.AddDays(1))).Recomputation!.Id);
            undisturbed = await service.TextAsync(Results);
        }

        string folder = TemporaryFolder.Create(), plant = Path.Combine(folder, "plant.yaml"), connection = await server.CreateDatabaseAsync();
        await File.WriteAllTextAsync(plant, SteadyHistory.Plant(), Stop);
        try
        {
            await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(), SmallPlant.Now))
            {
                await service.ImportAsync(SteadyHistory.Days(4));
                await service.EvaluatedAsync();
            }

            await using NpgsqlDataSource database = NpgsqlDataSource.Create(connection);
            await using (ChildService first = await ChildService.RunAsync(plant, folder, connection, "evaluation-before-commit:2"))
            {
                await first.Http.AcceptAsync(SteadyHistory.Plant(200), SteadyHistory.Start.AddDays(1));
                await first.DeathAsync();
            }

            // Two days are written beside each other where there are two cores: of them one may have been committed when the other killed the process.
            string shown = await TextAsync(database, "SELECT string_agg(shown_revision::text, ',' ORDER BY day) FROM line_day");
            Assert.Contains(shown, new[] { "1,1,1,1,1", "1,2,1,1,1", "1,1,2,1,1" });
            await using ChildService second = await ChildService.RunAsync(plant, folder, connection);
            await Poll.UntilAsync("the end of the recomputation", async () => await TextAsync(database, "SELECT string_agg(state, ',') FROM recomputation") == "done", 60);
            Assert.Equal(undisturbed, await TextAsync(database, Results));
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    [PostgreSqlFact]
    public async Task ReaderMeanwhile_SeesADayOldOrNew_NeverHalf()
    {
        await using RunningService service = await StartAsync(4);
        double old = (await service.CoefficientsAsync(SteadyHistory.Start))[0];
        int id = (await service.Http.AcceptAsync(SteadyHistory.Plant(200))).Recomputation!.Id;
        var seen = new HashSet<double>();
        bool done;
        do
        {
            done = (await service.GetAsync<RecomputationWire>($"/api/v1/recomputations/{id}")).State == "done";
            for (int day = 0; day < 4; day++)
            {
                double[] values = await service.CoefficientsAsync(SteadyHistory.Start.AddDays(day));
                Assert.Equal(288, values.Length);
                Assert.Equal(0, values.Max() - values.Min(), 6);
                seen.Add(double.Round(values[0] / old, 6));
            }
        }
        while (!done);
        Assert.Equal([0.5, 1], seen.Order());
    }

    [PostgreSqlFact]
    public async Task OpenPages_AreToldHowFarItIs()
    {
        await using RunningService service = await StartAsync(2);
        using HttpResponseMessage events = await service.Http.GetAsync("/api/v1/events", HttpCompletionOption.ResponseHeadersRead, Stop);
        using var reader = new StreamReader(await events.Content.ReadAsStreamAsync(Stop));
        await service.Http.RecomputationAsync("", "{}");
        string? line;
        var told = new List<string>();
        using var limit = new CancellationTokenSource(TimeSpan.FromSeconds(20));
        while (!told.Any(one => one.Contains("\"state\":\"done\"", StringComparison.Ordinal)) && (line = await reader.ReadLineAsync(limit.Token)) is not null)
        {
            if (line == "event: recomputation") told.Add((await reader.ReadLineAsync(limit.Token))!);
        }

        Assert.Contains("\"days_done\":3", told[^1]);
        Assert.Contains("\"why\":\"Asked for by this machine.\"", told[^1]);
    }

    [PostgreSqlFact]
    public async Task DaysThatCannotBeEvaluated_StopNeitherTheirLineNorAnother()
    {
        string two = SteadyHistory.Plant() + "\n" + SteadyHistory.Plant()[(SteadyHistory.Plant().IndexOf("lines:\n", StringComparison.Ordinal) + 7)..].Replace("one:", "two:", StringComparison.Ordinal).Replace("E1", "E2", StringComparison.Ordinal);
        await using RunningService service = await RunningService.StartAsync(server, two, SmallPlant.Now);
        await service.TextAsync(
            """
            CREATE FUNCTION refuse() RETURNS trigger LANGUAGE plpgsql AS $$ BEGIN RAISE EXCEPTION 'refused' USING ERRCODE = '22000'; END $$;
            CREATE TRIGGER refuse BEFORE INSERT ON line_window FOR EACH ROW WHEN (NEW.line_id = 1 AND NEW.at < '2026-04-15Z') EXECUTE FUNCTION refuse();
            SELECT 1
            """);
        await service.ImportAsync(SteadyHistory.Days(3));
        await Poll.UntilAsync("the other days", async () => await service.CountAsync("SELECT count(*) FROM line_day WHERE shown_revision IS NOT NULL") == 7, 60);
        Assert.Equal("1 2026-04-14", await service.TextAsync("SELECT line_id || ' ' || day FROM line_day WHERE shown_revision IS NULL"));
        await service.TextAsync("DROP TRIGGER refuse ON line_window; SELECT 1");
        await service.EvaluatedAsync();
    }

    [PostgreSqlFact]
    public async Task DaysOfAnOlderModel_AreOneRecomputation_ThatStaysStoppedWhenStopped()
    {
        string connection = await server.CreateDatabaseAsync();
        await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(), SmallPlant.Now))
        {
            await service.ImportAsync(SteadyHistory.Days(3));
            await service.EvaluatedAsync();
            await service.TextAsync("UPDATE line_day SET model = 1 RETURNING 1");
        }

        await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(), SmallPlant.Now))
        {
            RecomputationWire one = Assert.Single((await service.GetAsync<RecomputationsWire>("/api/v1/recomputations")).Recomputations);
            Assert.Equal(("older model", 4), (one.Cause, one.DaysTotal));
            await service.RecomputedAsync(one.Id);
            Assert.Equal(4, await service.CountAsync($"SELECT count(*) FROM line_day WHERE model = {LineEvaluation.ModelNumber}"));
            // As if it had been stopped before three of its days.
            await service.TextAsync("UPDATE line_day SET model = 1 WHERE day > '2026-04-14' RETURNING 1");
            await service.TextAsync("INSERT INTO recomputation_day SELECT line_id, day, 1 FROM line_day WHERE model = 1 RETURNING 1");
            await service.TextAsync("UPDATE recomputation SET state = 'cancelled' RETURNING 1");
        }

        await using (RunningService service = await RunningService.StartAsync(connection, SteadyHistory.Plant(), SmallPlant.Now))
        {
            RecomputationWire one = Assert.Single((await service.GetAsync<RecomputationsWire>("/api/v1/recomputations")).Recomputations);
            Assert.Equal(("cancelled", 3), (one.State, one.DaysLeft));
            await service.EvaluatedAsync();
            Assert.Equal(3, await service.CountAsync("SELECT count(*) FROM line_day WHERE model = 1"));
        }
    }

    private static async Task<string> TextAsync(NpgsqlDataSource database, string sql)
    {
        await using NpgsqlCommand command = database.CreateCommand(sql);
        return (await command.ExecuteScalarAsync(Stop))?.ToString() ?? "";
    }

    private async Task<RunningService> StartAsync(int days)
    {
        RunningService service = await RunningService.StartAsync(server, SteadyHistory.Plant(), SmallPlant.Now);
        await service.ImportAsync(SteadyHistory.Days(days));
        await service.EvaluatedAsync();
        return service;
    }
}
