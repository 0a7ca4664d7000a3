using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>
/// What <c>evapmonitor check</c> says of a sound plant file: per effect what can be computed, from which instruments, and what is missing.
/// </summary>
public static class PlantCheck
{
    /// <summary>The report, line by line.</summary>
    public static IReadOnlyList<string> Report(Site site)
    {
        ArgumentNullException.ThrowIfNull(site);
        var report = new List<string>
        {
            Invariant($"Site {site.Name} ({site.TimeZone}), windows of {site.Window.TotalMinutes:0.##} min, ")
                + Invariant($"history from {site.HistoryFrom.UtcDateTime:yyyy-MM-dd HH:mm} UTC"),
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
            report.Add(Head(check.Effect));
            report.Add("    heating temperature: " + Words(check.Heating));
            report.Add("    boiling temperature: " + Words(check.Boiling));
            report.Add("    duty:                " + Words(check.Duty));
            string coefficient = check.IsComplete ? "from these" : "not from these alone; the balance of the line may still give it";
            report.Add("    coefficient:         " + coefficient);
        }

        report.AddRange(EquipmentCheck.Report(line));
        Assumed("  accuracy assumed", SiteInstruments.Of(line), report);
        report.Add(Invariant($"  {checks.Count(c => c.IsComplete)} of {checks.Count} effects have a coefficient from their own instruments"));
    }

    private static void Assumed(string begin, IEnumerable<InstrumentAtPlace> instruments, List<string> report)
    {
        List<string> assumed = [.. instruments.Where(i => i.Instrument.Accuracy.Assumed)
            .Select(i => $"{i.Instrument.Signal} ±{AssumedAccuracy.InWords(i.Instrument.Accuracy, i.Instrument.Unit)}").Distinct()];
        if (assumed.Count > 0) report.Add($"{begin}: {string.Join(", ", assumed)}");
    }

    private static string Liquor(LiquorChoice choice)
    {
        if (choice.Always is { } always) return "liquor " + always.Name;
        IEnumerable<string> values = choice.ByValue.OrderBy(v => v.Key).Select(v => Invariant($"{v.Key} {v.Value.Name}"));
        return $"liquor told by {choice.Signal!.Signal} ({string.Join(", ", values)})";
    }

    private static string Head(Effect effect)
    {
        string heating = Names(effect.Heating.Select(h => h.IsSteam ? "steam" : h.Recompressor ?? "vapour of " + h.VapourOf));
        string liquor = Names(effect.Liquor.Select(l => l.From ?? "the feed"));
        string bodies = effect.Bodies.Count == 0 ? "" : $" in {string.Join(", ", effect.Bodies)}";
        return Invariant($"  {effect.Name}: {effect.Area:0.##} m2{bodies}, heated by {heating}, liquor from {liquor}");
    }

    private static string Words(Sourced sourced) => sourced.From ?? "missing: " + sourced.Missing;

    private static string Names(IEnumerable<string> names) => string.Join(" and ", names);
}
