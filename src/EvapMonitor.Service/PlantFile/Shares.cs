using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>Shares of a whole, exact (<c>91 %</c>) or with the half-width of what they may be (<c>1 % ± 1 %</c>).</summary>
internal static class Shares
{
    private static readonly double RootOfThree = double.Sqrt(3);
    private static readonly string[] Signs = ["±", "+/-", "+-"];

    public const string UncertainAllowed = "a share from 0 % to 100 %, such as 1 % ± 1 % (half-width) or 0 % (exactly)";

    /// <summary>A share from 0 to 1 (0 % to 100 %).</summary>
    public static double? Exact(PlantNode? node, Findings findings) =>
        Quantities.Read(node, Dimension.Fraction, share => share is >= 0 and <= 1, "from 0 % to 100 %", findings);

    /// <summary>
    /// A share with its uncertainty: half-width of a rectangular distribution, so that the standard is it over √3 (JCGM 100, 4.3.7).
    /// </summary>
    public static UncertainShare? Uncertain(PlantNode? node, Findings findings)
    {
        if (node is null) return null;
        if (node is ScalarNode scalar)
        {
            string[] parts = scalar.Text.Split(Signs, StringSplitOptions.TrimEntries);
            double? half = parts.Length == 1 ? 0 : parts.Length == 2 ? Share(parts[1]) : null;
            if (Share(parts[0]) is { } share && half is { } width) return new(share, width / RootOfThree);
        }

        findings.Wrong(node, UncertainAllowed);
        return null;
    }

    private static double? Share(string text) =>
        Quantities.TrySplit(text, out double number, out string written)
        && Quantities.Flaw(written, Dimension.Fraction, out UnitOfMeasure? unit) is null
        && unit!.ToSi(number) is >= 0 and <= 1 and var share
            ? share
            : null;
}
