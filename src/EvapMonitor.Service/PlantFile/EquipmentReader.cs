using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Service.PlantFile;

/// <summary>What a line has besides its effects: heaters, flashing condensate, tanks, bodies.</summary>
internal sealed class EquipmentReader(Findings findings, InstrumentReader instruments, LineNames names)
{
    public IReadOnlyList<Heater> Heaters(PlantNode? node, IReadOnlyDictionary<string, Liquor> liquors, IReadOnlySet<string> liquorNames)
    {
        var heaters = new List<Heater>();
        foreach ((string name, _, PlantNode value) in MappingReader.Named(node, "a heater's name", findings))
        {
            if (MappingReader.Open(value, PlantFileKeys.Heater, findings) is not { } mapping) continue;
            PlantNode? liquor = mapping.Require("liquor", "the name of a liquor");
            bool known = liquor is not null && LiquorChoiceReader.CheckName(liquor, liquorNames, "", findings);
            Instrument? flow = instruments.Read(mapping.Take("flow"), Dimension.MassFlow, Dimension.VolumeFlow);
            Instrument? before = instruments.Read(mapping.Take("in"), Dimension.Temperature), behind = instruments.Read(mapping.Take("out"), Dimension.Temperature);
            FixedOrMeasured? solids = Solids(mapping.Take("solids"));
            if (known && liquors.TryGetValue(((ScalarNode)liquor!).Text, out Liquor? heated))
                heaters.Add(new Heater { Name = name, Liquor = heated, Solids = solids, Flow = flow, In = before, Out = behind });
        }

        return heaters;
    }

    public IReadOnlyList<CondensateFlash> Flashes(PlantNode? node)
    {
        var flashes = new List<CondensateFlash>();
        foreach ((_, PlantNode key, PlantNode value) in MappingReader.Named(node, "an effect", findings))
        {
            string? from = names.Effect(key, findings);
            if (MappingReader.Open(value, PlantFileKeys.CondensateFlash, findings) is not { } mapping) continue;
            PlantNode? toNode = mapping.Require("flash-to", "the name of an effect");
            string? to = names.Effect(toNode, findings);
            if (from is null || to is null) continue;
            if (from == to) findings.Wrong(toNode!, $"condensate of {from} that flashes into its own chest", "another effect, whose chest is at a lower pressure");
            else flashes.Add(new(from, to));
        }

        if (Circle(flashes) is { } circle) findings.Wrong(node!, $"condensate that goes round in a circle: {Shown.Names(circle)}", "condensate that flashes to ever lower pressures");
        return flashes;
    }

    public IReadOnlyList<Tank> Tanks(PlantNode? node)
    {
        var tanks = new List<Tank>();
        foreach ((string name, PlantNode key, PlantNode value) in MappingReader.Named(node, "a tank's name", findings))
        {
            Unused(key, name, names.Effects);
            if (MappingReader.Open(value, PlantFileKeys.Tank, findings) is not { } mapping) continue;
            PlantNode? fromNode = mapping.Require("from", "feed, or the name of an effect");
            bool feed = fromNode is ScalarNode { Text: "feed" };
            string? from = feed ? null : names.Effect(fromNode, findings);
            double? holdUp = Quantities.Read(mapping.Take("hold-up"), Dimension.Mass, m => m > 0, "more than 0", findings);
            Instrument? level = instruments.Read(mapping.Take("level"), Dimension.Length);
            if (feed || from is not null) tanks.Add(new(name, from, holdUp, level));
        }

        return tanks;
    }

    public IReadOnlyList<Body> Bodies(PlantNode? node)
    {
        var bodies = new List<Body>();
        var cleaning = new CleaningReader(findings, instruments);
        foreach ((string name, PlantNode key, PlantNode value) in MappingReader.Named(node, "a body's name", findings))
        {
            Unused(key, name, names.Effects);
            if (MappingReader.Open(value, PlantFileKeys.Body, findings) is not { } mapping) continue;
            double? area = Quantities.Read(mapping.Require("area", Units.Allowed(Dimension.Area)), Dimension.Area, a => a > 0, "more than 0", findings);
            var serves = new Dictionary<string, ActiveSignal>(StringComparer.Ordinal);
            foreach ((_, PlantNode effectNode, PlantNode signal) in MappingReader.Named(mapping.Take("serves"), "an effect", findings))
            {
                string? effect = names.Effect(effectNode, findings);
                if (cleaning.Active(signal) is { } active && effect is not null) serves[effect] = active;
            }

            if (area is { } surface) bodies.Add(new(name, surface, serves));
        }

        return bodies;
    }

    /// <summary>Effects, tanks, bodies and recompressors are told apart by name alone.</summary>
    private void Unused(PlantNode key, string name, IEnumerable<string> taken)
    {
        if (taken.Contains(name)) findings.Wrong(key, $"the name {Shown.Quoted(name)}, which an effect has", "a name that nothing else in the line has");
    }

    private FixedOrMeasured? Solids(PlantNode? node)
    {
        if (node is MappingNode) return instruments.Read(node, Dimension.Fraction) is { } meter ? new(null, meter) : null;
        return Quantities.Read(node, Dimension.Fraction, x => x is >= 0 and < 1, "from 0 % to under 100 %, or an instrument {signal: …, unit: \"%\"}", findings) is { } solids
            ? new(solids, null) : null;
    }

    private static List<string>? Circle(List<CondensateFlash> flashes)
    {
        Dictionary<string, string> next = flashes.ToDictionary(flash => flash.From, flash => flash.To, StringComparer.Ordinal);
        foreach (string start in next.Keys)
        {
            var seen = new List<string> { start };
            string at = start;
            while (next.TryGetValue(at, out string? to))
            {
                if (to == start) return seen;
                if (seen.Contains(to)) break;
                seen.Add(at = to);
            }
        }

        return null;
    }
}
