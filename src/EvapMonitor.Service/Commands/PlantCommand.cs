using System.ComponentModel;
using System.Globalization;
using System.Net.Http.Headers;
using EvapMonitor.Service.Api.Wire;
using Spectre.Console.Cli;

namespace EvapMonitor.Service.Commands;

/// <summary>Gives a running service a plant file, or lists the revisions that it has.</summary>
internal sealed class PlantCommand : AsyncCommand<PlantCommand.Settings>
{
    internal sealed class Settings : CommandSettings
    {
        [CommandArgument(0, "[FILE]")]
        [Description("The plant file; without it, the accepted revisions are listed.")]
        public string? File { get; init; }

        [CommandOption("--in-force-from <INSTANT>")]
        [Description("From when the plant is so: the start of a UTC day, such as 2026-03-01T00:00:00Z. Without it the file corrects the revision in force now.")]
        public string? InForceFrom { get; init; }

        [CommandOption("--service <ADDRESS>")]
        [Description("Address of the running service, default " + ServiceOptions.DefaultListen + ".")]
        public string? Service { get; init; }

        public override Spectre.Console.ValidationResult Validate() => File is null && InForceFrom is not null
            ? Spectre.Console.ValidationResult.Error("--in-force-from needs the plant file that is in force from then on.")
            : Spectre.Console.ValidationResult.Success();
    }

    public override async Task<int> ExecuteAsync(CommandContext context, Settings settings, CancellationToken cancellationToken)
    {
        using var service = new ServiceConnection(settings.Service);
        return settings.File is { } file ? await GiveAsync(service, file, settings.InForceFrom, cancellationToken) : await ListAsync(service, cancellationToken);
    }

    private static async Task<int> GiveAsync(ServiceConnection service, string file, string? from, CancellationToken stop)
    {
        using var body = new ByteArrayContent(await File.ReadAllBytesAsync(file, stop));
        body.Headers.ContentType = new MediaTypeHeaderValue("application/yaml");
        ServiceConnection.Answer<AcceptedRevisionWire> answer = await service.PostAsync<AcceptedRevisionWire>(
            "/plant/revisions" + (from is null ? "" : "?in_force_from=" + Uri.EscapeDataString(from)), body, Path.GetFileName(file), stop);
        if (answer.Value is not { } accepted) return answer.Exit;
        Console.WriteLine(accepted.IsNew ? $"Accepted: {Told(accepted.Revision)}" : $"Nothing changed: the file holds then already as {Told(accepted.Revision)}");
        return accepted is { IsNew: true, Recomputation: { } recomputation } ? await RecomputationProgress.FollowAsync(service, recomputation, stop) : Exit.Done;
    }

    private static async Task<int> ListAsync(ServiceConnection service, CancellationToken stop)
    {
        ServiceConnection.Answer<RevisionsWire> answer = await service.GetAsync<RevisionsWire>("/plant/revisions", stop);
        foreach (RevisionWire one in answer.Value?.Revisions ?? []) Console.WriteLine(Told(one));
        return answer.Exit;
    }

    private static string Told(RevisionWire one) => string.Create(CultureInfo.InvariantCulture,
        $"revision {one.Revision}, {one.State}, from {one.InForceFrom:yyyy-MM-ddTHH:mm:ssZ}")
        + (one.InForceUntil is { } until ? string.Create(CultureInfo.InvariantCulture, $" until {until:yyyy-MM-ddTHH:mm:ssZ}") : one.ReplacedBy is { } by ? $" (replaced by revision {by})" : "")
        + string.Create(CultureInfo.InvariantCulture, $", accepted {one.AcceptedAt:yyyy-MM-ddTHH:mm:ssZ} from {one.Author}, {one.DaysComputed} days computed under it");
}
