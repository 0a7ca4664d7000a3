using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>The use of a surface that has a clean expectation of its own.</summary>
internal readonly record struct SurfaceUse(string Effect, string Product);

/// <summary>The producing hours of a surface as columns, with the time it has served.</summary>
internal sealed class SurfaceTable
{
    /// <summary>A silence of the data longer than this, hours, is not taken for production.</summary>
    public const double LongestSilence = 6;

    /// <summary>The conditions: ln solids, boiling temperature, ln flux.</summary>
    public const int Terms = 3;

    public SurfaceTable(IReadOnlyList<SurfaceHour> hours, IReadOnlyList<SurfaceSpan> spans)
    {
        Count = hours.Count;
        At = new long[Count];
        Use = new SurfaceUse[Count];
        LogCoefficient = new double[Count];
        Random = new double[Count];
        LogFeed = new double[Count];
        Served = new double[Count];
        Whole = new bool[Count];
        Condition = [new double[Count], new double[Count], new double[Count]];
        (long Start, long End)[] out_ = Merge(spans);
        int span = 0;
        for (int i = 0; i < Count; i++)
        {
            SurfaceHour hour = hours[i];
            if (i > 0 && hour.Hour <= At[i - 1]) throw new ArgumentException($"Hour {hour.Hour} does not come after {At[i - 1]}.", nameof(hours));
            if (!(hour.Coefficient.Value > 0) || !hour.Coefficient.IsPresent) throw new ArgumentException($"The coefficient of hour {hour.Hour} is {hour.Coefficient.Value}; it must be above 0 W/(m²·K).", nameof(hours));
            At[i] = hour.Hour;
            Use[i] = new SurfaceUse(hour.Effect, hour.Product);
            LogCoefficient[i] = double.Log(hour.Coefficient.Value);
            Random[i] = double.IsFinite(hour.Coefficient.Random) ? hour.Coefficient.Random / hour.Coefficient.Value : 0;
            LogFeed[i] = Log(hour.FeedFlow);
            Condition[0][i] = Log(hour.Solids);
            Condition[1][i] = hour.BoilingTemperature;
            Condition[2][i] = Log(hour.Flux);
            while (span < out_.Length && out_[span].End <= hour.Hour) span++;
            Whole[i] = span == out_.Length || out_[span].Start >= hour.Hour + Milliseconds.Hour;
        }

        Serve(out_);
    }

    /// <summary>Hours.</summary>
    public int Count { get; }

    /// <summary>Start of the hour, ms.</summary>
    public long[] At { get; }

    /// <summary>Effect and product.</summary>
    public SurfaceUse[] Use { get; }

    /// <summary>ln U.</summary>
    public double[] LogCoefficient { get; }

    /// <summary>Random part of U, as a share of it.</summary>
    public double[] Random { get; }

    /// <summary>ln of the feed flow; NaN without.</summary>
    public double[] LogFeed { get; }

    /// <summary>The conditions, one column for each term; NaN where not known.</summary>
    public double[][] Condition { get; }

    /// <summary>Hours of production up to the middle of the hour.</summary>
    public double[] Served { get; }

    /// <summary>False when the surface was out of production for a part of the hour.</summary>
    public bool[] Whole { get; }

    /// <summary>First hour that starts at or after an instant.</summary>
    public int FirstFrom(long instant)
    {
        int index = Array.BinarySearch(At, instant);
        return index < 0 ? ~index : index;
    }

    /// <summary>The conditions of an hour.</summary>
    public double[] ConditionsOf(int i) => [Condition[0][i], Condition[1][i], Condition[2][i]];

    private void Serve((long Start, long End)[] spans)
    {
        int span = 0;
        for (int i = 0; i < Count; i++)
        {
            if (i == 0)
            {
                Served[0] = 0.5;
                continue;
            }

            long from = At[i - 1] + (Milliseconds.Hour / 2), to = At[i] + (Milliseconds.Hour / 2), outside = 0;
            while (span < spans.Length && spans[span].End <= from) span++;
            for (int s = span; s < spans.Length && spans[s].Start < to; s++) outside += long.Min(spans[s].End, to) - long.Max(spans[s].Start, from);
            double passed = (to - from - outside) / (double)Milliseconds.Hour;
            Served[i] = Served[i - 1] + (passed > LongestSilence ? 1 : passed);
        }
    }

    private static (long Start, long End)[] Merge(IReadOnlyList<SurfaceSpan> spans)
    {
        var merged = new List<(long Start, long End)>(spans.Count);
        foreach (SurfaceSpan span in spans.OrderBy(span => span.Start).ThenBy(span => span.End))
        {
            if (span.End <= span.Start) continue;
            if (merged.Count > 0 && span.Start <= merged[^1].End) merged[^1] = (merged[^1].Start, long.Max(merged[^1].End, span.End));
            else merged.Add((span.Start, span.End));
        }

        return [.. merged];
    }

    private static double Log(double value) => value > 0 ? double.Log(value) : double.NaN;
}
