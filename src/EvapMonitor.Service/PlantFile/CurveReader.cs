using EvapMonitor.Core.Properties;

namespace EvapMonitor.Service.PlantFile;

/// <summary>A plant's own laboratory data for a liquor: polynomials and tables over dissolved solids in %.</summary>
internal sealed class CurveReader(Findings findings)
{
    private const int MostCoefficients = 10;
    private const int MostPoints = 200;
    private const string PolynomialAllowed = "one to ten numbers, the constant first: [a0, a1, …] over solids in %";
    private const string TableAllowed = "at least two points [solids in %, value], solids ascending from 0 to 100";
    private const string LineAllowed =
        "at least two points [boiling point of water, boiling point of the solution] in °C, ascending, the solution no lower than water";

    /// <summary>A curve of the keys polynomial and table; null when absent or, which is reported, wrong.</summary>
    public SolidsCurve? Curve(PlantNode? node) =>
        MappingReader.Open(node, PlantFileKeys.Curve, findings) is { } mapping && One(mapping) ? Curve(mapping) : null;

    /// <summary>As <see cref="Curve(PlantNode?)"/>, with Dühring's table besides; at most one of the two is set.</summary>
    public (SolidsCurve? Curve, DuhringTable? Duhring) Elevation(PlantNode? node)
    {
        if (MappingReader.Open(node, PlantFileKeys.ElevationCurve, findings) is not { } mapping || !One(mapping)) return (null, null);
        return mapping.Take("duhring") is { } duhring ? (null, Duhring(duhring)) : (Curve(mapping), null);
    }

    private bool One(MappingReader mapping)
    {
        if (mapping.Node.Entries.Count == 1) return true;
        string keys = mapping.Allows("duhring") ? "polynomial, table, duhring" : "polynomial, table";
        findings.Wrong(mapping.Node, Invariant($"a mapping with {mapping.Node.Entries.Count} keys"), "one of " + keys);
        return false;
    }

    private SolidsCurve? Curve(MappingReader mapping)
    {
        if (mapping.Take("polynomial") is { } polynomial)
        {
            if (Numbers(polynomial) is { Count: >= 1 and <= MostCoefficients } coefficients) return new SolidsPolynomial(coefficients);
            findings.Wrong(polynomial, PolynomialAllowed);
            return null;
        }

        if (mapping.Take("table") is not { } table) return null;
        if (Points(table) is { } points && points[0].X >= 0 && points[^1].X <= 100) return new SolidsTable(points);
        findings.Wrong(table, TableAllowed);
        return null;
    }

    private DuhringTable? Duhring(PlantNode node)
    {
        if (node is not MappingNode { Entries.Count: > 0 and <= MostPoints } mapping)
        {
            findings.Wrong(node, "a mapping from solids in %, ascending, to points: {40: [[60, 63.1], [100, 104.5]], …}");
            return null;
        }

        var lines = new List<DuhringLine>();
        double before = 0;
        foreach (MappingEntry entry in mapping.Entries)
        {
            if (Texts.Number(entry.Key, "solids in %, above 0 to 100, ascending", s => s > before && s <= 100, findings) is not { } solids)
                continue;
            before = solids;
            if (Points(entry.Value) is { } points && points.TrueForAll(p => p.Y >= p.X)) lines.Add(new(solids, points));
            else findings.Wrong(entry.Value, LineAllowed);
        }

        return lines.Count == mapping.Entries.Count ? new(lines) : null;
    }

    /// <summary>Points [x, y] with ascending x; null when they are none.</summary>
    internal static List<(double X, double Y)>? Points(PlantNode node)
    {
        if (node is not ListNode { Items: { Count: >= 2 and <= MostPoints } items }) return null;
        var points = new List<(double X, double Y)>();
        foreach (PlantNode item in items)
        {
            if (Numbers(item) is not [var x, var y] || (points.Count > 0 && x <= points[^1].X)) return null;
            points.Add((x, y));
        }

        return points;
    }

    private static List<double>? Numbers(PlantNode node)
    {
        if (node is not ListNode { Items: { Count: <= MostPoints } items }) return null;
        var numbers = new List<double>();
        foreach (PlantNode item in items)
        {
            if (item is not ScalarNode scalar || !Texts.TryNumber(scalar.Text, out double number)) return null;
            numbers.Add(number);
        }

        return numbers;
    }
}
