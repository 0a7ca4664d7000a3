using EvapMonitor.Core.Fouling;

namespace EvapMonitor.Core.Tests.Fouling;

/// <summary>Small counts of what the proof "expectation" shows with many.</summary>
public class CleanExpectationTests
{
    [Theory]
    [InlineData(0.02, false)]
    [InlineData(0.05, false)]
    [InlineData(0.02, true)]
    [InlineData(0.05, true)]
    public void FluxThatFollowsTheCoefficient_IsNotTakenForAClean(double loadVaries, bool constantDrivingForce)
    {
        ExpectationCases.FluxOutcome[] found = [.. Enumerable.Range(1, 8).Select(state => ExpectationCases.Flux(state, loadVaries, constantDrivingForce))];
        Assert.InRange(found.Average(one => one.Exponent), 0.17, 0.23);
        Assert.True(found.Count(one => double.Abs(one.Exponent - 0.2) < 2 * one.Standard) >= 6);
        Assert.All(found, one => Assert.InRange(double.Abs(one.CleanlinessErrors.Average()), 0, 0.02));
        // The trap is there: ordinary least squares takes the shared noise for an exponent.
        Assert.InRange(found.Average(one => one.Ordinary), 0.3, 1);
    }

    [Fact]
    public void WithoutFeedFlow_FluxIsLeftOut()
    {
        var surface = new SimulatedSurface(9) { WithFeed = false };
        Fill(surface);
        CleanReference reference = surface.History().References[^1];
        Assert.Equal([true, true, false], reference.Learnt);
        Assert.Equal(0, reference.Slopes[2]);
        Assert.Contains("flux 0 (not measured)", reference.Source, StringComparison.Ordinal);
    }

    [Fact]
    public void ConditionsThatHardlyMove_TeachNothing()
    {
        var surface = new SimulatedSurface(10) { SolidsVary = 0.0005, Slopes = [0, 0.012, 0.2] };
        Fill(surface);
        CleanReference reference = surface.History().References[^1];
        Assert.Equal([false, true, true], reference.Learnt);
        Assert.Contains("solids 0 (hardly moved)", reference.Source, StringComparison.Ordinal);
        // Away from what was seen the expectation stays, and says that it is less sure and held.
        SurfaceConditions at = reference.At;
        (double near, double sure, bool held) = reference.Expect(at);
        (double far, double unsure, bool heldThere) = reference.Expect(at with { LogSolids = at.LogSolids + 0.3 });
        Assert.Equal(near, far, 12);
        Assert.False(held);
        Assert.True(heldThere);
        Assert.True(unsure > sure + 0.1);
    }

    [Fact]
    public void WrongSigns_AreHeldAtTheirBound()
    {
        var surface = new SimulatedSurface(11) { Slopes = [0.5, -0.02, 0.2] };
        Fill(surface);
        CleanReference reference = surface.History().References[^1];
        Assert.Equal(0, reference.Slopes[0]);
        Assert.Equal(0, reference.Slopes[1]);
        Assert.InRange(reference.Slopes[2], 0.1, 0.3);
    }

    [Fact]
    public void OutsideTheLearntRange_ConditionsAreHeldAtTheBorder()
    {
        var surface = new SimulatedSurface(12);
        Fill(surface);
        CleanReference reference = surface.History().References[^1];
        SurfaceConditions border = reference.At with { BoilingTemperature = reference.Highest.BoilingTemperature }, beyond = border with { BoilingTemperature = border.BoilingTemperature + 10 };
        (double at, double sure, bool held) = reference.Expect(border);
        (double past, double unsure, bool heldThere) = reference.Expect(beyond);
        Assert.Equal(at, past, 12);
        Assert.False(held);
        Assert.True(heldThere);
        // Ten kelvins that the slope says nothing of are worth at least the slope itself.
        Assert.True(unsure > double.Hypot(sure, 10 * reference.Slopes[1]) * 0.99);
    }

    [Fact]
    public void ConditionsAlone_ShowAsNoResistance()
    {
        (double[] Hours, double[] Days, double[] Resistance)[] months = [.. Enumerable.Range(1, 12).Select(state => ExpectationCases.CleanMonth(state, 0.3))];
        double[] hours = [.. months.SelectMany(month => month.Hours)], days = [.. months.SelectMany(month => month.Days)];
        Assert.InRange(Share(hours, 1), 0.60, 0.76);
        Assert.InRange(Share(hours, 2), 0.92, 0.98);
        Assert.InRange(Share(days, 2), 0.86, 1);
        // No month as a whole is off by more than four per cent of the clean coefficient.
        Assert.All(months, month => Assert.InRange(month.Resistance.Average() * 2500, -0.04, 0.04));
    }

    private static double Share(double[] errors, double limit) => errors.Count(error => double.Abs(error) < limit) / (double)errors.Length;

    private static void Fill(SimulatedSurface surface)
    {
        for (int campaign = 0; campaign < 4; campaign++)
        {
            surface.Produce(200);
            surface.CleanFor(4);
        }

        surface.Produce(60);
    }
}
