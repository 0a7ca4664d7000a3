using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>Location, spread and slope that a few wild hours do not move.</summary>
internal static class Robust
{
    /// <summary>1.4826 times the median distance from the median: the standard deviation, where the numbers are normal (Hampel 1974).</summary>
    public static double Spread(ReadOnlySpan<double> values)
    {
        double[] copy = values.ToArray();
        double middle = Middle.Of(copy);
        for (int i = 0; i < copy.Length; i++) copy[i] = double.Abs(values[i] - middle);
        return 1.4826 * Middle.Of(copy);
    }

    /// <summary>Median of the means of all pairs, each number with itself too (Hodges and Lehmann 1963).</summary>
    public static double Location(ReadOnlySpan<double> values)
    {
        double[] means = new double[values.Length * (values.Length + 1) / 2];
        int count = 0;
        for (int i = 0; i < values.Length; i++)
        {
            for (int j = i; j < values.Length; j++) means[count++] = (values[i] + values[j]) / 2;
        }

        return Middle.Of(means);
    }

    /// <summary>Median of the differences of all pairs, one of each sample (Hodges and Lehmann 1963): how much higher the second lies.</summary>
    public static double Shift(ReadOnlySpan<double> first, ReadOnlySpan<double> second)
    {
        double[] differences = new double[first.Length * second.Length];
        int count = 0;
        foreach (double one in first)
        {
            foreach (double other in second) differences[count++] = other - one;
        }

        return Middle.Of(differences);
    }

    /// <summary>Median of the slopes of all pairs with different x (Theil 1950, Sen 1968), and its standard uncertainty by Sen's interval; NaN with fewer than two.</summary>
    public static (double Slope, double Standard) Slope(ReadOnlySpan<double> x, ReadOnlySpan<double> y)
    {
        int n = x.Length, count = 0;
        double[] slopes = new double[n * (n - 1) / 2];
        for (int i = 0; i < n; i++)
        {
            for (int j = i + 1; j < n; j++)
            {
                if (x[j] != x[i]) slopes[count++] = (y[j] - y[i]) / (x[j] - x[i]);
            }
        }

        if (count == 0) return (double.NaN, double.NaN);
        Span<double> found = slopes.AsSpan(0, count);
        double slope = Middle.Of(found);
        // Kendall's S has this standard deviation where there is no slope; half the width between the ranks at ± one of it is one standard uncertainty of the slope.
        double deviation = double.Sqrt(n * (n - 1.0) * ((2.0 * n) + 5) / 18) / 2;
        double middle = (count - 1) / 2.0;
        return (slope, (At(found, middle + deviation) - At(found, middle - deviation)) / 2);
    }

    private static double At(Span<double> values, double rank)
    {
        double held = double.Clamp(rank, 0, values.Length - 1);
        int below = (int)held, above = int.Min(below + 1, values.Length - 1);
        double low = Middle.Place(values, below), high = Middle.Place(values, above);
        return low + ((held - below) * (high - low));
    }
}
