namespace EvapMonitor.Service.PlantFile;

/// <summary>A mapping of a known kind, opened: unknown keys have been reported, the others are taken by name.</summary>
internal sealed class MappingReader
{
    private readonly KeySet _keys;
    private readonly Findings _findings;

    private MappingReader(MappingNode node, KeySet keys, Findings findings)
    {
        Node = node;
        _keys = keys;
        _findings = findings;
    }

    public MappingNode Node { get; }

    /// <summary>Opens a mapping; null when the node is absent or, which is reported, no mapping.</summary>
    public static MappingReader? Open(PlantNode? node, KeySet keys, Findings findings)
    {
        if (node is null) return null;
        if (node is not MappingNode mapping)
        {
            findings.Wrong(node, $"a mapping with {string.Join(", ", keys.Keys)}");
            return null;
        }

        foreach (MappingEntry entry in mapping.Entries)
        {
            if (keys.Keys.Contains(entry.Key.Text)) continue;
            if (findings.IsFull)
            {
                findings.OneMore();
                continue;
            }

            string? nearest = keys.Nearest(entry.Key.Text);
            string all = string.Join(", ", keys.Keys);
            findings.Wrong(entry.Key, $"the unknown key {Shown.Quoted(entry.Key.Text)}", nearest is null ? all : $"{nearest} (of {all})");
        }

        return new(mapping, keys, findings);
    }

    /// <summary>True when this kind of mapping has the key.</summary>
    public bool Allows(string key) => _keys.Keys.Contains(key);

    /// <summary>What stands at a key; null when the key is absent.</summary>
    /// <exception cref="ArgumentException">The kind of mapping has no such key: a mistake in the reader.</exception>
    public PlantNode? Take(string key) =>
        _keys.Keys.Contains(key) ? Node.Find(key) : throw new ArgumentException($"{_keys.Name} has no key {key}", nameof(key));

    /// <summary>The key itself, where a message is about the key and not its value; null when absent.</summary>
    public PlantNode? TakeKey(string key) => Take(key) is null ? null : Node.Entries.Find(e => e.Key.Text == key)!.Key;

    /// <summary>The entries of a mapping whose keys are names that the plant chose; what is none has been reported and left out.</summary>
    public static IReadOnlyList<(string Name, PlantNode Key, PlantNode Value)> Named(PlantNode? node, string what, Findings findings)
    {
        if (node is null) return [];
        if (node is not MappingNode { Entries.Count: > 0 } mapping)
        {
            findings.Wrong(node, $"a mapping from {what} to its members");
            return [];
        }

        return [.. mapping.Entries.Where(e => Texts.Name(e.Key, findings) is not null).Select(e => (e.Key.Text, (PlantNode)e.Key, e.Value))];
    }

    /// <summary>The items of a list with at least one; what is none has been reported.</summary>
    public static IReadOnlyList<PlantNode> Items(PlantNode? node, string allowed, Findings findings)
    {
        if (node is null) return [];
        if (node is ListNode { Items: { Count: > 0 } items }) return items;
        findings.Wrong(node, allowed);
        return [];
    }

    /// <summary>As <see cref="Take"/>; an absent key is reported.</summary>
    public PlantNode? Require(string key, string allowed)
    {
        PlantNode? node = Take(key);
        if (node is null) _findings.Missing(Node, key, allowed);
        return node;
    }
}
