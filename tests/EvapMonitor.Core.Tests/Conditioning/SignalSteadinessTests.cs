using EvapMonitor.Core.Conditioning;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Tests.Coefficients;

namespace EvapMonitor.Core.Tests.Conditioning;

/// <summary>Simulated signals by the minute: mean 100, noise 1, accuracy 0.3 (standard). Windows of 5 min, settling time 20 min.</summary>
public class SignalSteadinessTests
{
    private const int LookBack = 120, Settling = 20, Window = 5, Noise = 2_000;
    private static readonly Instrument Gauge = TestLine.Instrument("S", TestLine.Flow) with { Accuracy = new Accuracy(0, 0.3, AccuracyMeaning.Standard) };

    [Theory]
    [InlineData(0)]
    [InlineData(0.3)]
    public void NoiseAlone_IsWronglyNotSteadyInFewerThanOneWindowOfAHundred(double correlation)
    {
        // White noise, 25 samples a window: by simulation outside this program 0.4 % of the windows; correlation must not make it much more.
        bool?[] verdicts = [.. Verdicts([.. Signal(_ => 0, 60_000, correlation, 1)])];
        double wrong = verdicts.Count(one => one == false) / (double)verdicts.Length;
        Assert.InRange(wrong, 0.0005, 0.015);
        Assert.DoesNotContain(null, verdicts);
    }

    [Theory]
    [InlineData(6)]
    [InlineData(20)]
    [InlineData(200)]
    public void Step_IsFoundInTheSecondWindowAtTheLatestAndPassesWithinAnHour(double size)
    {
        double[] signal = [.. Signal(minute => minute >= Noise ? size : 0, 2 * Noise, 0, 2)];
        Assert.False(VerdictAt(signal, Noise + (2 * Window)));
        for (int end = Noise + (2 * Window); end <= Noise + Settling; end += Window) Assert.False(VerdictAt(signal, end));
        Assert.True(VerdictAt(signal, Noise + 60 + Window));
    }

    [Theory]
    [InlineData(0.4, 60)]
    // A ramp that stands far out of the noise looks like correlated noise at its end, and is judged on the coarser grid.
    [InlineData(2, 150)]
    public void Ramp_IsFoundWithinHalfAnHourAndHeldUntilItEnds(double perMinute, int settled)
    {
        double[] signal = [.. Signal(minute => perMinute * int.Clamp(minute - Noise, 0, 240), 2 * Noise, 0, 3)];
        for (int end = Noise + 30; end <= Noise + 240; end += Window) Assert.False(VerdictAt(signal, end));
        Assert.True(VerdictAt(signal, Noise + 240 + settled));
    }

    [Fact]
    public void SlowDriftUnderTheNoise_IsSteady()
    {
        // 3 noises in an hour: no window shows it, no balance suffers from it.
        bool?[] verdicts = [.. Verdicts([.. Signal(minute => 0.05 * minute, 10_000, 0, 4)])];
        Assert.True(verdicts.Count(one => one == true) > 0.97 * verdicts.Length);
    }

    [Fact]
    public void StepFarBelowTheAccuracy_IsNone()
    {
        double[] signal = [.. Signal(minute => minute >= Noise ? 0.1 : 0, 2 * Noise, 0, 5).Select((value, i) => 100 + (i >= Noise ? 0.1 : 0) + (0.001 * (value - 100)))];
        Assert.True(VerdictAt(signal, Noise + 10));
        Assert.False(SignalSteadiness.Judge(Gauge with { Accuracy = new Accuracy(0, 0, AccuracyMeaning.Standard) }, signal.AsSpan(0, Noise + 10), 0, Noise - 20, Noise));
    }

    [Fact]
    public void FrozenSignal_IsNotJudged()
    {
        Assert.Null(VerdictAt([.. Enumerable.Repeat(100.0, 1_000)], 500));
        double[] stops = [.. Signal(_ => 0, Noise, 0, 6), .. Enumerable.Repeat(100.0, 200)];
        Assert.Null(VerdictAt(stops, Noise + 100));
    }

    [Fact]
    public void SignalThatIsAway_IsNotJudgedAndSoUntilTheFiltersKnowItAgain()
    {
        double[] signal = [.. Signal(_ => 0, Noise, 0, 7)];
        Array.Fill(signal, double.NaN, 1_000, 10);
        Assert.Null(VerdictAt(signal, 1_010));
        Assert.Null(VerdictAt(signal, 1_030));
        Assert.NotNull(VerdictAt(signal, 1_010 + SignalSteadiness.WarmUp + Settling + Window));
    }

    [Fact]
    public void SingleMissingSamples_CostNothing()
    {
        double[] signal = [.. Signal(_ => 0, Noise, 0, 8).Select((value, i) => i % 11 == 0 ? double.NaN : value)];
        bool?[] verdicts = [.. Verdicts(signal)];
        Assert.True(verdicts.Count(one => one == true) > 0.95 * verdicts.Length);
    }

    [Fact]
    public void SamplesBeforeTheLookBack_DoNotMatter()
    {
        double[] signal = [.. Signal(minute => minute == 700 ? 500 : 0, Noise, 0.6, 9)];
        double[] other = [.. signal.Select((value, i) => i < 1_000 ? value * 3 : value)];
        int end = 1_000 + LookBack + Settling + Window;
        Assert.Equal(VerdictAt(signal, end), VerdictAt(other, end));
    }

    private static IEnumerable<double> Signal(Func<int, double> at, int count, double correlation, int state) =>
        SteadyStatisticTests.Noise(correlation, count, state).Select((noise, minute) => 100 + at(minute) + noise);

    private static IEnumerable<bool?> Verdicts(double[] signal)
    {
        for (int end = LookBack + Settling + Window; end <= signal.Length; end += Window) yield return VerdictAt(signal, end);
    }

    private static bool? VerdictAt(double[] signal, int end)
    {
        int start = int.Max(0, end - LookBack - Settling - Window);
        return SignalSteadiness.Judge(Gauge, signal.AsSpan(start, end - start), start, end - Settling - Window - 1, end - Window - 1);
    }
}
