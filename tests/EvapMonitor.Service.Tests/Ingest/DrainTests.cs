using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Api;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Tests.Support;
using Npgsql;

namespace EvapMonitor.Service.Tests.Ingest;

public class DrainTests(PostgresServer server)
{
    private static readonly long Start = TimeProvider.System.GetUtcNow().AddMinutes(-30).ToUnixTimeMilliseconds();

    private readonly SourceState _source = new("test", "test", "");

    [IngestFact]
    public async Task DatabaseAwayAndBack_TheBacklogDrains_AndNothingIsLost()
    {
        await using OwnPostgres postgres = await OwnPostgres.StartAsync();
        await using IngestService service = await IngestService.StartAsync(postgres.Connection);
        await KeepAsync(service, 0, 1_000);
        await service.StoredAsync(1_000);
        await postgres.StopAsync();
        for (int i = 0; i < 40; i++) await KeepAsync(service, 1_000 + (i * 2_500), 2_500);
        await Poll.UntilAsync("the notice", () => service.Notices.Standing.Any(notice => notice.Key == "database-away"));
        await postgres.StartAgainAsync();
        await service.StoredAsync(101_000, 60);
        Assert.Equal(Enumerable.Range(0, 101_000).Select(i => (double)i), await service.ValuesAsync("F.1"));
        await Poll.UntilAsync("the spool empty", () => service.Get<Intake>().SpooledBytes == 0);
        Assert.Empty(service.Notices.Standing);
        Assert.Equal((101_000, 0, 0), (service.Drain.Accepted, service.Drain.Repeated, service.Drain.Differing));
    }

    [IngestFact]
    public async Task DatabaseAway_TheSiteIsStillTold_AsItWasKnown_WithTheNotice()
    {
        await using OwnPostgres postgres = await OwnPostgres.StartAsync();
        await using IngestService service = await IngestService.StartAsync(postgres.Connection);
        SiteStates states = service.Get<SiteStates>();
        Service.Api.Wire.SiteWire before = await states.SiteAsync(TestContext.Current.CancellationToken);
        Assert.Empty(before.Notices);
        await postgres.StopAsync();
        Service.Api.Wire.SiteWire away = await states.SiteAsync(TestContext.Current.CancellationToken);
        Assert.Equal((before.Name, before.LatestReadingAt), (away.Name, away.LatestReadingAt));
        Assert.Contains("does not answer", Assert.Single(away.Notices).Sentence, StringComparison.Ordinal);
    }

    [IngestFact]
    public async Task ReadingsThatTheDatabaseRefuses_AreNarrowedDown_AndTheOthersStored()
    {
        await using IngestService service = await IngestService.StartAsync(await server.CreateDatabaseAsync());
        await using (NpgsqlCommand rule = service.Database.CreateCommand("ALTER TABLE reading ADD CONSTRAINT no_sevens CHECK (value <> 777 AND value <> 1778)"))
            await rule.ExecuteNonQueryAsync(TestContext.Current.CancellationToken);
        await KeepAsync(service, 0, 3_000);
        await service.StoredAsync(2_998, 30);
        IReadOnlyList<RefusedReading> refused = await service.Get<RefusedStore>().ListAsync(10, TestContext.Current.CancellationToken);
        Assert.Equal([777.0, 1778.0], refused.Select(one => one.Value!.Value).Order());
        Assert.All(refused, one => Assert.Equal(("F.1", "test"), (one.Signal, one.Source)));
        Assert.All(refused, one => Assert.Contains("no_sevens", one.Reason, StringComparison.Ordinal));
        Assert.Contains(service.Notices.Standing, notice => notice.Key == "readings-refused");
        await Poll.UntilAsync("the spool empty", () => service.Get<Intake>().SpooledBytes == 0);
    }

    [IngestFact]
    public async Task SignalsThatNoRevisionNames_AreCounted_NotStored()
    {
        string connection = await server.CreateDatabaseAsync();
        await using IngestService service = await IngestService.StartAsync(connection);
        PlantHolder plant = service.Get<PlantHolder>();
        PlantInForce before = plant.Current;
        plant.Timeline = new PlantTimeline(
            [before with { Signals = before.Signals.Where(pair => pair.Key != "F.1").ToDictionary(pair => pair.Key, pair => pair.Value) }],
            before.Signals.Where(pair => pair.Key != "F.1").Select(pair => (pair.Key, pair.Value.SignalId, pair.Value.HomeLineId)), before.RevisionId);
        IntakeAnswer answer = await service.Get<Intake>().KeepAsync(_source, [Reading("F.1", 0), Reading("T.1", 1)]);
        Assert.Equal(new IntakeAnswer(1, 0, 1, null), answer);
        await service.StoredAsync(1);
        Assert.Equal("F.1", Assert.Single(service.Get<UnknownSignals>().All).Name);
    }

    [IngestFact]
    public async Task Storing_MarksTheDaysTouched()
    {
        await using IngestService service = await IngestService.StartAsync(await server.CreateDatabaseAsync());
        var day = new DateTimeOffset(2026, 2, 3, 12, 0, 0, TimeSpan.Zero);
        await service.Get<Intake>().KeepAsync(_source, [new IncomingReading("F.1", new Reading(day.ToUnixTimeMilliseconds(), 1, Quality.Good))]);
        await service.StoredAsync(1);
        Assert.Equal(1, await service.CountAsync("SELECT count(*) FROM line_day WHERE day = '2026-02-03'"));
    }

    private static IncomingReading Reading(string signal, int i) => new(signal, new Reading(Start + i, i, Quality.Good));

    private async Task KeepAsync(IngestService service, int from, int count)
    {
        IntakeAnswer answer = await service.Get<Intake>().KeepAsync(_source, [.. Enumerable.Range(from, count).Select(i => Reading("F.1", i))]);
        Assert.Equal(count, answer.Accepted);
    }
}
