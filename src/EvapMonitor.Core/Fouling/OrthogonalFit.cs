namespace EvapMonitor.Core.Fouling;

/// <summary>
/// Linear least squares by Householder reflections (Golub 1965). The normal equations would square the condition number; sums run in one fixed order.
/// </summary>
internal sealed class OrthogonalFit
{
    private OrthogonalFit(double[] coefficients, double[][] inverseGram, double residualSum)
    {
        Coefficients = coefficients;
        InverseGram = inverseGram;
        ResidualSum = residualSum;
    }

    /// <summary>The solution.</summary>
    public double[] Coefficients { get; }

    /// <summary>(XᵀX)⁻¹.</summary>
    public double[][] InverseGram { get; }

    /// <summary>Sum of the squared residuals.</summary>
    public double ResidualSum { get; }

    /// <summary>Solves min |y − X b|²; null when a column follows from those before it, or there are fewer rows than columns.</summary>
    /// <param name="columns">Columns of X; they stay as they are.</param>
    /// <param name="response">y.</param>
    public static OrthogonalFit? Solve(IReadOnlyList<double[]> columns, double[] response)
    {
        int p = columns.Count, n = response.Length;
        if (n < p) return null;
        double[][] a = new double[p][];
        for (int j = 0; j < p; j++) a[j] = (double[])columns[j].Clone();
        double[] y = (double[])response.Clone();
        double[] diagonal = new double[p];
        for (int j = 0; j < p; j++)
        {
            double whole = Norm(columns[j], 0), norm = Norm(a[j], j);
            if (!(norm > 1e-15 * whole)) return null;
            diagonal[j] = a[j][j] > 0 ? -norm : norm;
            a[j][j] -= diagonal[j];
            // |v|² = 2·norm·(norm + |a_jj|), v in place of the column.
            double half = norm * double.Abs(a[j][j]);
            for (int k = j + 1; k < p; k++) Reflect(a[j], a[k], j, half);
            Reflect(a[j], y, j, half);
        }

        double[][] inverse = InverseTriangle(a, diagonal);
        double[] b = new double[p];
        double[][] gram = new double[p][];
        for (int i = 0; i < p; i++)
        {
            gram[i] = new double[p];
            for (int j = 0; j < p; j++)
            {
                if (j >= i) b[i] += inverse[i][j] * y[j];
                for (int k = int.Max(i, j); k < p; k++) gram[i][j] += inverse[i][k] * inverse[j][k];
            }
        }

        double sum = 0;
        for (int i = p; i < n; i++) sum += y[i] * y[i];
        return new OrthogonalFit(b, gram, sum);
    }

    private static double Norm(double[] column, int from)
    {
        double sum = 0;
        for (int i = from; i < column.Length; i++) sum += column[i] * column[i];
        return double.Sqrt(sum);
    }

    private static void Reflect(double[] by, double[] column, int from, double half)
    {
        double product = 0;
        for (int i = from; i < by.Length; i++) product += by[i] * column[i];
        double share = product / half;
        for (int i = from; i < by.Length; i++) column[i] -= share * by[i];
    }

    /// <summary>R⁻¹; above the diagonal R stands in the columns, the diagonal beside.</summary>
    private static double[][] InverseTriangle(double[][] columns, double[] diagonal)
    {
        int p = diagonal.Length;
        double[][] inverse = new double[p][];
        for (int i = 0; i < p; i++) inverse[i] = new double[p];
        for (int j = 0; j < p; j++)
        {
            inverse[j][j] = 1 / diagonal[j];
            for (int i = j - 1; i >= 0; i--)
            {
                double sum = 0;
                for (int k = i + 1; k <= j; k++) sum += columns[k][i] * inverse[k][j];
                inverse[i][j] = -sum / diagonal[i];
            }
        }

        return inverse;
    }
}
