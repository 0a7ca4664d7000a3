using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Service.PlantFile;

/// <summary>The liquors of a site. All construction of liquors is here.</summary>
internal static class LiquorReader
{
    private const string Water = "water";
    private const string Custom = "custom";

    // Stand in for the curves that are not being judged.
    private static readonly SolidsPolynomial NoElevation = new([0]);
    private static readonly SolidsPolynomial AnyPositive = new([1]);

    /// <summary>The liquors by name; water is always among them.</summary>
    /// <param name="node">The section; null when absent.</param>
    /// <param name="findings">Where mistakes go.</param>
    /// <param name="names">Every declared name, also of liquors that are wrong, so that one mistake is told once.</param>
    public static Dictionary<string, Liquor> Read(PlantNode? node, Findings findings, out IReadOnlySet<string> names)
    {
        var liquors = new Dictionary<string, Liquor>(StringComparer.Ordinal) { [Water] = Liquors.Create(Water) };
        var declared = new HashSet<string>(StringComparer.Ordinal) { Water };
        foreach ((string name, PlantNode key, PlantNode value) in MappingReader.Named(node, "a liquor's name", findings))
        {
            declared.Add(name);
            if (One(name, key, value, findings) is { } liquor) liquors[name] = liquor;
        }

        names = declared;
        return liquors;
    }

    private static Liquor? One(string name, PlantNode key, PlantNode value, Findings findings)
    {
        if (MappingReader.Open(value, PlantFileKeys.Liquor, findings) is not { } mapping) return null;
        string allowed = string.Join(", ", Liquors.Kinds.Append(Custom));
        if (mapping.Require("kind", allowed) is not { } kindNode) return null;
        string? kind = (kindNode as ScalarNode)?.Text;
        if (kind is null || (kind != Custom && !Liquors.Kinds.Contains(kind)))
        {
            findings.Wrong(kindNode, allowed);
            return null;
        }

        if (name == Water && kind != Water) findings.Wrong(key, "another name: water is always water");
        OnlyOwnKeys(mapping, kind, findings);
        if (kind == Custom) return OfPlant(name, mapping, findings);
        return Liquors.Create(kind, name, kind == "sucrose" ? Purity(mapping.Take("purity"), findings) : null);
    }

    private static void OnlyOwnKeys(MappingReader mapping, string kind, Findings findings)
    {
        string[] own = kind switch
        {
            Custom => ["boiling-point-elevation", "heat-capacity", "density"],
            "sucrose" => ["purity"],
            _ => [],
        };
        foreach (string other in PlantFileKeys.Liquor.Keys.Except([.. own, "kind"]))
        {
            if (mapping.TakeKey(other) is { } stray)
                findings.Wrong(
                    stray, $"{other} for the kind {kind}", own.Length == 0 ? "no further keys for this kind" : string.Join(", ", own));
        }
    }

    private static double? Purity(PlantNode? node, Findings findings) =>
        Quantities.Read(node, Dimension.Fraction, p => p is > 0 and <= 1, "above 0 % to 100 %", findings);

    private static CustomLiquor? OfPlant(string name, MappingReader mapping, Findings findings)
    {
        var curves = new CurveReader(findings);
        PlantNode? elevationNode = mapping.Require("boiling-point-elevation", "{polynomial: […]}, {table: [[0, 0], …]} or {duhring: {…}}");
        PlantNode? heatNode = mapping.Require("heat-capacity", "{polynomial: […]} or {table: …} in J/(kg.K)");
        PlantNode? densityNode = mapping.Take("density");
        (SolidsCurve? elevation, DuhringTable? duhring) = curves.Elevation(elevationNode);
        SolidsCurve? heat = curves.Curve(heatNode);
        SolidsCurve? density = curves.Curve(densityNode);
        if (densityNode is null)
            findings.Note(
                mapping.Node, $"{name} has no density: it is made from the volumes of water and solids, with a standard uncertainty of 5 %");

        bool sound = Sound(
            elevationNode, elevation, "0 K at 0 % solids, nowhere negative, at most 10 K; above that {duhring: …}",
            e => CustomLiquor.Problems(e, AnyPositive), findings)
            & Sound(
                heatNode, heat, "more than 0 J/(kg.K) at all solids given (a polynomial: from 0 to 100 %)",
                h => CustomLiquor.Problems(NoElevation, h), findings)
            & Sound(
                densityNode, density, "more than 0 kg/m3 at all solids given (a polynomial: from 0 to 100 %)",
                d => CustomLiquor.Problems(NoElevation, AnyPositive, d), findings);
        if (!sound || heat is null || (elevation is null && duhring is null)) return null;
        CustomLiquor liquor = duhring is null
            ? CustomLiquor.Create(name, elevation!, heat, density)
            : CustomLiquor.Create(name, duhring, heat, density);
        if (liquor.ElevationRuleExceededAt() is { } from)
            findings.Note(
                elevationNode!,
                Invariant($"above {from * 100:0.#} % solids the elevation of {name} exceeds 10 K and cannot be carried to other pressures; ")
                    + "give {duhring: …} where the line goes beyond");
        return liquor;
    }

    private static bool Sound(
        PlantNode? node, SolidsCurve? curve, string allowed, Func<SolidsCurve, IReadOnlyList<string>> judge, Findings findings)
    {
        if (node is null || curve is null) return true;
        IReadOnlyList<string> problems = judge(curve);
        if (problems.Count > 0) findings.Wrong(node, string.Join("; ", problems.Select(p => p.TrimEnd('.'))), allowed);
        return problems.Count == 0;
    }
}
