using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>
/// The surface before and after an interruption. Both sides are brought to one set of conditions and, along the growth of fouling before, to one instant; their
/// shift is the median of all differences (Hodges and Lehmann), its uncertainty that of hours whose scatter is correlated.
/// </summary>
internal sealed partial record Recovery
{
    /// <summary>Hours compared before, at most, within <see cref="Within"/>.</summary>
    public const int MostBefore = 24;

    /// <summary>Hours compared after, at most, within <see cref="Within"/>.</summary>
    public const int MostAfter = 12;

    /// <summary>Fewest hours on each side.</summary>
    public const int Fewest = 4;

    /// <summary>How far hours may be away, ms.</summary>
    public const long Within = 3 * Milliseconds.Day;

    /// <summary>Hours over which the growth before is drawn.</summary>
    private const int MostForGrowth = 120;

    /// <summary>The test; null when there is none, and <see cref="Reason"/> says why.</summary>
    public RecoveryTest? Test { get; private init; }

    /// <summary>Why there is no test; empty when there is one.</summary>
    public string Reason { get; private init; } = "";

    /// <summary>True when more hours will come.</summary>
    public bool Awaiting { get; private init; }

    /// <summary>1/U at reference conditions before, m²·K/W, random part.</summary>
    public Measured Before { get; private init; } = Measured.Absent;

    /// <summary>1/U at reference conditions after.</summary>
    public Measured After { get; private init; } = Measured.Absent;

    /// <summary>1/U of the clean surface at the same conditions; absent when it is not known.</summary>
    public Measured Clean { get; private init; } = Measured.Absent;

    /// <summary>No comparison can be made.</summary>
    public static Recovery NotComparable(string reason) => new() { Reason = reason };

    /// <summary>Compares.</summary>
    /// <param name="table">The hours.</param>
    /// <param name="settled">Hours that tell of the surface.</param>
    /// <param name="interruption">The interruption.</param>
    /// <param name="from">First hour that may count before it.</param>
    /// <param name="until">First hour after it that may not count: the next interruption.</param>
    /// <param name="final">True when no more hours will come up to <paramref name="until"/>.</param>
    /// <param name="expectation">The clean expectation of a use.</param>
    public static Recovery Compare(SurfaceTable table, bool[] settled, Interruption interruption, int from, int until, bool final, Func<SurfaceUse, CleanReference> expectation)
    {
        int first = table.FirstFrom(interruption.End), end = table.FirstFrom(interruption.Start - Milliseconds.Hour + 1);
        int[] after = [.. Enumerable.Range(first, int.Max(until - first, 0)).Where(i => settled[i] && table.At[i] < interruption.End + Within).Take(MostAfter)];
        if (after.Length < MostAfter && !final && (table.Count == 0 || table.At[^1] + Milliseconds.Hour < interruption.End + Within || interruption.End == long.MaxValue))
            return new Recovery { Awaiting = true, Reason = $"{after.Length} of {MostAfter} hours after it are there" };
        if (after.Length < Fewest) return new Recovery { Reason = $"too few hours after it: {after.Length}, needs {Fewest}" };
        SurfaceUse use = after.GroupBy(i => table.Use[i]).MaxBy(group => group.Count())!.Key;
        after = [.. after.Where(i => table.Use[i] == use)];
        int[] all = [.. Enumerable.Range(from, int.Max(end - from, 0)).Where(i => settled[i])];
        int[] near = [.. all.Where(i => table.At[i] + Milliseconds.Hour > interruption.Start - Within)];
        SurfaceUse useBefore = near.Count(i => table.Use[i] == use) >= Fewest || near.Length == 0 ? use : near.GroupBy(i => table.Use[i]).MaxBy(group => group.Count())!.Key;
        int[] before = [.. near.Where(i => table.Use[i] == useBefore).TakeLast(MostBefore)];
        if (before.Length < Fewest || after.Length < Fewest)
            return new Recovery { Reason = $"too few hours: {before.Length} before and {after.Length} after it, needs {Fewest}" };
        CleanReference one = expectation(useBefore), other = expectation(use);
        if (use != useBefore && !(Knows(one) && Knows(other)))
        {
            string which = Knows(one) ? use.Product : useBefore.Product;
            return new Recovery { Reason = $"product or effect changed, and the clean coefficient with {(which.Length > 0 ? which : "one of them")} is not learnt" };
        }

        int[] growth = [.. all.Where(i => table.Use[i] == useBefore && i <= before[^1]).TakeLast(MostForGrowth)];
        return new Sides(table, growth, before, after, one, other, use != useBefore).Compare();
    }

    private static bool Knows(CleanReference reference) => reference.Basis is ReferenceBasis.Level or ReferenceBasis.Conditions;
}
