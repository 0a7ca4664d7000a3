namespace EvapMonitor.Core.Properties;

/// <summary>
/// Sodium hydroxide in water: Dühring lines and enthalpy fitted to the charts of the handbooks, as used with Geankoplis, Transport Processes and Unit
/// Operations, example 8.4-3.
/// Range, from memory: elevation to 50 % and 15 to 120 °C; enthalpy 10 to 50 % and 15 to 150 °C.
/// </summary>
public sealed class SodiumHydroxide : Liquor
{
    // Below this the enthalpy correlation leaves water's: it is not exact at no solids.
    private const double LowestOfEnthalpy = 0.1;
    private static readonly CorrelationRange ElevationRange = new(0, 0.5, 15, 120);
    private static readonly CorrelationRange Range = new(0, 0.5, 15, 150);

    /// <inheritdoc/>
    /// <remarks>
    /// 271.3627x² - 9.419608x + 0.1419526·x·T in °F, T the boiling point of water in °F. Below 19 °C the form dips under zero by 0.01 K for traces of
    /// solids: cut off there.
    /// Standard uncertainty 0.1 K and 2 % (at 50 % and 48.9 °C it gives 39.8 K where the chart is read as 40.6 K).
    /// </remarks>
    public override PropertyValue BoilingPointElevation(double solids, double waterBoilingPoint)
    {
        var x = CorrelationRange.Solids(solids);
        var value = double.Max(0, x * (271.3627 * x - 9.419608 + 0.1419526 * Fahrenheit(waterBoilingPoint)) / 1.8);
        return ElevationRange.Answer(value, x == 0 ? 0 : 0.1 + 0.02 * value, x, waterBoilingPoint);
    }

    /// <inheritdoc/>
    /// <remarks>The slope of <see cref="Enthalpy"/>. Standard uncertainty 2 %.</remarks>
    public override PropertyValue HeatCapacity(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var value = Blend(x, WaterReference.HeatCapacity(temperature), 2326 * 1.8 * (0.963929 - 0.335714 * double.Max(x, LowestOfEnthalpy)));
        return Range.Answer(value, 0.02 * value, x, temperature);
    }

    /// <inheritdoc/>
    /// <remarks>
    /// From 10 %: 2.326(-10.25 - 319.591837x + 939.795918x² + 0.963929T - 0.335714xT) kJ/kg, T in °F, heat of dilution included; the chart's datum is
    /// liquid water at 0 °C.
    /// Below 10 %: straight between water and the correlation at 10 %, since the correlation misses water by up to 45 kJ/kg at no solids.
    /// Standard uncertainty about 7 kJ/kg (20 %, 60 °C: 206.95 where the chart is read as 214).
    /// </remarks>
    public override double Enthalpy(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var c = double.Max(x, LowestOfEnthalpy);
        var published = 2326 * (-10.25 - 319.591837 * c + 939.795918 * c * c + (0.963929 - 0.335714 * c) * Fahrenheit(temperature));
        return Blend(x, WaterReference.Enthalpy(temperature), published);
    }

    /// <inheritdoc/>
    /// <remarks>Stated rule, no publication: ρ(water)·(1 + 1.12x - 0.12x²), set to handbook values at 20 °C (from memory: 20 % 1,219, 50 % 1,525 kg/m³).
    /// Standard uncertainty 1.5 %.</remarks>
    public override PropertyValue Density(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var value = WaterReference.Density(temperature) * (1 + x * (1.12 - 0.12 * x));
        return Range.Answer(value, 0.015 * value, x, temperature);
    }

    private static double Blend(double solids, double water, double published) =>
        solids >= LowestOfEnthalpy ? published : double.Lerp(water, published, solids / LowestOfEnthalpy);

    private static double Fahrenheit(double temperature) => 1.8 * (temperature - CorrelationRange.IcePoint) + 32;
}
