using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Tests.Published;

/// <summary>Heat capacities, enthalpies and densities that others published.</summary>
public class LiquorEnthalpyTests
{
    /// <summary>Correlation used with Geankoplis, example 8.4-3. The chart is read there as 214 and 505 kJ/kg, which 7.5 kJ/kg covers.</summary>
    [Theory]
    [InlineData(.2, 60, 206.95, 2, 214)]
    [InlineData(.5, 89.5, 508.5, 1, 505)]
    public void EnthalpyOfSodiumHydroxide_MatchesPublishedFigures(double solids, double celsius, double printed, int decimals, double chart)
    {
        var computed = Liquors.Create("sodium-hydroxide").Enthalpy(solids, celsius + 273.15) / 1000;
        Printed.SameDecimals(printed, computed, decimals);
        Assert.InRange(chart, computed - 7.5, computed + 7.5);
    }

    /// <summary>Jamieson et al. 1969 as given by Sharqawy et al. 2010, equation 9: 60 °C, 35 g/kg.</summary>
    [Fact]
    public void HeatCapacityOfSeaWater_MatchesPublishedFigure() =>
        Printed.SameDecimals(4.01436, Liquors.Create("sea-water").HeatCapacity(.035, 333.15).Value / 1000, 5);

    /// <summary>Sharqawy et al. 2010, equation 8, at 25 °C and 35 g/kg: 1023.6 kg/m³; ours stands on the steam tables' water, within the 0.1 % that the publication claims.</summary>
    [Fact]
    public void DensityOfSeaWater_MatchesEquation8() =>
        Assert.InRange(Liquors.Create("sea-water").Density(.035, 298.15).Value, 1023.6 * 0.999, 1023.6 * 1.001);

    /// <summary>Bubník et al. 1995, by hand: purity 90 %, 50 %, 80 °C: 4.1868 - 50·(0.0297 - 0.00414) + 7.5e-5·50·80 = 3.2088 kJ/(kg·K).</summary>
    [Fact]
    public void HeatCapacityOfSugar_MatchesFormulaWorkedByHand() =>
        Printed.SameDecimals(3208.8, Liquors.Create("sucrose", purity: .9).HeatCapacity(.5, 353.15).Value, 1);

    /// <summary>Choi and Okos 1986: whole milk of 12.5 % solids lies near 3.9 kJ/(kg·K) (dairy handbooks, from memory: 3.85 to 3.95).</summary>
    [Fact]
    public void HeatCapacityOfWholeMilk_LiesWhereHandbooksPutIt() =>
        Assert.InRange(Liquors.Create("milk").HeatCapacity(.125, 313.15).Value, 3850, 3950);

    /// <summary>Densities at 20 °C from handbooks, from memory, as plausibility bounds: the stated uncertainty (two standards) must reach them.</summary>
    [Theory]
    [InlineData("sucrose", .2, 1081)]
    [InlineData("sucrose", .4, 1176)]
    [InlineData("sucrose", .6, 1286)]
    [InlineData("sodium-hydroxide", .1, 1109)]
    [InlineData("sodium-hydroxide", .2, 1219)]
    [InlineData("sodium-hydroxide", .3, 1328)]
    [InlineData("sodium-hydroxide", .5, 1525)]
    [InlineData("milk", .125, 1030)]
    public void Densities_ReachHandbookFigures(string kind, double solids, double handbook)
    {
        var answer = Liquors.Create(kind).Density(solids, 293.15);
        Assert.InRange(handbook, answer.Value - 2 * answer.Standard, answer.Value + 2 * answer.Standard);
    }
}
