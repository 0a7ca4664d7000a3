namespace EvapMonitor.Core.Properties;

/// <summary>
/// Technical sugar solutions of a given purity. Elevation and heat capacity: Bubník, Kadlec, Urban and Bruhns, Sugar Technologists Manual, 8th edition,
/// Bartens 1995.
/// Range, from memory: solids to 92 %, purity 60 to 100 %, 0 to 130 °C.
/// </summary>
public sealed class Sucrose : Liquor
{
    private const double Branching = 60;
    private const double BlendFrom = 55;
    private readonly Branch _thin, _thick;
    private readonly CorrelationRange _range;

    /// <summary>A sugar solution.</summary>
    /// <param name="purity">Sucrose as a mass fraction of the dissolved solids, above 0 to 1. Below 0.6 every value counts as extrapolated.</param>
    /// <exception cref="ArgumentOutOfRangeException">The purity is not above 0 and at most 1.</exception>
    public Sucrose(double purity = 1)
    {
        if (!(purity > 0 && purity <= 1))
            throw new ArgumentOutOfRangeException(
                nameof(purity), purity, FormattableString.Invariant($"Purity {purity} is not a mass fraction above 0 and at most 1."));
        Purity = purity;
        var q = 100 * purity;
        _thin = new Branch(40,
            1.59515e-4 + q * (-2.00092e-6 + q * 8.01933e-9), 1.84440e-6 + q * (-3.04380e-8 + q * 1.72958e-10), 1.08062e-3 + q * (2.89645e-6 - q * 3.01416e-8));
        _thick = new Branch(60,
            1.67525e-4 + q * (-1.85299e-6 + q * 7.92284e-9), 2.87764e-6 + q * (-2.77263e-8 + q * 1.44306e-10), 1.06668e-3 + q * (2.10304e-6 - q * 4.28274e-8));
        _range = new CorrelationRange(0, purity >= 0.6 ? 0.92 : 0, 0, 130);
    }

    /// <summary>Sucrose as a mass fraction of the dissolved solids.</summary>
    public double Purity { get; }

    /// <inheritdoc/>
    /// <remarks>
    /// A·w²·(273.15 + t)²/(374.3 - t)^0.38·[B(w - k)² + C], w solids in %, t boiling point of water in °C, one set of coefficients below 60 % and one
    /// from there.
    /// The two sets stand 0.085 K apart at 60 % (purity 100 %, 1 atm), a step that would show in every trend that crosses it: between 55 and 60 % they are
    /// blended, so that the published values hold below 55 % and from 60 %.
    /// Standard uncertainty 0.5 K·(solids/0.6)^1.5: the published forms for sugar differ by half a kelvin at 60 %.
    /// </remarks>
    public override PropertyValue BoilingPointElevation(double solids, double waterBoilingPoint)
    {
        var x = CorrelationRange.Solids(solids);
        var w = 100 * x;
        var share = double.Clamp((w - BlendFrom) / (Branching - BlendFrom), 0, 1);
        var weight = share * share * (3 - 2 * share);
        var shape = double.Lerp(_thin.At(w), _thick.At(w), weight);
        var value = shape * waterBoilingPoint * waterBoilingPoint / double.Pow(374.3 - (waterBoilingPoint - CorrelationRange.IcePoint), 0.38);
        return _range.Answer(value, 0.5 * double.Pow(x / 0.6, 1.5), x, waterBoilingPoint);
    }

    /// <inheritdoc/>
    /// <remarks>The elevation differentiated.</remarks>
    public override (double BySolids, double ByTemperature, double StandardBySolids, double StandardByTemperature) ElevationSlopes(double solids, double waterBoilingPoint)
    {
        double x = CorrelationRange.Solids(solids), w = 100 * x, share = double.Clamp((w - BlendFrom) / (Branching - BlendFrom), 0, 1);
        double weight = share * share * (3 - (2 * share)), weightSlope = 6 * share * (1 - share) / (Branching - BlendFrom);
        double thin = _thin.At(w), thick = _thick.At(w), shape = double.Lerp(thin, thick, weight);
        double shapeSlope = double.Lerp(_thin.Slope(w), _thick.Slope(w), weight) + ((thick - thin) * weightSlope);
        double below = 374.3 - (waterBoilingPoint - CorrelationRange.IcePoint), byShape = waterBoilingPoint * waterBoilingPoint / double.Pow(below, 0.38);
        // Beyond the range the standard uncertainty is twice that within.
        double wider = _range.Answer(0, 1, x, waterBoilingPoint).Standard;
        return (100 * shapeSlope * byShape, shape * byShape * ((2 / waterBoilingPoint) + (0.38 / below)), wider * 1.25 * double.Sqrt(x / 0.6), 0);
    }

    /// <inheritdoc/>
    /// <remarks>4.1868 - w(0.0297 - 4.6e-5 q) + 7.5e-5 w t kJ/(kg·K), w solids and q purity in %, t in °C. Standard uncertainty 1.5 % (judged from the
    /// spread between published forms).</remarks>
    public override PropertyValue HeatCapacity(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var value = 4186.8 + x * (LessThanWater + 7.5 * (temperature - CorrelationRange.IcePoint));
        return _range.Answer(value, 0.015 * value, x, temperature);
    }

    /// <inheritdoc/>
    /// <remarks>No heat of dilution: for sugar it is a few kJ/kg of solution at 60 % (from memory), within the uncertainty of the heat capacity.</remarks>
    public override double Enthalpy(double solids, double temperature)
    {
        var t = temperature - CorrelationRange.IcePoint;
        return WaterReference.Enthalpy(temperature) + CorrelationRange.Solids(solids) * t * (LessThanWater + 3.75 * t);
    }

    /// <inheritdoc/>
    public override double EnthalpyBySolids(double solids, double temperature)
    {
        var t = temperature - CorrelationRange.IcePoint;
        return t * (LessThanWater + 3.75 * t);
    }

    /// <inheritdoc/>
    public override double EnthalpyByTemperature(double solids, double temperature) =>
        WaterReference.EnthalpySlope(temperature) + CorrelationRange.Solids(solids) * (LessThanWater + 7.5 * (temperature - CorrelationRange.IcePoint));

    /// <inheritdoc/>
    /// <remarks>Stated rule, no publication: water and solids keep their volumes, solids at 1,600 kg/m³, which meets the sugar tables at 20 °C within 0.5
    /// % (from memory). Standard uncertainty 1 %.</remarks>
    public override PropertyValue Density(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var value = WaterReference.DensityByVolumes(x, temperature, 1600);
        return _range.Answer(value, 0.01 * value, x, temperature);
    }

    // Heat capacity of the solids less that of water at 0 °C, J/(kg·K).
    private double LessThanWater => -1e5 * (0.0297 - 4.6e-3 * Purity);

    private readonly record struct Branch(double Middle, double A, double B, double C)
    {
        public double At(double w) => A * w * w * (B * (w - Middle) * (w - Middle) + C);

        public double Slope(double w) => A * w * ((2 * (B * (w - Middle) * (w - Middle) + C)) + (2 * B * w * (w - Middle)));
    }
}
