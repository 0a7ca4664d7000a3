using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>What only the line as a whole can tell: names once, no circles, shares that add up.</summary>
internal static class LineChecks
{
    private const double Rounding = 1e-9;

    public static void Check(IReadOnlyList<EffectEntry> entries, IReadOnlyList<Tank> tanks, PlantNode? tanksNode, Findings findings)
    {
        NamesOnce(entries, findings);
        var first = entries.DistinctBy(e => e.Effect.Name).ToDictionary(e => e.Effect.Name, StringComparer.Ordinal);
        Circle(
            first, e => e.Effect.Heating.Select(h => h.VapourOf), e => e.HeatingNode,
            "heating that goes round in a circle", "effects that are heated in the end by steam", findings);
        Circle(
            first, e => e.Effect.Liquor.Select(l => Before(l.From, tanks)), e => e.LiquorNode,
            "liquor that goes round in a circle", "liquor that comes in the end from the feed", findings);
        SharesAddUp(entries, tanks, tanksNode, findings);
    }

    /// <summary>Names and former names, each at one place only.</summary>
    public static void NamesOnce(
        IEnumerable<(string Name, PlantNode Node, IReadOnlyList<string> Formerly, PlantNode? FormerlyNode)> all, Findings findings)
    {
        var taken = new Dictionary<string, int>(StringComparer.Ordinal);
        var entries = all.ToList();
        foreach ((string name, PlantNode node, _, _) in entries)
        {
            if (!taken.TryAdd(name, node.Line))
                findings.Wrong(
                    node, $"the name {Shown.Quoted(name)} a second time", Invariant($"each name once (the first is in line {taken[name]})"));
        }

        foreach ((_, _, IReadOnlyList<string> formerly, PlantNode? node) in entries)
        {
            foreach (string name in formerly)
            {
                if (!taken.TryAdd(name, node!.Line))
                    findings.Wrong(
                        node, $"the former name {Shown.Quoted(name)}, which is taken",
                        Invariant($"a former name that nothing else has or had (see line {taken[name]})"));
            }
        }
    }

    private static void NamesOnce(IReadOnlyList<EffectEntry> entries, Findings findings) =>
        NamesOnce(entries.Select(e => (e.Effect.Name, e.Name, e.Effect.Formerly, e.FormerlyNode)), findings);

    /// <summary>
    /// Takes away, again and again, what depends on nothing left or on which nothing left depends; what stays goes in circles.
    /// </summary>
    private static void Circle(
        Dictionary<string, EffectEntry> entries, Func<EffectEntry, IEnumerable<string?>> sources, Func<EffectEntry, PlantNode?> place,
        string found, string allowed, Findings findings)
    {
        var left = entries.ToDictionary(
            e => e.Key, e => sources(e.Value).OfType<string>().Where(entries.ContainsKey).ToHashSet(StringComparer.Ordinal));
        while (true)
        {
            var needed = left.Values.SelectMany(s => s).ToHashSet(StringComparer.Ordinal);
            List<string> free = [.. left.Where(e => e.Value.Count == 0 || !needed.Contains(e.Key)).Select(e => e.Key)];
            if (free.Count == 0) break;
            foreach (string name in free) left.Remove(name);
            foreach (HashSet<string> others in left.Values) others.ExceptWith(free);
        }

        if (left.Count == 0) return;
        List<string> circle = [.. entries.Keys.Where(left.ContainsKey)];
        if (place(entries[circle[0]]) is { } node) findings.Wrong(node, $"{found}: {Shown.Names(circle)}", allowed);
    }

    /// <summary>The effect before a tank; what is no tank is itself.</summary>
    private static string? Before(string? source, IReadOnlyList<Tank> tanks) => tanks.FirstOrDefault(t => t.Name == source) is { } tank ? tank.From : source;

    private static void SharesAddUp(IReadOnlyList<EffectEntry> entries, IReadOnlyList<Tank> tanks, PlantNode? tanksNode, Findings findings)
    {
        var takers = entries.SelectMany(e => e.Effect.Liquor.Zip(e.SourceNodes, (source, node) => (source, node, effect: e.Effect.Name)))
            .Concat(tanks.Select(t => (source: new LiquorSource(t.From), node: tanksNode!, effect: t.Name)));
        foreach (var group in takers.GroupBy(t => t.source.From))
        {
            string from = group.Key ?? "the feed";
            var rest = group.Where(t => t.source.Share is null).ToList();
            double sum = group.Sum(t => t.source.Share?.Value ?? 0);
            foreach (var second in rest.Skip(1))
            {
                findings.Wrong(
                    second.node, $"{second.effect} taking all that is left of {from}, as {rest[0].effect} does",
                    $"a share such as {{from: {group.Key ?? "feed"}, share: 50 % ± 10 %}} for all but one");
            }

            if (sum > 1 + Rounding)
                findings.Wrong(
                    group.Last(t => t.source.Share is not null).node, Invariant($"shares of {from} that add up to {sum * 100:0.##} %"),
                    "at most 100 %");
            if (group.Key is null && rest.Count == 0 && sum < 1 - Rounding)
                findings.Wrong(
                    group.Last().node, Invariant($"shares of the feed that add up to {sum * 100:0.##} %"),
                    "100 %, or one effect without a share, which takes the rest");
        }
    }
}
