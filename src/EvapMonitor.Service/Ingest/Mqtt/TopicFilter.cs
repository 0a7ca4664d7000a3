namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>An MQTT topic filter (MQTT 5.0, section 4.7) that also tells what its wildcards stood for.</summary>
public sealed class TopicFilter
{
    private readonly string[] _levels;

    private TopicFilter(string text) => (Text, _levels) = (text, text.Split('/'));

    /// <summary>The filter as written.</summary>
    public string Text { get; }

    /// <summary>Number of wildcards.</summary>
    public int Wildcards => _levels.Count(level => level is "+" or "#");

    /// <summary>Reads a filter; null with the reason when it is not one.</summary>
    public static TopicFilter? Read(string text, out string? wrong)
    {
        ArgumentNullException.ThrowIfNull(text);
        string[] levels = text.Split('/');
        wrong = text.Length is 0 or > 1000 ? "allowed: 1 to 1000 letters"
            : text.Any(char.IsControl) ? "control characters are not allowed"
            : levels.Any(level => level.Length > 1 && level.AsSpan().ContainsAny('+', '#')) ? "a wildcard (+ or #) stands alone between slashes"
            : Array.IndexOf(levels, "#") is >= 0 and var place && place < levels.Length - 1 ? "# stands last"
            : levels[0] == "$share" ? "shared subscriptions are not supported: their messages are not in order"
            : null;
        return wrong is null ? new TopicFilter(text) : null;
    }

    /// <summary>What the wildcards stand for in a topic, in their order; null when the topic does not match.</summary>
    public IReadOnlyList<string>? Match(string topic)
    {
        ArgumentNullException.ThrowIfNull(topic);
        string[] parts = topic.Split('/');
        // Wildcards at the front do not match what a broker says of itself.
        if (topic.StartsWith('$') && _levels[0] is "+" or "#") return null;
        var found = new List<string>();
        for (int i = 0; i < _levels.Length; i++)
        {
            if (_levels[i] == "#")
            {
                found.Add(string.Join('/', parts.Skip(i)));
                return found;
            }

            if (i >= parts.Length) return null;
            if (_levels[i] == "+") found.Add(parts[i]);
            else if (_levels[i] != parts[i]) return null;
        }

        return parts.Length == _levels.Length ? found : null;
    }
}
