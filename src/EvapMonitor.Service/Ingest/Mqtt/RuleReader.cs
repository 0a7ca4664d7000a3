using System.Text.Json;

namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>Reads how the messages under one filter are to be read.</summary>
internal static class RuleReader
{
    public static MessageRule? Read(JsonElement element, string where, List<string> problems)
    {
        var topic = new SettingsReader(
            element, where, problems, "filter", "message", "signal", "value", "time", "quality", "signal-member", "time-written", "signals");
        if (element.ValueKind != JsonValueKind.Object) return null;
        MessageShape shape = topic.OneOf("message", "number", "object", "members") switch
        {
            "number" => MessageShape.Number,
            "object" => MessageShape.Object,
            _ => MessageShape.Members,
        };
        TimeWritten written = topic.OneOf("time-written", "rfc3339", "unix-ms", "unix-s") switch
        {
            "unix-ms" => TimeWritten.UnixMilliseconds,
            "unix-s" => TimeWritten.UnixSeconds,
            _ => TimeWritten.Rfc3339,
        };
        foreach (string name in MembersWithout(shape))
        {
            if (topic.Has(name)) topic.Wrong(name, $"has no meaning with the message of {shape.ToString().ToLowerInvariant()} form", "leave it out");
        }

        if (topic.Text("filter", required: true) is not { } text) return null;
        if (TopicFilter.Read(text, out string? wrong) is not { } filter)
        {
            topic.Wrong("filter", $"found \"{text}\"", wrong!);
            return null;
        }

        var rule = new MessageRule(filter, shape) { TimeWritten = written, Signal = shape == MessageShape.Members ? SignalName.Member : SignalName.Topic };
        if (topic.Text("signal") is { } template)
        {
            SignalName? signal = SignalName.Read(template, filter.Wildcards, shape == MessageShape.Members, out wrong);
            if (signal is null) topic.Wrong("signal", $"found \"{template}\"", wrong!);
            else rule = rule with { Signal = signal };
            if (topic.Has("signals")) topic.Wrong("signal", "stands beside signals", "one of the two");
        }

        return rule with
        {
            ValueMember = topic.Text("value") ?? rule.ValueMember,
            TimeMember = topic.Text("time") ?? rule.TimeMember,
            QualityMember = topic.Text("quality") ?? rule.QualityMember,
            SignalMember = topic.Text("signal-member") ?? rule.SignalMember,
            Signals = topic.Find("signals") is { } signals ? ReadSignals(signals, topic) : null,
        };
    }

    private static string[] MembersWithout(MessageShape shape) => shape switch
    {
        MessageShape.Number => ["value", "time", "quality", "signal-member", "time-written", "signals"],
        MessageShape.Object => ["signals"],
        _ => ["value", "signal-member"],
    };

    private static Dictionary<string, string>? ReadSignals(JsonElement element, SettingsReader topic)
    {
        var signals = new Dictionary<string, string>(StringComparer.Ordinal);
        if (element.ValueKind != JsonValueKind.Object || !element.EnumerateObject().Any())
        {
            topic.Wrong("signals", "found " + JsonFields.Shown(element), "an object such as {\"flow\": \"N.FT-10\"}: member of the message, name of the signal");
            return null;
        }

        foreach (JsonProperty member in element.EnumerateObject())
        {
            if (member.Value.ValueKind != JsonValueKind.String || JsonFields.WhyNoSignal(member.Value.GetString()!) is not null)
                topic.Wrong("signals." + member.Name, "found " + JsonFields.Shown(member.Value), "the name of a signal");
            else signals[member.Name] = member.Value.GetString()!;
        }

        return signals;
    }
}
