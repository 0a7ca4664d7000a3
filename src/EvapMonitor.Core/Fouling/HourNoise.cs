namespace EvapMonitor.Core.Fouling;

/// <summary>
/// What an hour's ln U scatters about the truth, as an autoregression of first order in time: Φ is the correlation of an hour with the next one. Neighbouring hours
/// share slow causes, so that the mean of n hours is less sure than 1/√n.
/// </summary>
/// <param name="Sigma">Standard deviation of an hour.</param>
/// <param name="Phi">Correlation at one hour, 0 to under 1.</param>
/// <param name="Learnt">False: assumed, for want of hours.</param>
internal readonly record struct HourNoise(double Sigma, double Phi, bool Learnt)
{
    /// <summary>Largest correlation that is believed: beyond, hours cannot tell noise from fouling.</summary>
    public const double LargestPhi = 0.95;

    /// <summary>What is assumed until it can be learnt.</summary>
    public static HourNoise Assumed { get; } = new(0.02, 0.5, false);

    /// <summary>Variance of Σ w·(noise of the hour); hours ascend.</summary>
    public double Variance(ReadOnlySpan<double> weights, ReadOnlySpan<double> hours)
    {
        double sum = 0, carried = 0, log = double.Log(double.Max(Phi, 1e-9));
        for (int i = 0; i < weights.Length; i++)
        {
            if (i > 0) carried *= double.Exp(log * (hours[i] - hours[i - 1]));
            sum += weights[i] * (weights[i] + (2 * carried));
            carried += weights[i];
        }

        return Sigma * Sigma * double.Max(sum, 0);
    }

    /// <summary>Learns it from residuals of groups of hours in a row, from each of which a mean and a slope were taken.</summary>
    /// <param name="residuals">Residuals, group by group.</param>
    /// <param name="hours">Times in hours, as long.</param>
    /// <param name="starts">Where the groups start; the last entry is the end.</param>
    public static HourNoise Learn(ReadOnlySpan<double> residuals, ReadOnlySpan<double> hours, IReadOnlyList<int> starts)
    {
        int groups = starts.Count - 1;
        if (groups < 5) return Assumed;
        double limit = 3 * Robust.Spread(residuals), squares = 0, products = 0, paired = 0;
        for (int g = 0; g < groups; g++)
        {
            for (int i = starts[g]; i < starts[g + 1]; i++)
            {
                double one = double.Clamp(residuals[i], -limit, limit);
                squares += one * one;
                if (i + 1 == starts[g + 1] || hours[i + 1] - hours[i] > 1.5) continue;
                double next = double.Clamp(residuals[i + 1], -limit, limit);
                products += one * next;
                paired += ((one * one) + (next * next)) / 2;
            }
        }

        if (!(squares > 0) || !(paired > 0)) return Assumed;
        // Taking a mean and a slope from n numbers lowers their correlation to about φ − (2 + 4φ)/n (Kendall 1954 for the mean; the same expansion with a slope).
        double n = residuals.Length / (double)groups, phi = double.Clamp(((products / paired) + (2 / n)) / double.Max(1 - (4 / n), 0.2), 0, LargestPhi);
        double share = KeptShare(int.Max((int)double.Round(n), 4), phi);
        return new HourNoise(double.Sqrt(squares / residuals.Length / share), phi, true);
    }

    /// <summary>Share of the variance of n hours in a row that is left when their mean and slope are taken out: tr(MΣ)/n.</summary>
    private static double KeptShare(int n, double phi)
    {
        double[] mean = new double[n], slope = new double[n], hours = new double[n];
        double squares = 0;
        for (int i = 0; i < n; i++)
        {
            hours[i] = i;
            slope[i] = i - ((n - 1) / 2.0);
            squares += slope[i] * slope[i];
        }

        for (int i = 0; i < n; i++)
        {
            mean[i] = 1 / double.Sqrt(n);
            slope[i] /= double.Sqrt(squares);
        }

        var unit = new HourNoise(1, phi, true);
        return double.Max((n - unit.Variance(mean, hours) - unit.Variance(slope, hours)) / n, 0.05);
    }
}
