using EvapMonitor.Core.Conditioning;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Tests.Conditioning;

public class SignalConditioningTests
{
    private const long Minute = Milliseconds.Minute;
    private static readonly WindowGrid Hour = new(0, 5 * Minute, 12);

    [Fact]
    public void UnevenReadings_MeanIsTimeWeighted()
    {
        // 10 for four minutes, 20 for one: 12, where the mean of the samples would be 15.
        ConditionedSignal signal = Condition(Flow(), (0, 10), (4, 20));
        Assert.Equal(12, signal.Mean[0], 12);
        Assert.Equal(1, signal.GoodShare[0]);
    }

    [Fact]
    public void LinearSignal_LineJoinsReadingsWithinTheWindow()
    {
        // From 0 to 4 within four minutes (mean 2), then held at 4 for one: (2·4 + 4·1)/5.
        ConditionedSignal signal = Condition(Flow() with { Interpolation = Interpolation.Linear }, (0, 0), (4, 4));
        Assert.Equal(2.4, signal.Mean[0], 12);
    }

    [Fact]
    public void RisingSignal_RateIsItsSlope()
    {
        // 0.02 a second, from minute to minute.
        Assert.Equal(0.02, Condition(Flow(), (0, 0), (1, 1.2), (2, 2.4), (3, 3.6), (4, 4.8)).Rate[0], 1e-12);
        Assert.Equal(0.02, Condition(Flow() with { Interpolation = Interpolation.Linear }, (0, 0), (1, 1.2), (3, 3.6), (4, 4.8)).Rate[0], 1e-12);
        Assert.Equal(0, Condition(Flow(), (0, 7), (2, 7), (3, 7)).Rate[0], 1e-12);
        Assert.True(double.IsNaN(Condition(Flow(), (0, 7), (3, 8)).Rate[0]));
    }

    [Theory]
    [InlineData(Interpolation.Step)]
    [InlineData(Interpolation.Linear)]
    public void ReadingAfterAWindow_LeavesTheWindowAsItWas(Interpolation interpolation)
    {
        Instrument instrument = Flow() with { Interpolation = interpolation };
        ConditionedSignal before = Condition(instrument, (0, 1), (3, 2)), after = Condition(instrument, (0, 1), (3, 2), (6, 50), (7, 60));
        Assert.Equal(before.Mean[0], after.Mean[0]);
        Assert.Equal(before.Random[0], after.Random[0]);
    }

    [Fact]
    public void OldValue_IsNotCarriedPastStaleAfter()
    {
        ConditionedSignal signal = Condition(Flow() with { StaleAfter = TimeSpan.FromMinutes(9) }, (0, 7));
        Assert.Equal(7, signal.Mean[0]);
        Assert.Equal(7, signal.Mean[1]);
        Assert.Equal(0.8f, signal.GoodShare[1]);
        Assert.True(double.IsNaN(signal.Mean[2]));
        Assert.Equal("F has no reading", signal.WhyAbsent(2));
    }

    [Theory]
    [InlineData(2.0, true)]
    [InlineData(1.9, false)]
    public void GoodShare_UnderSixtyPercentGivesNoValue(double badFrom, bool absent)
    {
        // Good from 0 to badFrom + 1 minutes: 3.0 of 5 is just enough, 2.9 is not; the reading at the end of it is bad.
        double until = badFrom + 1;
        var readings = new ReadingSeries();
        readings.Add(new Reading(0, 5, Quality.Good));
        readings.Add(new Reading((long)(until * Minute), 5, Quality.Bad));
        ConditionedSignal signal = Condition(Flow(), readings);
        Assert.Equal(!absent, double.IsNaN(signal.Mean[0]));
        Assert.Equal(1, signal.Rejected[0, (int)Rejection.BadQuality]);
    }

    [Fact]
    public void BadOutOfRangeAndNotANumber_AreLeftOutAndCountedByReason()
    {
        var readings = new ReadingSeries();
        readings.Add(new Reading(0, 10, Quality.Good));
        readings.Add(new Reading(3 * Minute + 30_000, 900, Quality.Good));
        readings.Add(new Reading(4 * Minute, double.NaN, Quality.Good));
        readings.Add(new Reading(4 * Minute + 30_000, 12, Quality.Bad));
        ConditionedSignal signal = Condition(Flow() with { Range = (0, 100) }, readings);
        Assert.Equal(10, signal.Mean[0]);
        Assert.Equal(0.7f, signal.GoodShare[0]);
        Assert.Equal([1, 1, 1, 0], Enumerable.Range(0, 4).Select(reason => signal.Rejected[0, reason]));
    }

    [Fact]
    public void UncertainQuality_TriplesTheRandomPartOnly()
    {
        ConditionedSignal good = Condition(Flow(), Noisy(Quality.Good)), uncertain = Condition(Flow(), Noisy(Quality.Uncertain));
        Assert.Equal(good.Mean[11], uncertain.Mean[11]);
        Assert.Equal(3 * good.Random[11], uncertain.Random[11], 1e-12);
        Assert.Equal(good.Systematic[11], uncertain.Systematic[11]);
    }

    [Fact]
    public void Random_OfWhiteNoise_IsItsDeviationByRootOfTheCount()
    {
        // 5 readings a window of known deviation 0.4: 0.4/√5, found within the spread of an hour's estimate.
        double[] found = [.. Enumerable.Range(1, 60).Select(state => Condition(Flow(), Noisy(Quality.Good, state)).Random[11])];
        Assert.Equal(0.4 / double.Sqrt(5), found.Average(), 0.02);
    }

    [Fact]
    public void Random_AfterAStep_ForgetsTheStep()
    {
        var readings = new ReadingSeries();
        var noise = new Random(5);
        for (int minute = 0; minute < 60; minute++)
            readings.Add(new Reading(minute * Minute, (minute < 30 ? 10 : 60) + (0.4 * Normal(noise)), Quality.Good));
        Assert.InRange(Condition(Flow(), readings).Random[7], 0.05, 0.4);
    }

    [Fact]
    public void Systematic_IsTheAccuracyAndNoAveragingShrinksIt()
    {
        // 2 % of a reading of 10 as half-width of a rectangle: 0.2/√3.
        Assert.Equal(0.2 / double.Sqrt(3), Condition(Flow(), (0, 10), (1, 10), (2, 10)).Systematic[0], 1e-12);
    }

    private static Instrument Flow() => new()
    {
        Signal = "F", Unit = new UnitOfMeasure("kg/s", Dimension.MassFlow, 1), Accuracy = new Accuracy(0.02, 0, AccuracyMeaning.HalfWidth),
    };

    private static ReadingSeries Noisy(Quality quality, int state = 1)
    {
        var readings = new ReadingSeries();
        var noise = new Random(state);
        for (int minute = 0; minute < 60; minute++) readings.Add(new Reading(minute * Minute, 10 + (0.4 * Normal(noise)), quality));
        return readings;
    }

    private static double Normal(Random noise) => double.Sqrt(-2 * double.Log(1 - noise.NextDouble())) * double.Cos(double.Tau * noise.NextDouble());

    private static ConditionedSignal Condition(Instrument instrument, params (int Minute, double Value)[] readings)
    {
        var series = new ReadingSeries();
        foreach ((int minute, double value) in readings) series.Add(new Reading(minute * Minute, value, Quality.Good));
        return Condition(instrument, series);
    }

    private static ConditionedSignal Condition(Instrument instrument, ReadingSeries readings) => SignalConditioning.Condition(instrument, SignalPartials.Of(instrument, readings, Hour), Hour, Hour, _ => false);
}
