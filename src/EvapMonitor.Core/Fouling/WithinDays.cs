using System.Runtime.InteropServices;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>
/// Hours in groups: those of one UTC day without an interruption. From each group a mean and a straight drift are taken, so that fouling, however it goes over
/// weeks, and its growth within the day do not enter. Differences of neighbouring hours would do the same, but they keep little of conditions that move over a shift
/// and all of the noise.
/// </summary>
internal sealed partial class WithinDays
{
    /// <summary>Fewest hours of a group.</summary>
    public const int SmallestGroup = 6;

    private readonly List<double> _response = [], _feed = [], _time = [];
    private readonly List<double>[] _terms = [[], [], []];
    private readonly List<int> _starts = [0], _dayOf = [];

    private double[] _weights = [];

    private WithinDays()
    {
    }

    /// <summary>Rows.</summary>
    public int Rows => _response.Count;

    /// <summary>Different days.</summary>
    public int Days => _dayOf.Count == 0 ? 0 : _dayOf[^1] + 1;

    /// <summary>Groups the hours of one use.</summary>
    /// <param name="table">The hours.</param>
    /// <param name="use">Effect and product.</param>
    /// <param name="from">First hour.</param>
    /// <param name="limit">First hour that may not be looked at.</param>
    /// <param name="segment">A number for each hour; hours of different numbers are not compared.</param>
    /// <param name="settled">False for hours of starting up.</param>
    /// <param name="share">Cleanliness of each hour: a fouled surface follows its conditions by so much less, 1/U being the sum of two resistances.</param>
    /// <param name="terms">The terms that are wanted.</param>
    public static WithinDays Collect(SurfaceTable table, SurfaceUse use, int from, int limit, int[] segment, bool[] settled, double[] share, bool[] terms)
    {
        var days = new WithinDays();
        long lastDay = long.MinValue;
        int day = -1;
        var group = new List<int>(24);
        for (int i = from; i <= limit; i++)
        {
            bool ends = i == limit || (group.Count > 0 && (segment[i] != segment[group[0]] || Day(table.At[i]) != Day(table.At[group[0]])));
            if (ends && group.Count > 0)
            {
                if (group.Count >= SmallestGroup)
                {
                    if (Day(table.At[group[0]]) != lastDay) day++;
                    lastDay = Day(table.At[group[0]]);
                    days.Add(table, group, share, day);
                }

                group.Clear();
            }

            if (i < limit && table.Use[i] == use && settled[i] && Known(table, i, terms)) group.Add(i);
        }

        days._weights = new double[days.Rows];
        Array.Fill(days._weights, 1);
        return days;
    }

    /// <summary>How much a term moves within the days, as a standard deviation.</summary>
    public double Movement(int term)
    {
        double[] weights = new double[Rows];
        Array.Fill(weights, 1);
        double[] column = Take(CollectionsMarshal.AsSpan(_terms[term]), weights);
        double sum = 0;
        foreach (double one in column) sum += one * one;
        return double.Sqrt(sum / int.Max(Rows, 1));
    }

    /// <summary>A column without the weighted mean and drift of each group, times the root of the weight.</summary>
    private double[] Take(ReadOnlySpan<double> column, double[] weights)
    {
        double[] left = new double[Rows];
        ReadOnlySpan<double> time = CollectionsMarshal.AsSpan(_time);
        for (int g = 0; g < _dayOf.Count; g++)
        {
            double w = 0, t = 0, c = 0;
            for (int i = _starts[g]; i < _starts[g + 1]; i++)
            {
                w += weights[i];
                t += weights[i] * time[i];
                c += weights[i] * column[i];
            }

            double meanTime = t / w, mean = c / w, product = 0, square = 0;
            for (int i = _starts[g]; i < _starts[g + 1]; i++)
            {
                double at = time[i] - meanTime;
                product += weights[i] * at * (column[i] - mean);
                square += weights[i] * at * at;
            }

            double drift = product / square;
            for (int i = _starts[g]; i < _starts[g + 1]; i++) left[i] = (weights[i] == 1 ? 1 : double.Sqrt(weights[i])) * (column[i] - mean - (drift * (time[i] - meanTime)));
        }

        return left;
    }

    private void Add(SurfaceTable table, List<int> group, double[] share, int day)
    {
        double clean = 0;
        foreach (int i in group) clean += share[i] / group.Count;
        foreach (int i in group)
        {
            _response.Add(table.LogCoefficient[i]);
            _time.Add(table.At[i] / (double)Milliseconds.Hour);
            _feed.Add(clean * OrNothing(table.LogFeed[i]));
            for (int t = 0; t < SurfaceTable.Terms; t++) _terms[t].Add(clean * OrNothing(table.Condition[t][i]));
        }

        _starts.Add(_response.Count);
        _dayOf.Add(day);
    }

    private static bool Known(SurfaceTable table, int i, bool[] terms)
    {
        for (int t = 0; t < SurfaceTable.Terms; t++)
        {
            if (terms[t] && double.IsNaN(table.Condition[t][i])) return false;
        }

        return !terms[2] || !double.IsNaN(table.LogFeed[i]);
    }

    private static double OrNothing(double value) => double.IsNaN(value) ? 0 : value;

    private static long Day(long instant) => instant - Milliseconds.Modulo(instant, Milliseconds.Day);
}
