using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Tests.Support;
using Microsoft.Extensions.DependencyInjection;
using Npgsql;
using Serilog.Events;

namespace EvapMonitor.Service.Tests.Ingest;

/// <summary>The whole service with the ingest plant, its ways in set as a test wants them.</summary>
public sealed class IngestService : IAsyncDisposable
{
    private readonly ServiceHost _host;

    private IngestService(string folder, ServiceHost host, string connection)
    {
        (Folder, _host) = (folder, host);
        Http = new HttpClient { BaseAddress = new Uri(host.Address) };
        // Not pooled: the database goes away in some tests, and a connection kept would not notice.
        Database = NpgsqlDataSource.Create(connection + ";Pooling=false");
    }

    public string Folder { get; }

    public HttpClient Http { get; }

    public NpgsqlDataSource Database { get; }

    internal SourceStates Sources => Get<SourceStates>();

    internal Notices Notices => Get<Notices>();

    internal Drain Drain => Get<Drain>();

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    /// <summary>Starts the service.</summary>
    /// <param name="connection">The database.</param>
    /// <param name="sources">Text of the sources file; null for none.</param>
    /// <param name="ownBroker">Port of the own broker or off.</param>
    /// <param name="spoolMebibytes">Quota of the spool.</param>
    /// <param name="folder">The data folder; null makes one.</param>
    public static async Task<IngestService> StartAsync(string connection, string? sources = null, string ownBroker = "off", string? spoolMebibytes = null, string? folder = null)
    {
        folder ??= TemporaryFolder.Create();
        ServiceOptions options = await OptionsAsync(folder, connection, sources, ownBroker, spoolMebibytes);
        return new IngestService(folder, await ServiceHost.StartAsync(options, Stop, null, LogEventLevel.Fatal), connection);
    }

    public static async Task<ServiceOptions> OptionsAsync(string folder, string connection, string? sources, string ownBroker, string? spoolMebibytes)
    {
        string plant = Path.Combine(folder, "plant.yaml");
        await File.WriteAllTextAsync(plant, IngestPlant.Text, Stop);
        if (sources is not null) await File.WriteAllTextAsync(Path.Combine(folder, "sources.json"), sources, Stop);
        return new ServiceOptions
        {
            Plant = plant, Data = folder, Connection = connection, Listen = "http://127.0.0.1:0",
            Ingest = new IngestSettings { OwnBroker = ownBroker, SpoolMebibytes = spoolMebibytes, ReserveMebibytes = "0" },
        };
    }

    public T Get<T>()
        where T : notnull => _host.Services.GetRequiredService<T>();

    public async Task<long> CountAsync(string sql = "SELECT count(*) FROM reading")
    {
        await using NpgsqlCommand command = Database.CreateCommand(sql);
        return (long)(await command.ExecuteScalarAsync(Stop))!;
    }

    /// <summary>The stored values of a signal in the order of their instants.</summary>
    public async Task<IReadOnlyList<double>> ValuesAsync(string signal)
    {
        await using NpgsqlCommand command = Database.CreateCommand("SELECT coalesce(array_agg(value ORDER BY at), '{}') FROM reading JOIN signal USING (signal_id) WHERE name = $1");
        command.Parameters.Add(new() { Value = signal });
        return (double[])(await command.ExecuteScalarAsync(Stop))!;
    }

    public Task StoredAsync(long readings, int limitSeconds = 20) => Poll.UntilAsync($"{readings} readings stored", async () => await CountAsync() == readings, limitSeconds);

    public async ValueTask DisposeAsync()
    {
        Http.Dispose();
        await _host.DisposeAsync();
        await Database.DisposeAsync();
        Directory.Delete(Folder, recursive: true);
    }
}
