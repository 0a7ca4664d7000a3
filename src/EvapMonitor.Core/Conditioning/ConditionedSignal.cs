using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>Why a stretch of a signal did not enter a mean.</summary>
public enum Rejection
{
    /// <summary>The source says bad.</summary>
    BadQuality,
    /// <summary>No value, or not a finite number.</summary>
    NotANumber,
    /// <summary>Outside the instrument's range.</summary>
    OutOfRange,
    /// <summary>Stood still while its neighbours moved.</summary>
    Frozen,
}

/// <summary>What conditioning leaves of one signal: a mean for each window with its uncertainty, or no mean and the reason.</summary>
public sealed class ConditionedSignal
{
    /// <summary>Makes an empty result for a grid.</summary>
    internal ConditionedSignal(Instrument instrument, WindowGrid grid)
    {
        Instrument = instrument;
        Grid = grid;
        Mean = new double[grid.Count];
        Systematic = new double[grid.Count];
        Random = new double[grid.Count];
        Rate = new double[grid.Count];
        RateRandom = new double[grid.Count];
        GoodShare = new float[grid.Count];
        Rejected = new int[grid.Count, Enum.GetValues<Rejection>().Length];
        Samples = new int[grid.Count];
    }

    /// <summary>The instrument.</summary>
    public Instrument Instrument { get; }

    /// <summary>The windows.</summary>
    public WindowGrid Grid { get; }

    /// <summary>Time-weighted mean of the good time, SI units, pressures absolute; NaN where the window has no value.</summary>
    public double[] Mean { get; }

    /// <summary>Systematic standard uncertainty, SI units: the instrument's accuracy, which no averaging shrinks.</summary>
    public double[] Systematic { get; }

    /// <summary>Random standard uncertainty of the mean, SI units.</summary>
    public double[] Random { get; }

    /// <summary>How fast the value rises within the window, SI units per s: the straight line through its readings by least squares; NaN with fewer than three.</summary>
    public double[] Rate { get; }

    /// <summary>Random standard uncertainty of the rate, from the scatter of the readings.</summary>
    public double[] RateRandom { get; }

    /// <summary>Share of the window in which the signal was good, 0 to 1.</summary>
    public float[] GoodShare { get; }

    /// <summary>Good readings in the window.</summary>
    public int[] Samples { get; }

    /// <summary>Readings not used, by window and <see cref="Rejection"/>.</summary>
    public int[,] Rejected { get; }

    private readonly HashSet<int> _excluded = [];

    /// <summary>Takes its value from every window that an interval touches: a person says that the instrument is not to be believed.</summary>
    /// <param name="intervals">Start and end, ms since 1970-01-01T00:00:00Z; the end is not in it.</param>
    internal void Exclude(IEnumerable<(long Start, long End)> intervals)
    {
        foreach ((long start, long end) in intervals)
        {
            for (int window = 0; window < Grid.Count; window++)
            {
                if (Grid.StartOf(window) >= end || Grid.StartOf(window) + Grid.Step <= start) continue;
                Mean[window] = double.NaN;
                _excluded.Add(window);
            }
        }
    }

    /// <summary>In plain words, why the window has no value.</summary>
    public string WhyAbsent(int window)
    {
        if (_excluded.Contains(window)) return $"{Instrument.Signal} is excluded by a person";
        int most = -1;
        for (int reason = 0; reason < Rejected.GetLength(1); reason++)
        {
            if (Rejected[window, reason] > 0 && (most < 0 || Rejected[window, reason] > Rejected[window, most])) most = reason;
        }

        return most < 0
            ? GoodShare[window] > 0 ? $"{Instrument.Signal} has too few readings" : $"{Instrument.Signal} has no reading"
            : (Rejection)most switch
            {
                Rejection.BadQuality => $"{Instrument.Signal} is bad by its source",
                Rejection.NotANumber => $"{Instrument.Signal} has no number",
                Rejection.OutOfRange => $"{Instrument.Signal} is outside its range",
                _ => $"{Instrument.Signal} is frozen",
            };
    }
}
