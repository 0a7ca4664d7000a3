using System.IO.Compression;
using System.Net.Http.Json;
using EvapMonitor.Service.Api;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Simulator;
using Microsoft.Extensions.DependencyInjection;
using Spectre.Console.Cli;

namespace EvapMonitor.Service.Commands;

/// <summary>Runs the service with an invented plant. Its history is made and imported once, while the page already works.</summary>
internal sealed class DemoCommand : AsyncCommand<ServiceSettings>
{
    public override async Task<int> ExecuteAsync(CommandContext context, ServiceSettings settings, CancellationToken cancellationToken)
    {
        ServiceOptions options = settings.ToOptions(null, Path.Combine(ServiceOptions.DefaultData, "demo"), connection: null);
        Directory.CreateDirectory(options.Data);
        string plant = Path.Combine(options.Data, "plant.yaml");
        DateTimeOffset start = Start(options.Data);
        if (!File.Exists(plant)) await File.WriteAllTextAsync(plant, DemoPlant.PlantFile(start), cancellationToken);
        await using ServiceHost host = await ServiceHost.StartAsync(options with { Plant = plant }, cancellationToken);
        Console.WriteLine($"The demo plant is at {host.Address} (stop with Ctrl-C)");
        SiteWire site = await host.Services.GetRequiredService<SiteStates>().SiteAsync(cancellationToken);
        if (site.Readings == "none" && site.ImportsRunning == 0) await FillAsync(host.Address, options.Data, start, cancellationToken);
        await host.WaitAsync(cancellationToken);
        return Exit.Done;
    }

    /// <summary>The instant at which the demo's history begins: fixed at the first start, so that a second start goes on with the same past.</summary>
    private static DateTimeOffset Start(string data)
    {
        string note = Path.Combine(data, "demo-start.txt");
        if (File.Exists(note) && DateTimeOffset.TryParse(File.ReadAllText(note), System.Globalization.CultureInfo.InvariantCulture, out DateTimeOffset known)) return known;
        DateTimeOffset now = TimeProvider.System.GetUtcNow();
        var start = new DateTimeOffset(now.Year, now.Month, now.Day, now.Hour, 0, 0, TimeSpan.Zero);
        start = start.AddDays(-DemoPlant.Days);
        File.WriteAllText(note, start.ToString("O"));
        return start;
    }

    private static async Task FillAsync(string address, string data, DateTimeOffset start, CancellationToken stop)
    {
        using var http = new HttpClient { BaseAddress = new Uri(address), Timeout = TimeSpan.FromMinutes(10) };
        foreach ((string effect, DateTimeOffset from, DateTimeOffset to) in DemoPlant.LoggedCleanings(start))
        {
            using var request = new HttpRequestMessage(HttpMethod.Post, "/api/v1/cleanings")
            {
                Content = JsonContent.Create(new { line = "north", effect, start = from, end = to, kind = "chemical", note = "" }),
            };
            request.Headers.Add("Idempotency-Key", $"demo-{effect}-{from.ToUnixTimeSeconds()}");
            using HttpResponseMessage logged = await http.SendAsync(request, stop);
            logged.EnsureSuccessStatusCode();
        }

        string file = Path.Combine(data, "history.csv.gz");
        await using (var zip = new GZipStream(File.Create(file), CompressionLevel.Fastest))
        await using (var text = new StreamWriter(zip))
        {
            DemoPlant.WriteHistory(text, start, TimeProvider.System.GetUtcNow());
        }

        await ImportCommand.ImportAsync(http, file, replace: false, stop);
        File.Delete(file);
    }
}
