using EvapMonitor.Service.Tests.Ingest.Mqtt;
using EvapMonitor.Service.Tests.Support;
using MQTTnet;
using Npgsql;

namespace EvapMonitor.Service.Tests.Ingest;

/// <summary>The service in a process of its own dies at a named point under load; started again, it has every acknowledged reading, once.</summary>
public class KillTests(PostgresServer server)
{
    private const int Readings = 600;
    private static readonly DateTimeOffset Start = TimeProvider.System.GetUtcNow().AddMinutes(-30);

    [IngestTheory]
    [InlineData("spool-after-commit:1")]
    [InlineData("spool-after-commit:4")]
    [InlineData("drain-after-commit:1")]
    [InlineData("drain-after-commit:3")]
    public async Task KilledAtANamedPoint_EveryAcknowledgedReadingIsThereOnce(string point)
    {
        string connection = await server.CreateDatabaseAsync();
        string folder = TemporaryFolder.Create();
        await using Mosquitto broker = await Mosquitto.StartAsync();
        try
        {
            await IngestService.OptionsAsync(folder, connection, BrokerSourceTests.Sources(broker, "5", """{"filter": "#", "message": "object"}"""), "off", null);
            await using NpgsqlDataSource database = NpgsqlDataSource.Create(connection);
            await using ChildService first = await ChildService.RunAsync(Path.Combine(folder, "plant.yaml"), folder, connection, point);
            Task death = first.DeathAsync();
            using Publisher publisher = await Publisher.ConnectAsync(broker.Port);
            // The session must stand before anything is sent, else the broker has nobody to keep it for.
            await Poll.UntilAsync("the subscription", async () => (await publisher.SendAsync("T.1", "{\"value\":1}")).ReasonCode == MqttClientPublishReasonCode.Success);
            int sent = 0;
            while (!death.IsCompleted || sent < Readings)
            {
                Assert.True(sent < 200_000, "the service was not killed");
                await publisher.SendSeriesAsync("F.1", Start, sent, 50);
                sent += 50;
            }

            await death;
            await using ChildService second = await ChildService.RunAsync(Path.Combine(folder, "plant.yaml"), folder, connection);
            await using NpgsqlCommand count = database.CreateCommand("SELECT count(*) FROM reading JOIN signal USING (signal_id) WHERE name = 'F.1'");
            await Poll.UntilAsync("all stored", async () => (long)(await count.ExecuteScalarAsync(TestContext.Current.CancellationToken))! >= sent, 60);
            await using NpgsqlCommand values = database.CreateCommand("SELECT array_agg(value ORDER BY at) FROM reading JOIN signal USING (signal_id) WHERE name = 'F.1'");
            Assert.Equal(Enumerable.Range(0, sent).Select(i => (double)i), (double[])(await values.ExecuteScalarAsync(TestContext.Current.CancellationToken))!);
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }
}
