using EvapMonitor.Core.Properties;
using EvapMonitor.Service.PlantFile;

namespace EvapMonitor.Service.Tests.PlantFile;

public sealed class LiquorTests
{
    private const string Curves = "heat-capacity: {polynomial: [4190, -23.5]}, density: {polynomial: [998, 3.9, 0.013]}";
    private const string Elevation = "boiling-point-elevation: {polynomial: [0, 0.0178, 0.000622]}, ";

    [Theory]
    [InlineData("{kind: sucrose, purity: 91 %}", typeof(Sucrose))]
    [InlineData("{kind: sucrose}", typeof(Sucrose))]
    [InlineData("{kind: sodium-hydroxide}", typeof(SodiumHydroxide))]
    [InlineData("{kind: sea-water}", typeof(SeaWater))]
    [InlineData("{kind: milk}", typeof(Milk))]
    [InlineData("{kind: juice}", typeof(Juice))]
    [InlineData("{kind: black-liquor}", typeof(BlackLiquor))]
    [InlineData("{kind: water}", typeof(Water))]
    [InlineData("{kind: custom, " + Elevation + Curves + "}", typeof(CustomLiquor))]
    public void Kind_GivesItsLiquorByName(string declared, Type type)
    {
        Liquor liquor = Declared(declared);
        Assert.IsType(type, liquor);
        Assert.Equal("mixture", liquor.Name);
    }

    [Fact]
    public void Purity_ReachesTheLiquor() => Assert.Equal(0.91, Assert.IsType<Sucrose>(Declared("{kind: sucrose, purity: 91 %}")).Purity, 1e-12);

    [Fact]
    public void PolynomialOfThePlant_GivesItsOwnElevationAtAtmosphere()
    {
        Liquor liquor = Declared("{kind: custom, " + Elevation + Curves + "}");
        Assert.Equal((0.0178 * 50) + (0.000622 * 2500), liquor.BoilingPointElevation(0.5, 373.15).Value, 1e-9);
        Assert.Equal(4190 - (23.5 * 50), liquor.HeatCapacity(0.5, 340).Value, 1e-9);
    }

    [Fact]
    public void TableOfThePlant_IsStraightBetweenPoints() =>
        Assert.Equal(0.9, Declared("{kind: custom, boiling-point-elevation: {table: [[0, 0], [20, 0.6], [40, 1.2]]}, " + Curves + "}").BoilingPointElevation(0.3, 373.15).Value, 1e-9);

    [Fact]
    public void DuhringLines_GiveBoilingPointsAtBothPressures()
    {
        Liquor liquor = Declared("{kind: custom, boiling-point-elevation: {duhring: {40: [[60, 83.1], [100, 126.5]], 50: [[60, 100.1], [100, 142.5]]}}, " + Curves + "}");
        Assert.Equal(23.1, liquor.BoilingPointElevation(0.4, 333.15).Value, 1e-9);
        Assert.Equal(42.5, liquor.BoilingPointElevation(0.5, 373.15).Value, 1e-9);
    }

    [Theory]
    [InlineData("boiling-point-elevation: {table: [[0, 0], [50, 25]]}, ", "boiling-point-elevation", "passes 10 K at 20.0 % solids")]
    [InlineData("boiling-point-elevation: {polynomial: [0.5, 0.01]}, ", "boiling-point-elevation", "at 0 % solids must be 0 K")]
    [InlineData("boiling-point-elevation: {table: [[0, 0], [20, -1]]}, ", "boiling-point-elevation", "must not be negative")]
    [InlineData("boiling-point-elevation: {table: [[20, 1], [10, 2]]}, ", "boiling-point-elevation.table", "[[20, 1], [10, 2]]")]
    [InlineData("boiling-point-elevation: {polynomial: []}, ", "boiling-point-elevation.polynomial", "[]")]
    [InlineData("boiling-point-elevation: {polynomial: [0], table: [[0, 0], [40, 1]]}, ", "boiling-point-elevation", "a mapping with 2 keys")]
    [InlineData("boiling-point-elevation: {duhring: {40: [[60, 50], [100, 104]]}}, ", "boiling-point-elevation.duhring.40", "[[60, 50], [100, 104]]")]
    [InlineData("boiling-point-elevation: {duhring: {50: [[60, 70], [100, 114]], 40: [[60, 63], [100, 104]]}}, ", "boiling-point-elevation.duhring.40", "\"40\"")]
    [InlineData("", "boiling-point-elevation", "nothing")]
    public void WrongElevation_IsOneProblemAtItsPlace(string elevation, string path, string found)
    {
        PlantFileProblem problem = Examples.OnlyProblem(File("{kind: custom, " + elevation + Curves + "}"));
        Assert.Equal("liquors.mixture." + path, problem.Path);
        Assert.Contains(found, problem.Found, StringComparison.Ordinal);
    }

    [Fact]
    public void HeatCapacityThatFallsBelowZero_IsAProblem() => Assert.Equal(
        "liquors.mixture.heat-capacity", Examples.OnlyProblem(File("{kind: custom, " + Elevation + "heat-capacity: {polynomial: [4190, -50]}}")).Path);

    [Fact]
    public void PolynomialBeyondTenKelvinAndAbsentDensity_AreNoted()
    {
        IReadOnlyList<PlantFileNote> notes = PlantFileReader.Read(
            File("{kind: custom, boiling-point-elevation: {polynomial: [0, 0.2]}, heat-capacity: {polynomial: [4190]}}")).Notes;
        Assert.Contains(notes, n => n.Text.Contains("above 50 % solids", StringComparison.Ordinal));
        Assert.Contains(notes, n => n.Text.Contains("no density", StringComparison.Ordinal));
    }

    private static Liquor Declared(string text) => Examples.Sound(File(text)).Lines[0].Liquor.Always!;

    private static string File(string liquor) =>
        Examples.With("liquor: water", "liquor: mixture").Replace("lines:", "liquors:\n  mixture: " + liquor + "\nlines:", StringComparison.Ordinal);
}
