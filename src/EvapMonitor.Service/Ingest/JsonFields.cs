using System.Text;
using System.Text.Json;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Ingest.Files;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Ingest;

/// <summary>How an instant is written.</summary>
public enum TimeWritten
{
    /// <summary>RFC 3339 with an offset, such as 2026-03-01T14:05:00.250Z.</summary>
    Rfc3339,
    /// <summary>A number: milliseconds since 1970-01-01T00:00:00Z.</summary>
    UnixMilliseconds,
    /// <summary>A number: seconds since 1970-01-01T00:00:00Z, decimals allowed.</summary>
    UnixSeconds,
}

/// <summary>Reads values, instants and qualities that come as JSON. Each returns null, or what is wrong.</summary>
internal static class JsonFields
{
    /// <summary>A value: a number; true and false as 1 and 0; null as none (NaN).</summary>
    public static string? ReadValue(JsonElement element, out double value)
    {
        value = double.NaN;
        switch (element.ValueKind)
        {
            case JsonValueKind.Number when element.TryGetDouble(out value) && double.IsFinite(value):
            case JsonValueKind.Null:
                return null;
            case JsonValueKind.True or JsonValueKind.False:
                value = element.ValueKind == JsonValueKind.True ? 1 : 0;
                return null;
            default:
                value = double.NaN;
                return $"value {Shown(element)} is not a number";
        }
    }

    /// <summary>An instant in ms since 1970-01-01T00:00:00Z; parts of a millisecond are cut off.</summary>
    public static string? ReadTime(JsonElement element, TimeWritten written, out long at)
    {
        at = 0;
        if (written == TimeWritten.Rfc3339)
        {
            // Without an offset the instant would depend on where this machine stands.
            if (element.ValueKind == JsonValueKind.String && HasOffset(element) && element.TryGetDateTimeOffset(out DateTimeOffset time))
            {
                at = Instant.ToMilliseconds(time.UtcDateTime);
                return null;
            }

            return $"time {Shown(element)} is not of the form 2026-03-01T14:05:00Z";
        }

        double scale = written == TimeWritten.UnixSeconds ? 1000 : 1;
        if (element.ValueKind == JsonValueKind.Number && element.TryGetDouble(out double number) && double.Abs(number * scale) < 1e14)
        {
            // A double of seconds holds microseconds; half a millisecond guards against 0.9999999.
            at = (long)double.Floor((number * scale) + 0.0005);
            return null;
        }

        return $"time {Shown(element)} is not a number of {(written == TimeWritten.UnixSeconds ? "seconds" : "milliseconds")} since 1970";
    }

    /// <summary>A quality: good, uncertain, bad, or an OPC UA status code as a number or text; null is good.</summary>
    public static string? ReadQuality(JsonElement element, out Quality quality)
    {
        quality = Quality.Good;
        if (element.ValueKind == JsonValueKind.Null) return null;
        string? text = element.ValueKind switch
        {
            JsonValueKind.String => element.GetString(),
            JsonValueKind.Number => element.GetRawText(),
            _ => null,
        };
        return text is not null && QualityCodes.TryRead(Encoding.UTF8.GetBytes(text), out quality) ? null
            : $"quality {Shown(element)} is not good, uncertain, bad or an OPC UA status code";
    }

    /// <summary>Why a value does not go with a quality: only a bad reading may have none.</summary>
    public static string? WhyNoValue(double value, Quality quality) =>
        double.IsNaN(value) && quality != Quality.Bad ? "there is no value, which only a bad reading may lack" : null;

    /// <summary>Why a name cannot be a signal's; null when it can.</summary>
    public static string? WhyNoSignal(string name) =>
        name.Length is 0 or > IncomingReading.LongestName ? $"the signal's name has {name.Length} letters; allowed: 1 to {IncomingReading.LongestName}"
        : name.Any(char.IsControl) ? "the signal's name has control characters" : null;

    /// <summary>Some text of an element, for a message.</summary>
    public static string Shown(JsonElement element)
    {
        string text = element.GetRawText();
        return text.Length <= 60 ? text : text[..60] + "…";
    }

    private static bool HasOffset(JsonElement element)
    {
        string text = element.GetString()!;
        return text.Length >= 20 && (text[^1] is 'Z' || text[^6] is '+' or '-');
    }
}
