namespace EvapMonitor.Core.Properties;

/// <summary>One Dühring line: at these solids, the boiling point of the solution against that of water at the same pressure.</summary>
/// <param name="SolidsPercent">Dissolved solids, above 0 to 100 %.</param>
/// <param name="Points">(boiling point of water °C, boiling point of the solution °C), at least two, that of water rising.</param>
public sealed record DuhringLine(double SolidsPercent, IReadOnlyList<(double WaterCelsius, double SolutionCelsius)> Points);

/// <summary>
/// Measured boiling points at two or more pressures: what a liquor needs whose elevation passes 10 K. Straight along each line (Dühring's rule) and
/// straight in solids
/// between lines; below the first line straight to water, which has no elevation; above the last the last two lines continue.
/// </summary>
public sealed class DuhringTable
{
    private readonly Row[] _rows;
    private readonly double[] _solids;

    /// <summary>A table of Dühring lines.</summary>
    /// <param name="lines">At least one, solids rising.</param>
    /// <exception cref="ArgumentException">A line with fewer than two points, numbers that do not rise, a solution that boils below water.</exception>
    public DuhringTable(IReadOnlyList<DuhringLine> lines)
    {
        ArgumentNullException.ThrowIfNull(lines);
        if (lines.Count == 0)
            throw new ArgumentException("A Dühring table needs at least one line.", nameof(lines));
        for (var k = 0; k < lines.Count; k++)
        {
            var lowest = k == 0 ? 0 : lines[k - 1].SolidsPercent;
            if (!(lines[k].SolidsPercent > lowest && lines[k].SolidsPercent <= 100))
                throw new ArgumentException(
                    FormattableString.Invariant($"Solids of Dühring line {k + 1}, {lines[k].SolidsPercent} %, must lie above {lowest} % and at most at 100 %."), nameof(lines));
            RequirePoints(lines[k]);
        }
        Lines = [.. lines];
        _solids = [0, .. lines.Select(line => line.SolidsPercent)];
        _rows = [.. lines.Select(line => new Row([.. line.Points.Select(p => p.WaterCelsius)], [.. line.Points.Select(p => p.SolutionCelsius - p.WaterCelsius)]))];
    }

    /// <summary>The lines, solids rising.</summary>
    public IReadOnlyList<DuhringLine> Lines { get; }

    /// <summary>Boiling-point elevation, K, never negative, and whether solids or boiling point lie outside the table.</summary>
    /// <param name="solidsPercent">Dissolved solids, %.</param>
    /// <param name="waterCelsius">Boiling point of water at the pressure, °C.</param>
    public (double Elevation, bool Outside) ElevationAt(double solidsPercent, double waterCelsius)
    {
        var k = StraightLines.Line(_solids, solidsPercent);
        var left = k == 0 ? (Elevation: 0, Outside: false) : _rows[k - 1].At(waterCelsius);
        var right = _rows[k].At(waterCelsius);
        var share = (solidsPercent - _solids[k]) / (_solids[k + 1] - _solids[k]);
        var outside = solidsPercent > 0 && (left.Outside || right.Outside || solidsPercent > _solids[^1]);
        return (double.Max(0, left.Elevation + share * (right.Elevation - left.Elevation)), outside);
    }

    private static void RequirePoints(DuhringLine line)
    {
        if (line.Points.Count < 2)
            throw new ArgumentException(
                FormattableString.Invariant($"The Dühring line at {line.SolidsPercent} % solids needs at least two points, that is two pressures, not {line.Points.Count}."), nameof(line));
        for (var k = 0; k < line.Points.Count; k++)
        {
            var (water, solution) = line.Points[k];
            if (!double.IsFinite(water) || !double.IsFinite(solution) || solution < water)
                throw new ArgumentException(
                    FormattableString.Invariant($"Point {k + 1} of the Dühring line at {line.SolidsPercent} % solids, ({water}, {solution}) °C: the solution must boil no lower than water."), nameof(line));
            if (k > 0 && !(water > line.Points[k - 1].WaterCelsius))
                throw new ArgumentException(
                    FormattableString.Invariant($"Boiling points of water on the Dühring line at {line.SolidsPercent} % solids must rise: {water} °C follows {line.Points[k - 1].WaterCelsius} °C."), nameof(line));
        }
    }

    private sealed record Row(double[] Water, double[] Elevation)
    {
        public (double Elevation, bool Outside) At(double water) => (StraightLines.At(Water, Elevation, water), water < Water[0] || water > Water[^1]);
    }
}
