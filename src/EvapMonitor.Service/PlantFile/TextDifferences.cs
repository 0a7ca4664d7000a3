namespace EvapMonitor.Service.PlantFile;

/// <summary>What became of a line.</summary>
public enum LineChange
{
    /// <summary>Both texts have it.</summary>
    Same,
    /// <summary>Only the later text has it.</summary>
    Added,
    /// <summary>Only the earlier text has it.</summary>
    Removed,
}

/// <summary>A line of two texts that are compared.</summary>
/// <param name="Change">What became of it.</param>
/// <param name="FromLine">Its number in the earlier text, from 1; 0 when it was added.</param>
/// <param name="ToLine">Its number in the later text, from 1; 0 when it was removed.</param>
/// <param name="Text">The line without its end.</param>
public sealed record ComparedLine(LineChange Change, int FromLine, int ToLine, string Text);

/// <summary>
/// Differences of two texts by lines, with the fewest lines added and removed: E. W. Myers, An O(ND) difference algorithm and its variations, Algorithmica 1 (1986)
/// 251–266, the greedy algorithm of section 4 (cited from memory).
/// </summary>
public static class TextDifferences
{
    /// <summary>Texts that differ by more lines than this, after what they have in common at both ends, are told as replaced whole: memory grows with the square.</summary>
    public const int MostDifferences = 1000;

    /// <summary>All lines of both texts in order.</summary>
    public static IReadOnlyList<ComparedLine> Compare(string from, string to)
    {
        ArgumentNullException.ThrowIfNull(from);
        ArgumentNullException.ThrowIfNull(to);
        string[] a = Lines(from), b = Lines(to);
        int head = 0, tail = 0;
        while (head < a.Length && head < b.Length && a[head] == b[head]) head++;
        while (tail < a.Length - head && tail < b.Length - head && a[^(tail + 1)] == b[^(tail + 1)]) tail++;
        var lines = new List<ComparedLine>(a.Length + b.Length);
        for (int i = 0; i < head; i++) lines.Add(new ComparedLine(LineChange.Same, i + 1, i + 1, a[i]));
        lines.AddRange(Middle(a, b, head, tail));
        for (int i = tail; i > 0; i--) lines.Add(new ComparedLine(LineChange.Same, a.Length - i + 1, b.Length - i + 1, a[^i]));
        return lines;
    }

    /// <summary>The changed places, each with some lines before and after; places that would touch are one.</summary>
    /// <param name="lines">From <see cref="Compare"/>.</param>
    /// <param name="context">Number of lines around a change.</param>
    public static IReadOnlyList<IReadOnlyList<ComparedLine>> Stretches(IReadOnlyList<ComparedLine> lines, int context)
    {
        ArgumentNullException.ThrowIfNull(lines);
        var stretches = new List<IReadOnlyList<ComparedLine>>();
        int last = -1;
        List<ComparedLine>? open = null;
        for (int i = 0; i < lines.Count; i++)
        {
            if (lines[i].Change == LineChange.Same) continue;
            int first = int.Max(last + 1, i - context);
            if (open is null || first > last + 1) stretches.Add(open = []);
            int end = int.Min(lines.Count - 1, i + context);
            for (int k = first; k <= end; k++)
            {
                if (k > last) open.Add(lines[k]);
            }

            last = end;
        }

        return stretches;
    }

    private static string[] Lines(string text)
    {
        string[] lines = text.ReplaceLineEndings("\n").Split('\n');
        return lines[^1].Length == 0 ? lines[..^1] : lines;
    }

    private static List<ComparedLine> Middle(string[] a, string[] b, int head, int tail)
    {
        int n = a.Length - head - tail, m = b.Length - head - tail, most = int.Min(n + m, MostDifferences);
        // reach[k + most] is the furthest place in a on the diagonal k; trail keeps it as it was before each further difference.
        int[] reach = new int[(2 * most) + 2];
        var trail = new List<int[]>();
        for (int differences = 0; differences <= most; differences++)
        {
            trail.Add([.. reach]);
            for (int k = -differences; k <= differences; k += 2)
            {
                bool down = k == -differences || (k != differences && reach[k - 1 + most] < reach[k + 1 + most]);
                int x = down ? reach[k + 1 + most] : reach[k - 1 + most] + 1, y = x - k;
                while (x < n && y < m && a[head + x] == b[head + y]) (x, y) = (x + 1, y + 1);
                reach[k + most] = x;
                if (k == n - m && x >= n) return Walk(a, b, head, (n, m), most, trail);
            }
        }

        return
        [
            .. Enumerable.Range(head, n).Select(i => new ComparedLine(LineChange.Removed, i + 1, 0, a[i])),
            .. Enumerable.Range(head, m).Select(i => new ComparedLine(LineChange.Added, 0, i + 1, b[i])),
        ];
    }

    private static List<ComparedLine> Walk(string[] a, string[] b, int head, (int X, int Y) end, int most, List<int[]> trail)
    {
        var lines = new List<ComparedLine>();
        (int x, int y) = end;
        for (int differences = trail.Count - 1; differences >= 0; differences--)
        {
            int[] reach = trail[differences];
            int k = x - y;
            bool down = k == -differences || (k != differences && reach[k - 1 + most] < reach[k + 1 + most]);
            int before = down ? reach[k + 1 + most] : reach[k - 1 + most], run = down ? before : before + 1;
            for (; x > (differences == 0 ? 0 : run); x--, y--) lines.Add(new ComparedLine(LineChange.Same, head + x, head + y, a[head + x - 1]));
            if (differences == 0) break;
            lines.Add(down ? new ComparedLine(LineChange.Added, 0, head + y, b[head + y - 1]) : new ComparedLine(LineChange.Removed, head + x, 0, a[head + x - 1]));
            (x, y) = down ? (x, y - 1) : (x - 1, y);
        }

        lines.Reverse();
        return lines;
    }
}
