namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>The form of a message.</summary>
public enum MessageShape
{
    /// <summary>The payload is a number as text.</summary>
    Number,
    /// <summary>The payload is a JSON object with members for value, time, quality and signal.</summary>
    Object,
    /// <summary>The payload is a JSON object with a member for each signal and one for the time of all.</summary>
    Members,
    /// <summary>An object when the payload begins with a brace, else a number.</summary>
    Either,
}

/// <summary>How the messages under a topic filter are read.</summary>
/// <param name="Filter">The filter.</param>
/// <param name="Shape">The form of the payload.</param>
public sealed record MessageRule(TopicFilter Filter, MessageShape Shape)
{
    /// <summary>Makes the signal's name, where no member gives it. Default: the topic, or with <see cref="MessageShape.Members"/> the member's name.</summary>
    public SignalName Signal { get; init; } = SignalName.Topic;

    /// <summary>Member with the value. Default value.</summary>
    public string ValueMember { get; init; } = "value";

    /// <summary>Member with the instant; when it is absent, the instant of arrival holds. Default time.</summary>
    public string TimeMember { get; init; } = "time";

    /// <summary>Member with the quality; absent is good. Default quality.</summary>
    public string QualityMember { get; init; } = "quality";

    /// <summary>Member with the signal's name, which then comes before <see cref="Signal"/>. Default signal.</summary>
    public string SignalMember { get; init; } = "signal";

    /// <summary>How the instant is written. Default RFC 3339.</summary>
    public TimeWritten TimeWritten { get; init; }

    /// <summary>With <see cref="MessageShape.Members"/>: which member is which signal; null takes every member that is a number.</summary>
    public IReadOnlyDictionary<string, string>? Signals { get; init; }

    /// <summary>How messages to the service's own broker are read: every topic, either form, the topic is the signal.</summary>
    public static MessageRule OwnBroker { get; } = new(TopicFilter.Read("#", out _)!, MessageShape.Either);
}
