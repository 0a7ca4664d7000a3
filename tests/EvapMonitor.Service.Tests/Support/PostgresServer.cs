using EvapMonitor.Service.Store;
using Npgsql;
using Testcontainers.PostgreSql;

[assembly: AssemblyFixture(typeof(EvapMonitor.Service.Tests.Support.PostgresServer))]

namespace EvapMonitor.Service.Tests.Support;

/// <summary>
/// The one PostgreSQL server of a test run: a container where a Docker engine answers, else the program's own private server in a temporary folder.
/// Started when first asked for, removed at the end.
/// </summary>
public sealed class PostgresServer : IAsyncDisposable
{
    private readonly SemaphoreSlim _gate = new(1);
    private PostgreSqlContainer? _container;
    private PrivateServer? _private;
    private string? _folder;
    private string? _connection;
    private int _databases;

    /// <summary>Makes an empty database and gives its connection string.</summary>
    public async Task<string> CreateDatabaseAsync()
    {
        string server = await StartedAsync();
        string name = $"test_{Interlocked.Increment(ref _databases)}";
        await using var database = NpgsqlDataSource.Create(server);
        await using NpgsqlCommand create = database.CreateCommand($"CREATE DATABASE {name}");
        await create.ExecuteNonQueryAsync(TestContext.Current.CancellationToken);
        return new NpgsqlConnectionStringBuilder(server) { Database = name, MaxPoolSize = 12, Timeout = 15 }.ConnectionString;
    }

    public async ValueTask DisposeAsync()
    {
        if (_container is not null) await _container.DisposeAsync();
        if (_private is not null) await _private.StopAsync();
        if (_folder is not null) Directory.Delete(_folder, recursive: true);
        _gate.Dispose();
    }

    private async Task<string> StartedAsync()
    {
        await _gate.WaitAsync(TestContext.Current.CancellationToken);
        try
        {
            return _connection ??= await TryContainerAsync() ?? await StartPrivateAsync();
        }
        finally
        {
            _gate.Release();
        }
    }

    private async Task<string?> TryContainerAsync()
    {
        if (!Prerequisites.DockerAnswers) return null;
        PostgreSqlContainer? container = null;
        try
        {
            container = new PostgreSqlBuilder(Environment.GetEnvironmentVariable("EVAPMONITOR_TEST_IMAGE") ?? "postgres:17-alpine").Build();
            using var limit = new CancellationTokenSource(TimeSpan.FromSeconds(60));
            await container.StartAsync(limit.Token);
            _container = container;
            return container.GetConnectionString();
        }
        catch (Exception) when (PrivateServer.FindBinaries() is not null)
        {
            // The engine answers but speaks another version, has no image, or cannot get one.
            if (container is not null) await container.DisposeAsync();
            return null;
        }
    }

    private async Task<string> StartPrivateAsync()
    {
        _folder = TemporaryFolder.Create();
        _private = await PrivateServer.StartAsync(_folder, TestContext.Current.CancellationToken);
        return _private.Connection;
    }
}
