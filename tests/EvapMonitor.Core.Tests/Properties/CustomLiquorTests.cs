using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Tests.Properties;

public class CustomLiquorTests
{
    private static readonly SolidsPolynomial Capacity = new([4190, -23.5]);

    [Fact]
    public void TablePastTenKelvin_IsRefusedWithThePlaceAndTheRemedy()
    {
        var table = new SolidsTable([(0, 0), (40, 8), (60, 16)]);
        var error = Assert.Throws<ArgumentException>(() => CustomLiquor.Create("lye", table, Capacity));
        Assert.Contains("45.0 %", error.Message);
        Assert.Contains("Dühring", error.Message);
        Assert.Single(CustomLiquor.Problems(table, Capacity));
    }

    [Fact]
    public void TableUpToTenKelvin_IsTaken()
    {
        var liquor = CustomLiquor.Create("near", new SolidsTable([(0, 0), (50, 10)]), Capacity);
        Assert.Equal(10, liquor.BoilingPointElevation(0.5, 373.15).Value, 1e-9);
        Assert.False(liquor.BoilingPointElevation(0.5, 373.15).Extrapolated);
        Assert.True(liquor.BoilingPointElevation(0.51, 373.15).Extrapolated);
    }

    [Fact]
    public void PolynomialPastTenKelvin_SaysWhereAndFlagsFromThere()
    {
        var liquor = CustomLiquor.Create("steep", new SolidsPolynomial([0, 0, 0.004]), Capacity);
        var exceeded = liquor.ElevationRuleExceededAt();
        Assert.NotNull(exceeded);
        Assert.Equal(0.5, exceeded.Value, 1e-6);
        var below = liquor.BoilingPointElevation(0.499, 350);
        var above = liquor.BoilingPointElevation(0.6, 350);
        Assert.False(below.Extrapolated);
        Assert.True(above.Extrapolated);
        Assert.True(above.Standard > 2 * below.Standard);
    }

    [Fact]
    public void GentlePolynomial_NeverExceedsTheRule() =>
        Assert.Null(CustomLiquor.Create("textbook", new SolidsPolynomial([0, 0.0178, 6.22e-4]), Capacity).ElevationRuleExceededAt());

    [Fact]
    public void DuhringTable_IsStraightInTemperatureAndSolids()
    {
        var table = new DuhringTable([new DuhringLine(20, [(50, 56), (100, 108)]), new DuhringLine(40, [(50, 74), (100, 128)])]);
        var liquor = CustomLiquor.Create("lye", table, Capacity);
        Assert.Equal(7, liquor.BoilingPointElevation(0.2, 75 + 273.15).Value, 1e-9);
        Assert.Equal(18, liquor.BoilingPointElevation(0.3, 100 + 273.15).Value, 1e-9);
        Assert.Equal(4, liquor.BoilingPointElevation(0.1, 100 + 273.15).Value, 1e-9);
        Assert.Null(liquor.ElevationRuleExceededAt());
        Assert.False(liquor.BoilingPointElevation(0.3, 100 + 273.15).Extrapolated);
        Assert.True(liquor.BoilingPointElevation(0.3, 101 + 273.15).Extrapolated);
        Assert.True(liquor.BoilingPointElevation(0.41, 80 + 273.15).Extrapolated);
    }

    [Fact]
    public void EnthalpyOfCustomLiquor_IsHeatCapacityCountedFromZeroCelsius()
    {
        var liquor = CustomLiquor.Create("own", new SolidsPolynomial([0, 0.02]), Capacity);
        Assert.Equal(Steam.SaturatedLiquidEnthalpyAt(353.15) - 23.5 * 50 * 80, liquor.Enthalpy(0.5, 353.15), 1e-6);
    }

    [Fact]
    public void DensityOfCustomLiquor_ExpandsAsWaterDoes()
    {
        var liquor = CustomLiquor.Create("own", new SolidsPolynomial([0, 0.02]), Capacity, new SolidsPolynomial([998, 4]));
        Assert.Equal(1198, liquor.Density(0.5, 293.15).Value, 1e-9);
        Assert.Equal(1198 * Steam.SaturatedLiquidVolumeAt(293.15) / Steam.SaturatedLiquidVolumeAt(363.15), liquor.Density(0.5, 363.15).Value, 1e-9);
    }

    [Fact]
    public void ElevationOfWaterOtherThanZero_IsRefused() =>
        Assert.Contains("0 % solids must be 0 K, not 0.3 K", Assert.Single(CustomLiquor.Problems(new SolidsPolynomial([0.3, 0.02]), Capacity)));

    [Fact]
    public void NegativePoints_AreNamedOneByOne() =>
        Assert.Equal(2, CustomLiquor.Problems(new SolidsTable([(0, 0), (40, -1)]), new SolidsPolynomial([4190, -50])).Count);

    [Theory]
    [InlineData(40, 1, 40, 2)]
    [InlineData(40, 1, 30, 2)]
    [InlineData(-1, 1, 30, 2)]
    [InlineData(40, 1, 101, 2)]
    [InlineData(40, 1, 50, double.NaN)]
    public void TableThatDoesNotRise_IsRefused(double x1, double y1, double x2, double y2) =>
        Assert.Throws<ArgumentException>(() => new SolidsTable([(x1, y1), (x2, y2)]));

    [Fact]
    public void DuhringLineWithOnePressure_IsRefused() =>
        Assert.Contains("at least two points", Assert.Throws<ArgumentException>(() => new DuhringTable([new DuhringLine(20, [(100, 108)])])).Message);

    [Fact]
    public void DuhringLineBelowWater_IsRefused() =>
        Assert.Contains("no lower than water", Assert.Throws<ArgumentException>(() => new DuhringTable([new DuhringLine(20, [(50, 56), (100, 99)])])).Message);

    [Fact]
    public void EqualCurves_AreEqual()
    {
        Assert.Equal(new SolidsPolynomial([0, 1]), new SolidsPolynomial([0, 1]));
        Assert.Equal(new SolidsTable([(0, 1), (5, 2)]), new SolidsTable([(0, 1), (5, 2)]));
        Assert.NotEqual(new SolidsTable([(0, 1), (5, 2)]), new SolidsTable([(0, 1), (5, 3)]));
    }
}
