namespace EvapMonitor.Core.Plant;

/// <summary>How a recompressor raises the pressure of vapour.</summary>
public enum RecompressorKind
{
    /// <summary>A jet of motive steam draws the vapour along.</summary>
    Thermal,
    /// <summary>A fan, blower or compressor.</summary>
    Mechanical,
}

/// <summary>A machine that draws vapour of an effect and delivers it to chests at a higher pressure.</summary>
public sealed record Recompressor
{
    /// <summary>The name, by which effects are heated: letters, digits, underscore, hyphen; unique in its line.</summary>
    public required string Name { get; init; }

    /// <summary>How it raises the pressure.</summary>
    public required RecompressorKind Kind { get; init; }

    /// <summary>Name of the effect whose vapour it draws: a share of that vapour, the rest goes on.</summary>
    public required string Suction { get; init; }

    /// <summary>Instruments on the motive steam of a thermal recompressor.</summary>
    public MotiveSteam Motive { get; init; } = new(null, null, null);

    /// <summary>Power drawn by a mechanical recompressor, W.</summary>
    public Instrument? Power { get; init; }

    /// <summary>Share of that power which reaches the vapour: motor, gear and bearings lose the rest. Default 95 % ± 3 % (half-width).</summary>
    public UncertainShare Efficiency { get; init; } = new(0.95, 0.03 / double.Sqrt(3));

    /// <summary>Water sprayed into the vapour to take its superheat away; null: none is sprayed.</summary>
    public Instrument? Spray { get; init; }

    /// <summary>What the machine can do; null when not given, in which case the line cannot be rated.</summary>
    public MachineCurve? Curve { get; init; }
}

/// <summary>Instruments on motive steam, before its nozzle.</summary>
/// <param name="Flow">Flow, kg/s.</param>
/// <param name="Pressure">Pressure, Pa.</param>
/// <param name="Temperature">Temperature, K; without it, the steam is taken as saturated.</param>
public sealed record MotiveSteam(Instrument? Flow, Instrument? Pressure, Instrument? Temperature);

/// <summary>
/// What a recompressor can do: points joined by straight lines, and drawn straight on beyond the ends, which a rating reports.
/// Thermal: vapour drawn per motive steam (kg/kg) over discharge by suction pressure. Mechanical: discharge by suction pressure over the volume drawn (m³/s).
/// </summary>
public sealed class MachineCurve
{
    /// <summary>A curve.</summary>
    /// <param name="points">At least two, ascending.</param>
    /// <param name="isentropicEfficiency">Mechanical: isentropic work by work that reaches the vapour, above 0 to 1; thermal: 1.</param>
    /// <exception cref="ArgumentException">Fewer than two points, not ascending, not finite, or an efficiency out of range.</exception>
    public MachineCurve(IReadOnlyList<(double X, double Y)> points, double isentropicEfficiency = 1)
    {
        ArgumentNullException.ThrowIfNull(points);
        if (points.Count < 2) throw new ArgumentException("A machine curve has at least two points.", nameof(points));
        for (int i = 0; i < points.Count; i++)
        {
            if (!double.IsFinite(points[i].X) || !double.IsFinite(points[i].Y) || (i > 0 && points[i].X <= points[i - 1].X))
                throw new ArgumentException("The points of a machine curve are finite numbers and ascend.", nameof(points));
        }

        if (isentropicEfficiency is not (> 0 and <= 1))
            throw new ArgumentException("An isentropic efficiency is above 0 and at most 1.", nameof(isentropicEfficiency));
        Points = points;
        IsentropicEfficiency = isentropicEfficiency;
    }

    /// <summary>The points, ascending.</summary>
    public IReadOnlyList<(double X, double Y)> Points { get; }

    /// <summary>Isentropic work by work that reaches the vapour, above 0 to 1.</summary>
    public double IsentropicEfficiency { get; }

    /// <summary>True within the points given.</summary>
    public bool Covers(double x) => x >= Points[0].X && x <= Points[^1].X;

    /// <summary>The curve's value and slope.</summary>
    public (double Value, double Slope) At(double x)
    {
        int i = 1;
        while (i < Points.Count - 1 && x > Points[i].X) i++;
        double slope = (Points[i].Y - Points[i - 1].Y) / (Points[i].X - Points[i - 1].X);
        return (Points[i - 1].Y + (slope * (x - Points[i - 1].X)), slope);
    }
}
