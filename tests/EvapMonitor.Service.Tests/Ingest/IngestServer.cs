using EvapMonitor.Service.Store;
using Npgsql;

[assembly: AssemblyFixture(typeof(EvapMonitor.Service.Tests.Ingest.IngestServer))]

namespace EvapMonitor.Service.Tests.Ingest;

/// <summary>A PostgreSQL of the tests' own, made when first asked for.</summary>
public sealed class IngestServer : IAsyncDisposable
{
    private readonly SemaphoreSlim _gate = new(1);
    private string? _folder;
    private PrivateServer? _server;
    private int _databases;

    /// <summary>Makes an empty database and gives its connection string.</summary>
    public async Task<string> CreateDatabaseAsync()
    {
        await _gate.WaitAsync(TestContext.Current.CancellationToken);
        try
        {
            _server ??= await StartAsync();
            string name = $"ingest_{++_databases}";
            await using var database = NpgsqlDataSource.Create(_server.Connection);
            await using NpgsqlCommand create = database.CreateCommand($"CREATE DATABASE {name}");
            await create.ExecuteNonQueryAsync(TestContext.Current.CancellationToken);
            return new NpgsqlConnectionStringBuilder(_server.Connection) { Database = name, MaxPoolSize = 10 }.ConnectionString;
        }
        finally
        {
            _gate.Release();
        }
    }

    public async ValueTask DisposeAsync()
    {
        if (_server is not null) await _server.StopAsync();
        if (_folder is not null) Directory.Delete(_folder, recursive: true);
        _gate.Dispose();
    }

    private async Task<PrivateServer> StartAsync()
    {
        _folder = OpenFolder();
        return await PrivateServer.StartAsync(_folder, TestContext.Current.CancellationToken);
    }

    /// <summary>A folder that a database server under another account can pass through.</summary>
    public static string OpenFolder()
    {
        string folder = Directory.CreateTempSubdirectory("evapmonitor-ingest-").FullName;
        if (!OperatingSystem.IsWindows())
            File.SetUnixFileMode(folder, UnixFileMode.UserRead | UnixFileMode.UserWrite | UnixFileMode.UserExecute | UnixFileMode.GroupExecute | UnixFileMode.OtherExecute);
        return folder;
    }
}
