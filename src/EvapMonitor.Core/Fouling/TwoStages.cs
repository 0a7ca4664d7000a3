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

    /// <summary>The sandwich: (X̂ᵀX̂)⁻¹ Σ s sᵀ (X̂ᵀX̂)⁻¹ with s the score of a cluster, corrected for few clusters.</summary>
    public double[][] Covariance(int[] cluster, int clusters)
    {
        int p = Slopes.Length;
        double[][] score = Scores(_projected, Residuals, cluster, clusters);
        double correction = Correction(clusters, Residuals.Length, p);
        double[][] covariance = new double[p][];
        for (int i = 0; i < p; i++) covariance[i] = new double[p];
        double[] turned = new double[p];
        for (int c = 0; c < clusters; c++)
        {
            for (int i = 0; i < p; i++)
            {
                turned[i] = 0;
                for (int j = 0; j < p; j++) turned[i] += _inverse[i][j] * score[j][c];
            }

            for (int i = 0; i < p; i++)
            {
                for (int j = 0; j < p; j++) covariance[i][j] += correction * turned[i] * turned[j];
            }
        }

        return covariance;
    }

    /// <summary>F of the instrument in the first stage, with the same sandwich; NaN without one.</summary>
    public double FirstStage(int[] cluster, int clusters)
    {
        if (_instrumentAlone is null) return double.NaN;
        double square = 0, meat = 0;
        foreach (double one in _instrumentAlone) square += one * one;
        foreach (double one in Scores([_instrumentAlone], _firstResiduals!, cluster, clusters)[0]) meat += one * one;
        double variance = meat * Correction(clusters, Residuals.Length, Slopes.Length) / (square * square);
        return _firstSlope * _firstSlope / double.Max(variance, 1e-300);
    }

    private static double Correction(int clusters, int rows, int columns) =>
        clusters / double.Max(clusters - 1.0, 1) * ((rows - 1.0) / double.Max(rows - columns, 1));

    private static double[][] Scores(double[][] columns, double[] residuals, int[] cluster, int clusters)
    {
        double[][] score = new double[columns.Length][];
        for (int j = 0; j < columns.Length; j++)
        {
            score[j] = new double[clusters];
            for (int i = 0; i < residuals.Length; i++) score[j][cluster[i]] += columns[j][i] * residuals[i];
        }

        return score;
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
