using System.ComponentModel;
using System.Globalization;
using EvapMonitor.Service.Api.Wire;
using Spectre.Console;
using Spectre.Console.Cli;

namespace EvapMonitor.Service.Commands;

/// <summary>Has a running service compute days anew, and follows it.</summary>
internal sealed class RecomputeCommand : AsyncCommand<RecomputeCommand.Settings>
{
    private const string DayFormat = "yyyy-MM-dd";

    internal sealed class Settings : CommandSettings
    {
        [CommandOption("--line <LINE>")]
        [Description("The line; without it, all lines.")]
        public string? Line { get; init; }

        [CommandOption("--from <DAY>")]
        [Description("First UTC day, such as 2026-03-01; without it, the first with readings.")]
        public string? From { get; init; }

        [CommandOption("--to <DAY>")]
        [Description("Last UTC day; without it, the last with readings.")]
        public string? To { get; init; }

        [CommandOption("--cancel <ID>")]
        [Description("Stop this recomputation: the days left keep their results.")]
        public int? Cancel { get; init; }

        [CommandOption("--resume <ID>")]
        [Description("Go on with this recomputation.")]
        public int? Resume { get; init; }

        [CommandOption("--service <ADDRESS>")]
        [Description("Address of the running service, default " + ServiceOptions.DefaultListen + ".")]
        public string? Service { get; init; }

        public override ValidationResult Validate()
        {
            bool hasSpan = Line is not null || From is not null || To is not null;
            if ((Cancel is not null && Resume is not null) || ((Cancel ?? Resume) is not null && hasSpan)) return ValidationResult.Error("--cancel and --resume stand alone.");
            foreach (string? day in (ReadOnlySpan<string?>)[From, To])
            {
                if (day is not null && DayOf(day) is null) return ValidationResult.Error($"'{day}' is no day; allowed: a UTC day such as 2026-03-01.");
            }

            return ValidationResult.Success();
        }
    }

    public override async Task<int> ExecuteAsync(CommandContext context, Settings settings, CancellationToken cancellationToken)
    {
        using var service = new ServiceConnection(settings.Service);
        ServiceConnection.Answer<RecomputationWire> answer = settings switch
        {
            { Cancel: { } id } => await service.PostAsync<RecomputationWire>($"/recomputations/{id}/cancel", null, "", cancellationToken),
            { Resume: { } id } => await service.PostAsync<RecomputationWire>($"/recomputations/{id}/resume", null, "", cancellationToken),
            _ => await service.PostAsync<RecomputationWire>("/recomputations", new NewRecomputationWire(settings.Line, DayOf(settings.From), DayOf(settings.To)), cancellationToken),
        };
        if (answer.Value is not { } one) return answer.Exit;
        if (settings.Cancel is null) return await RecomputationProgress.FollowAsync(service, one, cancellationToken);
        Console.WriteLine(RecomputationProgress.Told(one));
        return Exit.Done;
    }

    private static DateOnly? DayOf(string? text) => DateOnly.TryParseExact(text, DayFormat, CultureInfo.InvariantCulture, DateTimeStyles.None, out DateOnly day) ? day : null;
}
