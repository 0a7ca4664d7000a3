using EvapMonitor.Core.Conditioning;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Tests.Conditioning;

public class LineConditioningTests
{
    private static readonly FixedOrMeasured Air = new(101_300, null);

    [Fact]
    public void SignalThatStandsStillWhileOthersMove_IsFrozen()
    {
        ConditionedSignal[] signals = Condition([Instrument("STILL"), Instrument("A"), Instrument("B")], (name, minute) => name == "STILL" ? 4 : 10 + (minute % 7));
        Assert.Equal(4, signals[0].Mean[12]);
        Assert.True(double.IsNaN(signals[0].Mean[40]));
        Assert.Equal("STILL is frozen", signals[0].WhyAbsent(40));
        Assert.False(double.IsNaN(signals[1].Mean[40]));
    }

    [Fact]
    public void PlantAtRest_IsNotFrozen()
    {
        ConditionedSignal[] signals = Condition([Instrument("A"), Instrument("B"), Instrument("C")], (_, _) => 4);
        Assert.All(signals, signal => Assert.Equal(4, signal.Mean[40]));
    }

    [Fact]
    public void ChangeWithinTheResolution_IsNoMovement()
    {
        Instrument still = Instrument("STILL") with { Resolution = 0.05 };
        ConditionedSignal[] signals = Condition([still, Instrument("A")], (name, minute) => name == "STILL" ? 4 + (0.02 * (minute % 2)) : 10 + (minute % 7));
        Assert.True(double.IsNaN(signals[0].Mean[40]));
    }

    [Theory]
    [InlineData(PressureReference.Gauge, 50_000, 151_300)]
    [InlineData(PressureReference.Vacuum, 80_000, 21_300)]
    [InlineData(PressureReference.Absolute, 50_000, 50_000)]
    public void Pressures_LeaveAbsolute(PressureReference reference, double written, double absolute)
    {
        Instrument gauge = Instrument("P") with { Unit = new UnitOfMeasure("Pa", Dimension.Pressure, 1, 0, reference) };
        Assert.Equal(absolute, Condition([gauge], (_, _) => written)[0].Mean[3]);
    }

    private static ConditionedSignal[] Condition(Instrument[] instruments, Func<string, int, double> value)
    {
        var grid = new WindowGrid(0, 5 * Milliseconds.Minute, 48);
        var readings = instruments.ToDictionary(instrument => instrument.Signal, instrument =>
        {
            var series = new ReadingSeries();
            for (int minute = 0; minute < 240; minute++) series.Add(new Reading(minute * Milliseconds.Minute, value(instrument.Signal, minute), Quality.Good));
            return series;
        });
        var memory = new LineMemory(instruments, TimeSpan.FromMinutes(5), TimeSpan.FromHours(1));
        memory.Fill(readings, grid.Start, grid.End);
        return LineConditioning.Condition(instruments, memory, Air, grid).Signals;
    }

    private static Instrument Instrument(string name) => new()
    {
        Signal = name, Unit = new UnitOfMeasure("kg/s", Dimension.MassFlow, 1), Accuracy = new Accuracy(0.01, 0, AccuracyMeaning.HalfWidth), FrozenAfter = TimeSpan.FromHours(2),
    };
}
