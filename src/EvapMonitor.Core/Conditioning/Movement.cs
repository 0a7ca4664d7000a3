using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>Knows when each signal of a line moved, so that a frozen signal can be told from a plant at rest.</summary>
internal sealed class Movement
{
    private readonly long[][] _moves;

    public Movement(IReadOnlyList<Instrument> instruments, Func<Instrument, ReadingSeries> series, WindowGrid grid)
    {
        long from = grid.Start - (long)LineConditioning.Memory.TotalMilliseconds;
        _moves = new long[instruments.Count][];
        for (int i = 0; i < _moves.Length; i++)
        {
            ReadingSeries readings = series(instruments[i]);
            int first = readings.IndexFrom(from), last = readings.IndexFrom(grid.End);
            // The first reading of a stretch is where it began, so the distinct beginnings are the moves.
            long[] since = ReadingVerdicts.StillSince(instruments[i], readings, first, last);
            _moves[i] = [.. since.Distinct()];
        }
    }

    /// <summary>True when at least half of the other signals that move at all have moved in a span.</summary>
    public bool OthersMoved(int signal, long from, long to)
    {
        int moved = 0, able = 0;
        for (int i = 0; i < _moves.Length; i++)
        {
            if (i == signal || _moves[i].Length < 2) continue;
            able++;
            int place = Array.BinarySearch(_moves[i], from);
            place = place >= 0 ? place : ~place;
            if (place < _moves[i].Length && _moves[i][place] <= to) moved++;
        }

        return able > 0 && 2 * moved >= able;
    }
}
