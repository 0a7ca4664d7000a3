using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Service.PlantFile;

/// <summary>What the instruments tell of the liquor around an effect without the balance of the whole line. Null: nothing.</summary>
internal static class LiquorKnowledge
{
    /// <summary>Where the solids leaving an effect come from.</summary>
    public static string? SolidsLeaving(Line line, Effect effect)
    {
        if (line.Liquor.Always is Water) return "no solids (water)";
        if (MeasuredSolidsLeaving(line, effect) is { } measured) return measured;
        return FlowLeaving(line, effect) is { } leaving && FlowEntering(line, effect) is { } entering && SolidsEntering(line, effect) is { } solids
            ? $"solids from {entering}, {solids} and {leaving}"
            : null;
    }

    /// <summary>How the evaporation of an effect follows from flow and solids of its liquor.</summary>
    public static string? Evaporation(Line line, Effect effect)
    {
        string? entering = FlowEntering(line, effect);
        if (entering is null) return null;
        string? solids = SolidsEntering(line, effect);
        if (solids is not null && MeasuredSolidsLeaving(line, effect) is { } leavingSolids)
            return $"{entering} and {solids} with {leavingSolids}";
        return FlowLeaving(line, effect) is { } leaving ? $"{entering} with {leaving}" : null;
    }

    /// <summary>Which liquor instruments would give the evaporation.</summary>
    public static string MissingForEvaporation(Line line, Effect effect)
    {
        var missing = new List<string>();
        if (FlowEntering(line, effect) is null) missing.Add($"the flow entering {effect.Name}");
        if (MeasuredSolidsLeaving(line, effect) is null && FlowLeaving(line, effect) is null)
            missing.Add($"the flow or the solids leaving {effect.Name}");
        else if (FlowLeaving(line, effect) is null && SolidsEntering(line, effect) is null) missing.Add($"the solids entering {effect.Name}");
        return string.Join(" and ", missing);
    }

    private static string? MeasuredSolidsLeaving(Line line, Effect effect) =>
        effect.Leaving.Solids is { } meter ? "solids " + meter.Signal
        : !IsLast(line, effect) ? null
        : line.Product.Solids is { } product ? "product solids " + product.Signal
        : line.Product.Laboratory is { } laboratory ? "laboratory value " + laboratory.Signal
        : null;

    private static string? FlowLeaving(Line line, Effect effect) =>
        effect.Leaving.Flow is { } meter ? "flow " + meter.Signal
        : IsLast(line, effect) && line.Product.Flow is { } product ? "product flow " + product.Signal
        : null;

    private static string? FlowEntering(Line line, Effect effect)
    {
        if (OnlySource(line, effect) is not { } source) return null;
        return source.From is null
            ? line.Feed.Flow is { } feed ? "feed flow " + feed.Signal : null
            : EffectOf(line, source.From) is { } before ? FlowLeaving(line, before) : null;
    }

    private static string? SolidsEntering(Line line, Effect effect)
    {
        if (effect.Liquor is not [var source]) return null;
        if (source.From is null)
            return line.Feed.Solids is { } feed ? "feed solids " + feed.Signal
                : line.Feed.Laboratory is { } laboratory ? "laboratory value " + laboratory.Signal
                : null;
        return EffectOf(line, source.From) is { } before ? SolidsLeaving(line, before) : null;
    }

    /// <summary>The effect of a name; null for a tank, whose liquor is not that which enters it at the time.</summary>
    private static Effect? EffectOf(Line line, string name) => line.Effects.FirstOrDefault(e => e.Name == name);

    /// <summary>The source of an effect that takes all of one source and nothing else.</summary>
    private static LiquorSource? OnlySource(Line line, Effect effect) =>
        effect.Liquor is [{ Share: null } source] && Takers(line, source.From) == 1
            ? source
            : null;

    /// <summary>True when the product is what leaves this effect and nothing else.</summary>
    private static bool IsLast(Line line, Effect effect)
    {
        List<Effect> last = [.. line.Effects.Where(e => Takers(line, e.Name) == 0)];
        bool wholly = line.Effects.SelectMany(o => o.Liquor).Where(s => s.From is not null)
            .GroupBy(s => s.From).All(g => g.Any(s => s.Share is null) || line.Tanks.Any(t => t.From == g.Key))
            && line.Tanks.All(t => Takers(line, t.Name) > 0);
        return wholly && last is [var only] && only.Name == effect.Name;
    }

    private static int Takers(Line line, string? source) =>
        line.Effects.SelectMany(e => e.Liquor).Count(s => s.From == source) + line.Tanks.Count(t => t.From == source);
}
