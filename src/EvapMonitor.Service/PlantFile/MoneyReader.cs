using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>Costs of a line: <c>{currency: EUR, steam: 31 per t, lost-evaporation: 9 per t, objective: per-time}</c>.</summary>
internal static class MoneyReader
{
    private const string CostAllowed = "a cost per mass, 0 or more, such as 31 per t (t, kg, lb)";

    private static readonly Dictionary<string, CampaignObjective> Objectives = new(StringComparer.Ordinal)
    {
        ["per-time"] = CampaignObjective.PerTime,
        ["per-product"] = CampaignObjective.PerProduct,
    };

    public static Money? Read(PlantNode? node, Findings findings)
    {
        if (MappingReader.Open(node, PlantFileKeys.Money, findings) is not { } mapping) return null;
        const string CurrencyAllowed = "a currency of three letters such as EUR";
        PlantNode? currencyNode = mapping.Require("currency", CurrencyAllowed);
        string? currency = Texts.Text(currencyNode, CurrencyAllowed, findings);
        if (currency is not null && (currency.Length != 3 || !currency.All(char.IsAsciiLetterUpper)))
            findings.Wrong(currencyNode!, CurrencyAllowed);
        return new(
            currency ?? "",
            Cost(mapping.Take("steam"), findings),
            Cost(mapping.Take("lost-evaporation"), findings),
            Texts.Choice(mapping.Take("objective"), Objectives, findings) ?? CampaignObjective.PerTime);
    }

    private static double? Cost(PlantNode? node, Findings findings)
    {
        if (node is null) return null;
        if (node is ScalarNode scalar && scalar.Text.Split(" per ", StringSplitOptions.TrimEntries) is [var amount, var unit]
            && Texts.TryNumber(amount, out double number) && number >= 0 && Quantities.Flaw(unit, Dimension.Mass, out UnitOfMeasure? mass) is null)
            return number / mass!.Factor;
        findings.Wrong(node, CostAllowed);
        return null;
    }
}
