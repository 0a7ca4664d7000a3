namespace EvapMonitor.Service.PlantFile;

/// <summary>A property over dissolved solids in %: polynomial coefficients from the constant term up, or points of a table; exactly one is set.</summary>
internal sealed record SolidsCurveText(IReadOnlyList<double>? Coefficients, IReadOnlyList<(double Solids, double Value)>? Points);

/// <summary>Boiling points by solids in %: at each, points (water °C, solution °C).</summary>
internal sealed record DuhringText(IReadOnlyList<(double Solids, IReadOnlyList<(double Water, double Solution)> Points)> Rows);

/// <summary>A plant's own laboratory data for a liquor: polynomials and tables.</summary>
internal sealed class CurveReader(Findings findings)
{
    private const int MostCoefficients = 10;
    private const int MostPoints = 200;
    private const string PolynomialAllowed = "one to ten numbers, the constant first: [a0, a1, …] over solids in %";
    private const string TableAllowed = "at least two points [solids in %, value], solids ascending from 0 to 100";
    private const string PointsAllowed = "at least two points [boiling point of water, boiling point of the solution] in °C, ascending";

    /// <summary>A curve of the keys polynomial and table; null when absent or, which is reported, wrong.</summary>
    public SolidsCurveText? Curve(PlantNode? node) =>
        MappingReader.Open(node, PlantFileKeys.Curve, findings) is { } mapping && One(mapping) ? Curve(mapping) : null;

    /// <summary>As <see cref="Curve(PlantNode?)"/>, with Dühring's table besides.</summary>
    public (SolidsCurveText? Curve, DuhringText? Duhring) Elevation(PlantNode? node)
    {
        if (MappingReader.Open(node, PlantFileKeys.ElevationCurve, findings) is not { } mapping || !One(mapping)) return (null, null);
        return mapping.Take("duhring") is { } duhring ? (null, Duhring(duhring)) : (Curve(mapping), null);
    }

    private bool One(MappingReader mapping)
    {
        if (mapping.Node.Entries.Count == 1) return true;
        findings.Wrong(mapping.Node, Invariant($"a mapping with {mapping.Node.Entries.Count} keys"), "one of polynomial, table" + (mapping.Allows("duhring") ? ", duhring" : ""));
        return false;
    }

    private SolidsCurveText? Curve(MappingReader mapping)
    {
        if (mapping.Take("polynomial") is { } polynomial)
        {
            List<double>? coefficients = Numbers(polynomial);
            if (coefficients is { Count: >= 1 and <= MostCoefficients }) return new(coefficients, null);
            findings.Wrong(polynomial, PolynomialAllowed);
            return null;
        }

        if (mapping.Take("table") is not { } table) return null;
        List<(double Solids, double Value)>? points = Points(table);
        if (points is not null && points[0].Solids >= 0 && points[^1].Solids <= 100) return new(null, points);
        findings.Wrong(table, TableAllowed);
        return null;
    }

    private DuhringText? Duhring(PlantNode node)
    {
        const string Allowed = "a mapping from solids in %, ascending, to points: {40: [[60, 63.1], [100, 104.5]], …}";
        if (node is not MappingNode { Entries.Count: > 0 and <= MostPoints } mapping)
        {
            findings.Wrong(node, Allowed);
            return null;
        }

        var rows = new List<(double, IReadOnlyList<(double, double)>)>();
        double before = double.NegativeInfinity;
        foreach (MappingEntry entry in mapping.Entries)
        {
            if (Texts.Number(entry.Key, "solids in %, from 0 to 100, ascending", s => s is >= 0 and <= 100 && s > before, findings) is not { } solids) continue;
            before = solids;
            if (Points(entry.Value) is { } points) rows.Add((solids, points));
            else findings.Wrong(entry.Value, PointsAllowed);
        }

        return new(rows);
    }

    private static List<(double X, double Y)>? Points(PlantNode node)
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
