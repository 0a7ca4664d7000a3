using EvapMonitor.Service.Store;
using EvapMonitor.Service.Tests.Support;
using Npgsql;

namespace EvapMonitor.Service.Tests.Evaluation;

/// <summary>Kills during evaluation and during an upgrade of the database, and the leases that keep two processes apart.</summary>
public sealed class EvaluationKillTests(PostgresServer server)
{
    private const string Windows = "SELECT count(*) || ' ' || coalesce(sum(hashtextextended(w::text, 0)), 0) FROM effect_window w";

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    [PostgreSqlFact]
    public async Task KilledEvaluation_IsDoneByTheNextProcess_WithTheSameBits()
    {
        byte[] file = History.Long(20_000);
        string undisturbed;
        await using (RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now))
        {
            Assert.Equal("done", (await service.ImportAsync(file)).State);
            await service.EvaluatedAsync();
            undisturbed = await service.TextAsync(Windows);
        }

        string folder = TemporaryFolder.Create(), plant = Path.Combine(folder, "plant.yaml"), connection = await server.CreateDatabaseAsync();
        await File.WriteAllTextAsync(plant, SmallPlant.Text, Stop);
        try
        {
            await using (ChildService first = await ChildService.RunAsync(plant, folder, connection, "evaluation-before-commit"))
            {
                await first.UploadAsync(file);
                await first.DeathAsync();
            }

            await using NpgsqlDataSource database = NpgsqlDataSource.Create(connection);
            Assert.Equal("0 0", await TextAsync(database, Windows));
            // The dead process holds the line's lease still: the next one takes over within 30 s.
            await using ChildService second = await ChildService.RunAsync(plant, folder, connection);
            await Poll.UntilAsync("the evaluation by the second process", async () => await TextAsync(database, Windows) == undisturbed, 60);
            Assert.Equal("2", await TextAsync(database, "SELECT fence FROM line_lease"));
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    [PostgreSqlFact]
    public async Task KilledUpgrade_GoesOnWithTheNextScript()
    {
        string folder = TemporaryFolder.Create(), plant = Path.Combine(folder, "plant.yaml"), connection = await server.CreateDatabaseAsync();
        await File.WriteAllTextAsync(plant, SmallPlant.Text, Stop);
        try
        {
            await Assert.ThrowsAsync<InvalidOperationException>(() => ChildService.RunAsync(plant, folder, connection, "migration-after-script"));
            await using NpgsqlDataSource database = NpgsqlDataSource.Create(connection);
            Assert.Equal("", await TextAsync(database, "SELECT coalesce(to_regclass('line_lease')::text, '')"));
            await using ChildService second = await ChildService.RunAsync(plant, folder, connection);
            Assert.Equal("line_lease", await TextAsync(database, "SELECT coalesce(to_regclass('line_lease')::text, '')"));
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    [PostgreSqlFact]
    public async Task Lease_IsHeldByOne_AndTakenOverWithAHigherFence()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        LeaseStore one = new(service.Database), other = new(service.Database);
        const int line = 77;
        Assert.Equal(1, (await one.HoldAsync([line], Stop))[line]);
        Assert.Empty(await other.HoldAsync([line], Stop));
        Assert.Equal(1, (await one.HoldAsync([line], Stop))[line]);
        await service.TextAsync("UPDATE line_lease SET until = clock_timestamp() - interval '1 s' WHERE line_id = 77 RETURNING 1");
        Assert.Equal(2, (await other.HoldAsync([line], Stop))[line]);
        await using NpgsqlConnection connection = await service.Database.OpenConnectionAsync(Stop);
        await Assert.ThrowsAsync<LeaseLostException>(() => one.CheckAsync(connection, line, 1));
        await other.CheckAsync(connection, line, 2);
        await other.ReleaseAsync();
        Assert.Equal(3, (await one.HoldAsync([line], Stop))[line]);
    }

    private static async Task<string> TextAsync(NpgsqlDataSource database, string sql)
    {
        await using NpgsqlCommand command = database.CreateCommand(sql);
        return (await command.ExecuteScalarAsync(Stop))!.ToString()!;
    }
}
