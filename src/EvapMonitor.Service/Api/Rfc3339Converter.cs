using System.Globalization;
using System.Text.Json;
using System.Text.Json.Serialization;

namespace EvapMonitor.Service.Api;

/// <summary>Reads times that carry their offset. One without would be taken for the time of whatever zone this machine is set to, in silence.</summary>
internal sealed class Rfc3339Converter : JsonConverter<DateTimeOffset>
{
    public override DateTimeOffset Read(ref Utf8JsonReader reader, Type typeToConvert, JsonSerializerOptions options)
    {
        string? text = reader.GetString();
        return reader.TryGetDateTimeOffset(out DateTimeOffset time) && HasOffset(text) ? time : throw new JsonException("The JSON value could not be converted: no RFC 3339 time.");
    }

    public override void Write(Utf8JsonWriter writer, DateTimeOffset value, JsonSerializerOptions options) =>
        writer.WriteStringValue(value.ToUniversalTime().ToString("yyyy-MM-ddTHH:mm:ss.FFFFFFZ", CultureInfo.InvariantCulture));

    /// <summary>True for a text that ends with Z or an offset; also for none at all.</summary>
    public static bool HasOffset(string? text) =>
        string.IsNullOrEmpty(text) || text[^1] is 'Z' or 'z' || (text.Length > 16 && text[^6] is '+' or '-' or ' ' && text[^3] == ':');
}
