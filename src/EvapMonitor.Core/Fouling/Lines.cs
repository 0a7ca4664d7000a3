namespace EvapMonitor.Core.Fouling;

/// <summary>How a straight line through points follows each of them: weights of least squares, for the uncertainty of lines that were drawn robustly.</summary>
internal static class Lines
{
    /// <summary>Weights whose sum with the values is the line at 0.</summary>
    public static double[] Intercept(ReadOnlySpan<double> x) => At(x, 0);

    /// <summary>Weights whose sum with the values is the line at a place.</summary>
    public static double[] At(ReadOnlySpan<double> x, double place)
    {
        (double mean, double square) = Moments(x);
        double[] weights = new double[x.Length];
        for (int i = 0; i < weights.Length; i++) weights[i] = (1.0 / x.Length) + (square > 0 ? (x[i] - mean) * (place - mean) / square : 0);
        return weights;
    }

    /// <summary>Weights whose sum with the values is the slope.</summary>
    public static double[] Slope(ReadOnlySpan<double> x)
    {
        (double mean, double square) = Moments(x);
        double[] weights = new double[x.Length];
        for (int i = 0; i < weights.Length; i++) weights[i] = square > 0 ? (x[i] - mean) / square : 0;
        return weights;
    }

    private static (double Mean, double Square) Moments(ReadOnlySpan<double> x)
    {
        double mean = 0, square = 0;
        foreach (double one in x) mean += one / x.Length;
        foreach (double one in x) square += (one - mean) * (one - mean);
        return (mean, square);
    }
}
