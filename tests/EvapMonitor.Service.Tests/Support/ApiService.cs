using System.Net;
using System.Net.Http.Json;
using System.Text;
using System.Text.Json;
using EvapMonitor.Service.PlantFile;
using EvapMonitor.Simulator;

namespace EvapMonitor.Service.Tests.Support;

/// <summary>
/// A service with the north line of the demo plant and two days of its history, evaluated, shared by the tests of one class. Its present is just after the end of the history.
/// </summary>
public class ApiService(PostgresServer server) : IAsyncLifetime
{
    /// <summary>The first instant of the history.</summary>
    public static readonly DateTimeOffset Start = new(2026, 3, 2, 0, 0, 0, TimeSpan.Zero);

    /// <summary>The end of the history.</summary>
    public static readonly DateTimeOffset End = Start.AddDays(2);

    private static readonly Lazy<string> Readings = new(() =>
    {
        IReadOnlyList<LineReadings> lines = DemoPlant.Readings(PlantFileReader.Read(Plant).Site!, Start);
        foreach (LineReadings line in lines) line.Simulation.RunTo(End);
        using StringWriter wide = new(), marked = new();
        HistoryWriter.Write(wide, marked, lines, Start, End);
        return wide.ToString();
    });

    private RunningService? _service;

    public static string History => Readings.Value;

    public static string Plant => DemoPlant.PlantFile(Start, "north");

    public RunningService Service => _service ?? throw new InvalidOperationException("The prerequisites of the service are missing.");

    public HttpClient Http => Service.Http;

    public async ValueTask InitializeAsync()
    {
        if (!Prerequisites.HasPostgreSql) return;
        _service = await RunningService.StartAsync(server, Plant, End.AddMinutes(1));
        Assert.Equal("done", (await _service.ImportAsync(History)).State);
        await _service.SurfacesAsync();
    }

    /// <summary>A request with a JSON body and an idempotency key.</summary>
    public static HttpRequestMessage Keyed(HttpMethod method, string path, string body, string key) => new(method, path)
    {
        Content = new StringContent(body, Encoding.UTF8, "application/json"), Headers = { { "Idempotency-Key", key } },
    };

    /// <summary>Sends a request and expects problem details; gives their text.</summary>
    public async Task<string> ProblemAsync(HttpStatusCode status, HttpRequestMessage request)
    {
        using HttpResponseMessage answer = await Http.SendAsync(request, TestContext.Current.CancellationToken);
        string text = await answer.Content.ReadAsStringAsync(TestContext.Current.CancellationToken);
        Assert.True(status == answer.StatusCode, $"{(int)answer.StatusCode} {text}");
        Assert.Equal("application/problem+json", answer.Content.Headers.ContentType?.MediaType);
        using JsonDocument problem = JsonDocument.Parse(text);
        Assert.Equal((int)status, problem.RootElement.GetProperty("status").GetInt32());
        return problem.RootElement.TryGetProperty("detail", out JsonElement detail) ? detail.GetString()! : "";
    }

    /// <inheritdoc cref="ProblemAsync(HttpStatusCode, HttpRequestMessage)"/>
    public async Task<string> ProblemAsync(HttpStatusCode status, string path)
    {
        using var request = new HttpRequestMessage(HttpMethod.Get, path);
        return await ProblemAsync(status, request);
    }

    public async ValueTask DisposeAsync()
    {
        if (_service is not null) await _service.DisposeAsync();
        GC.SuppressFinalize(this);
    }
}
