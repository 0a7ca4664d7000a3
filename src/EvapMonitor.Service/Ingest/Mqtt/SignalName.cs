using System.Globalization;
using System.Text;

namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>
/// A template for a signal's name: text with {topic}, {member}, {1} for what the first wildcard of the filter stands for, {2} for the second, and so on.
/// </summary>
public sealed class SignalName
{
    private readonly IReadOnlyList<(string Text, bool IsPlace)> _parts;

    private SignalName(IReadOnlyList<(string Text, bool IsPlace)> parts) => _parts = parts;

    /// <summary>The topic itself.</summary>
    public static SignalName Topic { get; } = new([("topic", true)]);

    /// <summary>The name of the member.</summary>
    public static SignalName Member { get; } = new([("member", true)]);

    /// <summary>Reads a template; null with the reason when it is not one.</summary>
    /// <param name="text">The template.</param>
    /// <param name="wildcards">Number of wildcards in the filter.</param>
    /// <param name="withMember">True where there is a member to name.</param>
    /// <param name="wrong">The reason.</param>
    public static SignalName? Read(string text, int wildcards, bool withMember, out string? wrong)
    {
        ArgumentNullException.ThrowIfNull(text);
        var parts = new List<(string, bool)>();
        wrong = null;
        for (int at = 0; at < text.Length;)
        {
            int open = text.IndexOf('{', at);
            if (open != at) parts.Add((open < 0 ? text[at..] : text[at..open], false));
            if (open < 0) break;
            int close = text.IndexOf('}', open);
            string place = close < 0 ? text[open..] : text[(open + 1)..close];
            bool isNumber = int.TryParse(place, NumberStyles.None, CultureInfo.InvariantCulture, out int number);
            if (close < 0 || !(place == "topic" || (place == "member" && withMember) || (isNumber && number >= 1 && number <= wildcards)))
            {
                string allowed = "{topic}" + (withMember ? ", {member}" : "") + (wildcards > 0 ? Invariant($", {{1}} to {{{wildcards}}}") : "");
                wrong = $"allowed in braces here: {allowed}";
                return null;
            }

            parts.Add((place, true));
            at = close + 1;
        }

        if (parts.Count > 0) return new SignalName(parts);
        wrong = "empty; allowed: a name or a template";
        return null;
    }

    /// <summary>The name for a message.</summary>
    public string Of(string topic, IReadOnlyList<string> wildcards, string member)
    {
        ArgumentNullException.ThrowIfNull(wildcards);
        if (_parts is [("topic", true)]) return topic;
        var name = new StringBuilder();
        foreach ((string text, bool isPlace) in _parts)
        {
            name.Append(!isPlace ? text : text switch
            {
                "topic" => topic,
                "member" => member,
                _ => wildcards[int.Parse(text, CultureInfo.InvariantCulture) - 1],
            });
        }

        return name.ToString();
    }
}
