using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Ingest.Files;

/// <summary>Files through the whole service into PostgreSQL.</summary>
public sealed class ImportTests(PostgresServer server)
{
    private const string Readings = """
        time,signal,value,quality
        2026-04-01T10:00:00Z,FT-1,60.5,good
        2026-04-01T10:00:00Z,PT-1,0.9,uncertain
        2026-04-01T10:05:00Z,FT-1,,bad
        """;

    [PostgreSqlFact]
    public async Task Readings_AreStoredAsTheyCame()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        ImportWire import = await service.ImportAsync(Readings, name: "april.csv");
        Assert.Equal(("april.csv", "done", 3L, 0L, 0L, 0L, 0L), (import.Name, import.State, import.Accepted, import.Repeated, import.Differing, import.Rejected, import.NotInPlant));
        Assert.Equal((import.BytesTotal, 4L), (import.BytesRead, import.Rows));
        Assert.Equal(
            "FT-1 2026-04-01 10:00:00+00 60.5 0,FT-1 2026-04-01 10:05:00+00 - 2,PT-1 2026-04-01 10:00:00+00 0.9 1",
            await service.TextAsync("SELECT string_agg(concat_ws(' ', name, at, coalesce(value::text, '-'), quality), ',' ORDER BY name, at) FROM reading JOIN signal USING (signal_id)"));
    }

    [PostgreSqlFact]
    public async Task SameReadingsAgain_ChangeNothing()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        await service.ImportAsync(Readings);
        await service.EvaluatedAsync();
        string before = await service.TextAsync(History.Checksum), days = await service.TextAsync("SELECT string_agg(d::text, ' ' ORDER BY day) FROM line_day d");
        foreach (string file in new[] { Readings, Readings + "\n" })
        {
            ImportWire again = await service.ImportAsync(file);
            Assert.Equal(("done", 0L, 3L, 0L), (again.State, again.Accepted, again.Repeated, again.Differing));
            Assert.Equal(before, await service.TextAsync(History.Checksum));
            Assert.Equal(days, await service.TextAsync("SELECT string_agg(d::text, ' ' ORDER BY day) FROM line_day d"));
        }
    }

    [PostgreSqlFact]
    public async Task DifferingRepeat_IsCounted_AndTheFirstValueStays()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        await service.ImportAsync(Readings);
        ImportWire other = await service.ImportAsync("time,FT-1,PT-1\n2026-04-01T10:00:00Z,61,0.9\n2026-04-01T10:05:00Z,62,0.91\n");
        // FT-1 differs twice (a bad one without a value differs from 62), PT-1 differs in its quality, and one reading is new.
        Assert.Equal((1L, 0L, 3L), (other.Accepted, other.Repeated, other.Differing));
        Assert.Equal("60.5", await service.TextAsync("SELECT value FROM reading JOIN signal USING (signal_id) WHERE name = 'FT-1' ORDER BY at LIMIT 1"));
    }

    [PostgreSqlFact]
    public async Task RepeatsWithinAFile_FirstWins_OrTheLastWhenReplacing()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        const string file = "time,signal,value\n2026-04-01T10:00:00Z,FT-1,1\n2026-04-01T10:00:00Z,FT-1,1\n2026-04-01T10:00:00Z,FT-1,2\n";
        ImportWire first = await service.ImportAsync(file);
        Assert.Equal((1L, 1L, 1L), (first.Accepted, first.Repeated, first.Differing));
        Assert.Equal("1", await service.TextAsync("SELECT value FROM reading"));
        ImportWire replacing = await service.ImportAsync(file, replace: true);
        Assert.Equal((1L, 2L, 0L), (replacing.Accepted, replacing.Repeated, replacing.Differing));
        Assert.Equal("2", await service.TextAsync("SELECT value FROM reading"));
    }

    [PostgreSqlFact]
    public async Task LateReadings_HaveOnlyTheirDaysComputedAnew()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        string Days(IEnumerable<int> days, int hour) => "time,FT-1\n" + string.Concat(days.Select(day => $"2026-04-{day:00}T{hour:00}:00:00Z,{day + hour}\n"));
        const string versions = "SELECT string_agg(to_char(day, 'DD') || ':' || data_version, ' ' ORDER BY day) FROM line_day";
        await service.ImportAsync(Days([2, 3, 4, 5], 8));
        await service.EvaluatedAsync();
        Assert.Equal("02:1 03:1 04:1 05:1", await service.TextAsync(versions));
        string before = await service.TextAsync("SELECT string_agg(xmin || ' ' || at, ',' ORDER BY at) FROM line_window WHERE at < '2026-04-04' OR at >= '2026-04-05'");

        await service.ImportAsync(Days([4], 9));
        await service.EvaluatedAsync();
        Assert.Equal("02:1 03:1 04:2 05:1", await service.TextAsync(versions));
        Assert.Equal(before, await service.TextAsync("SELECT string_agg(xmin || ' ' || at, ',' ORDER BY at) FROM line_window WHERE at < '2026-04-04' OR at >= '2026-04-05'"));

        // A reading shortly before midnight reaches into the next day: it is held for a while, and its stillness and scatter count for two hours more.
        await service.ImportAsync(Days([2], 23));
        await service.EvaluatedAsync();
        Assert.Equal("02:2 03:2 04:2 05:1", await service.TextAsync(versions));
    }

    [PostgreSqlFact]
    public async Task Replace_OverridesAndMarksTheDaysItChanges()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        await service.ImportAsync("time,FT-1\n2026-04-02T08:00:00Z,1\n2026-04-03T08:00:00Z,2\n2026-04-04T08:00:00Z,3\n");
        await service.EvaluatedAsync();
        ImportWire replacing = await service.ImportAsync("time,FT-1\n2026-04-02T08:00:00Z,1\n2026-04-03T08:00:00Z,9\n2026-04-05T08:00:00Z,4\n", replace: true);
        Assert.Equal(("done", 2L, 1L, 0L), (replacing.State, replacing.Accepted, replacing.Repeated, replacing.Differing));
        Assert.Equal("1 9 3 4", await service.TextAsync("SELECT string_agg(value::text, ' ' ORDER BY at) FROM reading"));
        Assert.Equal("02:1 03:2 04:1 05:1", await service.TextAsync("SELECT string_agg(to_char(day, 'DD') || ':' || data_version, ' ' ORDER BY day) FROM line_day"));
    }

    [PostgreSqlFact]
    public async Task TooEarlyTooLateAndUnknown_AreCountedAndTold()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        ImportWire import = await service.ImportAsync("""
            time,signal,value
            2025-08-31T21:59:59Z,FT-1,1
            2025-08-31T22:00:00Z,FT-1,2
            2026-04-20T12:09:00Z,FT-1,3
            2026-04-20T12:30:00Z,FT-1,4
            2026-04-01T00:00:00Z,Other,5
            2026-04-01T00:05:00Z,Other,6
            """);
        Assert.Equal((2L, 2L, 2L), (import.Accepted, import.Rejected, import.NotInPlant));
        Assert.Equal(
            [(2, "time '2025-08-31T21:59:59Z' is before the plant file's history-from"), (5, "time '2026-04-20T12:30:00Z' is more than 10 minutes ahead")],
            import.Problems.Select(problem => ((int)problem.Line, problem.Reason)));
        Assert.Equal(("Other", 2L), (import.UnknownSignals.Single().Name, import.UnknownSignals.Single().Count));
    }

    [PostgreSqlFact]
    public async Task ManyBadRows_AreCounted_AndTheFirstHundredTold()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        ImportWire import = await service.ImportAsync("time,FT-1\n" + string.Concat(Enumerable.Range(0, 500).Select(i => $"2026-04-01T10:00:00Z,x{i}\n")));
        Assert.Equal(("done", 500L, 100), (import.State, import.Rejected, import.Problems.Count));
        Assert.Equal((2L, 101L), (import.Problems[0].Line, import.Problems[^1].Line));
    }

    [PostgreSqlFact]
    public async Task UnusableFiles_Fail_AndTheNextIsTaken()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        ImportWire header = await service.ImportAsync("signal,when,what\n");
        Assert.Equal("failed", header.State);
        Assert.StartsWith("Line 1: found \"signal,when,what\"; the header must be", header.Error);
        byte[] whole = ReadingFileTests.Gzip("time,FT-1\n" + string.Concat(Enumerable.Range(0, 20_000).Select(i => $"2026-04-01T10:{i / 60 % 60:00}:{i % 60:00}Z,{i * 7919 % 10007}\n")));
        ImportWire cut = await service.ImportAsync(whole[..(whole.Length - 100)]);
        Assert.Equal("failed", cut.State);
        Assert.StartsWith("The file is damaged:", cut.Error);
        Assert.Equal("done", (await service.ImportAsync(Readings)).State);
        Assert.Empty(Directory.GetFiles(service.UploadFolder));
    }

    [PostgreSqlFact]
    public async Task Cancel_KeepsWhatIsStored()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        // Twelve batches; the next file waits meanwhile and is cancelled in the queue.
        ImportWire first = await service.UploadAsync(History.Long(600_000)), second = await service.UploadAsync(History.Long(10));
        using (HttpResponseMessage answer = await service.Http.PostAsync($"/api/v1/imports/{second.Id}/cancel", null, TestContext.Current.CancellationToken)) answer.EnsureSuccessStatusCode();
        await Poll.UntilAsync("a first batch", async () => (await service.GetAsync<ImportWire>($"/api/v1/imports/{first.Id}")).Accepted > 0);
        using (HttpResponseMessage answer = await service.Http.PostAsync($"/api/v1/imports/{first.Id}/cancel", null, TestContext.Current.CancellationToken)) answer.EnsureSuccessStatusCode();
        ImportWire ended = await service.EndOfImportAsync(first.Id);
        Assert.Equal("cancelled", ended.State);
        Assert.Equal("cancelled", (await service.EndOfImportAsync(second.Id)).State);
        Assert.InRange(ended.Accepted, 1, 599_999);
        Assert.Equal(ended.Accepted, await service.CountAsync("SELECT count(*) FROM reading"));
        Assert.Equal(0, ended.Accepted % 50_000);

        // Sent again, it goes through to the end and counts what was there as repeated.
        ImportWire again = await service.ImportAsync(History.Long(600_000));
        Assert.Equal(("done", 600_000 - ended.Accepted, ended.Accepted), (again.State, again.Accepted, again.Repeated));
    }
}
