using System.Buffers;
using System.Buffers.Text;
using System.Collections.Concurrent;
using System.Text.Json;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Service.Ingest.Mqtt;

/// <summary>What a message turned out to be.</summary>
internal enum MessageVerdict
{
    /// <summary>It holds readings.</summary>
    Readings,
    /// <summary>It cannot be read.</summary>
    Malformed,
    /// <summary>It was retained and has no time, so that nobody knows when its value was true.</summary>
    InstantUnknown,
}

/// <summary>Reads the messages of one source by its rules: the first whose filter matches the topic holds. Safe from several threads.</summary>
internal sealed class MessageReader(IReadOnlyList<MessageRule> rules)
{
    /// <summary>Largest payload, bytes.</summary>
    public const int LargestPayload = 1 << 20;

    private const int MostTopicsKept = 10_000;
    private static readonly JsonDocumentOptions Options = new() { MaxDepth = 16 };

    /// <summary>What was found for a topic, so that it is worked out once.</summary>
    private readonly ConcurrentDictionary<string, (MessageRule? Rule, IReadOnlyList<string> Wildcards, string Signal)> _topics = new(StringComparer.Ordinal);

    private int _kept;

    /// <summary>Reads a message.</summary>
    /// <param name="topic">Its topic.</param>
    /// <param name="payload">Its payload.</param>
    /// <param name="arrival">When it came, ms since 1970-01-01T00:00:00Z.</param>
    /// <param name="retained">True when it lay at the broker before.</param>
    /// <param name="readings">The readings.</param>
    /// <param name="wrong">Why it is malformed.</param>
    public MessageVerdict Read(string topic, ReadOnlySequence<byte> payload, long arrival, bool retained, out IReadOnlyList<IncomingReading> readings, out string? wrong)
    {
        readings = [];
        (MessageRule? rule, IReadOnlyList<string> wildcards, string signal) = RuleOf(topic);
        wrong = rule is null ? "no rule for this topic" : payload.Length > LargestPayload ? $"the payload has {payload.Length} bytes; allowed: {LargestPayload}" : null;
        if (wrong is not null) return MessageVerdict.Malformed;
        try
        {
            bool isObject = rule!.Shape is MessageShape.Object or MessageShape.Members || (rule.Shape == MessageShape.Either && BeginsWithBrace(payload));
            if (!isObject) return ReadNumber(signal, payload, arrival, retained, out readings, out wrong);
            using JsonDocument document = JsonDocument.Parse(payload, Options);
            if (document.RootElement.ValueKind != JsonValueKind.Object)
            {
                wrong = "the payload is not a JSON object";
                return MessageVerdict.Malformed;
            }

            long? at = arrival;
            if (document.RootElement.TryGetProperty(rule.TimeMember, out JsonElement time))
            {
                wrong = JsonFields.ReadTime(time, rule.TimeWritten, out long stated);
                at = stated;
            }
            else if (retained)
            {
                return MessageVerdict.InstantUnknown;
            }

            if (wrong is null && rule.Shape == MessageShape.Members) readings = ReadMembers(rule, topic, wildcards, document.RootElement, at.Value, out wrong);
            else if (wrong is null) readings = ReadObject(rule, signal, document.RootElement, at.Value, out wrong);
        }
        catch (JsonException error)
        {
            wrong = $"not JSON: {error.Message}";
        }
        catch (InvalidOperationException)
        {
            // Text with half a surrogate pair cannot be given out as text.
            wrong = "text that is not valid Unicode";
        }

        return wrong is null ? MessageVerdict.Readings : MessageVerdict.Malformed;
    }

    private static MessageVerdict ReadNumber(
        string signal, ReadOnlySequence<byte> payload, long arrival, bool retained, out IReadOnlyList<IncomingReading> readings, out string? wrong)
    {
        readings = [];
        wrong = null;
        ReadOnlySpan<byte> text = payload.Length > 64 ? default : payload.IsSingleSegment ? payload.FirstSpan : payload.ToArray();
        text = text.Trim(" \t\r\n"u8);
        if (!Utf8Parser.TryParse(text, out double value, out int used) || used != text.Length || !double.IsFinite(value))
        {
            wrong = $"'{System.Text.Encoding.UTF8.GetString(payload.Slice(0, long.Min(payload.Length, 40)).ToArray())}' is not a number";
            return MessageVerdict.Malformed;
        }

        if (retained) return MessageVerdict.InstantUnknown;
        wrong = JsonFields.WhyNoSignal(signal);
        readings = [new IncomingReading(signal, new Reading(arrival, value, Quality.Good))];
        return wrong is null ? MessageVerdict.Readings : MessageVerdict.Malformed;
    }

    private static IReadOnlyList<IncomingReading> ReadObject(MessageRule rule, string signal, JsonElement message, long at, out string? wrong)
    {
        Quality quality = Quality.Good;
        double value = double.NaN;
        wrong = null;
        if (message.TryGetProperty(rule.SignalMember, out JsonElement name))
        {
            if (name.ValueKind == JsonValueKind.String) signal = name.GetString()!;
            else wrong = $"{rule.SignalMember} {JsonFields.Shown(name)} is not text";
        }

        if (message.TryGetProperty(rule.QualityMember, out JsonElement stated)) wrong ??= JsonFields.ReadQuality(stated, out quality);
        if (message.TryGetProperty(rule.ValueMember, out JsonElement number)) wrong ??= JsonFields.ReadValue(number, out value);
        wrong ??= JsonFields.WhyNoValue(value, quality) ?? JsonFields.WhyNoSignal(signal);
        return [new IncomingReading(signal, new Reading(at, value, quality))];
    }

    private static List<IncomingReading> ReadMembers(MessageRule rule, string topic, IReadOnlyList<string> wildcards, JsonElement message, long at, out string? wrong)
    {
        Quality quality = Quality.Good;
        wrong = message.TryGetProperty(rule.QualityMember, out JsonElement stated) ? JsonFields.ReadQuality(stated, out quality) : null;
        var readings = new List<IncomingReading>();
        foreach (JsonProperty member in message.EnumerateObject())
        {
            if (wrong is not null) break;
            if (member.NameEquals(rule.TimeMember) || member.NameEquals(rule.QualityMember)) continue;
            string? signal = rule.Signals is null ? rule.Signal.Of(topic, wildcards, member.Name) : rule.Signals.GetValueOrDefault(member.Name);
            // Without a list of members, those that are no numbers are something else.
            if (signal is null || (rule.Signals is null && member.Value.ValueKind is not (JsonValueKind.Number or JsonValueKind.True or JsonValueKind.False))) continue;
            wrong = JsonFields.ReadValue(member.Value, out double value) ?? JsonFields.WhyNoSignal(signal);
            if (wrong is not null) wrong = $"{member.Name}: {wrong}";
            // A member without a value says nothing, unless all of the message is bad.
            else if (!double.IsNaN(value) || quality == Quality.Bad) readings.Add(new IncomingReading(signal, new Reading(at, value, quality)));
        }

        if (readings.Count == 0) wrong ??= "no member is a signal";
        return readings;
    }

    private (MessageRule? Rule, IReadOnlyList<string> Wildcards, string Signal) RuleOf(string topic)
    {
        if (_topics.TryGetValue(topic, out var known)) return known;
        (MessageRule?, IReadOnlyList<string>, string) found = (null, [], topic);
        foreach (MessageRule rule in rules)
        {
            if (rule.Filter.Match(topic) is not { } wildcards) continue;
            found = (rule, wildcards, rule.Signal.Of(topic, wildcards, ""));
            break;
        }

        if (_kept >= MostTopicsKept)
        {
            _topics.Clear();
            _kept = 0;
        }

        if (_topics.TryAdd(topic, found)) Interlocked.Increment(ref _kept);
        return found;
    }

    private static bool BeginsWithBrace(ReadOnlySequence<byte> payload)
    {
        foreach (ReadOnlyMemory<byte> piece in payload)
        {
            foreach (byte one in piece.Span)
            {
                if (one is not ((byte)' ' or (byte)'\t' or (byte)'\r' or (byte)'\n')) return one == (byte)'{';
            }
        }

        return false;
    }
}
