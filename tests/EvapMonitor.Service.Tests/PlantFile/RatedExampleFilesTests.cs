using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.Tests.PlantFile;

/// <summary>The example files are lines that could be: with coefficients and conditions of their trade each finds an operating point.</summary>
public sealed class RatedExampleFilesTests
{
    private static OperatingPoint Rate(string file, RatingConditions conditions, IReadOnlyDictionary<string, IReadOnlyList<string>>? inService = null)
    {
        Line line = Examples.Sound(Examples.Text(file)).Lines[0];
        RatingResult result = new Rating(new LineGraph(line, inService), new LineProperties(line.Liquor.Always!)).Solve(conditions);
        Assert.True(result.Point is not null, result.Reason);
        Assert.Empty(result.Point.Remarks);
        return result.Point;
    }

    private static Dictionary<string, double> ByName(params (string Name, double Coefficient)[] all) => all.ToDictionary(one => one.Name, one => one.Coefficient);

    [Fact]
    public void MixedSevenEffects_WithTheSpareInN2_Rates()
    {
        OperatingPoint point = Rate(
            "mixed-seven-effects.yaml",
            new()
            {
                Coefficients = ByName(("B1", 900), ("B8", 1200), ("B3", 1300), ("B4", 1350), ("B5", 1400), ("B6", 1500), ("B7", 1350)),
                FeedSolids = 0.16, FeedTemperature = 363, ProductSolids = 0.68, SteamPressure = 4.2e5, LastVapourPressure = 1.3e4,
            },
            new Dictionary<string, IReadOnlyList<string>> { ["N2"] = ["B8"], ["N3"] = ["B3"] });
        Assert.InRange(point.SteamEconomy, 4.5, 7);
        Assert.InRange(point.FeedFlow * 3.6, 150, 600);
    }

    [Fact]
    public void ThermalRecompression_SavesSteam()
    {
        OperatingPoint point = Rate("thermal-recompression.yaml", new()
        {
            Coefficients = ByName(("F1", 2600), ("F2", 2300), ("F3", 1700), ("FINISHER", 900)),
            FeedSolids = 0.09, FeedTemperature = 345, ProductSolids = 0.46, SteamPressure = 2.2e4, LastVapourPressure = 8e3,
            Motive = new Dictionary<string, MotiveConditions> { ["J1"] = new(9e5, 0, 0.9) },
        });
        Assert.InRange(point.SteamEconomy, 3.2, 7);
        Assert.InRange(point.FeedFlow * 3.6, 8, 60);
    }

    [Fact]
    public void BleedsAndFlash_Rates()
    {
        OperatingPoint point = Rate("bleeds-and-flash.yaml", new()
        {
            Coefficients = ByName(("E1", 2900), ("E2", 2600), ("E3", 2200), ("E4", 1500), ("E5", 750)),
            FeedSolids = 0.14, FeedTemperature = 396, ProductSolids = 0.66, SteamPressure = 2.6e5, LastVapourPressure = 2e4,
            Bleeds = new Dictionary<string, double> { ["E2 to pans"] = 8 },
            Heaters = new Dictionary<string, HeaterConditions> { ["H1"] = new(75, 0.14, 383, 394), ["H2"] = new(75, 0.14, 372, 383), ["H3"] = new(30, 0, 320, 350) },
        });
        Assert.True(point[VariableKind.FlashVapour, "E4"] > point[VariableKind.FlashVapour, "E2"] * 0.5);
        Assert.True(point[VariableKind.BleedFlow, "E3 to H3"] > 1);
    }

    [Fact]
    public void MechanicalRecompression_NeedsPowerInPlaceOfSteam()
    {
        OperatingPoint point = Rate("mechanical-recompression.yaml", new()
        {
            Coefficients = ByName(("E1", 2100)), FeedSolids = 0.06, FeedTemperature = 358, ProductSolids = 0.3, LastVapourPressure = 5e4,
        });
        Assert.Equal(0, point.FreshSteam);
        double work = point[VariableKind.Power, "FAN"] / point.Evaporation / 3600;
        // In kWh per tonne: machines of this kind take 10 to 30 (from memory, as a bound of plausibility).
        Assert.InRange(work, 8, 35);
    }
}
