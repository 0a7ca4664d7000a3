using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Commands.Demo;
using EvapMonitor.Service.Ingest.Mqtt;
using EvapMonitor.Service.PlantFile;
using EvapMonitor.Service.Tests.Support;
using EvapMonitor.Simulator;
using Microsoft.Extensions.DependencyInjection;

namespace EvapMonitor.Service.Tests.Commands;

/// <summary>The demo against a real service: published and imported readings are of one piece.</summary>
public sealed class DemoRunTests(PostgresServer server) : IDisposable
{
    private static readonly DateTimeOffset Start = new(2026, 3, 2, 0, 0, 0, TimeSpan.Zero), Present = Start.AddHours(5.5);

    private readonly string _folder = TemporaryFolder.Create();

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    public void Dispose() => Directory.Delete(_folder, recursive: true);

    [PostgreSqlFact]
    public async Task PublishedReadings_AreThoseThatAHistoryHolds()
    {
        await using RunningService service = await RunningService.StartAsync(await server.CreateDatabaseAsync(), DemoPlant.PlantFile(Start), Present, ownBroker: "0");
        IReadOnlyList<LineReadings> lines = DemoPlant.Readings(PlantFileReader.Read(DemoPlant.PlantFile(Start)).Site!, Start);
        foreach (LineReadings line in lines) line.Simulation.RunTo(Present);
        DemoRecord record = DemoRecord.Open(_folder, Start);

        // Some minutes in a moment. On a busy disk each message takes its time, so they are few.
        var clock = new DemoClock(new ShiftedClock(Present), 1000, Present.AddMinutes(-24));
        Assert.Equal(Present.AddMinutes(-24), clock.Begin);
        using (var enough = CancellationTokenSource.CreateLinkedTokenSource(Stop))
        {
            var broker = new BrokerSettings { Name = "own broker", Host = "127.0.0.1", Port = service.Services.GetRequiredService<OwnBroker>().Port, ClientId = "fennholm", Topics = [] };
            var told = new List<string>();
            Task live = new DemoLive(broker, service.Http, record, clock, lines, told.Add).RunAsync(enough.Token);
            await Poll.UntilAsync("the published minutes", () => record.Newest > clock.Begin, 120);
            await enough.CancelAsync();
            await Assert.ThrowsAnyAsync<OperationCanceledException>(() => live);
            Assert.Empty(told);
        }

        DateTimeOffset seam = record.Newest!.Value;
        string others = Written(lines, clock.Begin, seam, out string instruments);
        int published = Cells(instruments) + Cells(others);
        Assert.InRange(published, 50 * 2, 80 * 20);
        // Close to the present readings come more often; those of whole even minutes are the historian's.
        const string Even = "SELECT count(*) FROM reading WHERE extract(epoch FROM at)::bigint % 120 = 0";
        await Poll.UntilAsync("every published reading", async () => await service.CountAsync($"{Even} AND at < '{seam:O}'") == published, 60);

        // The same minutes as a history: nothing is new, nothing differs.
        ImportWire again = await service.ImportAsync(instruments), more = await service.ImportAsync(others);
        Assert.Equal((0, 0, published), (again.Accepted + more.Accepted, again.Differing + more.Differing, again.Repeated + more.Repeated));

        // What comes before is filled, and only that.
        Assert.Equal([new(Start, clock.Begin)], record.Missing(seam));
        await new DemoHistory(service.Http, _folder, record, lines).FillAsync(seam, Stop);
        Assert.Empty(DemoRecord.Open(_folder, Start.AddDays(1)).Missing(seam));
        Assert.Equal(Start, DemoRecord.Open(_folder, Start.AddDays(1)).Start);
        int all = Cells(Written(lines, Start, seam, out string whole)) + Cells(whole);
        Assert.Equal(all, await service.CountAsync($"{Even} AND at < '{seam:O}'"));
        Assert.Empty(Directory.GetFiles(_folder, "*.gz"));
    }

    [PostgreSqlFact]
    public async Task Cleanings_AreLoggedOnce()
    {
        await using RunningService service = await RunningService.StartAsync(await server.CreateDatabaseAsync(), DemoPlant.PlantFile(Start), Start.AddDays(30), ownBroker: "off");
        for (int time = 0; time < 2; time++) await DemoCleanings.LogAsync(service.Http, Start, Start, Start.AddDays(30), Stop);
        IReadOnlyList<CleaningWire> north = (await service.GetAsync<CleaningsWire>("/api/v1/cleanings?line=north")).Cleanings;
        Assert.Equal([Start.AddDays(10), Start.AddDays(17), Start.AddDays(28)], north.Select(cleaning => cleaning.Start).Order());
        Assert.Equal("boil-out", north[0].Kind);
        Assert.Equal(10, (await service.GetAsync<CleaningsWire>("/api/v1/cleanings?line=west")).Cleanings.Count);
    }

    [Theory]
    [InlineData("")]
    [InlineData("2026-03-02T00:00:00Z\nrubbish\n")]
    [InlineData("2026-03-02T00:00:00Z\n2026-03-03T00:00:00Z 2026-03-02T00:00:00Z\n")]
    public void DamagedRecord_IsToldInALine(string text)
    {
        File.WriteAllText(Path.Combine(_folder, "demo-history.txt"), text);
        StartException told = Assert.Throws<StartException>(() => DemoRecord.Open(_folder, Start));
        Assert.Contains("demo-history.txt cannot be read", Assert.Single(told.Problems));
    }

    private static string Written(IReadOnlyList<LineReadings> lines, DateTimeOffset from, DateTimeOffset to, out string instruments)
    {
        using StringWriter wide = new(), marked = new();
        HistoryWriter.Write(wide, marked, lines, from, to);
        instruments = wide.ToString();
        return marked.ToString();
    }

    /// <summary>Readings in a file: filled cells of a wide one, rows of a long one.</summary>
    private static int Cells(string file)
    {
        string[] rows = file.Split('\n', StringSplitOptions.RemoveEmptyEntries);
        return rows[0] == "time,signal,value,quality" ? rows.Length - 1 : rows.Skip(1).Sum(row => row.Split(',').Skip(1).Count(cell => cell.Length > 0));
    }
}
