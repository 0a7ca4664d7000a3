using System.Diagnostics;
using EvapMonitor.Benchmarks.Proofs;
using EvapMonitor.Service.Store;
using Npgsql;

namespace EvapMonitor.Benchmarks.Ingest;

/// <summary>What the figures of the ways in stand on: a folder, a database, a broker, all of their own.</summary>
internal sealed class Stand : IAsyncDisposable
{
    private readonly bool _mounted;

    private Stand(string folder, PrivateServer server, BrokerProcess broker, bool mounted)
    {
        (Folder, Server, Broker, _mounted) = (folder, server, broker, mounted);
        Database = NpgsqlDataSource.Create(server.Connection);
    }

    public string Folder { get; }

    public PrivateServer Server { get; }

    public BrokerProcess Broker { get; }

    public NpgsqlDataSource Database { get; }

    /// <summary>Makes it.</summary>
    /// <param name="disk">Size of a file system in memory for the database alone, as mount writes it; null for the folder's own.</param>
    public static async Task<Stand> MakeAsync(string? disk = null)
    {
        string folder = Directory.CreateTempSubdirectory("evapmonitor-ingest-").FullName;
        // The private server runs as another user when this runs as root: it must be able to pass through.
        if (!OperatingSystem.IsWindows()) File.SetUnixFileMode(folder, (UnixFileMode)0b111_101_101);
        string database = Path.Combine(folder, "database");
        Directory.CreateDirectory(database);
        if (disk is not null) Run("mount", "-t", "tmpfs", "-o", "mode=755,size=" + disk, "tmpfs", database);
        PrivateServer server = await PrivateServer.StartAsync(database, CancellationToken.None);
        BrokerProcess broker = await BrokerProcess.StartAsync(folder);
        Directory.CreateDirectory(Path.Combine(folder, "data"));
        await File.WriteAllTextAsync(Path.Combine(folder, "plant.yaml"), LoadPlant.Text);
        await File.WriteAllTextAsync(Path.Combine(folder, "data", "sources.json"), LoadPlant.Sources(broker.Port));
        return new Stand(folder, server, broker, disk is not null);
    }

    /// <summary>Starts the service and waits until it serves and has its session at the broker.</summary>
    public async Task<(ServiceProcess Service, string Address)> ServeAsync()
    {
        ServiceProcess service = ServiceProcess.Start(Path.Combine(Folder, "plant.yaml"), Path.Combine(Folder, "data"), Server.Connection);
        return (service, await service.AddressAsync());
    }

    public async Task<long> CountAsync(string sql = "SELECT count(*) FROM reading")
    {
        // The database may have been away since the last question.
        Database.Clear();
        await using NpgsqlCommand command = Database.CreateCommand(sql);
        return Convert.ToInt64(await command.ExecuteScalarAsync(), System.Globalization.CultureInfo.InvariantCulture);
    }

    public async ValueTask DisposeAsync()
    {
        await Broker.DisposeAsync();
        await Database.DisposeAsync();
        await Server.StopAsync();
        if (_mounted) Run("umount", Path.Combine(Folder, "database"));
        Directory.Delete(Folder, recursive: true);
    }

    /// <summary>Gives the database's file system another size.</summary>
    public void EnlargeDisk(string size) => Run("mount", "-o", "remount,size=" + size, Path.Combine(Folder, "database"));

    /// <summary>Kills all processes of the database as kill -9 does.</summary>
    public void KillDatabase()
    {
        string note = Directory.GetFiles(Path.Combine(Folder, "database", "postgresql"), "postmaster.pid", SearchOption.AllDirectories).Single();
        string postmaster = File.ReadLines(note).First();
        // Its children first would let it start others; without it they end themselves at their next word.
        Run("kill", "-KILL", postmaster);
    }

    /// <summary>Starts the database until it answers, as the service does with a server of its own.</summary>
    public async Task BringBackAsync()
    {
        for (int attempt = 0; ; attempt++)
        {
            try
            {
                await Server.EnsureRunningAsync(CancellationToken.None);
                await CountAsync("SELECT 1");
                return;
            }
            catch (Exception error) when (error is NpgsqlException or InvalidOperationException && attempt < 60)
            {
                await Task.Delay(500);
            }
        }
    }

    private static void Run(string program, params string[] arguments)
    {
        using Process process = Process.Start(program, arguments);
        process.WaitForExit();
        if (process.ExitCode != 0) throw new InvalidOperationException($"{program} {string.Join(' ', arguments)} failed with {process.ExitCode}.");
    }
}
