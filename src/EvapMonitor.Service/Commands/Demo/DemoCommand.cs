using System.ComponentModel;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Ingest.Mqtt;
using EvapMonitor.Service.PlantFile;
using EvapMonitor.Simulator;
using Spectre.Console;
using Spectre.Console.Cli;

namespace EvapMonitor.Service.Commands.Demo;

/// <summary>Runs the service with an invented plant. Its history is made and imported while the pages already work; then readings come over MQTT.</summary>
internal sealed class DemoCommand : AsyncCommand<DemoCommand.Settings>
{
    internal sealed class Settings : ServiceSettings
    {
        [CommandOption("--pace <TIMES>")]
        [Description("How many times as fast as the clock readings come, 1 to 1000: history then stops earlier, and within an hour they have caught up. Default 1.")]
        [DefaultValue(1.0)]
        public double Pace { get; init; }

        public override ValidationResult Validate() =>
            Pace is >= 1 and <= 1000 ? ValidationResult.Success() : ValidationResult.Error($"--pace: found {Pace}; allowed: 1 to 1000.");
    }

    public override async Task<int> ExecuteAsync(CommandContext context, Settings settings, CancellationToken cancellationToken)
    {
        ServiceOptions options = settings.ToOptions(null, Path.Combine(ServiceOptions.DefaultData, "demo"), connection: null);
        Directory.CreateDirectory(options.Data);
        TimeProvider clock = TimeProvider.System;
        DemoRecord record = DemoRecord.Open(options.Data, DayOf(clock.GetUtcNow()).AddDays(-DemoPlant.Days));
        string plant = Path.Combine(options.Data, "plant.yaml");
        if (!File.Exists(plant)) await File.WriteAllTextAsync(plant, DemoPlant.PlantFile(record.Start), cancellationToken);
        await using ServiceHost host = await ServiceHost.StartAsync(options with { Plant = plant }, cancellationToken);
        Console.WriteLine($"The demo plant is at {host.Address} (stop with Ctrl-C)");
        using var stop = CancellationTokenSource.CreateLinkedTokenSource(cancellationToken);
        Task readings = Task.Run(() => MakeReadingsAsync(host, options, record, new DemoClock(clock, settings.Pace, record.Newest), stop.Token), CancellationToken.None);
        await host.WaitAsync(cancellationToken);
        await stop.CancelAsync();
        await readings;
        return Exit.Done;
    }

    private static async Task MakeReadingsAsync(ServiceHost host, ServiceOptions options, DemoRecord record, DemoClock clock, CancellationToken stop)
    {
        using var http = new HttpClient { BaseAddress = new Uri(host.Address), Timeout = TimeSpan.FromMinutes(10) };
        IReadOnlyList<LineReadings> lines = [];
        bool begun = await TellingAsync("The demo makes no readings", async () =>
        {
            lines = DemoPlant.Readings(host.Services.GetRequiredService<Store.PlantHolder>().Current.Site, record.Start);
            await Task.WhenAll(lines.Select(line => Task.Run(() => line.Simulation.RunTo(clock.Begin), stop)));
            await DemoCleanings.LogAsync(http, record.Start, record.Start, clock.Begin, stop);
        }, stop);
        if (!begun) return;
        BrokerSettings? broker = BrokerOf(host, options);
        if (broker is null) Console.WriteLine("No live readings: the own MQTT broker is off and sources.json names none.");
        await Task.WhenAll(
            TellingAsync("The history is not whole; another start goes on with it", async () =>
            {
                await new DemoHistory(http, options.Data, record, lines).FillAsync(clock.Begin, stop);
                Console.WriteLine("The history is imported; its evaluation goes on.");
            }, stop),
            TellingAsync("The live readings have ended", () =>
                broker is null ? Task.CompletedTask : new DemoLive(broker, http, record, clock, lines, Console.WriteLine).RunAsync(stop), stop));
    }

    /// <summary>Does a part; where it fails, says so and leaves the rest to go on.</summary>
    private static async Task<bool> TellingAsync(string failed, Func<Task> part, CancellationToken stop)
    {
        try
        {
            await part();
            return true;
        }
        catch (OperationCanceledException) when (stop.IsCancellationRequested)
        {
            return false;
        }
        catch (Exception error) when (error is HttpRequestException or OperationCanceledException or InvalidOperationException or NotSupportedException or IOException)
        {
            await Console.Error.WriteLineAsync($"{failed}: {error.Message}");
            return false;
        }
    }

    /// <summary>The own broker, or the first that the sources file names.</summary>
    private static BrokerSettings? BrokerOf(ServiceHost host, ServiceOptions options) =>
        host.Services.GetService<OwnBroker>() is { Port: > 0 and var port }
            ? new BrokerSettings { Name = "own broker", Host = "127.0.0.1", Port = port, ClientId = "fennholm", Topics = [] }
            : options.Ingest.Plan(options.Data, out _).Brokers is [{ } first, ..] ? first : null;

    /// <summary>The story's days begin at midnight (UTC).</summary>
    private static DateTimeOffset DayOf(DateTimeOffset now) => new(now.Year, now.Month, now.Day, 0, 0, 0, TimeSpan.Zero);
}
