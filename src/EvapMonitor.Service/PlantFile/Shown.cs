using System.Text;

namespace EvapMonitor.Service.PlantFile;

/// <summary>How text from a plant file is shown in a message: short, on one line, without control characters.</summary>
internal static class Shown
{
    private const int Longest = 80;

    /// <summary>What stands at a node.</summary>
    public static string Node(PlantNode node) => node switch
    {
        ScalarNode { IsNothing: true } => "nothing",
        ScalarNode scalar => Quoted(scalar.Text),
        ListNode list => List(list, Longest) ?? "a list",
        _ => "a mapping",
    };

    /// <summary>A short list as it would stand in one line; null when it is long or holds mappings.</summary>
    private static string? List(ListNode list, int room)
    {
        var items = new List<string>();
        foreach (PlantNode item in list.Items)
        {
            string? text = item is ScalarNode scalar ? Clean(scalar.Text) : item is ListNode inner ? List(inner, room) : null;
            room -= (text?.Length ?? 0) + 2;
            if (text is null || room < 0) return null;
            items.Add(text);
        }

        return $"[{string.Join(", ", items)}]";
    }

    /// <summary>The text in quotes.</summary>
    public static string Quoted(string text) =>
        text.Length > Longest ? $"\"{Clean(text[..Longest])}…\"" : $"\"{Clean(text)}\"";

    /// <summary>The text with control characters and halves of surrogate pairs written out.</summary>
    public static string Clean(string text)
    {
        if (!text.Any(Hidden)) return text;
        var clean = new StringBuilder(text.Length + 10);
        foreach (char c in text)
        {
            if (Hidden(c)) clean.Append(Invariant($"\\u{(int)c:x4}"));
            else clean.Append(c);
        }

        return clean.ToString();
    }

    /// <summary>Names in a row, the first dozen of them.</summary>
    public static string Names(IEnumerable<string> names)
    {
        const int Most = 12;
        List<string> all = [.. names];
        return all.Count == 0 ? "none"
            : all.Count <= Most ? string.Join(", ", all)
            : Invariant($"{string.Join(", ", all.Take(Most))} and {all.Count - Most} more");
    }

    private static bool Hidden(char c) => char.IsControl(c) || char.IsSurrogate(c) || c is '\u2028' or '\u2029';
}
