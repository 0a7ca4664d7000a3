using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;
using Npgsql;

namespace EvapMonitor.Service.Tests.Ingest.Files;

/// <summary>The program dies as if by kill -9 in the middle of an import of three batches and is started again: nothing is lost, nothing doubled.</summary>
public sealed class ImportKillTests(PostgresServer server)
{
    private const int Readings = 120_000;

    private static readonly byte[] File = HistoryWithFaults();

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    [PostgreSqlTheory]
    [InlineData("import-before-commit:2")]
    [InlineData("import-after-commit:2")]
    [InlineData("import-before-end")]
    public async Task KilledImport_GoesOn_AndHoldsTheSame(string place)
    {
        string folder = TemporaryFolder.Create(), plant = Path.Combine(folder, "plant.yaml"), connection = await server.CreateDatabaseAsync();
        await System.IO.File.WriteAllTextAsync(plant, SmallPlant.Text, Stop);
        try
        {
            await using (ChildService first = await ChildService.RunAsync(plant, folder, connection, place))
            {
                await first.UploadAsync(File);
                await first.DeathAsync();
            }

            await using NpgsqlDataSource database = NpgsqlDataSource.Create(connection);
            Assert.Equal("running", await TextAsync(database, "SELECT state FROM import_file"));
            await using ChildService second = await ChildService.RunAsync(plant, folder, connection);
            ImportWire ended = await second.EndOfImportAsync();
            Assert.Equal(("done", 0L, 0L, 2L, 3L), (ended.State, ended.Repeated, ended.Differing, ended.Rejected, ended.NotInPlant));
            Assert.Equal((ended.BytesTotal, Readings + 1L + 5), (ended.BytesRead, ended.Rows));
            Assert.Equal(await UndisturbedAsync(), await TextAsync(database, History.Checksum));
            Assert.Equal(ended.Accepted.ToString(), await TextAsync(database, "SELECT count(*) FROM reading"));
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    private static readonly SemaphoreSlim Once = new(1);
    private static string? _undisturbed;

    /// <summary>The checksum of the same import without a kill.</summary>
    private async Task<string> UndisturbedAsync()
    {
        await Once.WaitAsync(Stop);
        try
        {
            if (_undisturbed is not null) return _undisturbed;
            await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text);
            Assert.Equal("done", (await service.ImportAsync(File)).State);
            return _undisturbed = await service.TextAsync(History.Checksum);
        }
        finally
        {
            Once.Release();
        }
    }

    private static byte[] HistoryWithFaults() =>
        [.. History.Long(Readings), .. "soon,FT-1,1\n2026-04-01T00:00:00Z,other,1\n2026-04-01T00:00:00Z,other,1\n2026-04-01T00:00:00Z,more,1\nlater,FT-1,1\n"u8];

    private static async Task<string> TextAsync(NpgsqlDataSource database, string sql)
    {
        await using NpgsqlCommand command = database.CreateCommand(sql);
        return (await command.ExecuteScalarAsync(Stop))!.ToString()!;
    }
}
