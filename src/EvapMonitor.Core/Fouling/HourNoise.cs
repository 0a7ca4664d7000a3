namespace EvapMonitor.Core.Fouling;

/// <summary>
/// What an hour's ln U scatters about the truth: a part that is new in every hour and a part that lasts for about a day (an autoregression of first order), from
/// everything that no condition explains. Neighbouring hours share the slow part, so that the mean of n hours is less sure than 1/√n.
/// </summary>
/// <param name="Sigma">Standard deviation of an hour.</param>
/// <param name="SlowShare">Share of its square that is slow, 0 to 1.</param>
/// <param name="Learnt">False: assumed, for want of hours.</param>
internal readonly record struct HourNoise(double Sigma, double SlowShare, bool Learnt)
{
    /// <summary>Correlation of the slow part from one hour to the next: it fades to a third in twenty hours.</summary>
    public const double Phi = 0.95;

    private static readonly double LogPhi = double.Log(Phi);

    /// <summary>What is assumed until it can be learnt.</summary>
    public static HourNoise Assumed { get; } = new(0.02, 0.25, false);

    /// <summary>Correlation of two hours so many hours apart.</summary>
    public double Correlation(double hours) => hours == 0 ? 1 : SlowShare * double.Exp(LogPhi * hours);

    /// <summary>Variance of Σ w·(noise of the hour); hours ascend.</summary>
    public double Variance(ReadOnlySpan<double> weights, ReadOnlySpan<double> hours)
    {
        double slow = 0, fast = 0, carried = 0;
        for (int i = 0; i < weights.Length; i++)
        {
            if (i > 0) carried *= double.Exp(LogPhi * (hours[i] - hours[i - 1]));
            fast += weights[i] * weights[i];
            slow += weights[i] * (weights[i] + (2 * carried));
            carried += weights[i];
        }

        return Sigma * Sigma * (((1 - SlowShare) * fast) + (SlowShare * double.Max(slow, 0)));
    }
}
