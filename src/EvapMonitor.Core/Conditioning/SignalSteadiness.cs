using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Conditioning;

/// <summary>
/// Tells whether one signal was steady over a stretch, from its samples by the minute. The filters start anew at the first sample, so that the answer depends on
/// these samples alone.
/// </summary>
internal static class SignalSteadiness
{
    /// <summary>
    /// A larger R is a change. White noise exceeds it in 0.03 % of all samples, so that in a line of four key signals between one and two windows of a hundred
    /// are wrongly called not steady (25 samples each; simulation of 400,000 here, held by a test).
    /// </summary>
    public const double Critical = 2.5;

    /// <summary>Samples after which the filters, started anew, say something.</summary>
    public const int WarmUp = 24;

    /// <summary>Where noise is correlated over longer than a minute, or readings come more rarely, the samples are five minutes apart at most.</summary>
    public const int Coarse = 5;

    /// <summary>Minutes between samples: the first grid is taken that is no finer than the correlation time; the last one in any case.</summary>
    private static readonly int[] Grids = [1, 2, Coarse];

    /// <summary>A signal that has not moved for so many samples is not judged: what its filters still hold is the past.</summary>
    public const int LongestUnchanged = 30;

    /// <summary>Missing samples in a row after which the filters start anew.</summary>
    public const int LongestGap = 5;

    /// <summary>
    /// A change must stand out of the noise by this share of the instrument's standard uncertainty: a smaller one would add less than 6 % to it
    /// (√(1 + 1/9)), however quiet the signal is.
    /// </summary>
    public const double LeastDeparture = 1.0 / 3;

    /// <summary>A correlation time of one sample, φ = e⁻¹, and one standard deviation of the estimate, so that it is not exceeded by chance. What is left is allowed for.</summary>
    private const double MostCorrelated = 0.5;

    /// <summary>Judges a stretch.</summary>
    /// <param name="instrument">The instrument: its accuracy and resolution.</param>
    /// <param name="samples">Samples by the minute, SI units; NaN where there is none; from <see cref="WarmUp"/> times <see cref="Coarse"/> before the stretch.</param>
    /// <param name="first">Number of the first sample, counted in minutes since 1970.</param>
    /// <param name="quiet">The settling time and the window behind it begin after this sample; the window ends with the last one.</param>
    /// <param name="window">The window begins after this sample.</param>
    /// <returns>True: steady all the time. False: it changed in that time, or so shortly before that the window cannot be told. Null: not judged.</returns>
    public static bool? Judge(Instrument instrument, ReadOnlySpan<double> samples, long first, long quiet, long window)
    {
        foreach (int every in Grids)
        {
            ReadOnlySpan<double> thin = Every(every, samples, first, out long start);
            double correlation = NoiseCorrelation.Of(thin);
            if (correlation > MostCorrelated && every < Coarse) continue;
            double expected = SteadyStatistic.Expected(double.Min(correlation, MostCorrelated));
            return Walk(instrument, thin, (int)Math.Floor((quiet - start) / (double)every), (int)Math.Floor((window - start) / (double)every), expected);
        }

        return null;
    }

    /// <summary>The samples at whole multiples of some minutes.</summary>
    private static ReadOnlySpan<double> Every(int minutes, ReadOnlySpan<double> samples, long first, out long start)
    {
        int skip = (int)((minutes - (first % minutes)) % minutes);
        start = first + skip;
        if (minutes == 1) return samples;
        var thin = new double[int.Max(0, (samples.Length - skip + minutes - 1) / minutes)];
        for (int i = 0; i < thin.Length; i++) thin[i] = samples[skip + (i * minutes)];
        return thin;
    }

    private static bool? Walk(Instrument instrument, ReadOnlySpan<double> samples, int quiet, int window, double expected)
    {
        var statistic = default(SteadyStatistic);
        bool afterChange = false, changed = false, unknown = false;
        bool? state = null;
        int missing = 0, unchanged = 0;
        double reference = double.NaN;
        for (int i = 0; i < samples.Length; i++)
        {
            double sample = samples[i];
            bool found = false;
            if (double.IsNaN(sample))
            {
                if (++missing == LongestGap + 1) (statistic, afterChange, state) = (default, false, null);
            }
            else
            {
                missing = 0;
                unchanged = double.Abs(sample - reference) <= instrument.Resolution ? unchanged + 1 : 0;
                if (unchanged == 0) reference = sample;
                double ratio = statistic.Add(sample) / expected, least = LeastDeparture * instrument.Accuracy.Standard(sample);
                if (statistic.Count < WarmUp) state = afterChange ? false : null;
                else if (ratio > Critical && statistic.Unexplained(expected) > least * least)
                {
                    // What was before the change is no part of the state that comes.
                    statistic = default;
                    statistic.Add(sample);
                    (found, afterChange, state) = (true, true, false);
                }
                else (afterChange, state) = (false, unchanged >= LongestUnchanged || double.IsNaN(ratio) ? null : true);
            }

            bool last = i == samples.Length - 1;
            changed |= (found && i > quiet) || (state == false && (i > window || last));
            unknown |= state is null && (i > quiet || last);
        }

        return changed ? false : unknown || samples.Length == 0 ? null : true;
    }
}
