using System.Buffers;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>How far the noise of neighbouring samples of a signal is correlated, whatever the signal itself does meanwhile.</summary>
internal static class NoiseCorrelation
{
    /// <summary>Differences beyond this many standard deviations are steps of the process and count as that many.</summary>
    private const double Clip = 3;

    /// <summary>
    /// Correlation φ of neighbouring samples of a first-order process, from that of their differences, ρ = −(1 − φ)/2: a ramp adds a constant to the differences,
    /// which their median takes away, and a step is one difference, which is clipped. 0 to 1; 0 when nothing moves.
    /// </summary>
    /// <param name="samples">Evenly spaced samples; NaN where there is none.</param>
    public static double Of(ReadOnlySpan<double> samples)
    {
        if (samples.Length < 3) return 0;
        int count = samples.Length - 1;
        double[] scratch = ArrayPool<double>.Shared.Rent(2 * count);
        try
        {
            Span<double> differences = scratch.AsSpan(0, count), work = scratch.AsSpan(count, count);
            int known = 0;
            for (int i = 0; i < count; i++)
            {
                differences[i] = samples[i + 1] - samples[i];
                if (double.IsFinite(differences[i])) work[known++] = differences[i];
            }

            if (known == 0) return 0;
            double middle = Middle.Of(work[..known]);
            for (int i = 0; i < known; i++) work[i] = double.Abs(work[i] - middle);
            // 1.4826: from median absolute deviation to standard deviation of a normal distribution.
            double limit = Clip * 1.4826 * Middle.Of(work[..known]);
            return Correlation(differences, middle, limit > 0 ? limit : double.PositiveInfinity);
        }
        finally
        {
            ArrayPool<double>.Shared.Return(scratch);
        }
    }

    private static double Correlation(ReadOnlySpan<double> differences, double middle, double limit)
    {
        double squares = 0, products = 0, previous = double.NaN;
        foreach (double difference in differences)
        {
            double one = double.Clamp(difference - middle, -limit, limit);
            if (double.IsFinite(one)) squares += one * one;
            if (double.IsFinite(one * previous)) products += one * previous;
            previous = one;
        }

        return squares > 0 ? double.Clamp(1 + (2 * products / squares), 0, 1) : 0;
    }
}
