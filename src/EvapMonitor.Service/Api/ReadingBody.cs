using System.Buffers;
using System.IO.Compression;
using System.Text.Json;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Ingest;

namespace EvapMonitor.Service.Api;

/// <summary>Reads the body of a batch of readings: all of it is right, or none is used.</summary>
internal static class ReadingBody
{
    /// <summary>Largest body, bytes, as sent and unfolded.</summary>
    public const int Largest = 16 << 20;

    /// <summary>Most readings in a batch.</summary>
    public const int MostReadings = 50_000;

    private const int MostProblemsTold = 10;

    /// <summary>The body unfolded; null when it is larger than allowed.</summary>
    /// <exception cref="InvalidDataException">It is not gzip.</exception>
    public static async Task<ReadOnlyMemory<byte>?> UnfoldAsync(Stream body, bool gzip, CancellationToken stop)
    {
        await using Stream input = gzip ? new GZipStream(body, CompressionMode.Decompress, leaveOpen: true) : body;
        var whole = new ArrayBufferWriter<byte>(64 << 10);
        while (whole.WrittenCount <= Largest)
        {
            int read = await input.ReadAsync(whole.GetMemory(16 << 10), stop);
            if (read == 0) return whole.WrittenMemory;
            whole.Advance(read);
        }

        return null;
    }

    /// <summary>The readings; or what is wrong, the first items by their index.</summary>
    public static IReadOnlyList<IncomingReading> Read(ReadOnlyMemory<byte> json, out string? wrong)
    {
        try
        {
            using JsonDocument document = JsonDocument.Parse(json, new JsonDocumentOptions { MaxDepth = 8 });
            JsonElement root = document.RootElement;
            wrong = root.ValueKind != JsonValueKind.Object || !root.TryGetProperty("readings", out JsonElement list) || list.ValueKind != JsonValueKind.Array
                || root.EnumerateObject().Count() != 1
                ? "The body is not an object with the one member readings, a list." : null;
            if (wrong is not null) return [];
            int count = root.GetProperty("readings").GetArrayLength();
            if (count is 0 or > MostReadings)
            {
                wrong = $"readings has {count} items; allowed: 1 to {MostReadings}.";
                return [];
            }

            return ReadItems(root.GetProperty("readings"), count, out wrong);
        }
        catch (JsonException error)
        {
            wrong = $"The body is not JSON: {error.Message}";
            return [];
        }
        catch (InvalidOperationException)
        {
            // The name of a member with half a surrogate pair cannot be compared with anything.
            wrong = "The body holds text that is not valid Unicode.";
            return [];
        }
    }

    private static List<IncomingReading> ReadItems(JsonElement list, int count, out string? wrong)
    {
        var readings = new List<IncomingReading>(count);
        var problems = new List<string>();
        int index = 0;
        // Equal names become one text: a batch names few signals many times.
        var names = new Dictionary<string, string>(StringComparer.Ordinal);
        foreach (JsonElement item in list.EnumerateArray())
        {
            if (TryReadItem(item, names, out IncomingReading reading) is { } problem) problems.Add($"readings[{index}]: {problem}");
            else readings.Add(reading);
            if (problems.Count == MostProblemsTold) break;
            index++;
        }

        wrong = problems.Count == 0 ? null : "Nothing was stored. " + string.Join("; ", problems) + ".";
        return problems.Count == 0 ? readings : [];
    }

    private static string? TryReadItem(JsonElement item, Dictionary<string, string> names, out IncomingReading reading)
    {
        try
        {
            return ReadItem(item, names, out reading);
        }
        catch (InvalidOperationException)
        {
            // Text with half a surrogate pair cannot be given out as text.
            reading = default;
            return "text that is not valid Unicode";
        }
    }

    private static string? ReadItem(JsonElement item, Dictionary<string, string> names, out IncomingReading reading)
    {
        reading = default;
        if (item.ValueKind != JsonValueKind.Object) return $"{JsonFields.Shown(item)} is not an object";
        string? signal = null, wrong = null;
        long? at = null;
        double value = double.NaN;
        Quality quality = Quality.Good;
        foreach (JsonProperty member in item.EnumerateObject())
        {
            switch (member.Name)
            {
                case "signal":
                    signal = member.Value.ValueKind == JsonValueKind.String ? member.Value.GetString() : null;
                    wrong ??= signal is null ? $"signal {JsonFields.Shown(member.Value)} is not text" : JsonFields.WhyNoSignal(signal);
                    break;
                case "at":
                    string? wrongTime = JsonFields.ReadTime(member.Value, TimeWritten.Rfc3339, out long instant);
                    (wrong, at) = (wrong ?? wrongTime, instant);
                    break;
                case "value":
                    wrong ??= JsonFields.ReadValue(member.Value, out value);
                    break;
                case "quality":
                    wrong ??= JsonFields.ReadQuality(member.Value, out quality);
                    break;
                default:
                    wrong ??= $"'{member.Name}' is not known; allowed: signal, at, value, quality";
                    break;
            }
        }

        wrong ??= signal is null ? "signal is missing" : at is null ? "at is missing" : JsonFields.WhyNoValue(value, quality);
        if (wrong is not null) return wrong;
        if (!names.TryGetValue(signal!, out string? name)) names.Add(signal!, name = signal!);
        reading = new IncomingReading(name, new Reading(at!.Value, value, quality));
        return null;
    }
}
