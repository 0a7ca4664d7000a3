using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Conditioning;

/// <summary>Tells a frozen signal from a plant at rest: it has stood still for its frozen-after while at least half of its neighbours moved.</summary>
internal sealed class Stillness(IReadOnlyList<Instrument> instruments, WindowPartial[][] partials, long step)
{
    /// <summary>True when a signal is frozen in a window.</summary>
    public bool IsFrozen(int signal, int window)
    {
        int span = (int)double.Ceiling(instruments[signal].FrozenAfter.TotalMilliseconds / step);
        int first = window - span + 1;
        // A bare number, such as the position of a switch, may stand still for ever.
        if (first < 0 || instruments[signal].Unit.Dimension == Dimension.Number || Moved(signal, first, window) != false) return false;
        int moved = 0, able = 0;
        for (int other = 0; other < partials.Length; other++)
        {
            if (other == signal || instruments[other].Unit.Dimension == Dimension.Number || Moved(other, first, window) is not { } has) continue;
            able++;
            if (has) moved++;
        }

        return able > 0 && 2 * moved >= able;
    }

    private static bool IsFlow(Dimension dimension) => dimension is Dimension.MassFlow or Dimension.VolumeFlow or Dimension.Power;

    /// <summary>Whether a signal moved beyond its resolution within some windows; null when it was not there all the time, or at rest.</summary>
    private bool? Moved(int signal, int first, int last)
    {
        WindowPartial[] windows = partials[signal];
        if (windows[first].GoodTime == 0 || windows[last].GoodTime == 0) return null;
        double lowest = double.PositiveInfinity, highest = double.NegativeInfinity;
        for (int window = first; window <= last; window++)
        {
            if (windows[window].GoodTime == 0) continue;
            lowest = double.Min(lowest, windows[window].Lowest);
            highest = double.Max(highest, windows[window].Highest);
            if (highest - lowest > instruments[signal].Resolution) return true;
        }

        // A meter with a low-flow cut-off says nothing for as long as nothing flows.
        return IsFlow(instruments[signal].Unit.Dimension) && lowest == 0 && highest == 0 ? null : false;
    }
}
