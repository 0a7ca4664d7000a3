using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>Judges single readings: which enter a mean, and since when a signal has stood still. Verdicts are recomputed, never stored.</summary>
internal static class ReadingVerdicts
{
    /// <summary>The reason to leave a reading out by itself, or null. Values are in the signal's unit.</summary>
    public static Rejection? Judge(Instrument instrument, double value, Quality quality)
    {
        if (quality == Quality.Bad) return Rejection.BadQuality;
        if (!double.IsFinite(value)) return Rejection.NotANumber;
        if (instrument.Range is not { } range) return null;
        double si = instrument.Unit.ToSi(value);
        return si < range.Low || si > range.High ? Rejection.OutOfRange : null;
    }

    /// <summary>For each reading of a span, the instant since which the signal has not changed beyond its resolution.</summary>
    /// <param name="instrument">Gives the resolution.</param>
    /// <param name="readings">The readings.</param>
    /// <param name="from">First index.</param>
    /// <param name="to">Index after the last.</param>
    public static long[] StillSince(Instrument instrument, ReadingSeries readings, int from, int to)
    {
        var since = new long[to - from];
        double anchor = double.NaN;
        long start = 0;
        for (int i = from; i < to; i++)
        {
            double value = readings.Value[i];
            // A reading without a number says nothing on movement: the stretch goes on.
            if (double.IsFinite(value) && !(double.Abs(instrument.Unit.DifferenceToSi(value - anchor)) <= instrument.Resolution))
            {
                anchor = value;
                start = readings.At[i];
            }
            else if (i == from)
            {
                start = readings.At[i];
            }

            since[i - from] = start;
        }

        return since;
    }
}
