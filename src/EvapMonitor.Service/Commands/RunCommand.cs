using System.ComponentModel;
using Spectre.Console.Cli;

namespace EvapMonitor.Service.Commands;

/// <summary>Options of the commands that run the service; each falls back to the environment, then to its default.</summary>
internal class ServiceSettings : CommandSettings
{
    [CommandOption("--data <FOLDER>")]
    [Description("Folder for the private database and uploads (EVAPMONITOR_DATA).")]
    public string? Data { get; init; }

    [CommandOption("--listen <ADDRESS>")]
    [Description("Loopback address to listen on (EVAPMONITOR_LISTEN), default " + ServiceOptions.DefaultListen + ".")]
    public string? Listen { get; init; }

    public ServiceOptions ToOptions(string? plant, string defaultData, string? connection) => new()
    {
        Plant = plant,
        Data = Data ?? Environment.GetEnvironmentVariable("EVAPMONITOR_DATA") ?? defaultData,
        Listen = Listen ?? Environment.GetEnvironmentVariable("EVAPMONITOR_LISTEN") ?? ServiceOptions.DefaultListen,
        Connection = connection,
        InContainer = Environment.GetEnvironmentVariable("EVAPMONITOR_NETWORK") == "container",
        Ingest = Ingest.IngestSettings.FromEnvironment(),
    };
}

/// <summary>Runs the service until it is told to stop.</summary>
internal sealed class RunCommand : AsyncCommand<RunCommand.Settings>
{
    internal sealed class Settings : ServiceSettings
    {
        [CommandArgument(0, "[PLANT]")]
        [Description("The plant file; without it, the revision last accepted.")]
        public string? Plant { get; init; }
    }

    public override async Task<int> ExecuteAsync(CommandContext context, Settings settings, CancellationToken cancellationToken)
    {
        // The connection string may hold a password: it comes by the environment alone, never by an argument that others can list.
        string? connection = Environment.GetEnvironmentVariable("EVAPMONITOR_CONNECTION");
        await using ServiceHost host = await ServiceHost.StartAsync(settings.ToOptions(settings.Plant, ServiceOptions.DefaultData, connection), cancellationToken);
        await host.WaitAsync(cancellationToken);
        return Exit.Done;
    }
}
