using System.Globalization;
using System.Text;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Ingest.Files;
using NodaTime;

namespace EvapMonitor.Service.Tests.Ingest.Files;

/// <summary>Keeps what a file holds, as texts that a test can compare: "A 2026-03-01T10:00:00Z 1.5 Good".</summary>
internal sealed class RecordingSink : IReadingSink
{
    private static readonly string[] Known = ["A", "B", "C", "a;b", "q\"x"];

    public List<string> Readings { get; } = [];

    public List<string> Problems { get; } = [];

    public Dictionary<string, int> Unknown { get; } = [];

    public static RecordingSink Of(string text) => Of(Encoding.UTF8.GetBytes(text));

    public static RecordingSink Of(byte[] file)
    {
        var sink = new RecordingSink();
        long earliest = new DateTimeOffset(2025, 1, 1, 0, 0, 0, TimeSpan.Zero).ToUnixTimeMilliseconds();
        long latest = new DateTimeOffset(2026, 12, 1, 0, 0, 0, TimeSpan.Zero).ToUnixTimeMilliseconds();
        new ReadingFile(new MemoryStream(file), DateTimeZoneProviders.Tzdb["Europe/Copenhagen"], earliest, latest, sink).Read();
        return sink;
    }

    public int KeyOf(string signal) => Array.IndexOf(Known, signal);

    public void Take(int key, in Reading reading) => Readings.Add(string.Create(CultureInfo.InvariantCulture,
        $"{Known[key]} {DateTimeOffset.FromUnixTimeMilliseconds(reading.At):yyyy-MM-ddTHH:mm:ss.FFFZ} {reading.Value} {reading.Quality}"));

    public void TakeUnknown(string signal) => Unknown[signal] = Unknown.GetValueOrDefault(signal) + 1;

    public void Reject(long line, string reason) => Problems.Add($"{line}: {reason}");

    public bool RowDone(long line) => true;
}
