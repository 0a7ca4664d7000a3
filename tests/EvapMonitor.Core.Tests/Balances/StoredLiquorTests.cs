using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;
using EvapMonitor.Core.Tests.Coefficients;

namespace EvapMonitor.Core.Tests.Balances;

/// <summary>A tank between two effects that fills while the line runs: its level tells what it stores.</summary>
public class StoredLiquorTests
{
    private const long Window = 5 * Milliseconds.Minute;
    private static readonly UnitOfMeasure Metre = new("m", Dimension.Length, 1);

    [Theory]
    [InlineData(0)]
    [InlineData(0.5)]
    [InlineData(-0.3)]
    public void RisingLevel_IsAFlowIntoTheTank(double kilogramsPerSecond)
    {
        // 40 t over 4 m: 10 t a metre. Five readings of 0.2 mm in 5 min tell a slope to 0.2 mm/(√5·85 s), which is 0.011 kg/s; and 5 % of what is stored.
        BalanceWindow balance = Evaluate(kilogramsPerSecond, 0.0002, (0, 4), without: "X2").Balance!;
        double stored = Flow(balance, "E1 to T") - Flow(balance, "T to E2");
        double within = 3 * double.Hypot(0.011, HoldUp.MassPerLevelStandard * kilogramsPerSecond);
        Assert.InRange(stored, kilogramsPerSecond - within, kilogramsPerSecond + within);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(0.4)]
    public void RisingLevelOfAnEffect_IsLiquorThatItKeeps(double kilogramsPerSecond)
    {
        LineWindow window = Evaluate(kilogramsPerSecond, 0.0002, (0, 4), without: "X2", inEffect: true);
        BalanceWindow balance = window.Balance!;
        double kept = Flow(balance, "feed to E1") - Flow(balance, "E1 to E2") - Value(balance, VariableKind.VapourFlow, "E1");
        double within = 3 * double.Hypot(0.011, HoldUp.MassPerLevelStandard * kilogramsPerSecond);
        Assert.InRange(kept, kilogramsPerSecond - within, kilogramsPerSecond + within);
        // The height, not its rate, corrects the driving force: about 2 m of liquor.
        Assert.InRange(window.Effects[0].DrivingForce.Value - window.Effects[0].HeadCorrectedDrivingForce.Value, 1, 6);
    }

    [Fact]
    public void LevelWithoutARange_LeavesUnknownWhatGoesOn() => Assert.True(double.IsNaN(Flow(Evaluate(0.5, 0.0002, null, without: "X2").Balance!, "T to E2")));

    [Fact]
    public void FillingTank_CoefficientBehindItIsThatOfTheLiquorThatGoesOn()
    {
        // The readings fit a line without a tank; what the level says the tank stores is then missing behind it.
        double still = Evaluate(0, 0.0001, (0, 4)).Effects[1].Duty.Value, filling = Evaluate(1, 0.0001, (0, 4)).Effects[1].Duty.Value;
        Assert.True(filling < still - 1e4, $"{filling} W against {still} W");
    }

    private static double Flow(BalanceWindow balance, string way) => Value(balance, VariableKind.LiquorFlow, way);

    private static double Value(BalanceWindow balance, VariableKind kind, string place) =>
        balance.Reconciled[balance.Layout.Variables.ToList().FindIndex(key => key == new VariableKey(kind, place))];

    private static LineWindow Evaluate(double kilogramsPerSecond, double scatter, (double, double)? range, string without = "", bool inEffect = false)
    {
        Line plain = TestLine.Line();
        Instrument level = TestLine.Instrument("LT", Metre) with { Range = range };
        Line line = inEffect ? plain with { Effects = [plain.Effects[0] with { Level = level, HoldUp = 40_000 }, plain.Effects[1] with { Chest = new Chest() }] } : plain with
        {
            Tanks = [new Tank("T", "E1", 40_000, level)],
            Effects = [plain.Effects[0], plain.Effects[1] with { Liquor = [new LiquorSource("T")], Chest = new Chest() }],
        };
        var site = new Site { Name = "site", TimeZone = "UTC", Atmosphere = new(101_325, null), HistoryFrom = DateTimeOffset.UnixEpoch, Lines = [line] };
        var gaussian = new Gaussian(3);
        var readings = new Dictionary<string, ReadingSeries>();
        foreach ((string signal, double value) in TestLine.Values.Append(new("LT", 2)))
        {
            if (signal == "C2" || signal == without) continue;
            ReadingSeries series = readings[signal] = new ReadingSeries();
            for (int minute = 0; minute < 120; minute++)
            {
                double risen = signal == "LT" ? (kilogramsPerSecond / 10_000 * (minute - 90) * 60) + (scatter * gaussian.Next()) : 0;
                series.Add(new Reading(Milliseconds.Day + (minute * Milliseconds.Minute), value + risen, Quality.Good));
            }
        }

        long from = Milliseconds.Day + (90 * Milliseconds.Minute);
        return new LineEvaluation(site, line).Evaluate(readings, from, from + Window, LineLog.Empty).Single();
    }
}
