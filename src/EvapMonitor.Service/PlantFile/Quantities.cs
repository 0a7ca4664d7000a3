using System.Text.RegularExpressions;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>A number with its unit, such as <c>1450 m2</c>, into SI.</summary>
internal static partial class Quantities
{
    /// <summary>The quantity in SI units; null when absent or, which is reported, wrong.</summary>
    /// <param name="node">Where it stands; null when the key is absent.</param>
    /// <param name="dimension">What it must be.</param>
    /// <param name="sound">Which SI values are allowed.</param>
    /// <param name="condition">The same in words, such as "more than 0"; empty for any.</param>
    /// <param name="findings">Where mistakes go.</param>
    public static double? Read(PlantNode? node, Dimension dimension, Func<double, bool> sound, string condition, Findings findings)
    {
        if (node is null) return null;
        string allowed = Units.Allowed(dimension) + (condition.Length == 0 ? "" : ", " + condition);
        if (node is not ScalarNode scalar || !TrySplit(scalar.Text, out double number, out string written))
        {
            findings.Wrong(node, allowed);
            return null;
        }

        string? flaw = Flaw(written, dimension, out UnitOfMeasure? unit);
        if (flaw is not null)
        {
            findings.Wrong(node, $"{Shown.Quoted(scalar.Text)} ({flaw})", allowed);
            return null;
        }

        double si = unit!.ToSi(number);
        if (double.IsFinite(si) && sound(si)) return si;
        findings.Wrong(node, allowed);
        return null;
    }

    /// <summary>As <see cref="Read"/> for times.</summary>
    public static TimeSpan? Time(PlantNode? node, TimeSpan least, TimeSpan most, Findings findings)
    {
        string condition = Invariant($"from {InWords(least)} to {InWords(most)}");
        double? seconds = Read(node, Dimension.Duration, s => s >= least.TotalSeconds && s <= most.TotalSeconds, condition, findings);
        return seconds is null ? null : TimeSpan.FromMilliseconds(double.Round(seconds.Value * 1000));
    }

    /// <summary>Why a unit does not fit a dimension; null when it fits.</summary>
    public static string? Flaw(string written, Dimension dimension, out UnitOfMeasure? unit)
    {
        unit = null;
        if (written.Length == 0) return "without a unit";
        unit = Units.Find(written);
        if (unit is null)
        {
            string? nearest = KeySet.NearestOf(written, Units.Known.Where(u => u.Dimension == dimension).Select(u => u.Written));
            return $"unknown unit {Shown.Quoted(written)}" + (nearest is null ? "" : $", perhaps {nearest}");
        }

        if (unit.Dimension != dimension) return $"{written} is the unit of {Units.Words(unit.Dimension)}";
        return null;
    }

    public static bool TrySplit(string text, out double number, out string unit)
    {
        Match match = NumberAndUnit().Match(text);
        unit = match.Groups[2].Value;
        number = 0;
        return match.Success && Texts.TryNumber(match.Groups[1].Value, out number);
    }

    private static string InWords(TimeSpan time) =>
        time == TimeSpan.Zero ? "0"
        : time.TotalHours >= 1 && time.TotalHours % 1 == 0 ? Invariant($"{time.TotalHours} h")
        : time.TotalMinutes >= 1 && time.TotalMinutes % 1 == 0 ? Invariant($"{time.TotalMinutes} min")
        : Invariant($"{time.TotalSeconds} s");

    [GeneratedRegex("^([+-]?[0-9.]+(?:[eE][+-]?[0-9]+)?)\\s*([^0-9.,].*)?\\z", RegexOptions.CultureInvariant | RegexOptions.Singleline)]
    private static partial Regex NumberAndUnit();
}
