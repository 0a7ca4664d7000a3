using System.Globalization;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Service.PlantFile;

/// <summary>Which liquor a line boils: a name, or a signal that tells it.</summary>
internal sealed class LiquorChoiceReader(
    Findings findings, InstrumentReader instruments, IReadOnlyDictionary<string, Liquor> liquors, IReadOnlySet<string> liquorNames)
{
    private const string Form = "{signal: N.PRODUCT, values: {1: juice, 0: water}}";

    /// <summary>The choice; null when absent or, which is reported, wrong.</summary>
    public LiquorChoice? Read(PlantNode? node)
    {
        if (node is null) return null;
        if (node is ScalarNode)
            return CheckName(node, liquorNames, " or " + Form, findings) && liquors.TryGetValue(((ScalarNode)node).Text, out Liquor? always)
                ? new(always, null, new Dictionary<int, Liquor>())
                : null;
        if (MappingReader.Open(node, PlantFileKeys.LiquorChoice, findings) is not { } mapping) return null;
        Instrument? signal = instruments.Number(mapping);
        PlantNode? values = mapping.Require("values", "a mapping from the signal's values to liquors, such as {1: juice, 0: water}");
        if (values is null) return null;
        if (values is not MappingNode { Entries.Count: > 0 } table)
        {
            findings.Wrong(values, "a mapping from the signal's values to liquors, such as {1: juice, 0: water}");
            return null;
        }

        var byValue = new Dictionary<int, Liquor>();
        foreach (MappingEntry entry in table.Entries)
        {
            if (!int.TryParse(entry.Key.Text, NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out int value))
                findings.Wrong(entry.Key, "a whole number");
            else if (CheckName(entry.Value, liquorNames, "", findings)
                && liquors.TryGetValue(((ScalarNode)entry.Value).Text, out Liquor? liquor) && !byValue.TryAdd(value, liquor))
                findings.Wrong(entry.Key, Invariant($"the value {value} a second time"), "each value once");
        }

        return signal is null ? null : new(null, signal, byValue);
    }

    /// <summary>Reports a node that names no liquor of the site.</summary>
    public static bool CheckName(PlantNode node, IReadOnlySet<string> names, string orElse, Findings findings)
    {
        if (node is ScalarNode scalar && names.Contains(scalar.Text)) return true;
        findings.Wrong(node, "the name of a liquor: " + Shown.Names(names) + orElse);
        return false;
    }
}
