using System.IO.Compression;
using System.Net.Http.Headers;
using System.Net.Http.Json;
using System.Text;
using System.Text.Json;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Commands.Demo;
using EvapMonitor.Service.PlantFile;
using EvapMonitor.Service.Store;
using EvapMonitor.Simulator;
using Npgsql;

namespace EvapMonitor.Benchmarks.Proofs;

/// <summary>A database with some days of the demo plant's three lines, imported and evaluated, and what a recomputation leaves in it.</summary>
internal sealed class RecomputeStand : IAsyncDisposable
{
    /// <summary>Results by table, each with the columns of its key.</summary>
    public static readonly IReadOnlyList<(string Table, string Key)> Tables =
    [
        ("effect_window", "line_id, effect_id, at, revision_id"), ("line_window", "line_id, at, revision_id"), ("balance_window", "line_id, at, revision_id"),
        ("effect_hour", "line_id, effect_id, quantity, hour, revision_id"), ("balance_hour", "line_id, hour, revision_id"),
        ("effect_stretch", "line_id, effect_id, starts_at, revision_id"),
    ];

    private static readonly JsonSerializerOptions Json = new() { PropertyNamingPolicy = JsonNamingPolicy.SnakeCaseLower };

    private readonly string _folder;
    private readonly PrivateServer _server;

    private RecomputeStand(string folder, PrivateServer server)
    {
        (_folder, _server) = (folder, server);
        Database = NpgsqlDataSource.Create(server.Connection + ";Command Timeout=600");
    }

    /// <summary>The first day.</summary>
    public static DateTimeOffset Start { get; } = new(2026, 1, 1, 0, 0, 0, TimeSpan.Zero);

    public NpgsqlDataSource Database { get; }

    public string Connection => _server.Connection;

    public string Plant => Path.Combine(_folder, "plant.yaml");

    public string Data => Path.Combine(_folder, "data");

    /// <summary>Makes it.</summary>
    public static async Task<RecomputeStand> MakeAsync()
    {
        string folder = Directory.CreateTempSubdirectory("evapmonitor-recompute-").FullName;
        // The private server runs as another user when this runs as root: it must be able to pass through.
        if (!OperatingSystem.IsWindows()) File.SetUnixFileMode(folder, (UnixFileMode)0b111_101_101);
        var stand = new RecomputeStand(folder, await PrivateServer.StartAsync(Path.Combine(folder, "database"), CancellationToken.None));
        Directory.CreateDirectory(stand.Data);
        await File.WriteAllTextAsync(stand.Plant, DemoPlant.PlantFile(Start));
        return stand;
    }

    /// <summary>Starts the service and waits until it serves.</summary>
    public async Task<(ServiceProcess Service, HttpClient Http)> ServeAsync(int? cores = null)
    {
        ServiceProcess service = ServiceProcess.Start(Plant, Data, Connection, cores);
        return (service, new HttpClient { BaseAddress = new Uri(await service.AddressAsync()), Timeout = TimeSpan.FromMinutes(10) });
    }

    /// <summary>Makes the history of some days and imports it; logs the cleanings of that time.</summary>
    /// <returns>Number of readings stored.</returns>
    public async Task<long> FillAsync(HttpClient http, int days)
    {
        IReadOnlyList<LineReadings> lines = DemoPlant.Readings(PlantFileReader.Read(await File.ReadAllTextAsync(Plant)).Site!, Start);
        await DemoCleanings.LogAsync(http, Start, Start, Start.AddDays(days), CancellationToken.None);
        const int piece = 10;
        for (int day = 0; day < days; day += piece)
        {
            DateTimeOffset from = Start.AddDays(day), to = Start.AddDays(int.Min(days, day + piece));
            foreach (LineReadings line in lines) line.Simulation.RunTo(to);
            string[] files = [Path.Combine(_folder, "wide.csv.gz"), Path.Combine(_folder, "marked.csv.gz")];
            await using (var wide = new StreamWriter(new GZipStream(File.Create(files[0]), CompressionLevel.Fastest)))
            await using (var marked = new StreamWriter(new GZipStream(File.Create(files[1]), CompressionLevel.Fastest)))
                HistoryWriter.Write(wide, marked, lines, from, to);
            foreach (string file in files) await ImportAsync(http, file);
        }

        return await CountAsync("SELECT count(*) FROM reading");
    }

    /// <summary>Waits until no day waits.</summary>
    public async Task EvaluatedAsync()
    {
        while (await CountAsync("SELECT count(*) FROM line_day WHERE anew OR changed_from IS NOT NULL OR taken_from IS NOT NULL") > 0) await Task.Delay(200);
    }

    /// <summary>Gives the plant file again with one more comment: a new revision of the same plant.</summary>
    public static async Task<AcceptedRevisionWire> NewRevisionAsync(HttpClient http)
    {
        using var body = new StringContent(DemoPlant.PlantFile(Start) + "\n# checked again\n", Encoding.UTF8, "application/yaml");
        using HttpResponseMessage answer = await http.PostAsync(new Uri("/api/v1/plant/revisions", UriKind.Relative), body);
        answer.EnsureSuccessStatusCode();
        return (await answer.Content.ReadFromJsonAsync<AcceptedRevisionWire>(Json))!;
    }

    /// <summary>Asks for all days anew.</summary>
    public static async Task<RecomputationWire> RecomputeAsync(HttpClient http, string? line = null)
    {
        using HttpResponseMessage answer = await http.PostAsJsonAsync(new Uri("/api/v1/recomputations", UriKind.Relative), new { line }, Json);
        answer.EnsureSuccessStatusCode();
        return (await answer.Content.ReadFromJsonAsync<RecomputationWire>(Json))!;
    }

    /// <summary>Waits until at most so many days of a recomputation are left.</summary>
    public async Task LeftAsync(int id, long days)
    {
        while (await CountAsync($"SELECT count(*) FROM recomputation_day WHERE recomputation_id = {id}") > days) await Task.Delay(20);
    }

    /// <summary>All bits of the results of a revision: rows and hash of each table, in the order of its key.</summary>
    public async Task<IReadOnlyDictionary<string, (long Rows, string Hash)>> BitsAsync(int revision)
    {
        var bits = new Dictionary<string, (long, string)>();
        foreach ((string table, string key) in Tables)
        {
            await using NpgsqlCommand command = Database.CreateCommand(
                $"SELECT count(*), coalesce(encode(sha256(string_agg(decode(md5(t::text), 'hex'), ''::bytea ORDER BY {key})), 'hex'), '') FROM {table} t WHERE revision_id = {revision}");
            await using NpgsqlDataReader reader = await command.ExecuteReaderAsync();
            await reader.ReadAsync();
            bits[table] = (reader.GetInt64(0), reader.GetString(1));
        }

        return bits;
    }

    /// <summary>Waits until the surfaces are computed from all that stands, and gives their bits: hours held against the clean expectation, and campaigns.</summary>
    public async Task<IReadOnlyDictionary<string, (long Rows, string Hash)>> SurfaceBitsAsync()
    {
        var inputs = new SurfaceInputs(Database);
        for (int line = 1; line <= await CountAsync("SELECT max(line_id) FROM line"); line++)
        {
            while (await CountAsync($"SELECT count(*) FROM surface_state WHERE line_id = {line} AND input LIKE '% {await inputs.VersionAsync(line, CancellationToken.None)}'") == 0) await Task.Delay(50);
        }

        var bits = new Dictionary<string, (long, string)>();
        foreach ((string table, string key) in new[] { ("clean_hour", "line_id, effect_id, hour"), ("surface_history", "line_id, surface") })
        {
            await using NpgsqlCommand command = Database.CreateCommand(
                $"SELECT count(*), coalesce(encode(sha256(string_agg(decode(md5(t::text), 'hex'), ''::bytea ORDER BY {key})), 'hex'), '') FROM {table} t");
            await using NpgsqlDataReader reader = await command.ExecuteReaderAsync();
            await reader.ReadAsync();
            bits[table] = (reader.GetInt64(0), reader.GetString(1));
        }

        return bits;
    }

    /// <summary>Deletes the results of a revision, so that what stands afterwards was written afterwards.</summary>
    public async Task ClearAsync(int revision)
    {
        foreach ((string table, _) in Tables)
        {
            await using NpgsqlCommand command = Database.CreateCommand($"DELETE FROM {table} WHERE revision_id = {revision}");
            await command.ExecuteNonQueryAsync();
        }

        await using NpgsqlCommand vacuum = Database.CreateCommand("VACUUM ANALYZE");
        await vacuum.ExecuteNonQueryAsync();
    }

    public async Task<long> CountAsync(string sql)
    {
        await using NpgsqlCommand command = Database.CreateCommand(sql);
        return Convert.ToInt64(await command.ExecuteScalarAsync(), System.Globalization.CultureInfo.InvariantCulture);
    }

    public async ValueTask DisposeAsync()
    {
        await Database.DisposeAsync();
        await _server.StopAsync();
        Directory.Delete(_folder, recursive: true);
    }

    private static async Task ImportAsync(HttpClient http, string file)
    {
        using var body = new StreamContent(File.OpenRead(file));
        body.Headers.ContentType = new MediaTypeHeaderValue("application/gzip");
        using HttpResponseMessage answer = await http.PostAsync(new Uri($"/api/v1/imports?name={Path.GetFileName(file)}", UriKind.Relative), body);
        answer.EnsureSuccessStatusCode();
        ImportWire import = (await answer.Content.ReadFromJsonAsync<ImportWire>(Json))!;
        while (import.State is "waiting" or "running")
        {
            await Task.Delay(200);
            import = (await http.GetFromJsonAsync<ImportWire>(new Uri($"/api/v1/imports/{import.Id}", UriKind.Relative), Json))!;
        }

        if (import.State != "done") throw new InvalidOperationException($"The import ended as {import.State}: {import.Error}");
    }
}
