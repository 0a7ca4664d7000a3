using System.Globalization;
using System.Text.RegularExpressions;

namespace EvapMonitor.Service.PlantFile;

/// <summary>Texts, names, plain numbers and choices.</summary>
internal static partial class Texts
{
    private const int LongestName = 64;
    private const int LongestText = 200;

    public const string NameAllowed = "a name of letters, digits, _ and -, at most 64 of them";

    /// <summary>A text that is not empty; null when it is not, which is reported.</summary>
    public static string? Text(PlantNode? node, string allowed, Findings findings)
    {
        if (node is null) return null;
        if (node is ScalarNode { IsNothing: false } scalar && scalar.Text.Length is > 0 and <= LongestText && !scalar.Text.Any(char.IsControl))
            return scalar.Text;
        findings.Wrong(node, allowed);
        return null;
    }

    public static bool IsName(string text) => text.Length <= LongestName && NamePattern().IsMatch(text);

    public static string? Name(PlantNode? node, Findings findings)
    {
        string? text = Text(node, NameAllowed, findings);
        if (text is null || IsName(text)) return text;
        findings.Wrong(node!, NameAllowed);
        return null;
    }

    /// <summary>One name or a list of names.</summary>
    public static IReadOnlyList<string> Names(PlantNode? node, Findings findings) => node switch
    {
        null => [],
        ListNode list => [.. list.Items.Select(item => Name(item, findings)).OfType<string>()],
        _ => Name(node, findings) is { } one ? [one] : [],
    };

    /// <summary>A number without unit.</summary>
    public static double? Number(PlantNode? node, string allowed, Func<double, bool> sound, Findings findings)
    {
        if (node is null) return null;
        if (node is ScalarNode scalar && TryNumber(scalar.Text, out double number) && sound(number)) return number;
        findings.Wrong(node, allowed);
        return null;
    }

    /// <summary>One of a few words.</summary>
    public static T? Choice<T>(PlantNode? node, IReadOnlyDictionary<string, T> choices, Findings findings)
        where T : struct
    {
        if (node is null) return null;
        if (node is ScalarNode scalar && choices.TryGetValue(scalar.Text, out T chosen)) return chosen;
        findings.Wrong(node, string.Join(", ", choices.Keys));
        return null;
    }

    public static bool TryNumber(string text, out double number)
    {
        number = 0;
        return text.Length <= 40 && NumberPattern().IsMatch(text)
            && double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out number) && double.IsFinite(number);
    }

    [GeneratedRegex("^[A-Za-z0-9_-]+\\z", RegexOptions.CultureInvariant)]
    private static partial Regex NamePattern();

    [GeneratedRegex("^[+-]?([0-9]+\\.?[0-9]*|\\.[0-9]+)([eE][+-]?[0-9]{1,3})?\\z", RegexOptions.CultureInvariant)]
    private static partial Regex NumberPattern();
}
