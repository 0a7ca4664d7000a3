using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>Recompressors and their curves.</summary>
internal sealed class RecompressorReader(Findings findings, InstrumentReader instruments, LineNames names)
{
    private const int MostPoints = 200;

    private static readonly Dictionary<string, RecompressorKind> Kinds = new(StringComparer.Ordinal)
    {
        ["thermal"] = RecompressorKind.Thermal, ["mechanical"] = RecompressorKind.Mechanical,
    };

    private static readonly string[] OfThermal = ["motive"], OfMechanical = ["power", "efficiency", "spray"];

    private readonly RouteReader _routes = new(findings, names);

    public IReadOnlyList<Recompressor> Read(PlantNode? node)
    {
        var machines = new List<Recompressor>();
        foreach ((string name, PlantNode key, PlantNode value) in MappingReader.Named(node, "a recompressor's name", findings))
        {
            if (names.Effects.Contains(name) || name == "steam")
                findings.Wrong(key, $"the name {Shown.Quoted(name)}, which is taken", "a name that nothing else in the line has");
            if (MappingReader.Open(value, PlantFileKeys.Recompressor, findings) is not { } mapping) continue;
            if (One(name, mapping) is { } machine) machines.Add(machine);
        }

        return machines;
    }

    private Recompressor? One(string name, MappingReader mapping)
    {
        RecompressorKind? kind = Texts.Choice(mapping.Require("kind", string.Join(", ", Kinds.Keys)), Kinds, findings);
        string? suction = _routes.VapourAt(mapping.Require("suction", "vapour of an effect"));
        MotiveSteam motive = Motive(mapping.Take("motive"));
        Instrument? power = instruments.Read(mapping.Take("power"), Dimension.Power);
        UncertainShare? efficiency = Efficiency(mapping.Take("efficiency"));
        Instrument? spray = instruments.Read(mapping.Take("spray"), Dimension.MassFlow, Dimension.VolumeFlow);
        MachineCurve? curve = Curve(mapping.Take("curve"), kind);
        foreach (string stray in kind switch { RecompressorKind.Thermal => OfMechanical, RecompressorKind.Mechanical => OfThermal, _ => [] })
        {
            if (mapping.TakeKey(stray) is { } key)
                findings.Wrong(key, $"{stray} of a {(kind == RecompressorKind.Thermal ? "thermal" : "mechanical")} recompressor", string.Join(", ", kind == RecompressorKind.Thermal ? OfThermal : OfMechanical));
        }

        if (kind is not { } known || suction is null) return null;
        var machine = new Recompressor { Name = name, Kind = known, Suction = suction, Motive = motive, Power = power, Spray = spray, Curve = curve };
        return efficiency is null ? machine : machine with { Efficiency = efficiency };
    }

    private UncertainShare? Efficiency(PlantNode? node)
    {
        UncertainShare? share = Shares.Uncertain(node, findings);
        if (share is { Value: 0 }) findings.Wrong(node!, "an efficiency of 0 %", "a share above 0 %, such as 95 % ± 3 %");
        return share;
    }

    private MotiveSteam Motive(PlantNode? node) => MappingReader.Open(node, PlantFileKeys.Motive, findings) is not { } mapping ? new(null, null, null) : new(
        instruments.Read(mapping.Take("flow"), Dimension.MassFlow), instruments.Read(mapping.Take("pressure"), Dimension.Pressure),
        instruments.Read(mapping.Take("temperature"), Dimension.Temperature));

    private MachineCurve? Curve(PlantNode? node, RecompressorKind? kind)
    {
        if (MappingReader.Open(node, PlantFileKeys.MachineCurve, findings) is not { } mapping) return null;
        IReadOnlyList<(double X, double Y)>? entrainment = Points(
            mapping.Take("entrainment"), "at least two points [discharge by suction pressure, kg drawn per kg of motive steam], the first number ascending and at least 1, the second not rising and not under 0",
            points => points[0].X >= 1 && points[^1].Y >= 0 && !Rises(points));
        UnitOfMeasure? unit = FlowUnit(mapping.Take("flow-unit"));
        IReadOnlyList<(double X, double Y)>? ratio = Points(
            mapping.Take("pressure-ratio"), "at least two points [volume drawn, discharge by suction pressure], the first number ascending from 0, the second above 1 and at most 10",
            points => points[0].X >= 0 && points.All(point => point.Y is > 1 and <= 10));
        double? efficiency = Quantities.Read(mapping.Take("isentropic-efficiency"), Dimension.Fraction, share => share is > 0 and <= 1, "above 0 % to 100 %", findings);
        bool thermal = kind == RecompressorKind.Thermal;
        foreach (string stray in kind is null ? [] : thermal ? (string[])["flow-unit", "pressure-ratio", "isentropic-efficiency"] : ["entrainment"])
        {
            if (mapping.TakeKey(stray) is { } key) findings.Wrong(key, $"{stray} in the curve of a {(thermal ? "thermal" : "mechanical")} recompressor", thermal ? "entrainment" : "flow-unit, pressure-ratio, isentropic-efficiency");
        }

        if (kind is null) return null;
        if (thermal)
        {
            mapping.Require("entrainment", "points [discharge by suction pressure, kg drawn per kg of motive steam]");
            return entrainment is null ? null : new(entrainment);
        }

        mapping.Require("pressure-ratio", "points [volume drawn, discharge by suction pressure]");
        mapping.Require("flow-unit", "the unit of the volume drawn, such as m3/h");
        mapping.Require("isentropic-efficiency", "a share, such as 75 %");
        return ratio is null || unit is null || efficiency is null ? null : new([.. ratio.Select(point => (unit.ToSi(point.X), point.Y))], efficiency.Value);
    }

    private UnitOfMeasure? FlowUnit(PlantNode? node)
    {
        string? written = Texts.Text(node, "the unit of the volume drawn, such as m3/h", findings);
        if (written is null) return null;
        if (Units.Find(written) is { Dimension: Dimension.VolumeFlow } unit) return unit;
        findings.Wrong(node!, "a unit of " + Units.Allowed(Dimension.VolumeFlow));
        return null;
    }

    private static bool Rises(IReadOnlyList<(double X, double Y)> points) => Enumerable.Range(1, points.Count - 1).Any(i => points[i].Y > points[i - 1].Y);

    private List<(double X, double Y)>? Points(PlantNode? node, string allowed, Func<IReadOnlyList<(double X, double Y)>, bool> sound)
    {
        if (node is null) return null;
        if (CurveReader.Points(node) is { Count: <= MostPoints } points && sound(points)) return points;
        findings.Wrong(node, allowed);
        return null;
    }
}
