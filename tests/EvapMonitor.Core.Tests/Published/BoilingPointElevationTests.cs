using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Tests.Published;

/// <summary>Boiling-point elevations that others published, or that follow from their formulas, to the digits given.</summary>
public class BoilingPointElevationTests
{
    // "1 atm" of the sources is water boiling at 100 °C; by IF97 it boils at 99.97 °C there, which is 0.001 K of elevation.
    private const double HundredCelsius = 373.15;

    private static double Elevation(string kind, double solids, double waterBoilingPoint, double? purity = null) =>
        Liquors.Create(kind, purity: purity).BoilingPointElevation(solids, waterBoilingPoint).Value;

    /// <summary>Bubník, Kadlec, Urban, Bruhns, Sugar Technologists Manual, 1995, purity 100 %, 1 atm; recomputed from the formula by another hand.</summary>
    [Theory]
    [InlineData(.2, .335)]
    [InlineData(.4, 1.117)]
    [InlineData(.5, 1.832)]
    [InlineData(.6, 3.096)]
    [InlineData(.7, 4.983)]
    [InlineData(.8, 9.521)]
    public void SugarOfPurityHundred_MatchesManual(double solids, double printed) =>
        Printed.SameDecimals(printed, Elevation("sucrose", solids, HundredCelsius, 1), 3);

    /// <summary>The same source, purity 80 %, 1 atm.</summary>
    [Theory]
    [InlineData(.6, 3.992)]
    [InlineData(.7, 6.329)]
    public void SugarOfPurityEighty_MatchesManual(double solids, double printed) =>
        Printed.SameDecimals(printed, Elevation("sucrose", solids, HundredCelsius, 0.8), 3);

    /// <summary>The same source, purity 100 %, water boiling at 60 °C.</summary>
    [Fact]
    public void SugarUnderVacuum_MatchesManual() => Printed.SameDecimals(2.344, Elevation("sucrose", .6, 333.15, 1), 3);

    /// <summary>Kadlec, Bretschneider, Dandar, La Sucrerie Belge 97, 1978 (pure sucrose, 1 atm), and Claassen's handbook (from memory): other forms for the same liquor lie within two standard uncertainties of ours.</summary>
    [Theory]
    [InlineData(.2, .457)]
    [InlineData(.4, 1.302)]
    [InlineData(.5, 2.037)]
    [InlineData(.6, 3.206)]
    [InlineData(.7, 5.250)]
    [InlineData(.8, 9.350)]
    [InlineData(.4, 1.1)]
    [InlineData(.6, 3.0)]
    [InlineData(.8, 9.4)]
    public void OtherFormsForSucrose_LieWithinTheStatedUncertainty(double solids, double other)
    {
        var ours = Liquors.Create("sucrose").BoilingPointElevation(solids, HundredCelsius);
        Assert.InRange(other, ours.Value - 2 * ours.Standard, ours.Value + 2 * ours.Standard);
    }

    /// <summary>Geankoplis, Transport Processes and Unit Operations, example 8.5-1: 1.78x + 6.22x² K; .35, .63 (from memory, recomputed) and 2.45 K at the solids of its three effects.</summary>
    [Theory]
    [InlineData(.133, .35)]
    [InlineData(.205, .63)]
    [InlineData(.5, 2.45)]
    public void TextbookSugarAsCustomPolynomial_MatchesExample(double solids, double printed)
    {
        var textbook = CustomLiquor.Create("textbook", new SolidsPolynomial([0, 0.0178, 6.22e-4]), new SolidsPolynomial([4190, -23.5]));
        var answer = textbook.BoilingPointElevation(solids, HundredCelsius);
        // 2.445 is printed as 2.45, .626 as .63: half a unit of the last digit
        Assert.InRange(answer.Value, printed - 0.0051, printed + 0.0051);
        Assert.False(answer.Extrapolated);
        Assert.Equal(4190 - 2350 * solids, textbook.HeatCapacity(solids, 330).Value, 1e-9);
    }

    /// <summary>Sharqawy, Lienhard, Zubair, Desalination and Water Treatment 16, 2010, equation 36.</summary>
    [Theory]
    [InlineData(60, .035, .40029)]
    [InlineData(100, .07, 1.13925)]
    public void SeaWater_MatchesEquation36(double celsius, double salinity, double printed) =>
        Printed.SameDecimals(printed, Elevation("sea-water", salinity, celsius + 273.15), 5);

    /// <summary>Fitted Dühring lines as used for Geankoplis, example 8.4-3.</summary>
    [Theory]
    [InlineData(.1, 2.66)]
    [InlineData(.2, 8.33)]
    [InlineData(.3, 17.01)]
    [InlineData(.4, 28.72)]
    [InlineData(.5, 43.43)]
    public void SodiumHydroxideAtHundredCelsius_MatchesDuhringLines(double solids, double printed) =>
        Printed.SameDecimals(printed, Elevation("sodium-hydroxide", solids, HundredCelsius), 2);

    /// <summary>The same, water boiling at 48.9 °C; Geankoplis reads 40.6 K from the chart, which the stated uncertainty must cover.</summary>
    [Fact]
    public void SodiumHydroxideUnderVacuum_MatchesDuhringLinesAndCoversTheChart()
    {
        var answer = Liquors.Create("sodium-hydroxide").BoilingPointElevation(.5, 48.9 + 273.15);
        Printed.SameDecimals(39.81, answer.Value, 2);
        Assert.InRange(40.6, answer.Value - 2 * answer.Standard, answer.Value + 2 * answer.Standard);
    }

    /// <summary>Kraft black liquor, published coefficients without a first citation, water boiling at 100 °C.</summary>
    [Theory]
    [InlineData(.2, 1.875)]
    [InlineData(.4, 5.816)]
    [InlineData(.6, 12.016)]
    public void BlackLiquor_MatchesPublishedForm(double solids, double printed) =>
        Printed.SameDecimals(printed, Elevation("black-liquor", solids, HundredCelsius), 3);

    /// <summary>Hui, Encyclopedia of Food Science and Technology: milk at atmospheric pressure.</summary>
    [Theory]
    [InlineData(.16, .5)]
    [InlineData(.275, 1)]
    [InlineData(.39, 1.5)]
    [InlineData(.49, 2)]
    [InlineData(.62, 3)]
    [InlineData(.69, 4)]
    [InlineData(.73, 5)]
    public void Milk_MatchesTable(double solids, double printed) =>
        Assert.Equal(printed, Elevation("milk", solids, HundredCelsius), 1e-9);

    /// <summary>Crapiste and Lozano, J. Food Sci. 53, 1988, constants from memory: the formula worked by hand at 50 % and 200 mbar.</summary>
    [Fact]
    public void Juice_MatchesFormulaWorkedByHand()
    {
        // 1.360e-2 · 50^0.749 · e^1.695 · 200^0.106 = 0.0136 · 18.7294 · 5.44665 · 1.75354
        Assert.Equal(2.4328, Elevation("juice", .5, Steam.SaturationTemperature(20000)), 2e-3);
    }

    /// <summary>The rule that carries an elevation from atmospheric pressure: 0.763 at 60 °C, 1.137 at 120 °C, from Clausius and Clapeyron with the steam tables.</summary>
    [Theory]
    [InlineData(60, .763)]
    [InlineData(120, 1.137)]
    public void ElevationOfCustomLiquor_IsCarriedToOtherPressuresByRule(double celsius, double factor)
    {
        var liquor = CustomLiquor.Create("own", new SolidsTable([(0, 0), (40, 1)]), new SolidsPolynomial([4190, -23.5]));
        Printed.SameDecimals(factor, liquor.BoilingPointElevation(.4, celsius + 273.15).Value, 3);
    }
}
