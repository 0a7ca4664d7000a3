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

    /// <summary>Where noise is correlated over longer than one sample (φ = e⁻¹), only every one of so many samples is looked at.</summary>
    public const int Coarse = 5;

    /// <summary>A signal that has not moved for so many samples is not judged: what its filters still hold is the past.</summary>
    public const int LongestUnchanged = 30;

    /// <summary>Missing samples in a row after which the filters start anew.</summary>
    public const int LongestGap = 5;

    /// <summary>
    /// A change must stand out of the noise by this share of the instrument's standard uncertainty: a smaller one would add less than 6 % to it
    /// (√(1 + 1/9)), however quiet the signal is.
    /// </summary>
    public const double LeastDeparture = 1.0 / 3;

    private static readonly double MostCorrelated = double.Exp(-1);

    /// <summary>Judges a stretch.</summary>
    /// <param name="instrument">The instrument: its accuracy and resolution.</param>
    /// <param name="samples">Samples by the minute, SI units; NaN where there is none; from <see cref="WarmUp"/> times <see cref="Coarse"/> before the stretch.</param>
    /// <param name="first">Number of the first sample, counted in minutes since 1970.</param>
    /// <param name="after">The stretch begins behind this sample and ends with the last one.</param>
    /// <returns>True: steady all the time. False: it changed, or has changed just before. Null: not judged.</returns>
    public static bool? Judge(Instrument instrument, ReadOnlySpan<double> samples, long first, long after)
    {
        int every = 1;
        double correlation = NoiseCorrelation.Of(samples);
        if (correlation > MostCorrelated)
        {
            every = Coarse;
            int skip = (int)((Coarse - (first % Coarse)) % Coarse);
            var coarse = new double[int.Max(0, (samples.Length - skip + Coarse - 1) / Coarse)];
            for (int i = 0; i < coarse.Length; i++) coarse[i] = samples[skip + (i * Coarse)];
            samples = coarse;
            first += skip;
            correlation = double.Min(MostCorrelated, NoiseCorrelation.Of(samples));
        }

        return Walk(instrument, samples, index => first + (index * every) > after, SteadyStatistic.Expected(correlation));
    }

    private static bool? Walk(Instrument instrument, ReadOnlySpan<double> samples, Func<int, bool> within, double expected)
    {
        var statistic = default(SteadyStatistic);
        bool afterChange = false, changed = false, unknown = false;
        bool? state = null;
        int missing = 0, unchanged = 0;
        double reference = double.NaN;
        for (int i = 0; i < samples.Length; i++)
        {
            double sample = samples[i];
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
                    (afterChange, state) = (true, false);
                }
                else (afterChange, state) = (false, unchanged >= LongestUnchanged || double.IsNaN(ratio) ? null : true);
            }

            if (i < samples.Length - 1 && !within(i)) continue;
            changed |= state == false;
            unknown |= state is null;
        }

        return changed ? false : unknown || samples.Length == 0 ? null : true;
    }
}
