using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>
/// Tells whether a line was steady in a window: all its key signals have been for the settling time, and nothing was switched in that time.
/// </summary>
internal sealed class LineSteadiness(LineMemory memory, IReadOnlyList<SwitchingSignal> switches)
{
    /// <summary>How far before its settling time a window's verdict looks back: the filters' start on the coarser grid.</summary>
    public static TimeSpan LookBack { get; } = TimeSpan.FromMinutes(SignalSteadiness.WarmUp * SignalSteadiness.Coarse);

    /// <summary>Judges a window.</summary>
    /// <param name="at">Its start.</param>
    /// <param name="settling">The settling time, ms.</param>
    /// <returns>True: steady. False: not steady. Null: not judged, because a key signal is absent, does not move at all or there is none.</returns>
    public bool? Of(long at, long settling)
    {
        if (Switched(at, settling)) return false;
        long quietFrom = at - settling, end = at + memory.Grid.Step;
        bool unknown = memory.Keys.Instruments.Count == 0;
        for (int key = 0; key < memory.Keys.Instruments.Count; key++)
        {
            ReadOnlySpan<double> samples = memory.Keys.Between(key, quietFrom - (long)LookBack.TotalMilliseconds, end, out long first);
            bool? steady = SignalSteadiness.Judge(memory.Keys.Instruments[key], samples, first, KeySamples.NumberOf(quietFrom), KeySamples.NumberOf(at));
            if (steady == false) return false;
            unknown |= steady is null;
        }

        return unknown ? null : true;
    }

    /// <summary>True when a signal that switches something moved in a window or in the settling time before it.</summary>
    private bool Switched(long at, long settling)
    {
        WindowGrid grid = memory.Grid;
        int last = (int)((at - grid.Start) / grid.Step), first = int.Max(0, last - (int)((settling + grid.Step - 1) / grid.Step));
        foreach (SwitchingSignal one in switches)
        {
            int? before = null;
            // One window more, to see a change between two windows.
            for (int window = int.Max(0, first - 1); window <= last; window++)
            {
                ref readonly WindowPartial partial = ref memory.Partials[one.Place][window];
                if (partial.GoodTime == 0) continue;
                int lowest = one.Position(partial.Lowest), highest = one.Position(partial.Highest);
                if (window >= first && (lowest != highest || (before ?? lowest) != lowest)) return true;
                before = highest;
            }
        }

        return false;
    }
}

/// <summary>A signal whose position switches something: a body, the product, a cleaning.</summary>
/// <param name="Place">Its place among the instruments of the memory.</param>
/// <param name="Position">What a value stands for.</param>
internal readonly record struct SwitchingSignal(int Place, Func<double, int> Position);
