using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>From what a quantity can be computed, or what is missing; exactly one of the two is set.</summary>
/// <param name="From">The instruments, the preferred way first.</param>
/// <param name="Missing">The instruments of which one would help.</param>
public sealed record Sourced(string? From, string? Missing);

/// <summary>What can be computed of one effect by the direct way, without the balance of the whole line.</summary>
/// <param name="Effect">The effect.</param>
/// <param name="Heating">Saturation temperature of the heating steam.</param>
/// <param name="Boiling">Boiling temperature of the liquor that leaves.</param>
/// <param name="Duty">Heat that the liquor receives.</param>
public sealed record EffectCheck(Effect Effect, Sourced Heating, Sourced Boiling, Sourced Duty)
{
    /// <summary>True when the coefficient follows from these three alone.</summary>
    public bool IsComplete => Heating.From is not null && Boiling.From is not null && Duty.From is not null;

    /// <summary>Looks through one line.</summary>
    public static IReadOnlyList<EffectCheck> Of(Line line)
    {
        ArgumentNullException.ThrowIfNull(line);
        return [.. line.Effects.Select(e => new EffectCheck(e, HeatingOf(line, e), BoilingOf(line, e), DutyOf(line, e)))];
    }

    private static Sourced HeatingOf(Line line, Effect effect)
    {
        var ways = new List<string>();
        if (effect.Chest.Pressure is { } chest) ways.Add("chest pressure " + chest.Signal);
        foreach (HeatSource source in effect.Heating.Where(s => s.VapourOf is not null))
        {
            if (EffectOf(line, source.VapourOf!).Vapour.Pressure is { } vapour)
                ways.Add($"vapour pressure {vapour.Signal} of {source.VapourOf}");
        }

        bool bySteam = effect.Heating.Any(h => h.IsSteam);
        if (bySteam && line.Steam is { Pressure: { } main, PressureAt: SteamGaugePlace.Chest })
            ways.Add($"steam main gauge {main.Signal} at the chest");
        if (effect.Chest is { Temperature: { } thermometer, TemperatureSeesSaturation: true })
            ways.Add($"chest thermometer {thermometer.Signal} that sees saturation");
        List<string> vapours = [.. effect.Heating.Select(h => h.VapourOf).OfType<string>()];
        string others = bySteam ? ", or a steam gauge at the chest" : vapours.Count > 0 ? ", or a vapour pressure of " + string.Join(" or ", vapours) : "";
        return Of(ways, $"a chest pressure of {effect.Name}{others}, or a chest thermometer that sees saturation");
    }

    private static Sourced BoilingOf(Line line, Effect effect)
    {
        var ways = new List<string>();
        string? solids = LiquorKnowledge.SolidsLeaving(line, effect);
        if (effect.Vapour.Pressure is { } pressure && solids is not null)
            ways.Add($"vapour pressure {pressure.Signal} and elevation at {solids}");
        if (effect.Leaving is { Temperature: { } thermometer, TemperatureSeesFlashedLiquor: true })
            ways.Add($"thermometer {thermometer.Signal} that sees flashed liquor");
        string missing = effect.Vapour.Pressure is null
            ? $"a vapour pressure of {effect.Name}" + (solids is null ? $" and the solids leaving {effect.Name}" : "")
            : $"the solids leaving {effect.Name} (for the elevation)";
        return Of(ways, missing + ", or a thermometer that sees flashed liquor");
    }

    private static Sourced DutyOf(Line line, Effect effect)
    {
        var ways = new List<string>();
        bool joined = line.CondensateFlashes.Any(f => f.To == effect.Name);
        bool alone = effect.Heating is [{ IsSteam: true }] && line.Effects.Count(e => e.Heating.Contains(HeatSource.Steam)) == 1 && !joined;
        if (alone && line.Steam.Flow is { } steam) ways.Add("steam flow " + steam.Signal);
        Sourced condensate = EquipmentCheck.Condensate(line, effect);
        if (condensate.From is { } flow) ways.Add(flow);
        if (LiquorKnowledge.Evaporation(line, effect) is { } evaporation) ways.Add("liquor side: " + evaporation);
        return Of(ways, $"{condensate.Missing}, or on the liquor side {LiquorKnowledge.MissingForEvaporation(line, effect)}");
    }

    private static Sourced Of(List<string> ways, string missing) =>
        ways.Count > 0 ? new(string.Join("; also ", ways), null) : new(null, missing);

    private static Effect EffectOf(Line line, string name) => line.Effects.First(e => e.Name == name);
}
