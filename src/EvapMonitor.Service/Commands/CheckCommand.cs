using System.ComponentModel;
using EvapMonitor.Service.PlantFile;
using Spectre.Console.Cli;

namespace EvapMonitor.Service.Commands;

/// <summary>Checks a plant file.</summary>
internal sealed class CheckCommand : AsyncCommand<CheckCommand.Settings>
{
    internal sealed class Settings : CommandSettings
    {
        [CommandArgument(0, "<PLANT>")]
        [Description("The plant file.")]
        public required string Plant { get; init; }
    }

    public override async Task<int> ExecuteAsync(CommandContext context, Settings settings, CancellationToken cancellationToken)
    {
        PlantFileResult result = PlantFileReader.Read(await File.ReadAllTextAsync(settings.Plant, cancellationToken));
        foreach (PlantFileProblem problem in result.Problems) await Console.Error.WriteLineAsync(problem.ToLine(settings.Plant));
        if (result.Site is not { } site) return Exit.Failed;
        foreach (string line in PlantCheck.Report(site)) Console.WriteLine(line);
        return Exit.Done;
    }
}
