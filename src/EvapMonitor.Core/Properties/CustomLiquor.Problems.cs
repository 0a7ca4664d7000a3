namespace EvapMonitor.Core.Properties;

/// <summary>What a plant's own curves must satisfy.</summary>
public sealed partial class CustomLiquor
{
    /// <summary>What is wrong with the curves of a liquor, one sentence each, for the reader of a plant file; empty when they can be used.</summary>
    public static IReadOnlyList<string> Problems(SolidsCurve atmosphericElevation, SolidsCurve heatCapacity, SolidsCurve? density = null)
    {
        ArgumentNullException.ThrowIfNull(atmosphericElevation);
        return [.. ProblemsOfElevation(atmosphericElevation), .. ProblemsOfContent(heatCapacity, density)];
    }

    private static IEnumerable<string> ProblemsOfElevation(SolidsCurve curve)
    {
        var (lowest, highest) = curve.Span;
        if (lowest == 0 && curve.At(0) != 0)
            yield return FormattableString.Invariant($"Boiling-point elevation at 0 % solids must be 0 K, not {curve.At(0)} K.");
        if (curve is not SolidsTable table)
            yield break;
        foreach (var (solids, value) in table.Points)
        {
            if (value < 0)
                yield return FormattableString.Invariant($"Boiling-point elevation at {solids} % solids must not be negative, found {value} K.");
        }
        if (ExceededAt(curve) is { } exceeded && 100 * exceeded < highest)
            yield return FormattableString.Invariant($"Boiling-point elevation passes {HighestElevationByRule} K at {100 * exceeded:F1} % solids: ")
                + "from there it cannot be carried from atmospheric to other pressures; give a Dühring table with boiling points at two or more pressures.";
    }

    private static IEnumerable<string> ProblemsOfContent(SolidsCurve heatCapacity, SolidsCurve? density)
    {
        ArgumentNullException.ThrowIfNull(heatCapacity);
        if (NotAboveZero(heatCapacity) is { } capacity)
            yield return FormattableString.Invariant($"Heat capacity must be above 0 J/(kg·K); at {capacity} % solids it is {heatCapacity.At(capacity)}.");
        if (density is not null && NotAboveZero(density) is { } heavy)
            yield return FormattableString.Invariant($"Density must be above 0 kg/m³; at {heavy} % solids it is {density.At(heavy)}.");
    }

    private static double? NotAboveZero(SolidsCurve curve)
    {
        for (var percent = curve.Span.Lowest; percent <= curve.Span.Highest; percent++)
        {
            if (!(curve.At(percent) > 0))
                return percent;
        }
        return curve.At(curve.Span.Highest) > 0 ? null : curve.Span.Highest;
    }

    // First crossing, found in steps of 0.1 % and then by halves.
    private static double? ExceededAt(SolidsCurve curve)
    {
        const int Steps = 1000;
        for (var k = 1; k <= Steps; k++)
        {
            if (!(Elevation(curve, 100.0 * k / Steps) > HighestElevationByRule))
                continue;
            double below = 100.0 * (k - 1) / Steps, above = 100.0 * k / Steps;
            for (var halving = 0; halving < 40; halving++)
            {
                var middle = 0.5 * (below + above);
                if (Elevation(curve, middle) > HighestElevationByRule)
                    above = middle;
                else
                    below = middle;
            }
            return above / 100;
        }
        return null;
    }

    private static void Require(IEnumerable<string> problems)
    {
        var text = string.Join(" ", problems);
        if (text.Length > 0)
            throw new ArgumentException(text);
    }
}
