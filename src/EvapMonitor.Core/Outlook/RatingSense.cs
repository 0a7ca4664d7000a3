using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Outlook;

/// <summary>Whether a solution of the equations is one that a plant can have: the equations alone would let heat and vapour run backwards.</summary>
internal static class RatingSense
{
    private const double Rounding = 1e-9;

    /// <summary>Why a solution is none; null when it is one.</summary>
    public static string? Flaw(LineGraph graph, LineVariables at, double[] x)
    {
        double least = -Rounding * double.Abs(x[at.FeedFlow]);
        for (int i = 0; i < graph.Line.Effects.Count; i++)
        {
            EffectVariables effect = at.Effects[i];
            string name = graph.Line.Effects[i].Name;
            if (x[effect.Heating] <= x[effect.Boiling])
                return FormattableString.Invariant($"{name} has no driving force (heating {x[effect.Heating] - 273.15:0.#} °C, boiling {x[effect.Boiling] - 273.15:0.#} °C)");
            if (x[effect.Solids] is not (>= 0 and < 0.99)) return $"{name} would have to boil its liquor dry";
            if (x[effect.Flow] <= 0) return $"{name} would have to evaporate more than it takes in";
            if (x[effect.Vapour] < least) return $"{name} would condense vapour: its liquor comes in too cold";
            if (effect.ToCondenser >= 0 && x[effect.ToCondenser] < least) return $"bleeds and suction take more vapour than {name} gives";
            if (effect.FlashVapour >= 0 && x[effect.FlashVapour] < least) return $"condensate of {name} is colder than the pot it is to flash into";
        }

        for (int k = 0; k < at.Heating.Length; k++)
        {
            if (x[at.Heating[k]] < least) return $"heating steam would run backwards on the way {at.Keys[at.Heating[k]].Place}";
        }

        foreach (int bleed in at.Bleeds)
        {
            if (x[bleed] < least) return $"vapour would run backwards on the way {at.Keys[bleed].Place}";
        }

        for (int k = 0; k < at.Liquor.Length; k++)
        {
            if (x[at.Liquor[k].Flow] < least) return $"liquor would run backwards on the way {at.Keys[at.Liquor[k].Flow].Place}";
        }

        for (int r = 0; r < at.Recompressors.Length; r++)
        {
            RecompressorVariables machine = at.Recompressors[r];
            string name = graph.Line.Recompressors[r].Name;
            if (x[machine.Suction] < least) return $"{name} would draw nothing";
            if (x[machine.Pressure] <= x[at.Effects[graph.SuctionFrom[r]].VapourPressure]) return $"{name} would not raise the pressure";
            if (machine.Spray >= 0 && x[machine.Spray] < least) return $"{name} would need its spray to take water out";
        }

        return null;
    }

    /// <summary>What to bear in mind about a solution.</summary>
    public static IReadOnlyList<string> Remarks(LineGraph graph, LineVariables at, double[] x)
    {
        var remarks = new List<string>();
        for (int r = 0; r < at.Recompressors.Length; r++)
        {
            Recompressor machine = graph.Line.Recompressors[r];
            EffectVariables suction = at.Effects[graph.SuctionFrom[r]];
            double low = x[suction.VapourPressure];
            double place = machine.Kind == RecompressorKind.Thermal
                ? x[at.Recompressors[r].Pressure] / low
                : x[at.Recompressors[r].Suction] * Compression.Of(low, x[suction.Boiling], x[at.Recompressors[r].Pressure]).Volume.Value;
            if (!machine.Curve!.Covers(place)) remarks.Add($"{machine.Name} works beyond the points of its curve");
        }

        return remarks;
    }
}
