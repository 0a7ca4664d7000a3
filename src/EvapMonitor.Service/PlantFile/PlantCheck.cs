using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Service.PlantFile;

/// <summary>
/// What <c>evapmonitor check</c> says of a sound plant file: per effect how sure its coefficient will be, on which
/// instruments that rests, and what one more would bring, at a typical state of the line.
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
        report.Add($"Line {line.Name}: {LiquorOf(line.Liquor)}");
        IReadOnlyList<CoefficientBasis> all = CoefficientBasis.Of(line, TypicalLiquor(line.Liquor), unit => AssumedAccuracy.For(unit, null));
        foreach ((Effect effect, CoefficientBasis basis) in line.Effects.Zip(all))
        {
            report.Add(Head(effect));
            report.Add("    coefficient:         " + Known(basis));
            if (OneMore(basis) is { } more) report.Add("    one more instrument: " + more);
        }

        report.AddRange(EquipmentCheck.Report(line));
        Assumed("  accuracy assumed", SiteInstruments.Of(line), report);
        report.Add(Invariant($"  {all.Count(basis => basis.RelativeStandard is not null)} of {all.Count} effects have a coefficient"));
    }

    private static void Assumed(string begin, IEnumerable<InstrumentAtPlace> instruments, List<string> report)
    {
        List<string> assumed = [.. instruments.Where(i => i.Instrument.Accuracy.Assumed)
            .Select(i => $"{i.Instrument.Signal} ±{AssumedAccuracy.InWords(i.Instrument.Accuracy, i.Instrument.Unit)}").Distinct()];
        if (assumed.Count > 0) report.Add($"{begin}: {string.Join(", ", assumed)}");
    }

    private static string LiquorOf(LiquorChoice choice)
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

    private static string Known(CoefficientBasis basis)
    {
        string rests = string.Join(", ", basis.RestsOn.Take(5).Select(one => Invariant($"{one.Name} {one.Share * 100:0} %")));
        return basis.RelativeStandard is { } known ? Invariant($"about ±{known * 100:0.0} % (standard); its uncertainty comes from {rests}")
            : basis.TooUncertain ? $"none: it would be uncertain by more than 25 %; that comes from {rests}"
            : "none: it does not follow from these instruments";
    }

    private static string? OneMore(CoefficientBasis basis)
    {
        if (basis.OneMore.Count == 0) return basis.RelativeStandard is null ? "no single one is enough" : null;
        return string.Join(", or ", basis.OneMore.Select(one => Invariant($"{one.Instrument} (±{one.RelativeStandard * 100:0.0} %)"))) + (basis.RelativeStandard is null ? " would give it" : " would make it surer");
    }

    /// <summary>Where a signal tells the product: the first that is not water.</summary>
    private static Liquor TypicalLiquor(LiquorChoice choice) =>
        choice.Always ?? choice.ByValue.OrderBy(one => one.Key).Select(one => one.Value).FirstOrDefault(one => one is not Water) ?? choice.ByValue.Values.First();

    private static string Names(IEnumerable<string> names) => string.Join(" and ", names);
}
