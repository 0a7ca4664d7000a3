using System.Text.RegularExpressions;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>
/// The ways to state an accuracy: <c>1 %</c>, <c>1 % of range</c>, <c>0.3 abs</c>, each with <c>95 %</c> or <c>standard</c> after it.
/// </summary>
internal static partial class AccuracyReader
{
    private const string Allowed = "1 % (of the reading), 1 % of range or 0.3 abs (in the instrument's unit), each with 95 % or standard after it";

    /// <summary>The accuracy; null when it is wrong, which is reported.</summary>
    public static Accuracy? Read(PlantNode node, UnitOfMeasure unit, (double Low, double High)? range, Findings findings)
    {
        Match match = node is ScalarNode scalar ? Form().Match(scalar.Text) : Match.Empty;
        if (!match.Success || !Texts.TryNumber(match.Groups["number"].Value, out double number) || number < 0)
        {
            findings.Wrong(node, Allowed);
            return null;
        }

        if (number == 0) findings.Note(node, "an instrument without any error: no instrument is, and its readings will outweigh all others");
        AccuracyMeaning meaning = match.Groups["meaning"].Value switch
        {
            "" => AccuracyMeaning.HalfWidth,
            "standard" => AccuracyMeaning.Standard,
            _ => AccuracyMeaning.NinetyFivePercent,
        };
        string kind = match.Groups["kind"].Value;
        if (kind.StartsWith("abs", StringComparison.Ordinal)) return new(0, unit.DifferenceToSi(number), meaning);
        if (number > 100)
        {
            findings.Wrong(node, Allowed + ", at most 100 %");
            return null;
        }

        return kind.EndsWith("range", StringComparison.Ordinal)
            ? OfRange(node, number / 100, meaning, range, findings)
            : OfReading(node, number / 100, meaning, unit, findings);
    }

    private static Accuracy? OfRange(
        PlantNode node, double share, AccuracyMeaning meaning, (double Low, double High)? range, Findings findings)
    {
        if (range is { } r) return new(0, share * (r.High - r.Low), meaning);
        findings.Wrong(
            node, $"{Shown.Node(node)} without a range", "the same with range: [lowest, highest] beside it, or an accuracy such as 0.3 abs");
        return null;
    }

    private static Accuracy? OfReading(PlantNode node, double share, AccuracyMeaning meaning, UnitOfMeasure unit, Findings findings)
    {
        if (unit.Dimension == Dimension.Temperature)
        {
            findings.Wrong(
                node, $"{Shown.Node(node)}, a share of a temperature whose zero is arbitrary",
                $"an accuracy in {unit.Written} such as 0.3 abs, or 1 % of range");
            return null;
        }

        if (unit.Dimension == Dimension.Fraction && share > 0)
            findings.Note(
                node,
                $"{Shown.Node(node)} is a share of the reading, not points of {unit.Written}; write abs instead of % where points are meant");
        return new(share, 0, meaning);
    }

    [GeneratedRegex(
        "^(?<number>[0-9.]+(?:[eE][+-]?[0-9]+)?)\\s*(?<kind>%\\s+of\\s+range|%\\s+of\\s+reading|%|abs)(?:\\s+(?<meaning>95\\s?%|standard))?\\z",
        RegexOptions.CultureInvariant)]
    private static partial Regex Form();
}
