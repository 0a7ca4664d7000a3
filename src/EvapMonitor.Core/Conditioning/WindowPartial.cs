namespace EvapMonitor.Core.Conditioning;

/// <summary>
/// What the readings of one signal leave in one window before its neighbours are asked: sums, counts, extremes. It depends on nothing but the readings from
/// stale-after before the window to the window's end, so that it is the same however and whenever it is computed.
/// </summary>
internal struct WindowPartial
{
    /// <summary>Sum of value times good time, SI units · ms.</summary>
    public double Weighted;

    /// <summary>Good time, ms.</summary>
    public double GoodTime;

    /// <summary>Sum of the good readings, SI units.</summary>
    public double Values;

    /// <summary>Sum of their times from the middle of the window, ms.</summary>
    public double Times;

    /// <summary>Sum of those times squared, ms².</summary>
    public double TimesSquared;

    /// <summary>Sum of value times time, SI units · ms.</summary>
    public double Moment;

    /// <summary>Good time of uncertain quality, ms.</summary>
    public double UncertainTime;

    /// <summary>Sum of squared successive differences.</summary>
    public double Squares;

    /// <summary>Number of those differences.</summary>
    public int Pairs;

    /// <summary>Good readings.</summary>
    public int Samples;

    /// <summary>Lowest good value in force in the window, SI units; meaningless without good time.</summary>
    public double Lowest;

    /// <summary>Highest good value in force in the window.</summary>
    public double Highest;

    /// <summary>Readings left out as bad by their source.</summary>
    public int Bad;

    /// <summary>Readings left out as no number.</summary>
    public int NotANumber;

    /// <summary>Readings left out as outside the range.</summary>
    public int OutOfRange;

    /// <summary>Takes a good reading into the sums over readings.</summary>
    /// <param name="value">Its value.</param>
    /// <param name="time">Its time from the middle of the window, ms.</param>
    public void Count(double value, double time)
    {
        Samples++;
        Values += value;
        Times += time;
        TimesSquared += time * time;
        Moment += value * time;
    }

    /// <summary>Mean square distance of the times of the good readings from their mean, ms².</summary>
    public readonly double TimeVariance => (TimesSquared / Samples) - (Times / Samples * (Times / Samples));

    /// <summary>Slope of the straight line through the good readings by least squares, SI units per ms; NaN for fewer than two.</summary>
    public readonly double Slope => ((Moment / Samples) - (Values / Samples * (Times / Samples))) / TimeVariance;

    /// <summary>Takes a good value into the extremes. Called before its time is added.</summary>
    public void Extend(double value)
    {
        Lowest = GoodTime > 0 ? double.Min(Lowest, value) : value;
        Highest = GoodTime > 0 ? double.Max(Highest, value) : value;
    }
}
