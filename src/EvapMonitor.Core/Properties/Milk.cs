namespace EvapMonitor.Core.Properties;

/// <summary>
/// Whole milk. Elevation from the table in Hui, Encyclopedia of Food Science and Technology; heat capacity and density by composition (Choi and Okos
/// 1986), for solids
/// of 27 % protein, 29 % fat, 38 % carbohydrate, 6 % ash. Range: solids 16 to 73 % for the elevation; to 60 % and 150 °C otherwise.
/// </summary>
public sealed class Milk : Liquor
{
    private static readonly FoodSolids WholeMilk = new(Protein: 0.27, Fat: 0.29, Carbohydrate: 0.38, Fibre: 0, Ash: 0.06);
    private static readonly SolidsTable Elevation = new([(0, 0), (16, 0.5), (27.5, 1), (39, 1.5), (49, 2), (62, 3), (69, 4), (73, 5)]);
    private static readonly CorrelationRange ElevationRange = new(0.16, 0.73, 40, 110);
    private static readonly CorrelationRange Range = new(0, 0.73, 0, 150);

    /// <inheritdoc/>
    /// <remarks>
    /// Straight between the points of the table, which is taken as at atmospheric pressure, and carried to other pressures as for any small elevation:
    /// times (T/373.15)²·r(373.15)/r(T). Standard uncertainty 0.15 K (the table is rounded to half a kelvin) and 5 %.
    /// </remarks>
    public override PropertyValue BoilingPointElevation(double solids, double waterBoilingPoint)
    {
        var x = CorrelationRange.Solids(solids);
        var value = Elevation.At(100 * x) * WaterReference.ElevationFactor(waterBoilingPoint);
        return ElevationRange.Answer(value, x == 0 ? 0 : 0.15 + 0.05 * value, x, waterBoilingPoint);
    }

    /// <inheritdoc/>
    /// <remarks>Mass-weighted by composition. Standard uncertainty 2 %.</remarks>
    public override PropertyValue HeatCapacity(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var value = WholeMilk.HeatCapacity(x, temperature - CorrelationRange.IcePoint);
        return Range.Answer(value, 0.02 * value, x, temperature);
    }

    /// <inheritdoc/>
    public override double Enthalpy(double solids, double temperature) =>
        WaterReference.Enthalpy(temperature) + WholeMilk.ContentBesideWater(CorrelationRange.Solids(solids), temperature - CorrelationRange.IcePoint);

    /// <inheritdoc/>
    /// <remarks>Water and components keep their volumes. Standard uncertainty 1.5 %.</remarks>
    public override PropertyValue Density(double solids, double temperature)
    {
        var x = CorrelationRange.Solids(solids);
        var value = WaterReference.DensityByVolumes(x, temperature, WholeMilk.SolidsDensity(temperature - CorrelationRange.IcePoint));
        return Range.Answer(value, 0.015 * value, x, temperature);
    }
}
