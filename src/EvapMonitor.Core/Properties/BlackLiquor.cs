namespace EvapMonitor.Core.Properties;

/// <summary>
/// Kraft black liquor. Elevation: a published form of which no first citation was found, hence its uncertainty. Heat capacity and density: stated simple
/// rules.
/// Range, as stated here: solids to 65 % (above it salts fall out and the slope of the elevation changes), 40 to 150 °C.
/// </summary>
public sealed class BlackLiquor : Liquor
{
    private static readonly CorrelationRange Range = new(0, 0.65, 40, 150);

    /// <inheritdoc/>
    /// <remarks>(6.173x - 7.48x^1.5 + 32.747x²)·[1 + 0.6(t - 100)/100] K, t the boiling point of water in °C. Standard uncertainty 0.2 K and 10 %:
    /// liquors of different woods differ by that.</remarks>
    public override PropertyValue BoilingPointElevation(double solids, double waterBoilingPoint)
    {
        var x = CorrelationRange.Solids(solids);
        var t = waterBoilingPoint - CorrelationRange.IcePoint;
        var value = x * (6.173 - 7.48 * double.Sqrt(x) + 32.747 * x) * (1 + 0.6 * (t - 100) / 100);
        return Range.Answer(value, x == 0 ? 0 : 0.2 + 0.1 * value, x, waterBoilingPoint);
    }

    /// <inheritdoc/>
    /// <remarks>
    /// Stated rule: mass-weighted water (steam tables) and solids with 1,675 + 3.31t J/(kg·K), t in °C (from memory of a widely used form, without its
    /// excess term,
    /// the sign of which could not be settled). Standard uncertainty 5 %.
    /// </remarks>
    public override PropertyValue HeatCapacity(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var value = (1 - x) * WaterReference.HeatCapacity(temperature) + x * (1675 + 3.31 * (temperature - CorrelationRange.IcePoint));
        return Range.Answer(value, 0.05 * value, x, temperature);
    }

    /// <inheritdoc/>
    /// <remarks>Heat capacity integrated, water's part being h′ itself; no heat of dilution.</remarks>
    public override double Enthalpy(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var t = temperature - CorrelationRange.IcePoint;
        return (1 - x) * WaterReference.Enthalpy(temperature) + x * t * (1675 + 3.31 / 2 * t);
    }

    /// <inheritdoc/>
    /// <remarks>Stated rule: ρ(water)·(1 + 0.65x), the usual 997 + 649x kg/m³ at 25 °C (from memory) with water's expansion. Standard uncertainty 2
    /// %.</remarks>
    public override PropertyValue Density(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var value = WaterReference.Density(temperature) * (1 + 0.65 * x);
        return Range.Answer(value, 0.02 * value, x, temperature);
    }
}
