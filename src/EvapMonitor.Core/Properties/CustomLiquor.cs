namespace EvapMonitor.Core.Properties;

/// <summary>
/// A liquor from the plant's own laboratory data. Elevation is given at atmospheric pressure and carried to other pressures by
/// (T/373.15)²·r(373.15)/r(T), or, from 10 K
/// on necessarily, as a Dühring table. Heat capacity and density are curves over the solids, taken as measured near 20 °C; the density follows water's
/// expansion.
/// </summary>
public sealed partial class CustomLiquor : Liquor
{
    /// <summary>The highest elevation at atmospheric pressure, K, that is carried to other pressures by rule.</summary>
    public const double HighestElevationByRule = 10;

    private const double Room = 293.15;
    private static readonly CorrelationRange Anywhere = new(0, 1, 0, 200);
    private SolidsCurve? _atmospheric;
    private DuhringTable? _duhring;
    private SolidsCurve _heatCapacity = null!;
    private SolidsCurve? _density;
    private double? _exceededAt;

    private CustomLiquor()
    {
    }

    /// <summary>A liquor with its elevation at atmospheric pressure.</summary>
    /// <param name="name">The name in the plant file.</param>
    /// <param name="atmosphericElevation">K over solids in %; a table must stay within 10 K up to its end.</param>
    /// <param name="heatCapacity">J/(kg·K) over solids in %.</param>
    /// <param name="density">kg/m³ at 20 °C over solids in %; null: water and solids keep their volumes, solids at 1,600 kg/m³.</param>
    /// <exception cref="ArgumentException">What <see cref="Problems(SolidsCurve, SolidsCurve, SolidsCurve)"/> finds.</exception>
    public static CustomLiquor Create(string name, SolidsCurve atmosphericElevation, SolidsCurve heatCapacity, SolidsCurve? density = null)
    {
        Require(Problems(atmosphericElevation, heatCapacity, density));
        return new CustomLiquor
        {
            Name = name,
            _atmospheric = atmosphericElevation,
            _heatCapacity = heatCapacity,
            _density = density,
            _exceededAt = ExceededAt(atmosphericElevation),
        };
    }

    /// <summary>A liquor with measured boiling points at several pressures.</summary>
    /// <param name="name">The name in the plant file.</param>
    /// <param name="boilingPoints">Dühring lines.</param>
    /// <param name="heatCapacity">J/(kg·K) over solids in %.</param>
    /// <param name="density">kg/m³ at 20 °C over solids in %; null: water and solids keep their volumes, solids at 1,600 kg/m³.</param>
    /// <exception cref="ArgumentException">Heat capacity or density is not above 0 somewhere on its span.</exception>
    public static CustomLiquor Create(string name, DuhringTable boilingPoints, SolidsCurve heatCapacity, SolidsCurve? density = null)
    {
        ArgumentNullException.ThrowIfNull(boilingPoints);
        Require(ProblemsOfContent(heatCapacity, density));
        return new CustomLiquor { Name = name, _duhring = boilingPoints, _heatCapacity = heatCapacity, _density = density };
    }

    /// <summary>
    /// Solids as a mass fraction at which the elevation at atmospheric pressure passes 10 K and the rule no longer carries it: values above are answered,
    /// but flagged, with
    /// grown uncertainty, and a Dühring table is wanted. Null when it never does (or the liquor has a Dühring table).
    /// </summary>
    public double? ElevationRuleExceededAt() => _exceededAt;

    /// <inheritdoc/>
    /// <remarks>Standard uncertainty 0.1 K and 5 %; above 10 K by rule 30 % of the excess on top.</remarks>
    public override PropertyValue BoilingPointElevation(double solids, double waterBoilingPoint)
    {
        var x = CorrelationRange.Solids(solids);
        if (x == 0)
            return new PropertyValue(0, 0, false);
        if (_duhring is not null)
        {
            var (measured, outside) = _duhring.ElevationAt(100 * x, waterBoilingPoint - CorrelationRange.IcePoint);
            var standard = 0.1 + 0.05 * measured;
            return new PropertyValue(measured, outside ? 2 * standard : standard, outside);
        }
        var atmospheric = Elevation(_atmospheric!, 100 * x);
        var value = atmospheric * WaterReference.ElevationFactor(waterBoilingPoint);
        var excess = double.Max(0, atmospheric - HighestElevationByRule);
        return Given(_atmospheric!, value, 0.1 + 0.05 * value + 0.3 * excess, x, excess > 0, waterBoilingPoint);
    }

    /// <inheritdoc/>
    /// <remarks>Standard uncertainty 2 %.</remarks>
    public override PropertyValue HeatCapacity(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var value = _heatCapacity.At(100 * x);
        return Given(_heatCapacity, value, 0.02 * double.Abs(value), x, false, temperature);
    }

    /// <inheritdoc/>
    public override double Enthalpy(double solids, double temperature) => WaterReference.Enthalpy(temperature)
        + (_heatCapacity.At(100 * CorrelationRange.Solids(solids)) - _heatCapacity.At(0)) * (temperature - CorrelationRange.IcePoint);

    /// <inheritdoc/>
    public override double EnthalpyByTemperature(double solids, double temperature) =>
        WaterReference.EnthalpySlope(temperature) + _heatCapacity.At(100 * CorrelationRange.Solids(solids)) - _heatCapacity.At(0);

    /// <inheritdoc/>
    /// <remarks>Standard uncertainty 1 %; 5 % where no density is given.</remarks>
    public override PropertyValue Density(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        if (_density is null)
        {
            var byVolumes = WaterReference.DensityByVolumes(x, temperature, 1600);
            return Anywhere.Answer(byVolumes, 0.05 * byVolumes, x, temperature);
        }
        var value = _density.At(100 * x) * WaterReference.Density(temperature) / WaterReference.Density(Room);
        return Given(_density, value, 0.01 * double.Abs(value), x, false, temperature);
    }

    private static PropertyValue Given(SolidsCurve curve, double value, double standard, double solids, bool refused, double temperature)
    {
        var range = Anywhere with { LowestSolids = curve.Span.Lowest / 100, HighestSolids = refused ? -1 : curve.Span.Highest / 100 };
        return range.Answer(value, standard, solids, temperature);
    }

    // A table that begins above 0 % is drawn straight from water, which has no elevation.
    private static double Elevation(SolidsCurve curve, double percent)
    {
        var lowest = curve.Span.Lowest;
        return double.Max(0, percent < lowest ? curve.At(lowest) * percent / lowest : curve.At(percent));
    }
}
