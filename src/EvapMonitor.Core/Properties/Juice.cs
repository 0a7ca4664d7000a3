namespace EvapMonitor.Core.Properties;

/// <summary>
/// Fruit juice, with the constants of apple juice. Elevation: Crapiste and Lozano, "Effect of concentration and pressure on the boiling point rise of
/// apple juice and
/// related sugar solutions", Journal of Food Science 53 (1988) 865 to 868: solids 17 to 72 %, 72 to 700 mbar. The four constants are from memory, hence
/// the wide uncertainty.
/// Heat capacity and density by composition (Choi and Okos 1986), for solids of 97 % carbohydrate, 1 % protein, 2 % ash.
/// </summary>
public sealed class Juice : Liquor
{
    private static readonly FoodSolids Clear = new(Protein: 0.01, Fat: 0, Carbohydrate: 0.97, Fibre: 0, Ash: 0.02);
    // 72 and 700 mbar as boiling points of water
    private static readonly CorrelationRange ElevationRange = new(0.17, 0.72, 39.6, 90);
    private static readonly CorrelationRange Range = new(0, 0.72, 0, 150);

    /// <inheritdoc/>
    /// <remarks>1.360e-2·C^0.749·exp(3.390e-2·C)·P^0.106, C solids in %, P in mbar. Standard uncertainty 0.1 K and 15 %.</remarks>
    public override PropertyValue BoilingPointElevation(double solids, double waterBoilingPoint)
    {
        var x = CorrelationRange.Solids(solids);
        var c = 100 * x;
        var millibar = Steam.SaturationPressure(waterBoilingPoint) / 100;
        var value = 1.360e-2 * double.Pow(c, 0.749) * double.Exp(3.390e-2 * c) * double.Pow(millibar, 0.106);
        return ElevationRange.Answer(value, x == 0 ? 0 : 0.1 + 0.15 * value, x, waterBoilingPoint);
    }

    /// <inheritdoc/>
    /// <remarks>Mass-weighted by composition. Standard uncertainty 2 %.</remarks>
    public override PropertyValue HeatCapacity(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var value = Clear.HeatCapacity(x, temperature - CorrelationRange.IcePoint);
        return Range.Answer(value, 0.02 * value, x, temperature);
    }

    /// <inheritdoc/>
    public override double Enthalpy(double solids, double temperature) =>
        WaterReference.Enthalpy(temperature) + Clear.ContentBesideWater(CorrelationRange.Solids(solids), temperature - CorrelationRange.IcePoint);

    /// <inheritdoc/>
    /// <remarks>Water and components keep their volumes. Standard uncertainty 1 %.</remarks>
    public override PropertyValue Density(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var value = WaterReference.DensityByVolumes(x, temperature, Clear.SolidsDensity(temperature - CorrelationRange.IcePoint));
        return Range.Answer(value, 0.01 * value, x, temperature);
    }
}
