using System.Text.Json;

namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>Takes the members of one JSON object of settings and gathers everything that is wrong, each with where it stands, what was found and what is allowed.</summary>
internal sealed class SettingsReader
{
    private readonly Dictionary<string, JsonElement> _members = new(StringComparer.Ordinal);
    private readonly List<string> _problems;
    private readonly string _where;

    public SettingsReader(JsonElement element, string where, List<string> problems, params IReadOnlyList<string> allowed)
    {
        (_where, _problems) = (where, problems);
        if (element.ValueKind != JsonValueKind.Object)
        {
            problems.Add($"{where}: found {JsonFields.Shown(element)}; allowed: an object with {string.Join(", ", allowed)}.");
            return;
        }

        foreach (JsonProperty member in element.EnumerateObject())
        {
            if (!allowed.Contains(member.Name)) problems.Add($"{where}.{member.Name}: not known; allowed: {string.Join(", ", allowed)}.");
            else if (!_members.TryAdd(member.Name, member.Value)) problems.Add($"{where}.{member.Name}: stands twice.");
        }
    }

    public bool Has(string name) => _members.ContainsKey(name);

    public JsonElement? Find(string name) => _members.TryGetValue(name, out JsonElement element) ? element : null;

    /// <summary>A text; null when absent or wrong.</summary>
    public string? Text(string name, bool required = false)
    {
        if (Find(name) is not { } element)
        {
            if (required) Wrong(name, "missing", "a text");
            return null;
        }

        if (element.ValueKind == JsonValueKind.String && element.GetString() is { Length: > 0 and <= 1000 } text) return text;
        // What stands there may be a password of the wrong kind: it is not repeated.
        Wrong(name, "not a text of 1 to 1000 letters", "a text");
        return null;
    }

    public int Whole(string name, int absent, int least, int most)
    {
        if (Find(name) is not { } element) return absent;
        if (element.ValueKind == JsonValueKind.Number && element.TryGetInt32(out int number) && number >= least && number <= most) return number;
        Wrong(name, "found " + JsonFields.Shown(element), Invariant($"a whole number from {least} to {most}"));
        return absent;
    }

    /// <summary>One of some words; the first when absent or wrong.</summary>
    public string OneOf(string name, params IReadOnlyList<string> words)
    {
        if (Find(name) is not { } element) return words[0];
        if (element.ValueKind == JsonValueKind.String && words.Contains(element.GetString())) return element.GetString()!;
        Wrong(name, "found " + JsonFields.Shown(element), string.Join(", ", words.Select(word => $"\"{word}\"")));
        return words[0];
    }

    /// <summary>The elements of a list that must not be empty, each with where it stands.</summary>
    public IEnumerable<(JsonElement Element, string Where)> Elements(string name)
    {
        if (Find(name) is not { ValueKind: JsonValueKind.Array } list || list.GetArrayLength() == 0)
        {
            Wrong(name, Has(name) ? "not a list with something in it" : "missing", "a list of objects");
            yield break;
        }

        int i = 0;
        foreach (JsonElement element in list.EnumerateArray()) yield return (element, Invariant($"{Path(name)}[{i++}]"));
    }

    public string Path(string name) => _where.Length == 0 ? name : $"{_where}.{name}";

    public void Wrong(string name, string found, string allowed) => _problems.Add($"{Path(name)}: {found}; allowed: {allowed}.");
}
