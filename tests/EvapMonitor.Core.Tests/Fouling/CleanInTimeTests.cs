using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Tests.Fouling;

/// <summary>Windows find their clean expectation by time, hours have it by index: both must say the same.</summary>
public class CleanInTimeTests
{
    [Theory]
    [InlineData(3, false)]
    [InlineData(4, true)]
    public void AtEveryHour_TheExpectationIsThatOfTheHour(int state, bool recalibrated)
    {
        SimulatedSurface surface = SurfaceHistoryTests.Campaigns(state, 4, 290);
        // A cleaning that nobody logged, and a time in which nothing happened.
        surface.Events.RemoveAt(1);
        surface.Stand(6);
        surface.Produce(100);
        if (recalibrated) surface.Events.Add(new SurfaceEvent(surface.Hours[500].Hour, surface.Hours[500].Hour, SurfaceEventKind.Recalibration, "", null));
        SurfaceHistory history = surface.History(design: 2600);
        var clean = new CleanInTime(
            surface.Hours[0].Effect, [new Surface(surface.Hours[0].Effect, surface.Hours[0].Effect, surface.Now, history)],
            [.. surface.Hours.Select(hour => new EffectStretch(hour.Hour, hour.Hour + Milliseconds.Hour, RunningState.Producing, hour.Product, ""))]);
        Assert.True(history.References.Count > 2);
        foreach (CleanHour hour in history.Hours) Assert.Same(history.References[hour.Reference], clean.At(hour.Hour)!.Value.Reference);
    }

    [Fact]
    public void WithoutAStretch_NothingIsSaid()
    {
        SurfaceHistory history = SurfaceHistoryTests.Campaigns(5, 1, 48).History(design: 2600);
        Assert.Null(new CleanInTime("E1", [new Surface("E1", "E1", 0, history)], []).At(history.Hours[3].Hour));
    }
}
