using System.Text;
using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Ingest.Files;
using EvapMonitor.Service.Store;
using NodaTime;

namespace EvapMonitor.Service.Evaluation;

/// <summary>A logged event of a file.</summary>
/// <param name="Start">When, ms.</param>
/// <param name="End">End of an interval, ms; null without one.</param>
/// <param name="Line">The line.</param>
/// <param name="Effect">The effect; null for the whole line.</param>
/// <param name="Signal">The signal of the instrument; null for others.</param>
/// <param name="Note">Free text; of a cleaning, the plant's word for it.</param>
/// <param name="Kind">cleaning, rejected-cleaning, instrument-excluded or recalibration.</param>
internal sealed record LoggedEvent(long Start, long? End, string Line, string? Effect, string? Signal, string Kind, string Note);

/// <summary>Reads a file of logged events: time,end,line,effect,signal,kind,note. Every mistake ends it: a wrong log would move results in silence.</summary>
internal static class EventFile
{
    /// <summary>The cleaning of an effect.</summary>
    public const string Cleaning = "cleaning";

    /// <summary>A rise of the coefficient in this time was no cleaning.</summary>
    public const string RejectedCleaning = "rejected-cleaning";

    private static readonly string[] Kinds = [Cleaning, RejectedCleaning, InstrumentLogStore.Excluded, InstrumentLogStore.Recalibrated];

    public static List<LoggedEvent> Read(string path, Site site)
    {
        var problems = new List<string>();
        var events = new List<LoggedEvent>();
        var times = new TimeReader(DateTimeZoneProviders.Tzdb[site.TimeZone]);
        using FileStream stream = File.OpenRead(path);
        var lines = new LineReader(stream);
        string name = Path.GetFileName(path);
        var clock = default(ClockState);
        while (lines.TryRead(out ReadOnlySpan<byte> line))
        {
            List<string> cells = Cells(line);
            if (lines.Number == 1)
            {
                if (!cells.SequenceEqual(["time", "end", "line", "effect", "signal", "kind", "note"])) throw new StartException([$"{name}:1: the header must be time,end,line,effect,signal,kind,note."]);
                continue;
            }

            if (line.IsEmpty) continue;
            if (WhyWrong(cells, site, times, ref clock, out LoggedEvent? logged) is { } wrong) problems.Add($"{name}:{lines.Number}: {wrong}");
            else events.Add(logged!);
        }

        return problems.Count == 0 ? events : throw new StartException(problems);
    }

    private static string? WhyWrong(List<string> cells, Site site, TimeReader times, ref ClockState clock, out LoggedEvent? logged)
    {
        logged = null;
        if (cells.Count != 7) return $"{cells.Count} columns; the header has 7";
        if (times.Read(Encoding.UTF8.GetBytes(cells[0]), ref clock, out long start) is { } wrong) return $"time '{cells[0]}' {wrong}";
        long? end = null;
        if (cells[1].Length > 0)
        {
            if (times.Read(Encoding.UTF8.GetBytes(cells[1]), ref clock, out long read) is { } wrongEnd) return $"end '{cells[1]}' {wrongEnd}";
            if (read <= start) return "end is not after time";
            end = read;
        }

        if (site.Lines.FirstOrDefault(one => one.Name == cells[2]) is not { } line) return $"line '{cells[2]}' is not in the plant file";
        if (cells[3].Length > 0 && line.Effects.All(effect => effect.Name != cells[3])) return $"line {line.Name} has no effect '{cells[3]}'";
        if (!Kinds.Contains(cells[5])) return $"kind '{cells[5]}' is not known; allowed: {string.Join(", ", Kinds)}";
        if (cells[5] is Cleaning or RejectedCleaning && cells[3].Length == 0) return $"{cells[5]} needs its effect";
        if (cells[5] is InstrumentLogStore.Excluded or InstrumentLogStore.Recalibrated)
        {
            if (cells[4].Length == 0) return $"{cells[5]} needs the signal of its instrument";
            if (new LineInstruments(line).All.All(instrument => instrument.Signal != cells[4])) return $"line {line.Name} has no instrument with the signal '{cells[4]}'";
        }

        logged = new LoggedEvent(start, end, line.Name, NullIfEmpty(cells[3]), NullIfEmpty(cells[4]), cells[5], cells[6]);
        return null;
    }

    private static string? NullIfEmpty(string cell) => cell.Length == 0 ? null : cell;

    private static List<string> Cells(ReadOnlySpan<byte> line)
    {
        var cells = new List<string>();
        var fields = new Fields(line, (byte)',');
        while (fields.TryTake(out ReadOnlySpan<byte> field)) cells.Add(Encoding.UTF8.GetString(field));
        return cells;
    }
}
