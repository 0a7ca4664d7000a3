namespace EvapMonitor.Service.PlantFile;

/// <summary>Collects what the readers find, so that a person sees every mistake of a file at once.</summary>
internal sealed class Findings
{
    /// <summary>More problems than this are not told one by one.</summary>
    public const int Most = 1000;

    private readonly List<PlantFileProblem> _problems = [];
    private readonly List<PlantFileNote> _notes = [];
    private readonly HashSet<PlantNode> _told = [];
    private int _left;

    public bool Any => _problems.Count > 0;

    /// <summary>True when further problems are only counted: a hostile file must not buy time with messages that nobody sees.</summary>
    public bool IsFull => _problems.Count >= Most;

    /// <summary>Counts a problem that is not told.</summary>
    public void OneMore() => _left++;

    /// <summary>What stands at the node is wrong. The first word about a node stands; what follows from it is not told.</summary>
    public void Wrong(PlantNode node, string allowed) => Wrong(node, Shown.Node(node), allowed);

    /// <summary>What stands at the node is wrong, described in other words than its text.</summary>
    public void Wrong(PlantNode node, string found, string allowed)
    {
        if (!_told.Add(node)) return;
        if (IsFull) OneMore();
        else Add(new(node.Line, node.Column, node.Path, found, allowed));
    }

    /// <summary>A required key is absent.</summary>
    public void Missing(MappingNode mapping, string key, string allowed)
    {
        string path = mapping.Path;
        Add(new(mapping.Line, mapping.Column, path.Length == 0 ? key : path + "." + key, "nothing", allowed));
    }

    /// <summary>The file as a whole, or a place that has no node.</summary>
    public void At(long line, long column, string found, string allowed) =>
        Add(new((int)long.Max(1, line), (int)long.Max(1, column), "", found, allowed));

    public void Note(PlantNode node, string text)
    {
        if (_notes.Count < Most) _notes.Add(new(node.Line, node.Column, node.Path, text));
    }

    public IReadOnlyList<PlantFileProblem> Problems()
    {
        List<PlantFileProblem> sorted = [.. _problems.OrderBy(p => p.Line).ThenBy(p => p.Column)];
        if (_left > 0)
            sorted.Add(new(sorted[^1].Line, sorted[^1].Column, "", Invariant($"{_left} more problems"), "a plant file without problems"));
        return sorted;
    }

    public IReadOnlyList<PlantFileNote> Notes() => [.. _notes.OrderBy(n => n.Line).ThenBy(n => n.Column)];

    private void Add(PlantFileProblem problem)
    {
        if (IsFull) OneMore();
        else _problems.Add(problem);
    }
}
