using System.Runtime.InteropServices;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>
/// Hours in groups: those of one UTC day without an interruption. From each group a mean and a straight drift are taken, so that fouling, whatever its course over
/// weeks, and its growth within the day do not enter. Differences of neighbouring hours would do the same, but they keep little of conditions that move over a shift
/// and all of the noise.
/// </summary>
internal sealed class WithinDays
{
    /// <summary>Fewest hours of a group.</summary>
    public const int SmallestGroup = 6;

    /// <summary>Huber's constant: 95 % of the efficiency of least squares where the noise is normal.</summary>
    private const double HuberBound = 1.345;

    /// <summary>Rounds of weighting at most, and the move of a slope under which there is no need for another.</summary>
    private const int Rounds = 6;

    private const double Settled = 5e-4;

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

    /// <summary>
    /// Two-stage least squares with Huber weights; covariance clustered by day (Liang and Zeger 1986), for few days. Null when the columns depend on each other.
    /// </summary>
    /// <param name="active">Terms to estimate.</param>
    /// <param name="held">Values of the terms that are not.</param>
    public SlopeEstimate? Estimate(bool[] active, double[] held)
    {
        double[] response = [.. _response];
        for (int t = 0; t < SurfaceTable.Terms; t++)
        {
            for (int i = 0; !active[t] && held[t] != 0 && i < Rows; i++) response[i] -= held[t] * _terms[t][i];
        }

        double[] weights = _weights, slopes = [];
        SlopeEstimate? last = null;
        for (int round = 0; round < Rounds; round++)
        {
            double[] y = Take(response, weights);
            double[][] x = [.. Enumerable.Range(0, SurfaceTable.Terms).Where(t => active[t]).Select(t => Take(CollectionsMarshal.AsSpan(_terms[t]), weights))];
            double[]? z = active[2] ? Take(CollectionsMarshal.AsSpan(_feed), weights) : null;
            if (TwoStages.Solve(x, y, z) is not { } solution) return null;
            double moved = slopes.Length == 0 ? 1 : slopes.Zip(solution.Slopes, (before, now) => double.Abs(before - now)).Append(0).Max();
            slopes = solution.Slopes;
            double[] residuals = new double[Rows];
            for (int i = 0; i < Rows; i++) residuals[i] = solution.Residuals[i] / double.Sqrt(weights[i]);
            double scale = Robust.Spread(residuals) * double.Sqrt(Rows / double.Max(Rows - (2.0 * _dayOf.Count) - x.Length, 1));
            bool settles = moved < Settled || round + 1 == Rounds;
            if (settles) last = Report(active, solution, residuals, weights, scale);
            double[] next = new double[Rows];
            for (int i = 0; i < Rows; i++) next[i] = double.Min(1, HuberBound * scale / double.Max(double.Abs(residuals[i]), 1e-300));
            weights = next;
            if (settles) break;
        }

        _weights = weights;
        return last;
    }

    private SlopeEstimate Report(bool[] active, TwoStages solution, double[] residuals, double[] weights, double scale)
    {
        // The bread of the sandwich is the slope of the score, not the weight: 1 within the bound, 0 beyond it.
        double inside = 0, weight = 0;
        for (int i = 0; i < Rows; i++)
        {
            if (double.Abs(residuals[i]) <= HuberBound * scale) inside++;
            weight += weights[i];
        }

        double[][] covariance = solution.Covariance(Cluster(), Days);
        double widen = inside > 0 ? weight / inside * (weight / inside) : 1;
        int[] place = [.. Enumerable.Range(0, SurfaceTable.Terms).Where(t => active[t])];
        double[] slopes = new double[SurfaceTable.Terms];
        double[,] full = new double[SurfaceTable.Terms, SurfaceTable.Terms];
        for (int i = 0; i < place.Length; i++)
        {
            slopes[place[i]] = solution.Slopes[i];
            for (int j = 0; j < place.Length; j++) full[place[i], place[j]] = widen * covariance[i][j];
        }

        return new SlopeEstimate(slopes, full, active[2] ? solution.FirstStage(Cluster(), Days) : double.NaN, Noise(residuals));
    }

    /// <summary>The scatter within days, and from the correlation of neighbours how much of it is slow.</summary>
    private HourNoise Noise(double[] residuals)
    {
        if (_dayOf.Count < 5) return HourNoise.Assumed;
        double limit = 3 * Robust.Spread(residuals), squares = 0, products = 0, paired = 0;
        for (int g = 0; g < _dayOf.Count; g++)
        {
            for (int i = _starts[g]; i < _starts[g + 1]; i++)
            {
                double one = double.Clamp(residuals[i], -limit, limit);
                squares += one * one;
                if (i + 1 == _starts[g + 1] || _time[i + 1] - _time[i] > 1.5) continue;
                double next = double.Clamp(residuals[i + 1], -limit, limit);
                products += one * next;
                paired += ((one * one) + (next * next)) / 2;
            }
        }

        if (!(paired > 0)) return HourNoise.Assumed;
        // Taking a mean and a slope from n numbers lowers their correlation to about φ − (2 + 4φ)/n (Kendall 1954 for the mean; the same expansion with a slope).
        double n = Rows / (double)_dayOf.Count, phi = ((products / paired) + (2 / n)) / double.Max(1 - (4 / n), 0.2);
        return new HourNoise(double.Sqrt(squares / double.Max(Rows - (2.0 * _dayOf.Count), 1)), double.Clamp(phi / HourNoise.Phi, 0, 1), true);
    }

    private int[] Cluster()
    {
        int[] cluster = new int[Rows];
        for (int g = 0; g < _dayOf.Count; g++) Array.Fill(cluster, _dayOf[g], _starts[g], _starts[g + 1] - _starts[g]);
        return cluster;
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

/// <summary>Slopes as the hours within days show them.</summary>
/// <param name="Slopes">b1, b2, b3; 0 where not estimated.</param>
/// <param name="Covariance">Their covariance; 0 where not estimated.</param>
/// <param name="FirstStage">F of the instrument, clustered by day; NaN without one.</param>
/// <param name="Noise">What the hours scatter about them.</param>
internal sealed record SlopeEstimate(double[] Slopes, double[,] Covariance, double FirstStage, HourNoise Noise);
