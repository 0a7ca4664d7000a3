namespace EvapMonitor.Service.PlantFile;

/// <summary>The names that a line declares, gathered before anything refers to them.</summary>
internal sealed record LineNames(
    IReadOnlyList<string> Effects, IReadOnlyList<string> Tanks, IReadOnlyList<string> Recompressors, IReadOnlyList<string> Bodies)
{
    public static LineNames Of(MappingNode line) => new(
        line.Find("effects") is ListNode list
            ? [.. list.Items.OfType<MappingNode>().Select(e => e.Find("name")).OfType<ScalarNode>().Select(n => n.Text)
                .Where(Texts.IsName).Distinct().Take(LineReader.MostEffects)]
            : [],
        KeysOf(line.Find("tanks")),
        KeysOf(line.Find("recompressors")),
        KeysOf(line.Find("bodies")));

    /// <summary>The name of a declared effect; null when absent or, which is reported, not declared.</summary>
    public string? Effect(PlantNode? node, Findings findings)
    {
        if (node is null) return null;
        if (node is ScalarNode scalar && Effects.Contains(scalar.Text)) return scalar.Text;
        findings.Wrong(node, "the name of an effect of this line: " + Shown.Names(Effects));
        return null;
    }

    private static IReadOnlyList<string> KeysOf(PlantNode? node) =>
        node is MappingNode mapping ? [.. mapping.Entries.Select(e => e.Key.Text)] : [];
}
