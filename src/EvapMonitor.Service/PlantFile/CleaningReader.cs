using System.Globalization;
using System.Text.RegularExpressions;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>Cleaning groups of a line and the cleaning rules of the site.</summary>
internal sealed partial class CleaningReader(Findings findings, InstrumentReader instruments)
{
    private const string HoursAllowed =
        "days and hours of the site's time zone, such as Mon-Fri 06:00-22:00 (Mon to Sun; 00:00 to 24:00), or a list of such";
    private static readonly string[] Days = ["Mon", "Tue", "Wed", "Thu", "Fri", "Sat", "Sun"];

    private static readonly Dictionary<string, Comparison> Comparisons = new(StringComparer.Ordinal)
    {
        [">"] = Comparison.Above, [">="] = Comparison.AtLeast, ["<"] = Comparison.Below, ["<="] = Comparison.AtMost, ["="] = Comparison.Equal,
    };

    public IReadOnlyList<CleaningGroup> Groups(PlantNode? node, LineNames names)
    {
        var groups = new List<CleaningGroup>();
        foreach ((string name, _, PlantNode value) in MappingReader.Named(node, "a group's name", findings))
        {
            if (MappingReader.Open(value, PlantFileKeys.CleaningGroup, findings) is not { } mapping) continue;
            const string Allowed = "a list of effects of this line";
            var effects = new List<string>();
            foreach (PlantNode item in MappingReader.Items(mapping.Require("effects", Allowed), Allowed, findings))
            {
                if (names.Effect(item, findings) is not { } effect) continue;
                if (effects.Contains(effect)) findings.Wrong(item, $"{effect} a second time", "each effect once");
                else effects.Add(effect);
            }

            TimeSpan? duration = Quantities.Time(mapping.Take("duration"), TimeSpan.FromMinutes(1), TimeSpan.FromDays(60), findings);
            double? cost = Texts.Number(mapping.Take("cost"), "the cost of one cleaning, a number from 0", c => c >= 0, findings);
            groups.Add(new(name, effects, duration, cost) { Signal = Active(mapping.Take("signal")) });
        }

        return groups;
    }

    /// <summary>A signal that tells that something goes on: <c>{signal: N.CIP, active: "&gt;0.5"}</c>.</summary>
    public ActiveSignal? Active(PlantNode? node)
    {
        if (MappingReader.Open(node, PlantFileKeys.ActiveSignal, findings) is not { } mapping) return null;
        const string Allowed = "a comparison such as \">0.5\" (>, >=, <, <=, =)";
        Instrument? instrument = instruments.Number(mapping);
        PlantNode? active = mapping.Require("active", Allowed);
        if (active is null) return null;
        Match match = active is ScalarNode scalar ? ComparisonForm().Match(scalar.Text) : Match.Empty;
        if (match.Success && Texts.TryNumber(match.Groups[2].Value, out double threshold))
            return instrument is null ? null : new(instrument, Comparisons[match.Groups[1].Value], threshold);
        findings.Wrong(active, Allowed);
        return null;
    }

    public CleaningRules? Rules(PlantNode? node, IReadOnlyList<Line> lines)
    {
        if (MappingReader.Open(node, PlantFileKeys.CleaningRules, findings) is not { } mapping) return null;
        double? atOnce = Texts.Number(
            mapping.Take("at-once"), "a whole number from 1 to 100", n => n is >= 1 and <= 100 && n == double.Truncate(n), findings);
        PlantNode? allowed = mapping.Take("allowed");
        IReadOnlyList<PlantNode> hours = allowed is ScalarNode ? [allowed] : MappingReader.Items(allowed, HoursAllowed, findings);
        IReadOnlyList<PlantNode> sets = MappingReader.Items(mapping.Take("not-together"), "a list of lists such as [[N1, N2]]", findings);
        List<EffectOfLine> all = [.. lines.SelectMany(l => l.Effects.Select(e => new EffectOfLine(l.Name, e.Name)))];
        ILookup<string, EffectOfLine> byName = all.Concat(all).Zip(all.Select(e => e.Effect).Concat(all.Select(e => e.Line + "." + e.Effect)))
            .ToLookup(pair => pair.Second, pair => pair.First, StringComparer.Ordinal);
        return new((int?)atOnce, [.. hours.Select(Hours).OfType<AllowedHours>()], [.. sets.Select(set => NotTogether(set, byName))]);
    }

    private IReadOnlyList<EffectOfLine> NotTogether(PlantNode set, ILookup<string, EffectOfLine> effects)
    {
        const string Allowed = "a list of at least two effects";
        IReadOnlyList<PlantNode> items = MappingReader.Items(set, Allowed, findings);
        if (items.Count == 1) findings.Wrong(set, "a list of one", Allowed);
        return [.. items.Select(item => EffectAnywhere(item, effects)).OfType<EffectOfLine>()];
    }

    private EffectOfLine? EffectAnywhere(PlantNode node, ILookup<string, EffectOfLine> effects)
    {
        if (node is ScalarNode scalar)
        {
            List<EffectOfLine> meant = [.. effects[scalar.Text]];
            if (meant.Count == 1) return meant[0];
            if (meant.Count > 1)
            {
                string choice = "one of " + Shown.Names(meant.Select(e => e.Line + "." + e.Effect));
                findings.Wrong(node, $"{Shown.Quoted(scalar.Text)}, which is in several lines", choice);
                return null;
            }
        }

        IEnumerable<string> all = effects.Select(g => g.Key).Where(name => name.Contains('.', StringComparison.Ordinal));
        findings.Wrong(node, "the name of an effect, with its line where several lines have it: " + Shown.Names(all));
        return null;
    }

    private AllowedHours? Hours(PlantNode node)
    {
        Match match = node is ScalarNode scalar ? HoursForm().Match(scalar.Text) : Match.Empty;
        if (match.Success && Clock(match, "from") is { } from && Clock(match, "to") is { } to && from != to && from < TimeSpan.FromDays(1))
        {
            int first = Array.IndexOf(Days, match.Groups["first"].Value);
            int last = match.Groups["last"].Success ? Array.IndexOf(Days, match.Groups["last"].Value) : first;
            int count = ((last - first + 7) % 7) + 1;
            return new([.. Enumerable.Range(first, count).Select(d => (DayOfWeek)((d + 1) % 7))], from, to);
        }

        findings.Wrong(node, HoursAllowed);
        return null;
    }

    private static TimeSpan? Clock(Match match, string side)
    {
        int hours = int.Parse(match.Groups[side + "Hour"].Value, CultureInfo.InvariantCulture);
        int minutes = int.Parse(match.Groups[side + "Minute"].Value, CultureInfo.InvariantCulture);
        return minutes < 60 && (hours < 24 || (hours == 24 && minutes == 0)) ? new TimeSpan(hours, minutes, 0) : null;
    }

    [GeneratedRegex("^(>=|<=|>|<|=)\\s*(\\S+)\\z", RegexOptions.CultureInvariant)]
    private static partial Regex ComparisonForm();

    [GeneratedRegex(
        "^(?<first>Mon|Tue|Wed|Thu|Fri|Sat|Sun)(-(?<last>Mon|Tue|Wed|Thu|Fri|Sat|Sun))?\\s+"
        + "(?<fromHour>[0-9]{2}):(?<fromMinute>[0-9]{2})-(?<toHour>[0-9]{2}):(?<toMinute>[0-9]{2})\\z",
        RegexOptions.CultureInvariant | RegexOptions.ExplicitCapture)]
    private static partial Regex HoursForm();
}
