using EvapMonitor.Service.Store;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Ingest;

/// <summary>A PostgreSQL of one test's own, to be stopped and started.</summary>
public sealed class OwnPostgres : IAsyncDisposable
{
    private readonly string _folder;
    private readonly PrivateServer _server;

    private OwnPostgres(string folder, PrivateServer server) => (_folder, _server) = (folder, server);

    public string Connection => _server.Connection;

    public static async Task<OwnPostgres> StartAsync()
    {
        string folder = TemporaryFolder.Create();
        return new OwnPostgres(folder, await PrivateServer.StartAsync(folder, TestContext.Current.CancellationToken));
    }

    public Task StopAsync() => _server.StopAsync();

    public Task StartAgainAsync() => _server.EnsureRunningAsync(TestContext.Current.CancellationToken);

    public async ValueTask DisposeAsync()
    {
        // A test that failed may have left it stopped.
        await _server.EnsureRunningAsync(CancellationToken.None);
        await _server.StopAsync();
        Directory.Delete(_folder, recursive: true);
    }
}
