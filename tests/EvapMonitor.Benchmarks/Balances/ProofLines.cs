using EvapMonitor.Core.Tests.Balances;

namespace EvapMonitor.Benchmarks.Balances;

/// <summary>Four lines, each with three sets of instruments.</summary>
internal static class ProofLines
{
    public static IEnumerable<(string Line, string Set, Func<InstrumentedLine> Make)> All()
    {
        foreach ((string name, string title) in new[] { ("forward", "forward, 4 effects, bleeds, flash"), ("backward", "backward, 3 effects"), ("mixed-five", "mixed, 5 effects, bleeds to heaters, flash cascade"), ("mechanical", "1 effect, mechanical recompression") })
        {
            TestLines.Case one = TestLines.Named(name);
            yield return (title, "all", () => InstrumentedLine.Of(one));
            yield return (title, "usual", () => InstrumentedLine.Of(one, Usual));
            yield return (title, "few", () => InstrumentedLine.Of(one, Few));
        }
    }

    /// <summary>Feed, product, steam, vapour pressures, condensates, bleeds and heaters; no gauges on chests, no flows and thermometers between effects.</summary>
    private static bool Usual(string name) => !name.EndsWith("-chest", StringComparison.Ordinal) && !name.EndsWith("-flow", StringComparison.Ordinal) && !name.EndsWith("-liquor", StringComparison.Ordinal);

    /// <summary>What determines the line and no more, or little more.</summary>
    private static bool Few(string name) => Usual(name) && !name.EndsWith("-condensate", StringComparison.Ordinal) && !name.EndsWith("-solids", StringComparison.Ordinal)
        || name is "feed-solids" or "product-solids" || name is "H1-solids" or "H2-solids" || name == "E-condensate" || name is "E-chest";
}
