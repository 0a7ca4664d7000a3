using System.Globalization;
using System.Net;
using System.Net.Sockets;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Ingest.Mqtt;
using EvapMonitor.Service.Tests.Support;
using MQTTnet;
using MQTTnet.Exceptions;

namespace EvapMonitor.Service.Tests.Ingest.Mqtt;

public class OwnBrokerTests(PostgresServer server)
{
    private static readonly DateTimeOffset Start = TimeProvider.System.GetUtcNow().AddMinutes(-30);

    [IngestTheory]
    [InlineData(true)]
    [InlineData(false)]
    public async Task NumbersAndObjects_AreStored(bool isVersion5)
    {
        await using IngestService service = await IngestService.StartAsync(await server.CreateDatabaseAsync(), ownBroker: "0");
        using Publisher publisher = await Publisher.ConnectAsync(service.Get<OwnBroker>().Port, isVersion5);
        await publisher.SendAsync("F.1", "12.5");
        await publisher.SendAsync("any", "{\"signal\":\"T.1\",\"value\":80,\"time\":\"" + Start.ToString("O") + "\"}");
        await publisher.SendAsync("P.1", "0.9", qos: 0);
        await publisher.SendAsync("P.1", "no number");
        await service.StoredAsync(3);
        SourceState state = service.Sources.All.Single(source => source.Kind == "broker");
        Assert.Equal((3, 1), (state.Accepted, state.Malformed));
    }

    [IngestFact]
    public async Task Acknowledged_IsInTheSpool_EvenWithTheDatabaseAway()
    {
        await using OwnPostgres postgres = await OwnPostgres.StartAsync();
        await using IngestService service = await IngestService.StartAsync(postgres.Connection, ownBroker: "0", spoolMebibytes: "1");
        await postgres.StopAsync();
        using Publisher five = await Publisher.ConnectAsync(service.Get<OwnBroker>().Port);
        using Publisher three = await Publisher.ConnectAsync(service.Get<OwnBroker>().Port, isVersion5: false);
        await five.SendSeriesAsync("F.1", Start, 0, 100);
        Assert.Equal(100, service.Sources.All.Single(source => source.Kind == "broker").Accepted);
        int filled = await BrokerSourceTests.FillAsync(service);

        // Each protocol has its own way to say no.
        bool refused = false;
        int taken = 0;
        while (!refused && taken < 200)
        {
            MqttClientPublishResult result = await five.SendAsync("T.1", Publisher.Message(Start, taken));
            refused = result.ReasonCode == MqttClientPublishReasonCode.QuotaExceeded;
            if (refused) Assert.Contains("spool is full", result.ReasonString, StringComparison.Ordinal);
            else taken++;
        }

        Assert.True(refused);
        await Assert.ThrowsAnyAsync<MqttCommunicationException>(async () => await three.SendAsync("T.1", Publisher.Message(Start, 300)));
        await postgres.StartAgainAsync();
        await service.StoredAsync(100 + filled + taken, 60);
    }

    [IngestFact]
    public async Task PortTaken_IsNoticed_AndTheServiceGoesOn()
    {
        using var other = new TcpListener(IPAddress.Loopback, 0);
        other.Start();
        int port = ((IPEndPoint)other.LocalEndpoint).Port;
        await using IngestService service = await IngestService.StartAsync(await server.CreateDatabaseAsync(), ownBroker: port.ToString(CultureInfo.InvariantCulture));
        Assert.Equal(0, service.Get<OwnBroker>().Port);
        Assert.Contains(port.ToString(CultureInfo.InvariantCulture), Assert.Single(service.Notices.Standing).Sentence, StringComparison.Ordinal);
        using HttpResponseMessage site = await service.Http.GetAsync("/api/v1/site", TestContext.Current.CancellationToken);
        Assert.Equal(HttpStatusCode.OK, site.StatusCode);
    }

    [Fact]
    public void NoSetting_ListensUnlessABrokerIsNamed()
    {
        Assert.Equal(OwnBroker.DefaultPort, new IngestSettings().Plan("/nowhere", out _).OwnBrokerPort);
        Assert.Null(new IngestSettings { OwnBroker = "off" }.Plan("/nowhere", out _).OwnBrokerPort);
        new IngestSettings { OwnBroker = "everywhere", SpoolMebibytes = "-1" }.Plan("/nowhere", out IReadOnlyList<string> problems);
        Assert.Equal(2, problems.Count);
    }
}
