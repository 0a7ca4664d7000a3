namespace EvapMonitor.Core.Properties;

/// <summary>A property of a plant's own liquor as a function of its solids in per cent, as laboratories write it.</summary>
public abstract record SolidsCurve
{
    /// <summary>The value at these solids.</summary>
    /// <param name="solidsPercent">Dissolved solids, %.</param>
    public abstract double At(double solidsPercent);

    /// <summary>The solids, %, between which the curve was given; a polynomial is given from 0 to 100 %.</summary>
    public abstract (double Lowest, double Highest) Span { get; }
}

/// <summary>c0 + c1·w + c2·w² + …, w solids in %.</summary>
public sealed record SolidsPolynomial : SolidsCurve
{
    /// <summary>A polynomial.</summary>
    /// <param name="coefficients">From the constant upward; at least one, all finite.</param>
    /// <exception cref="ArgumentException">No coefficient, or one that is not a finite number.</exception>
    public SolidsPolynomial(IReadOnlyList<double> coefficients)
    {
        ArgumentNullException.ThrowIfNull(coefficients);
        if (coefficients.Count == 0)
            throw new ArgumentException("A polynomial needs at least one coefficient, from the constant upward.", nameof(coefficients));
        for (var k = 0; k < coefficients.Count; k++)
        {
            if (!double.IsFinite(coefficients[k]))
                throw new ArgumentException(
                    FormattableString.Invariant($"Coefficient {k} of the polynomial, {coefficients[k]}, is not a finite number."), nameof(coefficients));
        }
        Coefficients = [.. coefficients];
    }

    /// <summary>The coefficients, from the constant upward.</summary>
    public IReadOnlyList<double> Coefficients { get; }

    /// <inheritdoc/>
    public override (double Lowest, double Highest) Span => (0, 100);

    /// <inheritdoc/>
    public override double At(double solidsPercent)
    {
        var value = 0.0;
        for (var k = Coefficients.Count - 1; k >= 0; k--)
            value = value * solidsPercent + Coefficients[k];
        return value;
    }

    /// <summary>Equal when the coefficients are.</summary>
    public bool Equals(SolidsPolynomial? other) => other is not null && Coefficients.SequenceEqual(other.Coefficients);

    /// <inheritdoc/>
    public override int GetHashCode() => Coefficients.Aggregate(17, HashCode.Combine);
}

/// <summary>Points of (solids %, value), straight between them and continued straight beyond the first and the last two.</summary>
public sealed record SolidsTable : SolidsCurve
{
    private readonly double[] _solids, _values;

    /// <summary>A table.</summary>
    /// <param name="points">At least two, solids rising from at least 0 to at most 100 %, values finite.</param>
    /// <exception cref="ArgumentException">Too few points, solids that do not rise, or a number out of bounds.</exception>
    public SolidsTable(IReadOnlyList<(double SolidsPercent, double Value)> points)
    {
        ArgumentNullException.ThrowIfNull(points);
        if (points.Count < 2)
            throw new ArgumentException($"A table needs at least two points of (solids %, value), not {points.Count}.", nameof(points));
        for (var k = 0; k < points.Count; k++)
        {
            var (solids, value) = points[k];
            if (!(solids >= 0 && solids <= 100) || !double.IsFinite(value))
                throw new ArgumentException(
                    FormattableString.Invariant($"Point {k + 1} of the table, ({solids}, {value}), needs solids from 0 to 100 % and a finite value."), nameof(points));
            if (k > 0 && !(solids > points[k - 1].SolidsPercent))
                throw new ArgumentException(
                    FormattableString.Invariant($"Solids of the table must rise: {solids} % follows {points[k - 1].SolidsPercent} %."), nameof(points));
        }
        Points = [.. points];
        _solids = [.. points.Select(point => point.SolidsPercent)];
        _values = [.. points.Select(point => point.Value)];
    }

    /// <summary>The points, solids rising.</summary>
    public IReadOnlyList<(double SolidsPercent, double Value)> Points { get; }

    /// <inheritdoc/>
    public override (double Lowest, double Highest) Span => (_solids[0], _solids[^1]);

    /// <inheritdoc/>
    public override double At(double solidsPercent) => StraightLines.At(_solids, _values, solidsPercent);

    /// <summary>Equal when the points are.</summary>
    public bool Equals(SolidsTable? other) => other is not null && Points.SequenceEqual(other.Points);

    /// <inheritdoc/>
    public override int GetHashCode() => Points.Aggregate(17, (hash, point) => HashCode.Combine(hash, point));
}
