namespace EvapMonitor.Core.Coefficients;

/// <summary>A result with the two parts of its standard uncertainty, all in one unit. NaN is absent.</summary>
/// <param name="Value">The best estimate.</param>
/// <param name="Systematic">Part that averaging does not shrink: accuracies, correlations, assumed shares.</param>
/// <param name="Random">Part from the scatter of readings.</param>
public readonly record struct Measured(double Value, double Systematic, double Random)
{
    /// <summary>An absent result.</summary>
    public static Measured Absent { get; } = new(double.NaN, double.NaN, double.NaN);

    /// <summary>Combined standard uncertainty (JCGM 100, 5.1).</summary>
    public double Standard => double.Sqrt((Systematic * Systematic) + (Random * Random));

    /// <summary>True when there is a value.</summary>
    public bool IsPresent => double.IsFinite(Value);
}
