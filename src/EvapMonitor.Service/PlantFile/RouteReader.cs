using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>What heats an effect and where its liquor comes from.</summary>
internal sealed class RouteReader(Findings findings, LineNames names)
{
    private const string VapourOf = "vapour of ";

    public string HeatingAllowed => "steam, " + Shown.Names([.. names.Effects.Select(e => VapourOf + e), .. names.Recompressors]) + ", or a list of these";

    public string LiquorAllowed =>
        $"feed, {Shown.Names([.. names.Effects, .. names.Tanks])}, or a list such as [{{from: feed, share: 60 % ± 5 %}}, {{from: {names.Effects.LastOrDefault("N2")}}}]";

    public IReadOnlyList<HeatSource> Heating(PlantNode node)
    {
        if (node is not ListNode) return HeatSourceAt(node) is { } one ? [one] : [];
        var sources = new List<HeatSource>();
        foreach (PlantNode item in MappingReader.Items(node, HeatingAllowed, findings))
        {
            if (HeatSourceAt(item) is not { } source) continue;
            if (sources.Contains(source)) findings.Wrong(item, $"{Shown.Node(item)} a second time", "each source of heat once");
            else sources.Add(source);
        }

        return sources;
    }

    public IReadOnlyList<(LiquorSource Source, PlantNode Node)> Liquor(PlantNode node)
    {
        if (node is not ListNode) return LiquorSourceAt(node) is { } one ? [(one, node)] : [];
        var sources = new List<(LiquorSource Source, PlantNode Node)>();
        foreach (PlantNode item in MappingReader.Items(node, LiquorAllowed, findings))
        {
            if (LiquorSourceAt(item) is not { } source) continue;
            if (sources.Exists(s => s.Source.From == source.From))
                findings.Wrong(item, $"{source.From ?? "feed"} a second time", "each source of liquor once");
            else sources.Add((source, item));
        }

        return sources;
    }

    /// <summary>The effect in <c>vapour of N1</c>; null when absent or, which is reported, wrong.</summary>
    public string? VapourAt(PlantNode? node)
    {
        if (node is null) return null;
        if (node is ScalarNode scalar && scalar.Text.StartsWith(VapourOf, StringComparison.Ordinal))
        {
            string effect = scalar.Text[VapourOf.Length..].Trim();
            if (names.Effects.Contains(effect)) return effect;
        }

        findings.Wrong(node, Shown.Names(names.Effects.Select(e => VapourOf + e)));
        return null;
    }

    private HeatSource? HeatSourceAt(PlantNode node)
    {
        if (node is ScalarNode { Text: "steam" }) return HeatSource.Steam;
        if (node is ScalarNode scalar && names.Recompressors.Contains(scalar.Text)) return new(null, scalar.Text);
        if (node is ScalarNode text && text.Text.StartsWith(VapourOf, StringComparison.Ordinal))
            return VapourAt(node) is { } effect ? new(effect) : null;
        findings.Wrong(node, HeatingAllowed);
        return null;
    }

    private LiquorSource? LiquorSourceAt(PlantNode node)
    {
        if (node is ScalarNode) return From(node, null);
        if (MappingReader.Open(node, PlantFileKeys.LiquorSource, findings) is not { } mapping) return null;
        PlantNode? from = mapping.Require("from", "feed, or the name of an effect or a tank: " + Shown.Names([.. names.Effects, .. names.Tanks]));
        UncertainShare? share = Shares.Uncertain(mapping.Take("share"), findings);
        return from is null ? null : From(from, share);
    }

    private LiquorSource? From(PlantNode node, UncertainShare? share)
    {
        if (node is ScalarNode { Text: "feed" }) return new(null, share);
        if (node is ScalarNode scalar && (names.Effects.Contains(scalar.Text) || names.Tanks.Contains(scalar.Text))) return new(scalar.Text, share);
        findings.Wrong(node, LiquorAllowed);
        return null;
    }
}
