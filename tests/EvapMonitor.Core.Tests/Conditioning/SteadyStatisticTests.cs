using EvapMonitor.Core.Conditioning;
using EvapMonitor.Core.Tests.Balances;

namespace EvapMonitor.Core.Tests.Conditioning;

/// <summary>The R-statistic against what is known of it: Cao and Rhinehart 1995, critical values by simulation.</summary>
public class SteadyStatisticTests
{
    [Theory]
    // White noise, factors 0.2, 0.1, 0.1: quantiles by a simulation of 200,000 samples outside this program.
    [InlineData(1.00, 0.50, 0.01)]
    [InlineData(1.44, 0.95, 0.003)]
    [InlineData(1.74, 0.99, 0.0015)]
    // The value in use: 400,000 samples by another program.
    [InlineData(SignalSteadiness.Critical, 0.9997, 0.0002)]
    public void WhiteNoise_StaysUnderTheCriticalValuesAsOftenAsTheirSignificanceSays(double critical, double share, double within)
    {
        double[] ratios = [.. Ratios(0, 400_000, 1)];
        Assert.Equal(share, ratios.Count(ratio => ratio <= critical) / (double)ratios.Length, within);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(0.2)]
    [InlineData(0.36)]
    public void CorrelatedNoise_BothVariancesAverageWhatTheFiltersOfAFirstOrderProcessGive(double correlation)
    {
        // R is a quotient, so its mean lies a little above the quotient of the means; its median is near it.
        double[] ratios = [.. Ratios(correlation, 200_000, 2).Order()];
        Assert.Equal(SteadyStatistic.Expected(correlation), ratios[ratios.Length / 2], 0.03);
    }

    [Fact]
    public void StepOfTwo_FirstValuesAreThoseByHand()
    {
        // 0, 0, 2: plain means at first, so ν² = (0 + 4)/2 and δ² = (0 + 4)/2; R = 1.8·2/2.
        var statistic = default(SteadyStatistic);
        statistic.Add(0);
        Assert.True(double.IsNaN(statistic.Add(0)));
        Assert.Equal(1.8, statistic.Add(2), 1e-12);
        Assert.Equal(2 - (2 / 1.8), statistic.Unexplained(1), 1e-12);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(0.3)]
    [InlineData(0.8)]
    public void Correlation_IsFoundWhateverTheSignalDoesMeanwhile(double correlation)
    {
        double[] noise = [.. Noise(correlation, 20_000, 3)];
        double[] ramp = [.. noise.Select((one, i) => one + (0.05 * i))], step = [.. noise.Select((one, i) => one + (i > 9_000 ? 40 : 0))];
        Assert.Equal(correlation, NoiseCorrelation.Of(noise), 0.03);
        Assert.Equal(correlation, NoiseCorrelation.Of(ramp), 0.03);
        Assert.Equal(correlation, NoiseCorrelation.Of(step), 0.03);
    }

    [Fact]
    public void HeldValues_AreCorrelated()
    {
        double[] noise = [.. Noise(0, 4_000, 4)];
        Assert.True(NoiseCorrelation.Of([.. Enumerable.Range(0, 20_000).Select(i => noise[i / 5])]) > 0.9);
    }

    /// <summary>Noise of standard deviation 1 from a first-order process.</summary>
    internal static IEnumerable<double> Noise(double correlation, int count, int state)
    {
        var gaussian = new Gaussian(state);
        double now = gaussian.Next();
        for (int i = 0; i < count; i++)
        {
            yield return now;
            now = (correlation * now) + (double.Sqrt(1 - (correlation * correlation)) * gaussian.Next());
        }
    }

    private static IEnumerable<double> Ratios(double correlation, int count, int state)
    {
        var statistic = default(SteadyStatistic);
        foreach (double sample in Noise(correlation, count + 100, state))
        {
            double ratio = statistic.Add(sample);
            if (statistic.Count > 100) yield return ratio;
        }
    }
}
