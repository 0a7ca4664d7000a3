using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Conditioning;

namespace EvapMonitor.Core.Tests.Balances;

public class InstrumentTestsTests
{
    private static readonly TimeSpan Hour = TimeSpan.FromHours(1);
    private const long Window = 5 * 60_000;

    [Fact]
    public void ReadingFarOff_IsNamedAlone()
    {
        InstrumentedLine line = InstrumentedLine.Of(TestLines.Named("forward"));
        double[] readings = line.Exact();
        int steam = line.PlaceOf("steam");
        readings[steam] *= 1.12;
        Assert.Equal([[steam]], line.Suspects(readings)!);
    }

    [Fact]
    public void ReadingsThatFit_AreNotNamed()
    {
        InstrumentedLine line = InstrumentedLine.Of(TestLines.Named("mixed"));
        Assert.Empty(line.Suspects(line.Exact())!);
    }

    [Fact]
    public void TwoFaults_AreFoundOneAfterTheOther()
    {
        InstrumentedLine line = InstrumentedLine.Of(TestLines.Named("forward"));
        double[] readings = line.Exact();
        int product = line.PlaceOf("product"), condensate = line.PlaceOf("N3-condensate");
        readings[product] *= 0.85;
        readings[condensate] *= 1.2;
        Assert.Equal([product, condensate], line.Suspects(readings)!.Select(set => Assert.Single(set)).Order());
    }

    [Fact]
    public void WithOneCheckAlone_AllThatItBindsAreNamedTogether()
    {
        string[] has = ["feed", "feed-solids", "feed-temperature", "product-solids", "product", "steam-pressure"];
        TestLines.Case forward = TestLines.Named("forward");
        InstrumentedLine line = InstrumentedLine.Of(
            forward with { Graph = new(forward.Graph.Line with { Bleeds = [], Heaters = [], CondensateFlashes = [] }) },
            name => has.Contains(name) || name.EndsWith("-vapour", StringComparison.Ordinal));
        double[] readings = line.Exact();
        readings[line.PlaceOf("product")] *= 1.2;
        IReadOnlyList<int> together = Assert.Single(line.Suspects(readings)!);
        Assert.Equal(new[] { "feed", "feed-solids", "product-solids", "product" }.Order(), together.Select(place => line.Instruments[place].Signal).Order());
    }

    [Fact]
    public void Suspicion_LeavesOutAfterItsTime_AndNotBefore()
    {
        var suspicions = new Suspicions(Window, Hour);
        for (int k = 0; k < 24; k++)
        {
            suspicions.Keep(k * Window, k >= 6 ? [3, 5] : []);
            Assert.Equal(k >= 17 ? [3, 5] : [], suspicions.LeftOutAt(k * Window));
        }

        suspicions.Keep(24 * Window, [5]);
        Assert.Equal([5], suspicions.LeftOutAt(24 * Window));
        suspicions.Forget(20 * Window);
        Assert.False(suspicions.Knows(20 * Window));
        Assert.True(suspicions.Knows(19 * Window));
    }

    [Fact]
    public void TooFewWindowsJudged_LeaveNothingOut()
    {
        var suspicions = new Suspicions(Window, Hour);
        for (int k = 0; k < 5; k++) suspicions.Keep(k * Window, [1]);
        Assert.Empty(suspicions.LeftOutAt(4 * Window));
        suspicions.Keep(5 * Window, [1]);
        Assert.Equal([1], suspicions.LeftOutAt(5 * Window));
    }
}
