namespace EvapMonitor.Service.PlantFile;

/// <summary>A node of the plant file with its place, so that every later check can say where it looked.</summary>
internal abstract class PlantNode(PlantNode? parent, string segment, int line, int column)
{
    private const int LongestSegment = 60;

    public int Line { get; } = line;

    public int Column { get; } = column;

    /// <summary>
    /// Such as <c>lines.north.effects[0].area</c>. Built on demand: a hostile file could make stored paths larger than memory.
    /// </summary>
    public string Path
    {
        get
        {
            string own = segment.Length > LongestSegment ? segment[..LongestSegment] + "…" : segment;
            if (parent is null) return Shown.Clean(own);
            string before = parent.Path;
            return before.Length == 0 || own.StartsWith('[') ? before + Shown.Clean(own) : before + "." + Shown.Clean(own);
        }
    }
}

/// <summary>A text or number.</summary>
internal sealed class ScalarNode(PlantNode? parent, string segment, int line, int column, string text, bool plain)
    : PlantNode(parent, segment, line, column)
{
    /// <summary>The text without the white space around it.</summary>
    public string Text { get; } = text.Trim();

    /// <summary>True for text without quotes.</summary>
    public bool Plain { get; } = plain;

    /// <summary>True for <c>key:</c> with nothing after it, and for YAML's words for nothing.</summary>
    public bool IsNothing => Plain && Text is "" or "~" or "null";
}

/// <summary>A list.</summary>
internal sealed class ListNode(PlantNode? parent, string segment, int line, int column) : PlantNode(parent, segment, line, column)
{
    public List<PlantNode> Items { get; } = [];
}

/// <summary>A mapping; duplicate keys have been reported and left out.</summary>
internal sealed class MappingNode(PlantNode? parent, string segment, int line, int column) : PlantNode(parent, segment, line, column)
{
    public List<MappingEntry> Entries { get; } = [];

    public PlantNode? Find(string key) => Entries.Find(e => e.Key.Text == key)?.Value;
}

/// <summary>One key with its value.</summary>
internal sealed record MappingEntry(ScalarNode Key, PlantNode Value);
