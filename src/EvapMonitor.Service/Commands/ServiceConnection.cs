using System.Globalization;
using System.Net;
using System.Net.Http.Json;
using System.Text.Json;
using EvapMonitor.Service.Api.Wire;

namespace EvapMonitor.Service.Commands;

/// <summary>Asks a running service on behalf of a command. What it refuses goes to stderr, one line each.</summary>
internal sealed class ServiceConnection : IDisposable
{
    private static readonly JsonSerializerOptions Json = new() { PropertyNamingPolicy = JsonNamingPolicy.SnakeCaseLower };

    private readonly HttpClient _http;

    /// <summary>Connects to a service: the address given, the environment's, or the default one.</summary>
    public ServiceConnection(string? address) =>
        _http = new HttpClient { BaseAddress = new Uri(address ?? Environment.GetEnvironmentVariable("EVAPMONITOR_LISTEN") ?? ServiceOptions.DefaultListen), Timeout = TimeSpan.FromMinutes(5) };

    /// <summary>An answer, or the exit code of a command that was refused.</summary>
    public readonly record struct Answer<T>(T? Value, int Exit)
        where T : class;

    /// <summary>Gets something.</summary>
    public Task<Answer<T>> GetAsync<T>(string path, CancellationToken stop)
        where T : class => SendAsync<T>(HttpMethod.Get, path, null, "", stop);

    /// <summary>Sends something.</summary>
    /// <param name="path">Path below /api/v1.</param>
    /// <param name="body">What is sent; null for nothing.</param>
    /// <param name="name">Name of the file that is sent, for its mistakes; empty for none.</param>
    /// <param name="stop">Cancels.</param>
    public Task<Answer<T>> PostAsync<T>(string path, HttpContent? body, string name, CancellationToken stop)
        where T : class => SendAsync<T>(HttpMethod.Post, path, body, name, stop);

    /// <summary>Sends an object as JSON.</summary>
    public Task<Answer<T>> PostAsync<T>(string path, object body, CancellationToken stop)
        where T : class => PostAsync<T>(path, JsonContent.Create(body, body.GetType(), null, Json), "", stop);

    public void Dispose() => _http.Dispose();

    private async Task<Answer<T>> SendAsync<T>(HttpMethod method, string path, HttpContent? body, string name, CancellationToken stop)
        where T : class
    {
        using var request = new HttpRequestMessage(method, new Uri("/api/v1" + path, UriKind.Relative)) { Content = body };
        using HttpResponseMessage answer = await _http.SendAsync(request, stop);
        if (answer.IsSuccessStatusCode) return new((await answer.Content.ReadFromJsonAsync<T>(Json, stop))!, Exit.Done);
        string text = await answer.Content.ReadAsStringAsync(stop);
        foreach (string line in Lines(text, name)) await Console.Error.WriteLineAsync(line);
        return new(null, answer.StatusCode is HttpStatusCode.BadRequest or HttpStatusCode.NotFound ? Exit.WrongUse : Exit.Failed);
    }

    /// <summary>Problem details as lines: the mistakes of a file as compilers write them, else what went wrong.</summary>
    private static IEnumerable<string> Lines(string text, string name)
    {
        JsonElement problem;
        try
        {
            problem = JsonSerializer.Deserialize<JsonElement>(text);
        }
        catch (JsonException)
        {
            return [text.ReplaceLineEndings(" ")];
        }

        if (problem.ValueKind != JsonValueKind.Object) return [text.ReplaceLineEndings(" ")];
        if (problem.TryGetProperty("problems", out JsonElement problems))
        {
            return problems.Deserialize<PlantProblemWire[]>(Json)!.Select(one =>
                new PlantFile.PlantFileProblem(one.Line, one.Column, one.Path, one.Found, one.Allowed).ToLine(name));
        }

        string? Member(string member) => problem.TryGetProperty(member, out JsonElement value) && value.ValueKind == JsonValueKind.String ? value.GetString() : null;
        return [(Member("detail") ?? Member("title") ?? text).ReplaceLineEndings(" ")];
    }
}

/// <summary>Follows a recomputation in a running service.</summary>
internal static class RecomputationProgress
{
    private static readonly TimeSpan Pause = TimeSpan.FromMilliseconds(500);

    /// <summary>Shows how far it is until it ends. When the command is stopped it goes on in the service.</summary>
    public static async Task<int> FollowAsync(ServiceConnection service, RecomputationWire one, CancellationToken stop)
    {
        try
        {
            while (one.State == "running")
            {
                await Task.Delay(Pause, stop);
                ServiceConnection.Answer<RecomputationWire> answer = await service.GetAsync<RecomputationWire>($"/recomputations/{one.Id}", stop);
                if (answer.Value is null) return answer.Exit;
                one = answer.Value;
                if (!Console.IsOutputRedirected) Console.Write($"\r{Progress(one),-100}");
            }
        }
        catch (OperationCanceledException) when (stop.IsCancellationRequested)
        {
            if (!Console.IsOutputRedirected) Console.WriteLine();
            await Console.Error.WriteLineAsync($"Recomputation {one.Id} goes on in the service. evapmonitor recompute --cancel {one.Id} stops it, --resume {one.Id} goes on.");
            return Exit.Failed;
        }

        if (!Console.IsOutputRedirected) Console.WriteLine();
        Console.WriteLine(Told(one));
        return one.State == "done" ? Exit.Done : Exit.Failed;
    }

    /// <summary>A recomputation in one line.</summary>
    public static string Told(RecomputationWire one) => string.Create(CultureInfo.InvariantCulture,
        $"{one.Id}: {one.Why} {one.Line ?? "all lines"}, {one.From:yyyy-MM-dd} to {one.To:yyyy-MM-dd}: {one.State}, {one.DaysDone} of {one.DaysTotal} days computed")
        + (one.State != "cancelled" ? "" : string.Create(CultureInfo.InvariantCulture, $"; {one.DaysLeft} keep their earlier results, --resume {one.Id} goes on"));

    private static string Progress(RecomputationWire one) => string.Create(CultureInfo.InvariantCulture,
        $"{one.Id}: {one.DaysDone} of {one.DaysTotal} days, {one.DaysPerMinute ?? 0:0} days/min, {one.SecondsLeft ?? 0:0} s left");
}
