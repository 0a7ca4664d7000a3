using System.Runtime.InteropServices;

namespace EvapMonitor.Core.Fouling;

/// <content>The slopes that the groups show.</content>
internal sealed partial class WithinDays
{
    /// <summary>Huber's constant: 95 % of the efficiency of least squares where the noise is normal.</summary>
    private const double HuberBound = 1.345;

    /// <summary>Rounds of weighting at most, and the move of a slope under which there is no need for another.</summary>
    private const int Rounds = 6;

    private const double Settled = 5e-4;

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

    /// <summary>The scatter within days, and from the correlation of neighbours how much of it is slow: never less than is assumed, since a day shows little of what lasts for one.</summary>
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
        return new HourNoise(double.Sqrt(squares / double.Max(Rows - (2.0 * _dayOf.Count), 1)), double.Clamp(phi / HourNoise.Phi, HourNoise.Assumed.SlowShare, 1), true);
    }

    private int[] Cluster()
    {
        int[] cluster = new int[Rows];
        for (int g = 0; g < _dayOf.Count; g++) Array.Fill(cluster, _dayOf[g], _starts[g], _starts[g + 1] - _starts[g]);
        return cluster;
    }
}
