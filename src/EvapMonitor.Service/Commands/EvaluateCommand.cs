using System.ComponentModel;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.PlantFile;
using Spectre.Console.Cli;

namespace EvapMonitor.Service.Commands;

/// <summary>The whole computation on files alone.</summary>
internal sealed class EvaluateCommand : AsyncCommand<EvaluateCommand.Settings>
{
    internal sealed class Settings : CommandSettings
    {
        [CommandArgument(0, "<PLANT>")]
        [Description("The plant file.")]
        public required string Plant { get; init; }

        [CommandArgument(1, "<READINGS>")]
        [Description("One or more CSV files of readings, plain or gzip.")]
        public required string[] Readings { get; init; }

        [CommandOption("--out <FOLDER>", isRequired: true)]
        [Description("Folder for the results; made when it is not there.")]
        public required string Out { get; init; }

        [CommandOption("--events <FILE>")]
        [Description("CSV of logged events: time,end,line,effect,signal,kind,note.")]
        public string? Events { get; init; }
    }

    public override async Task<int> ExecuteAsync(CommandContext context, Settings settings, CancellationToken cancellationToken)
    {
        PlantFileResult result = PlantFileReader.Read(await File.ReadAllTextAsync(settings.Plant, cancellationToken));
        foreach (PlantFileProblem problem in result.Problems) await Console.Error.WriteLineAsync(problem.ToLine(settings.Plant));
        if (result.Site is not { } site) return Exit.Failed;
        var evaluation = new FileEvaluation(site, cancellationToken);
        foreach (string file in settings.Readings) evaluation.Read(file);
        if (settings.Events is not null) evaluation.ReadEvents(settings.Events);
        Directory.CreateDirectory(settings.Out);
        evaluation.Write(settings.Out);
        foreach (string told in evaluation.Told) await Console.Error.WriteLineAsync(told);
        Console.WriteLine(evaluation.Summary);
        return evaluation.Rejected > 0 ? Exit.DoneWithRejected : Exit.Done;
    }
}
