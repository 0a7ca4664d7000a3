using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>What <c>evapmonitor check</c> says of a sound plant file: per effect what can be computed, from which instruments, and what is missing.</summary>
public static class PlantCheck
{
    /// <summary>The report, line by line.</summary>
    public static IReadOnlyList<string> Report(Site site)
    {
        ArgumentNullException.ThrowIfNull(site);
        var report = new List<string>
        {
            $"Site {site.Name} ({site.TimeZone}), windows of {Invariant($"{site.Window.TotalMinutes:0.##}")} min, history from {Invariant($"{site.HistoryFrom.UtcDateTime:yyyy-MM-dd HH:mm}")} UTC",
        };
        foreach (Line line in site.Lines) Report(line, report);
        Assumed("Site: accuracy assumed", SiteInstruments.Of(site).Where(i => i.Line is null), report);
        return report;
    }

    private static void Report(Line line, List<string> report)
    {
        report.Add("");
        report.Add($"Line {line.Name}: {Liquor(line.Liquor)}");
        IReadOnlyList<EffectCheck> checks = EffectCheck.Of(line);
        foreach (EffectCheck check in checks)
        {
            Effect effect = check.Effect;
            report.Add($"  {effect.Name}: {Invariant($"{effect.Area:0.##}")} m2, heated by {Names(effect.Heating.Select(h => h.VapourOf is null ? "steam" : "vapour of " + h.VapourOf))}, liquor from {Names(effect.Liquor.Select(l => l.From ?? "the feed"))}");
            report.Add("    heating temperature: " + Words(check.Heating));
            report.Add("    boiling temperature: " + Words(check.Boiling));
            report.Add("    duty:                " + Words(check.Duty));
            report.Add("    coefficient:         " + (check.IsComplete ? "from these" : "not from these alone; the balance of the line may still give it"));
        }

        Assumed("  accuracy assumed", SiteInstruments.Of(line), report);
        report.Add(Invariant($"  {checks.Count(c => c.IsComplete)} of {checks.Count} effects have a coefficient from their own instruments"));
    }

    private static void Assumed(string begin, IEnumerable<InstrumentAtPlace> instruments, List<string> report)
    {
        List<string> assumed = [.. instruments.Where(i => i.Instrument.Accuracy.Assumed)
            .Select(i => $"{i.Instrument.Signal} ±{AssumedAccuracy.InWords(i.Instrument.Accuracy, i.Instrument.Unit)}").Distinct()];
        if (assumed.Count > 0) report.Add($"{begin}: {string.Join(", ", assumed)}");
    }

    private static string Liquor(LiquorChoice choice) => choice.Always is { } always
        ? "liquor " + always.Name
        : $"liquor told by {choice.Signal!.Signal} ({string.Join(", ", choice.ByValue.OrderBy(v => v.Key).Select(v => Invariant($"{v.Key} {v.Value.Name}")))})";

    private static string Words(Sourced sourced) => sourced.From ?? "missing: " + sourced.Missing;

    private static string Names(IEnumerable<string> names) => string.Join(" and ", names);
}
