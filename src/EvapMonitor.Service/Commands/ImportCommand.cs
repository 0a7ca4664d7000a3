using System.ComponentModel;
using System.Globalization;
using System.Net.Http.Headers;
using System.Text.Json;
using EvapMonitor.Service.Api.Wire;
using Spectre.Console.Cli;

namespace EvapMonitor.Service.Commands;

/// <summary>Sends history files to a running service and follows their import.</summary>
internal sealed class ImportCommand : AsyncCommand<ImportCommand.Settings>
{
    private static readonly JsonSerializerOptions Json = new() { PropertyNamingPolicy = JsonNamingPolicy.SnakeCaseLower };

    internal sealed class Settings : CommandSettings
    {
        [CommandArgument(0, "<FILES>")]
        [Description("CSV files, plain or gzip.")]
        public required string[] Files { get; init; }

        [CommandOption("--service <ADDRESS>")]
        [Description("Address of the running service, default " + ServiceOptions.DefaultListen + ".")]
        public string? Service { get; init; }

        [CommandOption("--replace")]
        [Description("Override stored values that differ.")]
        public bool Replace { get; init; }
    }

    public override async Task<int> ExecuteAsync(CommandContext context, Settings settings, CancellationToken cancellationToken)
    {
        string address = settings.Service ?? Environment.GetEnvironmentVariable("EVAPMONITOR_LISTEN") ?? ServiceOptions.DefaultListen;
        using var http = new HttpClient { BaseAddress = new Uri(address), Timeout = TimeSpan.FromHours(1) };
        int exit = Exit.Done;
        foreach (string file in settings.Files) exit = int.Max(exit, await ImportAsync(http, file, settings.Replace, cancellationToken));
        return exit;
    }

    /// <summary>Sends one file and follows it to its end.</summary>
    internal static async Task<int> ImportAsync(HttpClient http, string file, bool replace, CancellationToken stop)
    {
        await using FileStream stream = File.OpenRead(file);
        using var body = new StreamContent(stream);
        body.Headers.ContentType = new MediaTypeHeaderValue(file.EndsWith(".gz", StringComparison.OrdinalIgnoreCase) ? "application/gzip" : "text/csv");
        string name = Path.GetFileName(file);
        using HttpResponseMessage answer = await http.PostAsync(new Uri($"/api/v1/imports?name={Uri.EscapeDataString(name)}&replace={(replace ? "true" : "false")}", UriKind.Relative), body, stop);
        if (!answer.IsSuccessStatusCode)
        {
            await Console.Error.WriteLineAsync($"{name}: {await answer.Content.ReadAsStringAsync(stop)}");
            return Exit.Failed;
        }

        ImportWire import = (await answer.Content.ReadFromJsonAsync<ImportWire>(Json, stop))!;
        while (import.State is "waiting" or "running")
        {
            await Task.Delay(TimeSpan.FromMilliseconds(500), stop);
            import = (await http.GetFromJsonAsync<ImportWire>(new Uri($"/api/v1/imports/{import.Id}", UriKind.Relative), Json, stop))!;
            if (!Console.IsOutputRedirected) Console.Write($"\r{Progress(name, import),-100}");
        }

        if (!Console.IsOutputRedirected) Console.WriteLine();
        Console.WriteLine(string.Create(CultureInfo.InvariantCulture,
            $"{name}: {import.State}, {import.Accepted} stored, {import.Repeated} repeated, {import.Differing} differing, {import.Rejected} rejected, {import.NotInPlant} of signals not in the plant file"));
        foreach (ProblemRowWire problem in import.Problems) await Console.Error.WriteLineAsync($"{name}:{problem.Line}: {problem.Reason}");
        foreach (UnknownSignalWire signal in import.UnknownSignals.Take(20)) await Console.Error.WriteLineAsync($"{name}: {signal.Name}: {signal.Count} readings, but the plant file names no such signal");
        if (import.Error is not null) await Console.Error.WriteLineAsync($"{name}: {import.Error}");
        if (import.State != "done") return Exit.Failed;
        return import.Rejected + import.Differing > 0 ? Exit.DoneWithRejected : Exit.Done;
    }

    private static string Progress(string name, ImportWire import) => string.Create(CultureInfo.InvariantCulture,
        $"{name}: {100.0 * import.BytesRead / long.Max(1, import.BytesTotal):0} %, {import.RowsPerS ?? 0:0} readings/s, {import.SecondsLeft ?? 0:0} s left");
}
