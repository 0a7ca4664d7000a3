namespace EvapMonitor.Core.Conditioning;

/// <summary>
/// The ratio of two estimates of a signal's variance: from its departures from a filtered mean, and from its successive differences. It is about 1 while only
/// noise moves the signal and grows when the signal itself moves. Cao and Rhinehart, An efficient method for on-line identification of steady state, J. Process
/// Control 5(6), 1995, 363-374; the order of the filters and their factors from memory.
/// </summary>
internal struct SteadyStatistic
{
    /// <summary>Filter factor of the mean, λ1.</summary>
    public const double MeanFactor = 0.2;

    /// <summary>Filter factor of the departures from the mean, λ2, and of the successive differences, λ3.</summary>
    public const double VarianceFactor = 0.1;

    private double _mean, _last, _departures, _differences;

    /// <summary>Samples since the filters were started.</summary>
    public int Count { get; private set; }

    /// <summary>
    /// Takes a sample. Until the filters have their full memory they are plain means of what there is, so that no value to start from has to be invented.
    /// </summary>
    /// <returns>R = (2 − λ1)·ν²/δ²; NaN while nothing has moved (δ² = 0).</returns>
    public double Add(double sample)
    {
        if (Count > 0)
        {
            double share = double.Max(VarianceFactor, 1.0 / Count), departure = sample - _mean, difference = sample - _last;
            _departures += share * ((departure * departure) - _departures);
            _differences += share * ((difference * difference) - _differences);
        }

        Count++;
        _mean += double.Max(MeanFactor, 1.0 / Count) * (sample - _mean);
        _last = sample;
        return _differences > 0 ? (2 - MeanFactor) * _departures / _differences : double.NaN;
    }

    /// <summary>The part of the mean square departure that noise does not explain, in the square of the signal's unit.</summary>
    /// <param name="expected">What R is for noise alone, from <see cref="Expected"/>.</param>
    public readonly double Unexplained(double expected) => _departures - (expected * _differences / (2 - MeanFactor));

    /// <summary>
    /// What R is on average when neighbouring samples of noise are correlated: 1 for white noise. By the stationary variances of the filters for a first-order
    /// process; derived here.
    /// </summary>
    /// <param name="correlation">Correlation φ of neighbouring samples, 0 to under 1.</param>
    public static double Expected(double correlation)
    {
        double carried = correlation * (1 - MeanFactor);
        double ofMean = MeanFactor / (2 - MeanFactor) * (1 + carried) / (1 - carried), shared = MeanFactor * correlation / (1 - carried);
        return (2 - MeanFactor) * (1 + ofMean - (2 * shared)) / (2 * (1 - correlation));
    }
}
