using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Service.PlantFile;

/// <summary>One line of the site.</summary>
internal sealed class LineReader(
    Findings findings, InstrumentReader instruments, IReadOnlyDictionary<string, Liquor> liquors, IReadOnlySet<string> liquorNames)
{
    /// <summary>More effects than any line has; a bound for what comes after.</summary>
    public const int MostEffects = 50;

    private static readonly TimeSpan LongestValid = TimeSpan.FromHours(24);

    private static readonly Dictionary<string, SteamGaugePlace> Places = new(StringComparer.Ordinal)
    {
        ["chest"] = SteamGaugePlace.Chest,
        ["before-valve"] = SteamGaugePlace.BeforeValve,
    };

    public Line? Read(string name, PlantNode node)
    {
        if (MappingReader.Open(node, PlantFileKeys.Line, findings) is not { } mapping) return null;
        LineNames names = LineNames.Of(mapping.Node);
        LiquorChoice? liquor = new LiquorChoiceReader(findings, instruments, liquors, liquorNames).Read(
            mapping.Require("liquor", "the name of a liquor"));
        var defaults = new Line { Name = name, Liquor = new(null, null, new Dictionary<int, Liquor>()), Effects = [] };
        var equipment = new EquipmentReader(findings, instruments, names);
        IReadOnlyList<Tank> tanks = equipment.Tanks(mapping.Take("tanks"));
        IReadOnlyList<Body> bodies = equipment.Bodies(mapping.Take("bodies"));
        IReadOnlyList<Recompressor> machines = new RecompressorReader(findings, instruments, names).Read(mapping.Take("recompressors"));
        IReadOnlyList<Heater> heaters = equipment.Heaters(mapping.Take("heaters"), liquors, liquorNames);
        return defaults with
        {
            Formerly = Texts.Names(mapping.Take("formerly"), findings),
            Liquor = liquor ?? defaults.Liquor,
            SuspectAfter = Quantities.Time(mapping.Take("suspect-after"), TimeSpan.FromMinutes(10), TimeSpan.FromHours(6), findings) ?? defaults.SuspectAfter,
            SettlingTime = Quantities.Time(mapping.Take("settling-time"), TimeSpan.FromMinutes(1), TimeSpan.FromHours(6), findings) ?? defaults.SettlingTime,
            ProducingAboveFeedFlow = ProducingWhen(mapping.Take("producing-when")),
            Feed = Stream(mapping.Take("feed")),
            Product = Stream(mapping.Take("product")),
            Steam = Steam(mapping.Take("steam")),
            Effects = Effects(mapping, names, tanks, bodies, machines),
            Bleeds = Bleeds(mapping.Take("bleeds"), names, heaters, mapping),
            Heaters = heaters,
            CondensateFlashes = equipment.Flashes(mapping.Take("condensate")),
            Tanks = tanks,
            Bodies = bodies,
            Recompressors = machines,
            CleaningGroups = new CleaningReader(findings, instruments).Groups(mapping.Take("cleaning-groups"), names),
            RequiredEvaporation = Quantities.Read(
                mapping.Take("required-evaporation"), Dimension.MassFlow, f => f > 0, "more than 0", findings),
            Money = MoneyReader.Read(mapping.Take("money"), findings),
        };
    }

    private List<Effect> Effects(
        MappingReader mapping, LineNames names, IReadOnlyList<Tank> tanks, IReadOnlyList<Body> bodies, IReadOnlyList<Recompressor> machines)
    {
        const string Allowed = "a list of effects, each with name, heating, liquor and area";
        PlantNode? node = mapping.Require("effects", Allowed);
        IReadOnlyList<PlantNode> items = MappingReader.Items(node, Allowed, findings);
        if (items.Count > MostEffects)
        {
            findings.Wrong(node!, Invariant($"{items.Count} effects"), Invariant($"at most {MostEffects} effects in a line"));
            return [];
        }

        var reader = new EffectReader(findings, instruments, names, bodies);
        List<EffectEntry> entries = [.. items.Select(reader.Read).OfType<EffectEntry>()];
        LineChecks.Check(entries, tanks, mapping.Take("tanks"), findings);
        EquipmentChecks.Check(entries, bodies, machines, mapping, findings);
        return [.. entries.Select(e => e.Effect)];
    }

    private double? ProducingWhen(PlantNode? node) => MappingReader.Open(node, PlantFileKeys.ProducingWhen, findings) is { } mapping
        ? Quantities.Read(
            mapping.Require("feed-flow-above", Units.Allowed(Dimension.MassFlow)), Dimension.MassFlow, f => f >= 0, "0 or more", findings)
        : null;

    private LiquorStream Stream(PlantNode? node)
    {
        if (MappingReader.Open(node, PlantFileKeys.LiquorStream, findings) is not { } mapping) return new();
        var stream = new LiquorStream
        {
            Flow = instruments.Read(mapping.Take("flow"), Dimension.MassFlow, Dimension.VolumeFlow),
            Solids = instruments.Read(mapping.Take("solids"), Dimension.Fraction),
            Temperature = instruments.Read(mapping.Take("temperature"), Dimension.Temperature),
        };
        if (MappingReader.Open(mapping.Take("laboratory"), PlantFileKeys.Laboratory, findings) is not { } laboratory) return stream;
        return stream with
        {
            Laboratory = instruments.Read(laboratory, Dimension.Fraction),
            LaboratoryValidFor = Quantities.Time(laboratory.Take("valid-for"), TimeSpan.FromMinutes(1), LongestValid, findings) ?? stream.LaboratoryValidFor,
        };
    }

    private SteamMain Steam(PlantNode? node)
    {
        if (MappingReader.Open(node, PlantFileKeys.Steam, findings) is not { } mapping) return new();
        var steam = new SteamMain
        {
            Flow = instruments.Read(mapping.Take("flow"), Dimension.MassFlow),
            Temperature = instruments.Read(mapping.Take("temperature"), Dimension.Temperature),
        };
        if (MappingReader.Open(mapping.Take("pressure"), PlantFileKeys.SteamPressure, findings) is not { } pressure) return steam;
        PlantNode? at = pressure.Take("at");
        if (at is null)
            findings.Note(
                pressure.Node,
                "nothing says where the gauge of the steam main sits: before-valve is assumed, so that it never stands for the chest pressure");
        return steam with
        {
            Pressure = instruments.Read(pressure, Dimension.Pressure),
            PressureAt = Texts.Choice(at, Places, findings) ?? steam.PressureAt,
        };
    }

    private List<Bleed> Bleeds(PlantNode? node, LineNames names, IReadOnlyList<Heater> heaters, MappingReader line)
    {
        var bleeds = new List<Bleed>();
        var seen = new HashSet<(string From, string To)>();
        foreach (PlantNode item in MappingReader.Items(node, "a list such as [{from: N1, to: heater}]", findings))
        {
            if (MappingReader.Open(item, PlantFileKeys.Bleed, findings) is not { } mapping) continue;
            PlantNode? toNode = mapping.Require("to", "the name of the user of the vapour");
            string? from = names.Effect(
                mapping.Require("from", "the name of an effect of this line: " + Shown.Names(names.Effects)), findings);
            string? to = Texts.Name(toNode, findings);
            Instrument? flow = instruments.Read(mapping.Take("flow"), Dimension.MassFlow);
            if (to is not null && names.Effects.Contains(to))
                findings.Wrong(toNode!, $"a user that is not an effect; an effect says heating: vapour of {from ?? "N1"}");
            if (from is null || to is null) continue;
            if (!seen.Add((from, to))) findings.Wrong(item, $"a second bleed from {from} to {to}", "each bleed once");
            else bleeds.Add(new(from, to, flow));
        }

        foreach (Heater heater in heaters.Where(h => bleeds.TrueForAll(b => b.To != h.Name)))
        {
            PlantNode place = ((MappingNode)line.Take("heaters")!).Entries.First(e => e.Key.Text == heater.Name).Key;
            findings.Note(place, $"no bleed goes to {heater.Name}: it says nothing of any effect");
        }

        return bleeds;
    }
}
