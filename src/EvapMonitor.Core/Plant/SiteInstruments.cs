namespace EvapMonitor.Core.Plant;

/// <summary>An instrument with the place where it sits.</summary>
/// <param name="Line">Name of the line; null for an instrument of the site.</param>
/// <param name="Effect">Name of the effect; null for an instrument of the line.</param>
/// <param name="Place">The place in words of the plant file, such as <c>vapour.pressure</c>.</param>
/// <param name="Instrument">The instrument.</param>
public sealed record InstrumentAtPlace(string? Line, string? Effect, string Place, Instrument Instrument);

/// <summary>Every instrument of a site, in plant-file order: the signals that a plant file names.</summary>
public static class SiteInstruments
{
    /// <summary>All of them; a signal that serves at several places comes several times.</summary>
    public static IReadOnlyList<InstrumentAtPlace> Of(Site site)
    {
        ArgumentNullException.ThrowIfNull(site);
        IEnumerable<InstrumentAtPlace> atmosphere = Present((null, "atmosphere", site.Atmosphere.Measured));
        return [.. atmosphere, .. site.Lines.SelectMany(Of)];
    }

    /// <summary>Those of one line.</summary>
    public static IReadOnlyList<InstrumentAtPlace> Of(Line line)
    {
        ArgumentNullException.ThrowIfNull(line);
        IEnumerable<InstrumentAtPlace> all =
        [
            .. Present((null, "liquor", line.Liquor.Signal)),
            .. Stream("feed", line.Feed),
            .. Stream("product", line.Product),
            .. Present(
                (null, "steam.flow", line.Steam.Flow), (null, "steam.pressure", line.Steam.Pressure),
                (null, "steam.temperature", line.Steam.Temperature)),
            .. line.Effects.SelectMany(Of),
            .. line.Bleeds.SelectMany(b => Present((null, $"bleed from {b.From} to {b.To}", b.Flow))),
            .. line.Heaters.SelectMany(h => Present(
                (null, $"heaters.{h.Name}.flow", h.Flow), (null, $"heaters.{h.Name}.in", h.In), (null, $"heaters.{h.Name}.out", h.Out),
                (null, $"heaters.{h.Name}.solids", h.Solids?.Measured))),
            .. line.Tanks.SelectMany(t => Present((null, $"tanks.{t.Name}.level", t.Level))),
            .. line.Bodies.SelectMany(b => b.Serves.SelectMany(s => Present((null, $"bodies.{b.Name}.serves.{s.Key}", s.Value.Instrument)))),
            .. line.Recompressors.SelectMany(r => Present(
                (null, $"recompressors.{r.Name}.motive.flow", r.Motive.Flow), (null, $"recompressors.{r.Name}.motive.pressure", r.Motive.Pressure),
                (null, $"recompressors.{r.Name}.motive.temperature", r.Motive.Temperature),
                (null, $"recompressors.{r.Name}.power", r.Power), (null, $"recompressors.{r.Name}.spray", r.Spray))),
            .. line.CleaningGroups.SelectMany(g => Present((null, $"cleaning-groups.{g.Name}", g.Signal?.Instrument))),
        ];
        return [.. all.Select(i => i with { Line = line.Name })];
    }

    private static IEnumerable<InstrumentAtPlace> Of(Effect effect) => Present(
        (effect.Name, "chest.pressure", effect.Chest.Pressure), (effect.Name, "chest.temperature", effect.Chest.Temperature),
        (effect.Name, "chest.condensate-flow", effect.Chest.CondensateFlow),
        (effect.Name, "chest.condensate-temperature", effect.Chest.CondensateTemperature),
        (effect.Name, "vapour.pressure", effect.Vapour.Pressure), (effect.Name, "vapour.temperature", effect.Vapour.Temperature),
        (effect.Name, "leaving.flow", effect.Leaving.Flow), (effect.Name, "leaving.solids", effect.Leaving.Solids),
        (effect.Name, "leaving.temperature", effect.Leaving.Temperature), (effect.Name, "level", effect.Level), (effect.Name, "pressure-difference", effect.PressureDifference));

    private static IEnumerable<InstrumentAtPlace> Stream(string name, LiquorStream stream) => Present(
        (null, name + ".flow", stream.Flow), (null, name + ".solids", stream.Solids),
        (null, name + ".temperature", stream.Temperature), (null, name + ".laboratory", stream.Laboratory));

    private static IEnumerable<InstrumentAtPlace> Present(params (string? Effect, string Place, Instrument? Instrument)[] places) =>
        places.Where(p => p.Instrument is not null).Select(p => new InstrumentAtPlace(null, p.Effect, p.Place, p.Instrument!));
}
