using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.PlantFile;

/// <summary>
/// Sections of the grammar that the computation does not carry out yet. They are refused where they stand, because a section that is read and
/// ignored makes wrong coefficients; their content is checked all the same, so that a file can be written ahead.
/// </summary>
internal sealed class LaterSections(Findings findings, InstrumentReader instruments, LineNames names, IReadOnlySet<string> liquorNames)
{
    private static readonly Dictionary<string, bool> Kinds = new(StringComparer.Ordinal) { ["thermal"] = true, ["mechanical"] = false };
    private readonly RouteReader _routes = new(findings, names);

    public void Refuse(MappingReader line)
    {
        Section(line, "heaters", "a section of heaters", "a bleed to the heater: [{from: N1, to: H1, flow: …}]", "a heater's name", Heater);
        Section(line, "condensate", "flashing condensate", "condensate that leaves each chest (no section)", "an effect", Flash);
        Section(line, "tanks", "a section of tanks", "liquor straight from the effect before", "a tank's name", Tank);
        Section(line, "bodies", "a section of bodies", "an area for each effect as a whole", "a body's name", Body);
        Section(
            line, "recompressors", "a section of recompressors", "effects heated by steam or by vapour of another effect",
            "a recompressor's name", Recompressor);
    }

    private void Section(MappingReader line, string key, string what, string instead, string names, Action<PlantNode, PlantNode> check)
    {
        if (line.TakeKey(key) is not { } place) return;
        findings.NotSupportedYet(place, what, instead);
        foreach ((_, PlantNode name, PlantNode value) in MappingReader.Named(line.Take(key), names, findings)) check(name, value);
    }

    private void Heater(PlantNode name, PlantNode value)
    {
        if (MappingReader.Open(value, PlantFileKeys.Heater, findings) is not { } mapping) return;
        if (mapping.Require("liquor", "the name of a liquor") is { } liquor) LiquorChoiceReader.CheckName(liquor, liquorNames, "", findings);
        instruments.Read(mapping.Require("flow", "an instrument"), Dimension.MassFlow, Dimension.VolumeFlow);
        instruments.Read(mapping.Require("in", "a thermometer"), Dimension.Temperature);
        instruments.Read(mapping.Require("out", "a thermometer"), Dimension.Temperature);
    }

    private void Flash(PlantNode name, PlantNode value)
    {
        names.Effect(name, findings);
        if (MappingReader.Open(value, PlantFileKeys.CondensateFlash, findings) is { } mapping)
            names.Effect(mapping.Require("flash-to", "the name of an effect"), findings);
    }

    private void Tank(PlantNode name, PlantNode value)
    {
        if (MappingReader.Open(value, PlantFileKeys.Tank, findings) is not { } mapping) return;
        names.Effect(mapping.Require("from", "the name of an effect"), findings);
        Quantities.Read(mapping.Take("hold-up"), Dimension.Mass, m => m > 0, "more than 0", findings);
        instruments.Read(mapping.Take("level"), Dimension.Length);
    }

    private void Body(PlantNode name, PlantNode value)
    {
        if (MappingReader.Open(value, PlantFileKeys.Body, findings) is not { } mapping) return;
        Quantities.Read(mapping.Require("area", Units.Allowed(Dimension.Area)), Dimension.Area, a => a > 0, "more than 0", findings);
        var cleaning = new CleaningReader(findings, instruments);
        foreach ((_, PlantNode effect, PlantNode signal) in MappingReader.Named(mapping.Take("serves"), "an effect", findings))
        {
            names.Effect(effect, findings);
            cleaning.Active(signal);
        }
    }

    private void Recompressor(PlantNode name, PlantNode value)
    {
        if (MappingReader.Open(value, PlantFileKeys.Recompressor, findings) is not { } mapping) return;
        bool? thermal = Texts.Choice(mapping.Require("kind", string.Join(", ", Kinds.Keys)), Kinds, findings);
        _routes.VapourAt(mapping.Require("suction", "vapour of an effect"));
        MappingReader? motive = MappingReader.Open(
            thermal == true ? mapping.Require("motive", "flow, pressure and temperature of the motive steam") : mapping.Take("motive"),
            PlantFileKeys.Motive, findings);
        if (motive is not null)
        {
            instruments.Read(motive.Take("flow"), Dimension.MassFlow);
            instruments.Read(motive.Take("pressure"), Dimension.Pressure);
            instruments.Read(motive.Take("temperature"), Dimension.Temperature);
        }

        instruments.Read(
            thermal == false ? mapping.Require("power", "an instrument for the power drawn") : mapping.Take("power"), Dimension.Power);
        Shares.Uncertain(mapping.Take("efficiency"), findings);
        instruments.Read(mapping.Take("spray"), Dimension.MassFlow, Dimension.VolumeFlow);
        if (mapping.Take("curve") is { } curve and not MappingNode) findings.Wrong(curve, "a mapping");
    }
}
