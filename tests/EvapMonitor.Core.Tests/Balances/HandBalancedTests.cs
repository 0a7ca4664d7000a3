using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;
using EvapMonitor.Core.Tests.Published;
using static EvapMonitor.Core.Tests.Balances.TestLines;

namespace EvapMonitor.Core.Tests.Balances;

/// <summary>
/// Cases balanced by hand with round enthalpies: vapour 2600 kJ/kg, condensate h′ = 4 kJ/(kg·K)·(T − 273.15 K) at saturation, liquor that carries
/// 4 kJ/(kg·K) too and has no elevation. No losses, no vents. Each number below can be checked with a pencil.
/// </summary>
public class HandBalancedTests
{
    private const double Ice = 273.15, Vapour = 2600e3, Heat = 4000;

    // Saturated liquid at 0, 100 and 200 °C: 0, 400, 800 kJ/kg.
    private static readonly LineProperties Round = new BookProperties(
        [(Ice, Vapour), (Ice + 200, Vapour)], [(Ice, 0), (Ice + 200, 200 * Heat)], _ => 0, (_, t) => Heat * (t - Ice));

    private static Effect Bare(Effect effect) => effect with { HeatLoss = None, Vent = None };

    private static double Pressure(double celsius) => Steam.SaturationPressure(Ice + celsius);

    private static OperatingPoint Rate(Line line, RatingConditions conditions)
    {
        RatingResult result = new Rating(new LineGraph(line), Round).Solve(conditions);
        Assert.True(result.Point is not null, result.Reason);
        return result.Point;
    }

    private static void Same(double expected, double found, double within = 1e-6) =>
        Assert.True(double.Abs(found - expected) <= within * double.Abs(expected), $"expected {expected}, found {found}");

    /// <summary>Two effects: 120 °C steam, first boils at 100 °C, second at 60 °C; feed at 100 °C so that the first effect only evaporates.</summary>
    private static Line TwoEffects(double first, double second) => Of(
        Bare(Effect("A", HeatSource.Steam, LiquorSource.Feed, first)), Bare(Effect("B", TestLines.Vapour("A"), From("A"), second)));

    private static RatingConditions At(double product, params (string, double)[] coefficients) => new()
    {
        Coefficients = ByName(coefficients), FeedSolids = 0.1, FeedTemperature = Ice + 100, FeedFlow = null, ProductSolids = product,
        SteamPressure = Pressure(120), LastVapourPressure = Pressure(60),
    };

    [Fact]
    public void Bleed_ToAHeater_FollowsFromItsDuty()
    {
        // Heater: 55 kg/s of water from 50 to 60 °C. h′ of water by the steam tables there: 209.3 and 251.2 kJ/kg, so 2.30 MW. The bleed is vapour of A at
        // 100 °C: it gives 2600 − 400 = 2200 kJ/kg, so 1.0455 kg/s. (The heater's liquor keeps its own tables; the exact duty is taken from them.)
        var water = new Water { Name = "water" };
        double duty = 55 * (water.Enthalpy(0, Ice + 60) - water.Enthalpy(0, Ice + 50)), bleed = duty / 2200e3;
        Assert.Equal(1.0455, bleed, 0.0005);
        // A evaporates 10 kg/s at 100 °C out of liquor at 100 °C: 22 MW by 22/(2600 − 480) = 10.377 kg/s of steam at 120 °C. UA = 22 MW/20 K.
        // B gets 10 − 1.0455 = 8.9545 kg/s: 19.70 MW; UA = 19.70/40. Its liquor comes at 100 °C and boils at 60 °C (240 kJ/kg):
        // with F in: 19.70 + (F − 10)·400 = V·2600 + (F − 10 − V)·240; F = 40: 19.70 + 12 = 2.36 V + 7.2, V = 10.38 kg/s.
        double second = (10 - bleed) * 2200e3, vapour = (second + (30 * 160e3)) / 2360e3;
        Line line = TwoEffects(22e6 / 20 / 2000, second / 40 / 1000) with
        {
            Bleeds = [new("A", "H", null)], Heaters = [new Heater { Name = "H", Liquor = water }],
        };
        OperatingPoint point = Rate(line, At(0.1 * 40 / (30 - vapour), ("A", 2000), ("B", 1000)) with
        {
            Heaters = new Dictionary<string, HeaterConditions> { ["H"] = new(55, 0, Ice + 50, Ice + 60) },
        });
        Same(40, point.FeedFlow);
        Same(bleed, point[VariableKind.BleedFlow, "A to H"]);
        Same(10, point.Effects[0].Vapour);
        Same(vapour, point.Effects[1].Vapour);
        Same(22.0 / 2.12, point.FreshSteam);
        Assert.Equal(Ice + 100, point.Effects[0].BoilingTemperature, 1e-5);
    }

    [Fact]
    public void Flash_OfTheFirstCondensate_JoinsTheSecondChest()
    {
        // A as above: 10.3774 kg/s of condensate at 120 °C (480 kJ/kg). In a pot at 100 °C: x = (480 − 400)/(2600 − 400) = 0.036364, so 0.37736 kg/s of vapour
        // joins the chest of B: 10.37736 kg/s condense there, 22.8302 MW.
        double condensate = 22.0 / 2.12, flash = condensate * 80 / 2200, duty = (10 + flash) * 2200e3, vapour = (duty + (30 * 160e3)) / 2360e3;
        Assert.Equal(0.37736, flash, 1e-5);
        Assert.Equal(22.8302e6, duty, 1e2);
        Line line = TwoEffects(22e6 / 20 / 2000, duty / 40 / 1000) with { CondensateFlashes = [new("A", "B")] };
        OperatingPoint point = Rate(line, At(0.1 * 40 / (30 - vapour), ("A", 2000), ("B", 1000)));
        Same(40, point.FeedFlow);
        Same(flash, point[VariableKind.FlashVapour, "A"]);
        Same(10 + flash, point.Effects[1].Condensate);
        Same(duty, point.Effects[1].Duty);
    }

    [Fact]
    public void FlashCascade_CarriesTheRemainderOn()
    {
        // Three effects, condensates at 120, 100, 80 °C; A's flashes at 100, what is left of it and B's own at 80 °C.
        // A: 10 kg/s at 480 → 10·80/2200 = 0.363636 vapour, 9.636364 left at 400. B condenses V_A + 0.363636.
        // Into the pot at 80 °C (320 kJ/kg) go 9.636364 + B's condensate, all at 400: x = 80/2280 = 0.0350877.
        Line line = Of(
            Bare(Effect("A", HeatSource.Steam, LiquorSource.Feed, 500)), Bare(Effect("B", TestLines.Vapour("A"), From("A"), 600)),
            Bare(Effect("C", TestLines.Vapour("B"), From("B"), 700))) with
        { CondensateFlashes = [new("A", "B"), new("B", "C")] };
        OperatingPoint point = Rate(line, At(0.4, ("A", 2000), ("B", 1800), ("C", 1500)));
        double liquid(string effect) => Heat * (point[VariableKind.HeatingTemperature, effect] - Ice);
        double first = point.Effects[0].Condensate * (liquid("A") - liquid("B")) / (Vapour - liquid("B"));
        double entering = point.Effects[0].Condensate - first + point.Effects[1].Condensate;
        double second = entering * (liquid("B") - liquid("C")) / (Vapour - liquid("C"));
        Same(first, point[VariableKind.FlashVapour, "A"]);
        Same(entering, point[VariableKind.FlashingFlow, "B"]);
        Same(second, point[VariableKind.FlashVapour, "B"]);
        Same(point.Effects[0].Vapour + first, point.Effects[1].Condensate);
        Same(point.Effects[1].Vapour + second, point.Effects[2].Condensate);
    }

    [Fact]
    public void ParallelBodies_AddTheirConductances()
    {
        // Bodies of 300 m² at 2400 and 200 m² at 1400 W/(m²·K): UA = 720,000 + 280,000 = 1 MW/K over 500 m², so U = 2000. At 20 K: 20 MW.
        Line line = Of(Bare(Effect("A", HeatSource.Steam, LiquorSource.Feed, 500)) with { Bodies = ["L", "R"] }) with
        {
            Bodies = [new("L", 300, new Dictionary<string, ActiveSignal>()), new("R", 200, new Dictionary<string, ActiveSignal>())],
        };
        OperatingPoint point = Rate(line, At(0.2, ("L", 2400), ("R", 1400)) with { LastVapourPressure = Pressure(100) });
        Same(2000, point.Effects[0].Coefficient);
        Same(20e6, point.Effects[0].Duty);
        // Boils at 100 °C from 100 °C: 20 MW/2200 kJ/kg = 9.0909 kg/s, half of the feed.
        Same(20.0 / 2.2, point.Evaporation);
        Same(40.0 / 2.2, point.FeedFlow);
    }

    [Fact]
    public void ParallelBodies_OneOutOfService_LeavesTheOther()
    {
        Line line = Of(Bare(Effect("A", HeatSource.Steam, LiquorSource.Feed, 500)) with { Bodies = ["L", "R"] }) with
        {
            Bodies = [new("L", 300, new Dictionary<string, ActiveSignal>()), new("R", 200, new Dictionary<string, ActiveSignal>())],
        };
        var graph = new LineGraph(line, new Dictionary<string, IReadOnlyList<string>> { ["A"] = ["L"] });
        OperatingPoint? point = new Rating(graph, Round).Solve(At(0.2, ("L", 2400)) with { LastVapourPressure = Pressure(100) }).Point;
        Same(2400 * 300 * 20, point!.Effects[0].Duty);
        Same(300, point.Effects[0].Area);
    }

    [Fact]
    public void ThermalRecompression_MixesMassAndHeat()
    {
        // One effect at 100 °C under a jet that delivers at 110 °C. Motive steam 4 kg/s of 2800 kJ/kg, 1.5 kg drawn per kg: 6 kg/s of 2600 kJ/kg.
        // Delivered: 10 kg/s of (4·2800 + 6·2600)/10 = 2680 kJ/kg; condenses at 110 °C (440 kJ/kg): 22.4 MW, over 10 K: UA = 2.24 MW/K.
        // Liquor boils at 100 °C from 100 °C: 22.4/2.2 = 10.1818 kg/s of vapour, of which 4.1818 go to the condenser.
        double ratio = Pressure(110) / Pressure(100);
        Line line = Of(Bare(Effect("A", By("J"), LiquorSource.Feed, 1000))) with
        {
            Recompressors = [new Recompressor { Name = "J", Kind = RecompressorKind.Thermal, Suction = "A", Curve = new([(ratio - 0.2, 2.0), (ratio, 1.5), (ratio + 0.2, 1.0)]) }],
        };
        // 2800 kJ/kg by the steam tables: saturated vapour of 1.2 to 1.3 MPa is 2784, so some superheat; found here.
        double superheat = 0;
        while (Steam.VapourEnthalpy(1e6, Steam.SaturationTemperature(1e6) + superheat) < 2800e3) superheat += 1e-4;
        OperatingPoint point = Rate(line, At(0.2, ("A", 2240)) with
        {
            SteamPressure = null, LastVapourPressure = Pressure(100), Motive = new Dictionary<string, MotiveConditions> { ["J"] = new(1e6, superheat, 4) },
        });
        Same(6, point[VariableKind.SuctionFlow, "J"], 1e-5);
        Same(10, point[VariableKind.DischargeFlow, "J"], 1e-5);
        Same(2680e3, point[VariableKind.DischargeEnthalpy, "J"], 1e-6);
        Same(22.4e6, point.Effects[0].Duty, 1e-5);
        Same(22.4 / 2.2, point.Evaporation, 1e-5);
        Same((22.4 / 2.2) - 6, point[VariableKind.CondenserFlow, "A"], 1e-4);
        Same(22.4 / 2.2 / 4, point.SteamEconomy, 1e-5);
    }

    [Fact]
    public void MechanicalRecompression_AddsThePowerThatReachesTheVapour()
    {
        // The balance alone: 10 kg/s of 2600 kJ/kg, 1 MW drawn of which 90 % reach the vapour, 0.2 kg/s of spray at 110 °C (440 kJ/kg).
        // Delivered: 10.2 kg/s of (26,000 + 900 + 88)/10.2 = 2645.88 kJ/kg.
        Line line = Of(Bare(Effect("A", By("M"), LiquorSource.Feed, 1000))) with
        {
            Recompressors = [new Recompressor { Name = "M", Kind = RecompressorKind.Mechanical, Suction = "A" }],
        };
        var equations = new LineEquations(new LineGraph(line), Round, 20);
        double[] x = new double[equations.Variables.Count];
        void Set(VariableKind kind, string place, double value) => x[equations.Variables[kind, place]] = value;
        Set(VariableKind.VapourPressure, "A", Pressure(100));
        Set(VariableKind.BoilingTemperature, "A", Ice + 100);
        Set(VariableKind.ChestPressure, "A", Pressure(110));
        Set(VariableKind.DischargePressure, "M", Pressure(110));
        Set(VariableKind.SuctionFlow, "M", 10);
        Set(VariableKind.Power, "M", 1e6);
        Set(VariableKind.Efficiency, "M", 0.9);
        Set(VariableKind.SprayFlow, "M", 0.2);
        Set(VariableKind.DischargeFlow, "M", 10.2);
        Set(VariableKind.DischargeEnthalpy, "M", (26_000e3 + 900e3 + 88e3) / 10.2);
        Set(VariableKind.HeatingFlow, "M to A", 10.2);
        var rows = new ConstraintRows();
        equations.Evaluate(x, rows);
        string[] held = [.. Enumerable.Range(0, rows.Count).Where(row => rows.Key(row).Place is "M" or "M to A").Select(row =>
        {
            Assert.True(double.Abs(rows.Residual(row)) < 1e-6 * rows.Scale(row), $"{rows.Key(row)}: {rows.Residual(row)}");
            return rows.Key(row).Says;
        })];
        Assert.Equal(["chest pressure", "discharge", "heat", "mass"], held.Order());
        Set(VariableKind.Power, "M", 1.1e6);
        equations.Evaluate(x, rows);
        int heat = Enumerable.Range(0, rows.Count).Single(row => rows.Key(row) == new ConstraintKey("heat", "M"));
        Same(0.9e5, rows.Residual(heat));
    }

    [Fact]
    public void MechanicalRecompression_RatedByItsCurve_KeepsToCurveAndIsentropicWork()
    {
        OperatingPoint point = Named("mechanical").Solved();
        double low = point[VariableKind.VapourPressure, "E"], high = point[VariableKind.DischargePressure, "M1"], boiling = point[VariableKind.BoilingTemperature, "E"];
        double drawn = point[VariableKind.SuctionFlow, "M1"], volume = drawn * Steam.VapourVolume(low, boiling);
        // The curve: 1.55 at 2, 1.40 at 12, 1.15 at 25 m³/s.
        double ratio = volume < 12 ? 1.55 - (0.15 * (volume - 2) / 10) : 1.40 - (0.25 * (volume - 12) / 13);
        Same(ratio, high / low, 1e-9);
        // The end of the isentropic path by bisection of the steam tables' entropy.
        double entropy = Steam.VapourEntropy(low, boiling), cold = Steam.SaturationTemperature(high), hot = cold + 200;
        for (int step = 0; step < 100; step++)
        {
            double middle = (cold + hot) / 2;
            if (Steam.VapourEntropy(high, middle) < entropy) cold = middle;
            else hot = middle;
        }

        double work = (Steam.VapourEnthalpy(high, hot) - Steam.VapourEnthalpy(low, boiling)) / 0.75;
        Same(drawn * work / 0.95, point[VariableKind.Power, "M1"], 1e-7);
        Same(Steam.VapourEnthalpy(low, boiling) + work, point[VariableKind.DischargeEnthalpy, "M1"], 1e-9);
    }

    [Fact]
    public void Tank_WithKnownAccumulation_GivesOnTheRest()
    {
        Line line = Of(
            Effect("A", HeatSource.Steam, LiquorSource.Feed, 300), Effect("B", TestLines.Vapour("A"), From("T"), 300)) with { Tanks = [new("T", "A", 5e4, null)] };
        var equations = new LineEquations(new LineGraph(line), Round, 20);
        double[] x = new double[equations.Variables.Count];
        // 12 kg/s come in, 3 are stored, 9 go on.
        x[equations.Variables[VariableKind.LiquorFlow, "A to T"]] = 12;
        x[equations.Variables[VariableKind.Accumulation, "T"]] = 3;
        x[equations.Variables[VariableKind.LeavingFlow, "T"]] = 9;
        x[equations.Variables[VariableKind.LiquorFlow, "T to B"]] = 9;
        x[equations.Variables[VariableKind.LeavingFlow, "A"]] = 12;
        var rows = new ConstraintRows();
        equations.Evaluate(x, rows);
        foreach (ConstraintKey key in (ConstraintKey[])[new("mass", "T"), new("liquor on the way", "A to T"), new("liquor on the way", "T to B")])
        {
            int row = Enumerable.Range(0, rows.Count).Single(row => rows.Key(row) == key);
            Assert.Equal(0, rows.Residual(row), 1e-12);
        }
    }
}
