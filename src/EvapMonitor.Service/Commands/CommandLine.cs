using EvapMonitor.Service.Commands.Demo;
using Spectre.Console.Cli;

namespace EvapMonitor.Service.Commands;

/// <summary>The commands of the program.</summary>
internal static class CommandLine
{
    /// <summary>Runs one command; returns its exit code: 0 done, 1 failed, 2 wrong use, 3 done with rejected input.</summary>
    public static Task<int> RunAsync(string[] arguments, CancellationToken stop)
    {
        var app = new CommandApp();
        app.Configure(commands =>
        {
            commands.SetApplicationName("evapmonitor");
            commands.AddCommand<RunCommand>("run").WithDescription("Run the service, with the plant file given or the revision last accepted.");
            commands.AddCommand<DemoCommand>("demo").WithDescription("Run the service with an invented plant: its history, then live readings over MQTT.");
            commands.AddCommand<CheckCommand>("check").WithDescription("Check a plant file; say per effect what can be computed and from which instruments.");
            commands.AddCommand<EvaluateCommand>("evaluate").WithDescription("The whole computation on files alone, without a database.");
            commands.AddCommand<ImportCommand>("import").WithDescription("Send history files to a running service and follow their import.");
            commands.AddCommand<PlantCommand>("plant").WithDescription("Give a running service a plant file, from now on or from an instant; or list its revisions.");
            commands.AddCommand<RecomputeCommand>("recompute").WithDescription("Have a running service compute days anew from their stored readings; stop that, go on.");
            commands.SetExceptionHandler(Failure.Tell);
        });
        return app.RunAsync(arguments, stop);
    }
}
