using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Tests.Fouling;

public class EffectHourTests
{
    [Fact]
    public void Hour_AveragesShrinkTheRandomPartAndNotTheSystematic()
    {
        EffectHour hour = Coefficients(Window(0, 1000), Window(1, 1010), Window(2, 1020), Window(3, 1050)).Single();
        Assert.Equal(1020, hour.Mean.Value, 12);
        Assert.Equal(30, hour.Mean.Systematic, 12);
        Assert.Equal(8.0 / 2, hour.Mean.Random, 12);
        Assert.Equal((4, 1000.0, 1050.0, 1015.0), (hour.Count, hour.Lowest, hour.Highest, hour.Median));
    }

    [Fact]
    public void IdleCleanedAndAbsentWindows_DoNotEnter()
    {
        EffectWindow absent = Window(2, 1000) with { Coefficient = Measured.Absent, Reason = "no duty" };
        EffectHour hour = Coefficients(
            Window(0, 1000), Window(1, 10) with { State = RunningState.Idle }, absent, Window(3, 10) with { State = RunningState.Cleaning }).Single();
        Assert.Equal((1, 1000.0), (hour.Count, hour.Mean.Value));
        Assert.Empty(Coefficients(absent));
    }

    [Fact]
    public void Resistance_MayBeNegativeAndIsNotClipped()
    {
        var clean = new CleanExpectation(1000, "design value");
        Assert.Equal((1 / 1100.0) - (1 / 1000.0), CleanComparison.Resistance(new Measured(1100, 20, 5), clean).Value, 1e-15);
        Assert.Equal(1.1, CleanComparison.Cleanliness(new Measured(1100, 20, 5), clean).Value, 12);
        Assert.False(CleanComparison.Resistance(Measured.Absent, clean).IsPresent);
        Assert.False(CleanComparison.Resistance(new Measured(1100, 20, 5), null).IsPresent);
    }

    [Fact]
    public void LimitResistance_IsThatOfTheLimitReachedFirst()
    {
        var clean = new CleanExpectation(1000, "design value");
        Assert.Equal((1 / 800.0) - (1 / 1000.0), CleanComparison.LimitResistance(new DueLimits(600, 0.8, null), clean)!.Value, 1e-15);
        Assert.Null(CleanComparison.LimitResistance(new DueLimits(null, null, 600), clean));
    }

    private static IEnumerable<EffectHour> Coefficients(params EffectWindow[] windows) =>
        EffectHour.Summarise(windows).Where(hour => hour.Quantity == HourQuantity.Coefficient);

    private static EffectWindow Window(int index, double coefficient) => new()
    {
        At = index * 5 * Milliseconds.Minute,
        State = RunningState.Producing,
        HeatingTemperature = new(380, 0.1, 0.1),
        BoilingTemperature = new(370, 0.1, 0.1),
        Elevation = new(1, 0.1, 0),
        DrivingForce = new(9, 0.1, 0.1),
        Duty = new(1e6, 1e4, 1e3),
        Coefficient = new(coefficient, 30, 8),
        Solids = 0.2,
        HeatingFrom = HeatingTemperatureSource.ChestPressure,
        BoilingFrom = BoilingTemperatureSource.VapourPressure,
        DutyFrom = DutySource.Condensate,
        Extrapolated = false,
        Reason = null,
    };
}
