namespace EvapMonitor.Service.PlantFile;

/// <summary>
/// The keys that one kind of mapping may have. The JSON Schema has a definition of the same name with the same keys; a test holds that.
/// </summary>
/// <param name="Name">Name of the kind, as in the schema.</param>
/// <param name="Keys">The keys.</param>
internal sealed record KeySet(string Name, params IReadOnlyList<string> Keys)
{
    private const int LongestKeyCompared = 40;

    /// <summary>The known key that an unknown one was probably meant to be; null when none is near.</summary>
    public string? Nearest(string unknown) => NearestOf(unknown, Keys);

    /// <summary>
    /// The word that is nearest to another, at most a third of its letters away (in short words only the case may differ); null when none is.
    /// </summary>
    public static string? NearestOf(string unknown, IEnumerable<string> words)
    {
        if (unknown.Length > LongestKeyCompared) return null;
        string? nearest = null;
        int least = (unknown.Length / 3) + 1;
        foreach (string word in words)
        {
            int distance = Distance(unknown, word);
            if (distance >= least) continue;
            least = distance;
            nearest = word;
        }

        return nearest;
    }

    /// <summary>Levenshtein distance without regard to case.</summary>
    private static int Distance(string one, string other)
    {
        int[] before = [.. Enumerable.Range(0, other.Length + 1)];
        for (int i = 0; i < one.Length; i++)
        {
            int[] now = new int[other.Length + 1];
            now[0] = i + 1;
            for (int j = 0; j < other.Length; j++)
            {
                int changed = char.ToUpperInvariant(one[i]) == char.ToUpperInvariant(other[j]) ? 0 : 1;
                now[j + 1] = Math.Min(Math.Min(now[j], before[j + 1]) + 1, before[j] + changed);
            }

            before = now;
        }

        return before[^1];
    }
}
