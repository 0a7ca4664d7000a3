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
        surface.History();
        var clock = Stopwatch.StartNew();
        SurfaceHistory history = surface.History();
        clock.Stop();
        Assert.Equal(30, history.Campaigns.Count);
        TestContext.Current.TestOutputHelper!.WriteLine($"{clock.Elapsed.TotalMilliseconds}");
        foreach (Campaign c in history.Campaigns) TestContext.Current.TestOutputHelper!.WriteLine($"{c.StartedBy} {c.InitialResistance} {c.FinalResistance} {c.GrowthRate} {c.RemovedShare} {c.ProductionHours}");
        foreach (CleanReference r in history.References) TestContext.Current.TestOutputHelper!.WriteLine($"{r.Level} {r.LevelUncertainty} {r.Source} {r.HourScatter} {r.HourCorrelation}");
        foreach (SurfaceCleaning c in history.Cleanings) TestContext.Current.TestOutputHelper!.WriteLine($"{c.Verdict} {c.Reason} {c.Test} {c.Before} {c.Left} {c.Removed}");
        Assert.InRange(clock.Elapsed.TotalMilliseconds, 0, 100);
    }
}
