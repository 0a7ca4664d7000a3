using System.Globalization;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Simulator;

/// <summary>Writes readings as files that the service imports.</summary>
public static class HistoryWriter
{
    /// <summary>Writes one stretch of history.</summary>
    /// <param name="wide">Receives a table with a column for each signal: good readings of the instruments. An empty cell is no reading.</param>
    /// <param name="marked">Receives a row for each other reading: marked ones, positions, laboratory.</param>
    /// <param name="lines">The lines; computed to the end of the stretch.</param>
    /// <param name="from">First instant.</param>
    /// <param name="to">End; not in it any more.</param>
    public static void Write(TextWriter wide, TextWriter marked, IReadOnlyList<LineReadings> lines, DateTimeOffset from, DateTimeOffset to)
    {
        ArgumentNullException.ThrowIfNull(wide);
        ArgumentNullException.ThrowIfNull(marked);
        long begin = from.ToUnixTimeMilliseconds(), end = to.ToUnixTimeMilliseconds();
        var columns = new List<(LineReadings Line, int Instrument, string Signal)>();
        marked.Write("time,signal,value,quality\n");
        foreach (LineReadings line in lines)
        {
            for (int i = 0; i < line.Simulation.Instruments.Count; i++)
            {
                var at = line.Simulation.Instruments[i];
                if (at.Instrument.Unit.Dimension != Core.Plant.Dimension.Number && !ReadingTimes.IsLaboratory(at))
                {
                    columns.Add((line, i, at.Instrument.Signal));
                    continue;
                }

                foreach (long instant in ReadingTimes.Of(at, begin, end, ReadingTimes.Historian)) Mark(marked, at.Instrument.Signal, line.At(i, instant));
            }
        }

        wide.Write("time");
        foreach ((_, _, string signal) in columns) wide.Write($",{signal}");
        wide.Write('\n');
        Span<char> number = stackalloc char[32];
        for (long instant = (begin + ReadingTimes.Historian - 1) / ReadingTimes.Historian * ReadingTimes.Historian; instant < end; instant += ReadingTimes.Historian)
        {
            wide.Write(Time(instant));
            foreach ((LineReadings line, int instrument, string signal) in columns)
            {
                wide.Write(',');
                if (line.At(instrument, instant) is not { } reading) continue;
                if (reading.Quality != Quality.Good) Mark(marked, signal, reading);
                else if (reading.Value.TryFormat(number, out int length, provider: CultureInfo.InvariantCulture)) wide.Write(number[..length]);
            }

            wide.Write('\n');
        }
    }

    private static void Mark(TextWriter text, string signal, Reading? reading)
    {
        if (reading is not { } one) return;
        string value = double.IsNaN(one.Value) ? "" : one.Value.ToString(CultureInfo.InvariantCulture);
        string quality = one.Quality switch { Quality.Good => "good", Quality.Uncertain => "uncertain", _ => "bad" };
        text.Write($"{Time(one.At)},{signal},{value},{quality}\n");
    }

    private static string Time(long at) => DateTimeOffset.FromUnixTimeMilliseconds(at).UtcDateTime.ToString("yyyy-MM-ddTHH:mm:ssZ", CultureInfo.InvariantCulture);
}
