using System.Globalization;

namespace EvapMonitor.Service.Tests.Support;

/// <summary>A service with the demo plant, whose feed flow reads a tenth too much from noon of the second day on.</summary>
public sealed class FaultyService(PostgresServer server) : IAsyncLifetime
{
    /// <summary>When the fault begins.</summary>
    public static readonly DateTimeOffset Fault = ApiService.Start.AddDays(1).AddHours(12);

    private RunningService? _service;

    /// <summary>The history with the fault in it.</summary>
    public static string History { get; } = string.Join('\n', ApiService.History.Split('\n').Select(Spoilt));

    public PostgresServer Server => server;

    public RunningService Service => _service ?? throw new InvalidOperationException("The prerequisites of the service are missing.");

    public async ValueTask InitializeAsync()
    {
        if (!Prerequisites.HasPostgreSql) return;
        _service = await RunningService.StartAsync(server, ApiService.Plant, ApiService.End.AddMinutes(1));
        Assert.Equal("done", (await _service.ImportAsync(History)).State);
        await _service.EvaluatedAsync();
    }

    public async ValueTask DisposeAsync()
    {
        if (_service is not null) await _service.DisposeAsync();
    }

    private static string Spoilt(string row)
    {
        string[] cells = row.Split(',');
        int column = Array.IndexOf(ApiService.History[..ApiService.History.IndexOf('\n', StringComparison.Ordinal)].TrimEnd('\r').Split(','), "N.FT-10");
        if (!DateTimeOffset.TryParse(cells[0], CultureInfo.InvariantCulture, out DateTimeOffset at) || at < Fault || cells[column].Length == 0) return row;
        cells[column] = (double.Parse(cells[column], CultureInfo.InvariantCulture) * 1.1).ToString("0.000", CultureInfo.InvariantCulture);
        return string.Join(',', cells);
    }
}
