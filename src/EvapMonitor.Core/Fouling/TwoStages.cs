namespace EvapMonitor.Core.Fouling;

/// <summary>
/// Two-stage least squares (Theil 1953, Basmann 1957): the last column is replaced by what the other columns and an instrument explain of it. Without an instrument it
/// is ordinary least squares.
/// </summary>
internal sealed class TwoStages
{
    private readonly double[][] _projected;
    private readonly double[][] _inverse;
    private readonly double[]? _instrumentAlone, _firstResiduals;
    private readonly double _firstSlope;

    private TwoStages(double[] slopes, double[] residuals, double[][] projected, double[][] inverse, double[]? instrumentAlone, double[]? firstResiduals, double firstSlope)
    {
        Slopes = slopes;
        Residuals = residuals;
        _projected = projected;
        _inverse = inverse;
        _instrumentAlone = instrumentAlone;
        _firstResiduals = firstResiduals;
        _firstSlope = firstSlope;
    }

    /// <summary>The slopes, in the order of the columns.</summary>
    public double[] Slopes { get; }

    /// <summary>y − X b, with the columns as they are, not as they are projected.</summary>
    public double[] Residuals { get; }

    /// <summary>Solves; null when columns depend on each other.</summary>
    /// <param name="columns">Regressors; with an instrument, the last one is the endogenous one.</param>
    /// <param name="response">Response.</param>
    /// <param name="instrument">Instrument; null without.</param>
    public static TwoStages? Solve(double[][] columns, double[] response, double[]? instrument)
    {
        double[][] projected = columns;
        double[]? alone = null, firstResiduals = null;
        double firstSlope = double.NaN;
        if (instrument is not null)
        {
            double[][] others = columns[..^1];
            // What is peculiar to the instrument (Frisch and Waugh 1933), and what it says of the last column.
            if (Without(others, instrument) is not { } peculiar || Without(others, columns[^1]) is not { } last) return null;
            double product = 0, square = 0;
            for (int i = 0; i < peculiar.Length; i++)
            {
                product += peculiar[i] * last[i];
                square += peculiar[i] * peculiar[i];
            }

            if (!(square > 0)) return null;
            firstSlope = product / square;
            alone = peculiar;
            firstResiduals = new double[peculiar.Length];
            double[] fitted = new double[peculiar.Length];
            for (int i = 0; i < peculiar.Length; i++)
            {
                firstResiduals[i] = last[i] - (firstSlope * peculiar[i]);
                fitted[i] = columns[^1][i] - firstResiduals[i];
            }

            projected = [.. others, fitted];
        }

        if (OrthogonalFit.Solve(projected, response) is not { } fit) return null;
        return new TwoStages(fit.Coefficients, Left(columns, response, fit.Coefficients), projected, fit.InverseGram, alone, firstResiduals, firstSlope);
    }

    /// <summary>
    /// The sandwich (X̂ᵀX̂)⁻¹ Σ s sᵀ (X̂ᵀX̂)⁻¹ with s the score of a cluster, each divided by what the fit leaves of it (Bell and McCaffrey 2002, the jackknife form): with few
    /// clusters, or some that weigh much, the plain sandwich is too narrow.
    /// </summary>
    public double[][] Covariance(int[] cluster, int clusters) => Sandwich(_projected, Residuals, _inverse, cluster, clusters);

    /// <summary>F of the instrument in the first stage, with the same sandwich; NaN without one.</summary>
    public double FirstStage(int[] cluster, int clusters)
    {
        if (_instrumentAlone is null) return double.NaN;
        double square = 0;
        foreach (double one in _instrumentAlone) square += one * one;
        return _firstSlope * _firstSlope / double.Max(Sandwich([_instrumentAlone], _firstResiduals!, [[1 / square]], cluster, clusters)[0][0], 1e-300);
    }

    private static double[][] Sandwich(double[][] columns, double[] residuals, double[][] inverse, int[] cluster, int clusters)
    {
        int p = columns.Length;
        double[][] score = [.. columns.Select(column => Products(column, residuals, cluster, clusters))];
        double[][] product = new double[p * p][];
        for (int j = 0; j < p; j++)
        {
            for (int k = 0; k <= j; k++) product[(j * p) + k] = product[(k * p) + j] = Products(columns[j], columns[k], cluster, clusters);
        }

        double[][] covariance = new double[p][];
        for (int i = 0; i < p; i++) covariance[i] = new double[p];
        for (int c = 0; c < clusters; c++)
        {
            // (I − M A) s* = s, M the cluster's own XᵀX and A the inverse of all.
            double[][] kept = new double[p][];
            for (int j = 0; j < p; j++)
            {
                kept[j] = new double[p];
                for (int i = 0; i < p; i++)
                {
                    kept[j][i] = i == j ? 1 : 0;
                    for (int k = 0; k < p; k++) kept[j][i] -= product[(i * p) + k][c] * inverse[k][j];
                }
            }

            double[] own = [.. score.Select(sums => sums[c])], whole = OrthogonalFit.Solve(kept, own)?.Coefficients ?? own;
            double[] turned = [.. inverse.Select(row => row.Zip(whole, (one, other) => one * other).Sum())];
            for (int i = 0; i < p; i++)
            {
                for (int j = 0; j < p; j++) covariance[i][j] += (clusters - 1.0) / clusters * turned[i] * turned[j];
            }
        }

        return covariance;
    }

    /// <summary>Σ a·b of each cluster.</summary>
    private static double[] Products(double[] one, double[] other, int[] cluster, int clusters)
    {
        double[] sums = new double[clusters];
        for (int i = 0; i < one.Length; i++) sums[cluster[i]] += one[i] * other[i];
        return sums;
    }

    private static double[]? Without(double[][] columns, double[] one)
    {
        if (columns.Length == 0) return one;
        return OrthogonalFit.Solve(columns, one) is { } fit ? Left(columns, one, fit.Coefficients) : null;
    }

    private static double[] Left(double[][] columns, double[] response, double[] slopes)
    {
        double[] left = (double[])response.Clone();
        for (int j = 0; j < columns.Length; j++)
        {
            for (int i = 0; i < left.Length; i++) left[i] -= slopes[j] * columns[j][i];
        }

        return left;
    }
}
