using System.Diagnostics;
using System.Globalization;
using EvapMonitor.Service.Tests.Ingest.Mqtt;
using MQTTnet;
using Npgsql;

namespace EvapMonitor.Service.Tests.Ingest;

/// <summary>The service in a process of its own dies at a named point under load; started again, it has every acknowledged reading, once.</summary>
public class KillTests(IngestServer server)
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
        string folder = IngestServer.OpenFolder();
        await using Mosquitto broker = await Mosquitto.StartAsync();
        try
        {
            await IngestService.OptionsAsync(folder, connection, BrokerSourceTests.Sources(broker, "5", """{"filter": "#", "message": "object"}"""), "off", null);
            using Process first = Run(folder, connection, point);
            await using NpgsqlDataSource database = NpgsqlDataSource.Create(connection);
            using Publisher publisher = await Publisher.ConnectAsync(broker.Port);
            using var limit = new CancellationTokenSource(TimeSpan.FromSeconds(60));
            // The session must stand before anything is sent, else the broker has nobody to keep it for.
            await IngestService.UntilAsync("the subscription", async () => (await publisher.SendAsync("T.1", "{\"value\":1}")).ReasonCode == MqttClientPublishReasonCode.Success, 60);
            int sent = 0;
            while (!first.HasExited || sent < Readings)
            {
                Assert.True(sent < 100_000 && !limit.IsCancellationRequested, "the service was not killed");
                await publisher.SendSeriesAsync("F.1", Start, sent, 50);
                sent += 50;
            }

            await first.WaitForExitAsync(limit.Token);
            Assert.Equal(137, first.ExitCode);
            using Process second = Run(folder, connection, null);
            try
            {
                await IngestService.UntilAsync("all stored", async () =>
                {
                    await using NpgsqlCommand command = database.CreateCommand("SELECT count(*) FROM reading JOIN signal USING (signal_id) WHERE name = 'F.1'");
                    return (long)(await command.ExecuteScalarAsync(limit.Token))! == sent;
                }, 60);
            }
            finally
            {
                second.Kill();
                await second.WaitForExitAsync(limit.Token);
            }

            await using NpgsqlCommand values = database.CreateCommand("SELECT array_agg(value ORDER BY at) FROM reading JOIN signal USING (signal_id) WHERE name = 'F.1'");
            Assert.Equal(Enumerable.Range(0, sent).Select(i => (double)i), (double[])(await values.ExecuteScalarAsync(limit.Token))!);
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    private static Process Run(string folder, string connection, string? point)
    {
        var start = new ProcessStartInfo("dotnet", [Path.Combine(AppContext.BaseDirectory, "evapmonitor.dll"), "run", Path.Combine(folder, "plant.yaml"), "--data", folder, "--listen", "http://127.0.0.1:0"])
        {
            RedirectStandardError = true, RedirectStandardOutput = true,
        };
        start.Environment["EVAPMONITOR_CONNECTION"] = connection;
        start.Environment["EVAPMONITOR_SPOOL_RESERVE_MIB"] = 0.ToString(CultureInfo.InvariantCulture);
        if (point is not null) start.Environment["EVAPMONITOR_KILL_AT"] = point;
        Process process = Process.Start(start)!;
        // Unread pipes would stop it once they are full.
        _ = process.StandardOutput.ReadToEndAsync();
        _ = process.StandardError.ReadToEndAsync();
        return process;
    }
}
