using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Browser;

/// <summary>
/// A line of the demo plant for the browser: the floor of N4 set so high that it is due, and texts from outside that would do harm if a page took them for markup.
/// </summary>
public sealed class DashboardService(PostgresServer server) : IAsyncLifetime
{
    internal const string Hostile = "<img src=x onerror=document.title='taken'>";

    private RunningService? _service;

    internal static string Plant { get; } = "# <script>document.title='taken'</script>" + Environment.NewLine
        + ApiService.Plant.Replace("coefficient-below: 720", "coefficient-below: 1500", StringComparison.Ordinal);

    public PostgresServer Server => server;

    public RunningService Service => _service ?? throw new InvalidOperationException("The prerequisites of the service are missing.");

    public async ValueTask InitializeAsync()
    {
        if (!Prerequisites.HasBrowser) return;
        _service = await RunningService.StartAsync(server, Plant, ApiService.End.AddMinutes(1));
        await _service.ImportAsync(ApiService.History, name: "two-days.csv");
        await _service.ImportAsync($"time,signal,value\n2026-03-03T10:00:00Z,{Hostile},1\n2026-03-03T10:00:00Z,N.FT-10,{Hostile}\n", name: "hostile.csv");
        await _service.EvaluatedAsync();
    }

    public async ValueTask DisposeAsync()
    {
        if (_service is not null) await _service.DisposeAsync();
    }
}
