using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>An effect with the places of its references, for the checks of the whole line.</summary>
internal sealed record EffectEntry(
    Effect Effect, PlantNode Name, PlantNode? FormerlyNode, PlantNode? HeatingNode, PlantNode? LiquorNode,
    IReadOnlyList<PlantNode> SourceNodes);

/// <summary>One effect of a line.</summary>
internal sealed class EffectReader(Findings findings, InstrumentReader instruments, LineNames names, IReadOnlyList<Body> bodies)
{
    private static readonly string[] Reserved = ["feed", "steam"];
    private readonly RouteReader _routes = new(findings, names);

    public EffectEntry? Read(PlantNode node)
    {
        if (MappingReader.Open(node, PlantFileKeys.Effect, findings) is not { } mapping) return null;
        PlantNode? nameNode = mapping.Require("name", Texts.NameAllowed);
        string? name = Texts.Name(nameNode, findings);
        if (Reserved.Contains(name))
            findings.Wrong(nameNode!, $"a name other than {string.Join(", ", Reserved)}, which have their own meaning");

        PlantNode? heatingNode = mapping.Require("heating", _routes.HeatingAllowed);
        PlantNode? liquorNode = mapping.Require("liquor", _routes.LiquorAllowed);
        IReadOnlyList<HeatSource> heating = heatingNode is null ? [] : _routes.Heating(heatingNode);
        IReadOnlyList<(LiquorSource Source, PlantNode Node)> liquor = liquorNode is null ? [] : _routes.Liquor(liquorNode);
        PlantNode? formerly = mapping.Take("formerly");
        var effect = new Effect
        {
            Name = name ?? "",
            Formerly = Texts.Names(formerly, findings),
            Heating = heating,
            Liquor = [.. liquor.Select(l => l.Source)],
            Area = Area(mapping, out IReadOnlyList<string> own) ?? 0,
            Bodies = own,
            CleanCoefficient = Quantities.Read(
                mapping.Take("clean-coefficient"), Dimension.HeatTransferCoefficient, c => c > 0, "more than 0", findings),
            Chest = Chest(mapping.Take("chest")),
            Vapour = Vapour(mapping.Take("vapour")),
            Leaving = Leaving(mapping.Take("leaving")),
            Level = instruments.Read(mapping.Take("level"), Dimension.Length),
            HoldUp = Quantities.Read(mapping.Take("hold-up"), Dimension.Mass, m => m > 0, "more than 0", findings),
            PressureDifference = Difference(mapping.Take("pressure-difference")),
            DueWhen = Due(mapping.Take("due-when")),
        };
        if (Shares.Uncertain(mapping.Take("heat-loss"), findings) is { } loss) effect = effect with { HeatLoss = loss };
        if (Shares.Uncertain(mapping.Take("vent"), findings) is { } vent) effect = effect with { Vent = vent };
        return name is null ? null : new(effect, nameNode!, formerly, heatingNode, liquorNode, [.. liquor.Select(l => l.Node)]);
    }

    private Instrument? Difference(PlantNode? node)
    {
        Instrument? found = instruments.Read(node, Dimension.Pressure);
        if (found is { Unit.Reference: not PressureReference.Absolute })
            findings.Wrong(node!, $"the unit {found.Unit.Written} for a difference", "a unit of pressure without a reference, such as kPa or mbar");
        return found;
    }

    /// <summary>The surface of the effect itself, or of all the bodies that it lists.</summary>
    private double? Area(MappingReader mapping, out IReadOnlyList<string> own)
    {
        own = [];
        if (mapping.Take("bodies") is not { } list)
            return Quantities.Read(mapping.Require("area", Units.Allowed(Dimension.Area)), Dimension.Area, a => a > 0, "more than 0", findings);
        if (mapping.TakeKey("area") is { } both) findings.Wrong(both, "an area beside bodies", "the area of each body, in the section bodies of the line");
        var found = new List<string>();
        foreach (PlantNode item in MappingReader.Items(list, "a list of bodies of this line", findings))
        {
            if (Texts.Name(item, findings) is not { } body) continue;
            if (!names.Bodies.Contains(body)) findings.Wrong(item, "the name of a body of this line: " + Shown.Names(names.Bodies));
            else if (found.Contains(body)) findings.Wrong(item, $"{body} a second time", "each body once");
            else found.Add(body);
        }

        own = found;
        return bodies.Where(body => found.Contains(body.Name)).Sum(body => body.Area);
    }

    private Chest Chest(PlantNode? node)
    {
        if (MappingReader.Open(node, PlantFileKeys.Chest, findings) is not { } mapping) return new();
        (Instrument? thermometer, bool sees) = Thermometer(mapping.Take("temperature"), "saturation");
        return new()
        {
            Pressure = instruments.Read(mapping.Take("pressure"), Dimension.Pressure),
            LineLoss = Quantities.Read(mapping.Take("line-loss"), Dimension.Pressure, p => p is >= 0 and < 1e5, "from 0 to under 1 bar", findings) ?? 0,
            Temperature = thermometer,
            TemperatureSeesSaturation = sees,
            CondensateFlow = instruments.Read(mapping.Take("condensate-flow"), Dimension.MassFlow, Dimension.VolumeFlow),
            CondensateTemperature = instruments.Read(mapping.Take("condensate-temperature"), Dimension.Temperature),
        };
    }

    private VapourSpace Vapour(PlantNode? node) => MappingReader.Open(node, PlantFileKeys.Vapour, findings) is not { } mapping ? new() : new()
    {
        Pressure = instruments.Read(mapping.Take("pressure"), Dimension.Pressure),
        Temperature = instruments.Read(mapping.Take("temperature"), Dimension.Temperature),
    };

    private LeavingLiquor Leaving(PlantNode? node)
    {
        if (MappingReader.Open(node, PlantFileKeys.Leaving, findings) is not { } mapping) return new();
        (Instrument? thermometer, bool sees) = Thermometer(mapping.Take("temperature"), "flashed-liquor");
        return new()
        {
            Flow = instruments.Read(mapping.Take("flow"), Dimension.MassFlow, Dimension.VolumeFlow),
            Solids = instruments.Read(mapping.Take("solids"), Dimension.Fraction),
            Temperature = thermometer,
            TemperatureSeesFlashedLiquor = sees,
        };
    }

    private (Instrument? Instrument, bool Sees) Thermometer(PlantNode? node, string seen)
    {
        if (MappingReader.Open(node, PlantFileKeys.SeeingThermometer, findings) is not { } mapping) return (null, false);
        bool? sees = Texts.Choice(mapping.Take("sees"), new Dictionary<string, bool>(StringComparer.Ordinal) { [seen] = true }, findings);
        return (instruments.Read(mapping, Dimension.Temperature), sees ?? false);
    }

    private DueLimits? Due(PlantNode? node)
    {
        if (MappingReader.Open(node, PlantFileKeys.DueWhen, findings) is not { } mapping) return null;
        if (mapping.Node.Entries.Count == 0)
            findings.Wrong(node!, "an empty mapping", "at least one of " + string.Join(", ", PlantFileKeys.DueWhen.Keys));
        return new(
            Quantities.Read(mapping.Take("coefficient-below"), Dimension.HeatTransferCoefficient, c => c > 0, "more than 0", findings),
            Shares.Exact(mapping.Take("cleanliness-below"), findings),
            Texts.Number(mapping.Take("hours-since-cleaning"), "hours, a number above 0 such as 600", h => h is > 0 and <= 1e6, findings));
    }
}
