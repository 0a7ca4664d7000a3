using EvapMonitor.Core.Properties;

namespace EvapMonitor.Service.PlantFile;

/// <summary>The liquors of a site. All construction of liquors is here.</summary>
internal static class LiquorReader
{
    public const string Water = "water";
    private const string Custom = "custom";
    private static readonly string[] Kinds = ["water", "sucrose", "sodium-hydroxide", "sea-water", "milk", "juice", "black-liquor"];

    /// <summary>The liquors by name; water is always among them.</summary>
    /// <param name="node">The section; null when absent.</param>
    /// <param name="findings">Where mistakes go.</param>
    /// <param name="names">Every declared name, also of liquors that are wrong, so that one mistake is told once.</param>
    public static Dictionary<string, Liquor> Read(PlantNode? node, Findings findings, out IReadOnlySet<string> names)
    {
        var liquors = new Dictionary<string, Liquor>(StringComparer.Ordinal) { [Water] = Published(Water, Water, null) };
        var declared = new HashSet<string>(StringComparer.Ordinal) { Water };
        foreach ((string name, PlantNode key, PlantNode value) in MappingReader.Named(node, "a liquor's name", findings))
        {
            declared.Add(name);
            if (One(name, key, value, findings) is { } liquor) liquors[name] = liquor;
        }

        names = declared;
        return liquors;
    }

    private static Pending? One(string name, PlantNode key, PlantNode value, Findings findings)
    {
        if (MappingReader.Open(value, PlantFileKeys.Liquor, findings) is not { } mapping) return null;
        string allowed = string.Join(", ", Kinds.Append(Custom));
        PlantNode? kindNode = mapping.Require("kind", allowed);
        if (kindNode is null) return null;
        string? kind = (kindNode as ScalarNode)?.Text;
        if (kind != Custom && !Kinds.Contains(kind))
        {
            findings.Wrong(kindNode, allowed);
            return null;
        }

        if (name == Water && kind != Water) findings.Wrong(key, "another name: water is always water");
        string[] own = kind == Custom ? ["boiling-point-elevation", "heat-capacity", "density"] : kind == "sucrose" ? ["purity"] : [];
        foreach (string other in PlantFileKeys.Liquor.Keys.Except([.. own, "kind"]))
        {
            if (mapping.TakeKey(other) is { } stray)
                findings.Wrong(stray, $"{other} for the kind {kind}", own.Length == 0 ? "no further keys for this kind" : string.Join(", ", own));
        }

        return kind == Custom
            ? OfPlant(name, mapping, findings)
            : Published(kind!, name, own.Contains("purity") ? Purity(mapping.Take("purity"), findings) : null);
    }

    private static double? Purity(PlantNode? node, Findings findings) =>
        Quantities.Read(node, Core.Plant.Dimension.Fraction, p => p is > 0 and <= 1, "above 0 % to 100 %", findings);

    private static Pending? OfPlant(string name, MappingReader mapping, Findings findings)
    {
        var curves = new CurveReader(findings);
        (SolidsCurveText? elevation, DuhringText? duhring) = curves.Elevation(mapping.Require("boiling-point-elevation", "{polynomial: […]}, {table: [[0, 0], …]} or {duhring: {…}}"));
        SolidsCurveText? heatCapacity = curves.Curve(mapping.Require("heat-capacity", "{polynomial: […]} or {table: …} in J/(kg.K)"));
        SolidsCurveText? density = curves.Curve(mapping.Require("density", "{polynomial: […]} or {table: …} in kg/m3"));
        return (elevation is null && duhring is null) || heatCapacity is null || density is null ? null : new Pending { Name = name };
    }

    private static Pending Published(string kind, string name, double? purity) => new Pending { Name = name };

    private sealed class Pending : Liquor
    {
        public override PropertyValue BoilingPointElevation(double solids, double waterBoilingPoint) => default;

        public override PropertyValue HeatCapacity(double solids, double temperature) => default;

        public override double Enthalpy(double solids, double temperature) => 0;

        public override PropertyValue Density(double solids, double temperature) => default;
    }
}
