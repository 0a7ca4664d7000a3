using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Tests.Properties;

public class LiquorTests
{
    private static readonly DuhringTable Lye = new(
    [
        new DuhringLine(20, [(50, 56), (100, 108.3)]),
        new DuhringLine(50, [(50, 90), (100, 143.4)]),
    ]);

    private static IEnumerable<Liquor> All() =>
    [
        .. Liquors.Kinds.Select(kind => Liquors.Create(kind)),
        Liquors.Create("sucrose", "raw", 0.7),
        CustomLiquor.Create("polynomial", new SolidsPolynomial([0, 0.0178, 6.22e-4]), new SolidsPolynomial([4190, -23.5]), new SolidsPolynomial([998, 3.9, 0.013])),
        CustomLiquor.Create("table", new SolidsTable([(10, 0.4), (40, 1.2), (65, 4)]), new SolidsTable([(0, 4180), (65, 2700)])),
        CustomLiquor.Create("measured", Lye, new SolidsPolynomial([4190, -23.5])),
    ];

    private static IEnumerable<(double Solids, double Temperature)> RandomStates(int count)
    {
        var random = new Random(1987);
        for (var k = 0; k < count; k++)
            yield return (random.NextDouble(), 273.15 + 200 * random.NextDouble());
        foreach (var solids in (double[])[0, 1e-12, 0.55, 0.6, 1])
        {
            yield return (solids, 273.15);
            yield return (solids, 473.15);
        }
    }

    [Fact]
    public void AnyState_IsAnsweredWithFiniteValuesAndUncertainties()
    {
        foreach (var liquor in All())
        {
            foreach (var (solids, temperature) in RandomStates(2000))
            {
                foreach (var answer in (PropertyValue[])[liquor.BoilingPointElevation(solids, temperature), liquor.HeatCapacity(solids, temperature), liquor.Density(solids, temperature)])
                {
                    Assert.True(double.IsFinite(answer.Value) && answer.Value >= 0, $"{liquor.Name} at {solids}, {temperature} K: {answer}");
                    Assert.True(double.IsFinite(answer.Standard) && answer.Standard >= 0, $"{liquor.Name} at {solids}, {temperature} K: {answer}");
                }
                Assert.True(liquor.HeatCapacity(solids, temperature).Value > 500, $"{liquor.Name} at {solids}, {temperature} K");
                Assert.True(liquor.Density(solids, temperature).Value > 500, $"{liquor.Name} at {solids}, {temperature} K");
                Assert.True(double.IsFinite(liquor.Enthalpy(solids, temperature)), $"{liquor.Name} at {solids}, {temperature} K");
            }
        }
    }

    [Fact]
    public void NoSolids_AreTheSteamTablesExactly()
    {
        foreach (var liquor in All())
        {
            foreach (var (_, temperature) in RandomStates(200))
            {
                Assert.Equal(Steam.SaturatedLiquidEnthalpyAt(temperature), liquor.Enthalpy(0, temperature));
                Assert.Equal(0, liquor.BoilingPointElevation(0, temperature).Value);
                Assert.Equal(0, liquor.BoilingPointElevation(0, temperature).Standard);
            }
        }
    }

    [Fact]
    public void MoreSolids_BoilHigher()
    {
        foreach (var liquor in All().Where(liquor => liquor is not Water))
        {
            foreach (var (solids, temperature) in RandomStates(2000))
            {
                var thin = liquor.BoilingPointElevation(0.99 * solids, temperature).Value;
                var thick = liquor.BoilingPointElevation(solids, temperature).Value;
                // the fitted Dühring lines are cut off at zero for traces of lye in cold water
                Assert.True(thick > thin || (thick == 0 && (solids < 0.02)) || solids < 1e-9, $"{liquor.Name} at {solids}, {temperature} K: {thin}, {thick}");
            }
        }
    }

    [Fact]
    public void HeatCapacity_IsTheSlopeOfEnthalpy()
    {
        // Correlations bring their own water, enthalpy stands on the steam tables' (along the saturation line, which rises with temperature): up to 3 % apart at 127 °C.
        foreach (var liquor in All())
        {
            foreach (var (solids, temperature) in RandomStates(500).Where(state => state.Temperature is > 280 and < 400 && state.Solids < 0.7))
            {
                var slope = (liquor.Enthalpy(solids, temperature + 0.5) - liquor.Enthalpy(solids, temperature - 0.5)) / 1;
                var published = liquor.HeatCapacity(solids, temperature).Value;
                Assert.True(Math.Abs(slope - published) < 0.04 * published, $"{liquor.Name} at {solids}, {temperature} K: slope {slope}, published {published}");
            }
        }
    }

    [Fact]
    public void SolidsBelowNothing_AreNoSolids()
    {
        foreach (var liquor in All())
            Assert.Equal(liquor.Enthalpy(0, 350), liquor.Enthalpy(-0.001, 350));
    }

    [Theory]
    [InlineData("sucrose", .5, 373.15, false)]
    [InlineData("sucrose", .95, 373.15, true)]
    [InlineData("sodium-hydroxide", .6, 373.15, true)]
    [InlineData("sea-water", .12, 373.15, false)]
    [InlineData("sea-water", .13, 373.15, true)]
    [InlineData("milk", .1, 343.15, true)]
    [InlineData("milk", .4, 343.15, false)]
    [InlineData("juice", .5, 333.15, false)]
    [InlineData("juice", .5, 373.15, true)]
    [InlineData("black-liquor", .7, 373.15, true)]
    public void StateOutsideThePublishedRange_IsFlaggedWithGrownUncertainty(string kind, double solids, double temperature, bool extrapolated)
    {
        var answer = Liquors.Create(kind).BoilingPointElevation(solids, temperature);
        Assert.Equal(extrapolated, answer.Extrapolated);
    }

    [Fact]
    public void SugarAcrossSixtyPercent_HasNoStep()
    {
        var sugar = Liquors.Create("sucrose");
        for (var w = 50.0; w < 65; w += 0.01)
        {
            var step = sugar.BoilingPointElevation((w + 0.01) / 100, 373.15).Value - sugar.BoilingPointElevation(w / 100, 373.15).Value;
            Assert.InRange(step, 0, 0.0025);
        }
    }

    [Fact]
    public void SodiumHydroxideAcrossTenPercent_HasNoStepInEnthalpy()
    {
        var lye = Liquors.Create("sodium-hydroxide");
        Assert.Equal(lye.Enthalpy(0.1 - 1e-9, 350), lye.Enthalpy(0.1 + 1e-9, 350), 0.1);
    }

    [Fact]
    public void KindsAreCreated_WithTheNameAsked()
    {
        foreach (var kind in Liquors.Kinds)
        {
            Assert.Equal(kind, Liquors.Create(kind).Name);
            Assert.Equal("north", Liquors.Create(kind, "north").Name);
        }
    }

    [Fact]
    public void UnknownKind_IsRefusedWithTheKnownOnes()
    {
        var error = Assert.Throws<ArgumentException>(() => Liquors.Create("brine"));
        Assert.Contains("brine", error.Message);
        Assert.Contains("black-liquor", error.Message);
    }

    [Theory]
    [InlineData("sucrose", 0.0)]
    [InlineData("sucrose", 91.0)]
    [InlineData("sucrose", double.NaN)]
    [InlineData("milk", 0.9)]
    public void PurityThatMakesNoSense_IsRefused(string kind, double purity) =>
        Assert.ThrowsAny<ArgumentException>(() => Liquors.Create(kind, null, purity));
}
