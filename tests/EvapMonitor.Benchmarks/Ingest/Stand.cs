using EvapMonitor.Benchmarks.Proofs;
using EvapMonitor.Service.Store;
using Npgsql;

namespace EvapMonitor.Benchmarks.Ingest;

/// <summary>What the figures of the ways in stand on: a folder, a database, a broker, all of their own.</summary>
internal sealed class Stand : IAsyncDisposable
{
    private readonly PrivateServer _server;

    private Stand(string folder, PrivateServer server, BrokerProcess broker)
    {
        (Folder, _server, Broker) = (folder, server, broker);
        Database = NpgsqlDataSource.Create(server.Connection);
    }

    public string Folder { get; }

    public BrokerProcess Broker { get; }

    public NpgsqlDataSource Database { get; }

    public static async Task<Stand> MakeAsync()
    {
        string folder = Directory.CreateTempSubdirectory("evapmonitor-ingest-").FullName;
        // The private server runs as another user when this runs as root: it must be able to pass through.
        if (!OperatingSystem.IsWindows()) File.SetUnixFileMode(folder, (UnixFileMode)0b111_101_101);
        PrivateServer server = await PrivateServer.StartAsync(Path.Combine(folder, "database"), CancellationToken.None);
        BrokerProcess broker = await BrokerProcess.StartAsync(folder);
        Directory.CreateDirectory(Path.Combine(folder, "data"));
        await File.WriteAllTextAsync(Path.Combine(folder, "plant.yaml"), LoadPlant.Text);
        await File.WriteAllTextAsync(Path.Combine(folder, "data", "sources.json"), LoadPlant.Sources(broker.Port));
        return new Stand(folder, server, broker);
    }

    /// <summary>Starts the service and waits until it serves and has its session at the broker.</summary>
    public async Task<(ServiceProcess Service, string Address)> ServeAsync()
    {
        ServiceProcess service = ServiceProcess.Start(Path.Combine(Folder, "plant.yaml"), Path.Combine(Folder, "data"), _server.Connection);
        return (service, await service.AddressAsync());
    }

    public async Task<long> CountAsync(string sql = "SELECT count(*) FROM reading")
    {
        await using NpgsqlCommand command = Database.CreateCommand(sql);
        return Convert.ToInt64(await command.ExecuteScalarAsync(), System.Globalization.CultureInfo.InvariantCulture);
    }

    public async ValueTask DisposeAsync()
    {
        await Broker.DisposeAsync();
        await Database.DisposeAsync();
        await _server.StopAsync();
        Directory.Delete(Folder, recursive: true);
    }
}
