using System.Diagnostics;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Tests.Fouling;

public class SurfaceHistoryTests
{
    private static SimulatedSurface Year(int state, int campaigns, int hours = 288)
    {
        var surface = new SimulatedSurface(state) { Season = 8 };
        for (int k = 0; k < campaigns; k++)
        {
            surface.Produce(hours);
            surface.CleanFor(5);
        }

        return surface;
    }

    [Fact]
    public void AYearOfHours_IsToldInTime()
    {
        SimulatedSurface surface = Year(1, 30);
        for (int i = 0; i < 5; i++) surface.History();
        var clock = Stopwatch.StartNew();
        SurfaceHistory history = surface.History();
        clock.Stop();
        Assert.Equal(30, history.Campaigns.Count);
        TestContext.Current.TestOutputHelper!.WriteLine($"{clock.Elapsed.TotalMilliseconds}");
        Assert.InRange(clock.Elapsed.TotalMilliseconds, 0, 100);
    }
}
