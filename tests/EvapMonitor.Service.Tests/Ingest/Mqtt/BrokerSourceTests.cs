using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Ingest.Mqtt;

public class BrokerSourceTests(PostgresServer server)
{
    private static readonly DateTimeOffset Start = TimeProvider.System.GetUtcNow().AddMinutes(-30);

    [IngestTheory]
    [InlineData("5")]
    [InlineData("3.1.1")]
    public async Task EachShape_IsStored(string protocol)
    {
        await using Mosquitto broker = await Mosquitto.StartAsync();
        await using IngestService service = await StartAsync(broker, protocol, """
            {"filter": "plant/+/+", "message": "number", "signal": "{1}.{2}"},
            {"filter": "lab", "message": "object"},
            {"filter": "line", "message": "members", "time-written": "unix-ms", "signals": {"steam": "F.2", "pressure": "P.2"}}
            """);
        using Publisher publisher = await Publisher.ConnectAsync(broker.Port, protocol == "5");
        await publisher.SendAsync("plant/F/1", "12.5");
        await publisher.SendAsync("lab", "{\"signal\":\"T.1\",\"value\":80,\"time\":\"" + Start.ToString("O") + "\"}");
        await publisher.SendAsync("line", $"{{\"time\":{Start.ToUnixTimeMilliseconds()},\"steam\":3,\"pressure\":1.2}}");
        await service.StoredAsync(4);
        Assert.Equal([12.5], await service.ValuesAsync("F.1"));
        Assert.Equal([80], await service.ValuesAsync("T.1"));
        Assert.Equal([3], await service.ValuesAsync("F.2"));
        Assert.Equal([1.2], await service.ValuesAsync("P.2"));
        SourceState state = service.Sources.All.Single(source => source.Name == "gateway");
        Assert.Equal((4, 0, 0), (state.Accepted, state.Malformed, state.Reconnects));
        Assert.NotNull(state.ConnectedSince);
        Assert.NotNull(state.LastMessage);
        Assert.Equal(1, await service.CountAsync("SELECT count(*) FROM line_day WHERE day = current_date"));
    }

    [IngestFact]
    public async Task Malformed_AreCountedAndSampled_AndTheRestGoesOn()
    {
        await using Mosquitto broker = await Mosquitto.StartAsync();
        await using IngestService service = await StartAsync(broker, "5", """{"filter": "#", "message": "object"}""");
        using Publisher publisher = await Publisher.ConnectAsync(broker.Port);
        for (int i = 0; i < 30; i++) await publisher.SendAsync("F.1", "rubbish " + i);
        await publisher.SendSeriesAsync("F.1", Start, 0, 10);
        await publisher.SendAsync("X.unknown", "{\"value\":1}");
        await publisher.SendAsync("F.1", Publisher.Message(TimeProvider.System.GetUtcNow().AddHours(1), 0));
        await service.StoredAsync(10);
        SourceState state = service.Sources.All.Single(source => source.Name == "gateway");
        await Poll.UntilAsync("all counted", () => state.OutOfTime == 1);
        Assert.Equal((30, 1, 10), (state.Malformed, state.Unknown, state.Accepted));
        Assert.Equal(20, state.Samples.Count);
        Assert.Contains(state.Samples, sample => sample.Where == "F.1" && sample.Reason.Contains("not JSON", StringComparison.Ordinal));
        Assert.Equal("X.unknown", Assert.Single(service.Get<UnknownSignals>().All).Name);
        Assert.NotNull(state.ConnectedSince);
    }

    [IngestTheory]
    [InlineData("5")]
    [InlineData("3.1.1")]
    public async Task Retained_IsReadOnce_WhenItHasATime(string protocol)
    {
        await using Mosquitto broker = await Mosquitto.StartAsync();
        using Publisher publisher = await Publisher.ConnectAsync(broker.Port);
        await publisher.SendAsync("F.1", Publisher.Message(Start, 7), retain: true);
        await publisher.SendAsync("T.1", "{\"value\":5}", retain: true);
        await using IngestService service = await StartAsync(broker, protocol, """{"filter": "#", "message": "object"}""");
        await service.StoredAsync(1);
        SourceState state = service.Sources.All.Single(source => source.Name == "gateway");
        await Poll.UntilAsync("the retained message without a time", () => state.InstantUnknown == 1);
        await broker.StopAsync();
        await broker.StartAsync();
        await Poll.UntilAsync("the reconnection", () => state.Reconnects == 1);
        using Publisher later = await Publisher.ConnectAsync(broker.Port);
        await later.SendAsync("F.1", Publisher.Message(Start, 8));
        await service.StoredAsync(2);
        Assert.Equal([7, 8], await service.ValuesAsync("F.1"));
    }

    [IngestTheory]
    [InlineData("5")]
    [InlineData("3.1.1")]
    public async Task BrokerRestarted_LosesNothing(string protocol)
    {
        await using Mosquitto broker = await Mosquitto.StartAsync();
        await using IngestService service = await StartAsync(broker, protocol, """{"filter": "#", "message": "object"}""");
        using (Publisher first = await Publisher.ConnectAsync(broker.Port)) await first.SendSeriesAsync("F.1", Start, 0, 500);
        await broker.StopAsync();
        SourceState state = service.Sources.All.Single(source => source.Name == "gateway");
        await Poll.UntilAsync("the loss noticed", () => service.Notices.Standing.Any(notice => notice.Key == "source:gateway"));
        Assert.Null(state.ConnectedSince);
        Assert.NotNull(state.LastError);
        await broker.StartAsync();
        using (Publisher second = await Publisher.ConnectAsync(broker.Port)) await second.SendSeriesAsync("F.1", Start, 500, 500);
        await service.StoredAsync(1000, 60);
        Assert.Equal(Enumerable.Range(0, 1000).Select(i => (double)i), await service.ValuesAsync("F.1"));
        Assert.DoesNotContain(service.Notices.Standing, notice => notice.Key == "source:gateway");
    }

    [IngestFact]
    public async Task ServiceAway_TheBrokerKeeps_AndNothingIsLost()
    {
        string connection = await server.CreateDatabaseAsync();
        await using Mosquitto broker = await Mosquitto.StartAsync();
        using Publisher publisher = await Publisher.ConnectAsync(broker.Port);
        await using (IngestService first = await IngestService.StartAsync(connection, Sources(broker, "5", """{"filter": "#", "message": "object"}""")))
        {
            await publisher.SendSeriesAsync("F.1", Start, 0, 100);
            await first.StoredAsync(100);
        }

        await publisher.SendSeriesAsync("F.1", Start, 100, 700);
        await using IngestService second = await IngestService.StartAsync(connection, Sources(broker, "5", """{"filter": "#", "message": "object"}"""));
        await second.StoredAsync(800);
        Assert.Equal(Enumerable.Range(0, 800).Select(i => (double)i), await second.ValuesAsync("F.1"));
    }

    [IngestTheory]
    [InlineData("5")]
    [InlineData("3.1.1")]
    public async Task SpoolRefuses_TheConnectionEnds_AndWhatWasSentComesLater(string protocol)
    {
        // The database is away, so that the small spool fills.
        await using OwnPostgres postgres = await OwnPostgres.StartAsync();
        await using Mosquitto broker = await Mosquitto.StartAsync();
        await using IngestService service = await IngestService.StartAsync(
            postgres.Connection, Sources(broker, protocol, """{"filter": "#", "message": "object"}"""), spoolMebibytes: "1");
        await postgres.StopAsync();
        SourceState state = service.Sources.All.Single(source => source.Name == "gateway");
        await Poll.UntilAsync("the connection", () => state.ConnectedSince is not null);
        using Publisher publisher = await Publisher.ConnectAsync(broker.Port);
        int filled = await FillAsync(service);
        await publisher.SendSeriesAsync("T.1", Start, 0, 200);
        await Poll.UntilAsync("the refusal", () => state.Refused > 0 && service.Notices.Standing.Any(notice => notice.Key == "spool-full"), 30);
        await Poll.UntilAsync("the end of the connection", () => state.LastError?.Contains("refused", StringComparison.Ordinal) == true);
        await postgres.StartAgainAsync();
        await service.StoredAsync(filled + 200, 60);
        Assert.Equal(Enumerable.Range(0, 200).Select(i => (double)i), await service.ValuesAsync("T.1"));
        await Poll.UntilAsync("the notices gone", () => service.Notices.Standing.Count == 0);
    }

    /// <summary>Fills the spool by another way until it refuses a handful.</summary>
    internal static async Task<int> FillAsync(IngestService service)
    {
        var other = new SourceState("other", "test", "");
        int filled = 0;
        foreach (int size in new[] { 20_000, 1_000, 50 })
        {
            IntakeAnswer answer;
            do
            {
                long start = Start.AddDays(-1).ToUnixTimeMilliseconds() + filled;
                answer = await service.Get<Intake>().KeepAsync(other, [.. Enumerable.Range(0, size).Select(i => new IncomingReading("F.1", new Reading(start + i, i, Quality.Good)))], alone: true);
                filled += answer.Accepted;
                // After a refusal one more is let through only in a second.
                if (answer.Refusal is not null) await Task.Delay(1_100, TestContext.Current.CancellationToken);
            }
            while (answer.Refusal is null);
        }

        return filled;
    }

    internal static string Sources(Mosquitto broker, string protocol, string topics, string more = "") =>
        $$"""{"brokers": [{"name": "gateway", "host": "127.0.0.1", "port": {{broker.Port}}, "protocol": "{{protocol}}", {{more}} "topics": [{{topics}}]}]}""";

    private async Task<IngestService> StartAsync(Mosquitto broker, string protocol, string topics, string more = "")
    {
        IngestService service = await IngestService.StartAsync(await server.CreateDatabaseAsync(), Sources(broker, protocol, topics, more));
        await Poll.UntilAsync("the connection", () => service.Sources.All.Any(source => source.ConnectedSince is not null));
        return service;
    }
}
