using Microsoft.Extensions.DependencyInjection;
using EvapMonitor.Service.Store;
using System.Net.Http.Headers;
using System.Net.Http.Json;
using System.Text;
using System.Text.Json;
using EvapMonitor.Service.Api.Wire;
using Npgsql;
using Serilog.Events;

namespace EvapMonitor.Service.Tests.Support;

/// <summary>The whole service on a free port of the loopback, with a plant file text, a folder and a database of its own.</summary>
public sealed class RunningService : IAsyncDisposable
{
    internal static readonly JsonSerializerOptions Json = new() { PropertyNamingPolicy = JsonNamingPolicy.SnakeCaseLower };

    private readonly string _folder;
    private readonly ServiceHost _host;

    private RunningService(string folder, ServiceHost host, string connection)
    {
        (_folder, _host) = (folder, host);
        Http = new HttpClient { BaseAddress = new Uri(host.Address), Timeout = TimeSpan.FromSeconds(60) };
        Database = NpgsqlDataSource.Create(connection);
    }

    public HttpClient Http { get; }

    public NpgsqlDataSource Database { get; }

    public string UploadFolder => Path.Combine(_folder, "uploads");

    public string Address => _host.Address;

    public IServiceProvider Services => _host.Services;

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    public static async Task<RunningService> StartAsync(PostgresServer server, string plant, DateTimeOffset? now = null) =>
        await StartAsync(await server.CreateDatabaseAsync(), plant, now);

    public static async Task<RunningService> StartAsync(string connection, string plant, DateTimeOffset? now = null, string ownBroker = "off")
    {
        string folder = TemporaryFolder.Create(), file = Path.Combine(folder, "plant.yaml");
        await File.WriteAllTextAsync(file, plant, Stop);
        var options = new ServiceOptions { Plant = file, Data = folder, Connection = connection, Listen = "http://127.0.0.1:0", Ingest = new() { OwnBroker = ownBroker, ReserveMebibytes = "0" } };
        ServiceHost host = await ServiceHost.StartAsync(options, Stop, now is { } start ? new ShiftedClock(start) : null, LogEventLevel.Fatal);
        return new RunningService(folder, host, connection);
    }

    /// <summary>Uploads a file and waits for the end of its import.</summary>
    public async Task<ImportWire> ImportAsync(string text, bool replace = false, string name = "history.csv") => await ImportAsync(Encoding.UTF8.GetBytes(text), replace, name);

    /// <inheritdoc cref="ImportAsync(string, bool, string)"/>
    public async Task<ImportWire> ImportAsync(byte[] file, bool replace = false, string name = "history.csv") => await EndOfImportAsync((await UploadAsync(file, replace, name)).Id);

    /// <summary>Uploads a file.</summary>
    public async Task<ImportWire> UploadAsync(byte[] file, bool replace = false, string name = "history.csv")
    {
        using var body = new ByteArrayContent(file);
        body.Headers.ContentType = new MediaTypeHeaderValue("text/csv");
        using HttpResponseMessage answer = await Http.PostAsync($"/api/v1/imports?name={name}&replace={(replace ? "true" : "false")}", body, Stop);
        Assert.Equal(System.Net.HttpStatusCode.Accepted, answer.StatusCode);
        return (await answer.Content.ReadFromJsonAsync<ImportWire>(Json, Stop))!;
    }

    public Task<ImportWire> EndOfImportAsync(string id) => Poll.UntilAsync("the end of the import", async () =>
        await GetAsync<ImportWire>($"/api/v1/imports/{id}") is { State: not ("waiting" or "running") } ended ? ended : null, 60);

    /// <summary>Waits until nothing that could be evaluated waits: a day whose last window is still open keeps its mark.</summary>
    public Task EvaluatedAsync() => Poll.UntilAsync(
        "the evaluation of every day",
        async () => await CountAsync($"SELECT count(*) FROM line_day WHERE anew OR taken_from IS NOT NULL OR changed_from < '{LastClosed:O}'") == 0,
        120);

    /// <summary>Waits as above, and until what the hours tell of the surfaces is computed from all of it.</summary>
    public async Task SurfacesAsync()
    {
        await EvaluatedAsync();
        var (inputs, store, plant) = (Services.GetRequiredService<SurfaceInputs>(), Services.GetRequiredService<SurfaceStore>(), Services.GetRequiredService<PlantHolder>().Current);
        foreach (LinePlace line in plant.Lines)
        {
            await Poll.UntilAsync(
                "the surfaces of every line",
                async () => await store.InputAsync(line.LineId, Stop) == $"{plant.RevisionId} {await inputs.VersionAsync(line.LineId, Stop)}", 60);
        }
    }

    private DateTimeOffset LastClosed => new(((Services.GetService(typeof(TimeProvider)) as TimeProvider)!.GetUtcNow().AddSeconds(-1).Ticks / TimeSpan.FromMinutes(5).Ticks) * TimeSpan.FromMinutes(5).Ticks, TimeSpan.Zero);

    public async Task<T> GetAsync<T>(string path) => (await Http.GetFromJsonAsync<T>(path, Json, Stop))!;

    public async Task<long> CountAsync(string sql)
    {
        await using NpgsqlCommand command = Database.CreateCommand(sql);
        return Convert.ToInt64(await command.ExecuteScalarAsync(Stop));
    }

    public async Task<string> TextAsync(string sql)
    {
        await using NpgsqlCommand command = Database.CreateCommand(sql);
        return (await command.ExecuteScalarAsync(Stop))?.ToString() ?? "";
    }

    public async ValueTask DisposeAsync()
    {
        Http.Dispose();
        await _host.DisposeAsync();
        await Database.DisposeAsync();
        Directory.Delete(_folder, recursive: true);
    }
}
