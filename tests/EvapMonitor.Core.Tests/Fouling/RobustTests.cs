using EvapMonitor.Core.Readings;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Tests.Balances;

namespace EvapMonitor.Core.Tests.Fouling;

public class RobustTests
{
    [Theory]
    [InlineData(new double[] { }, double.NaN)]
    [InlineData(new double[] { 3 }, 3)]
    [InlineData(new double[] { 4, 1, 3, 2 }, 2.5)]
    [InlineData(new double[] { 5, 5, 5, 1, 5 }, 5)]
    public void Median_IsTheMiddle(double[] values, double expected) => Assert.Equal(expected, Middle.Of(values));

    [Fact]
    public void Place_IsTheSortedOne()
    {
        var noise = new Gaussian(5);
        for (int n = 1; n < 60; n++)
        {
            // Rounded, so that there are ties.
            double[] values = [.. Enumerable.Range(0, n).Select(_ => double.Round(3 * noise.Next()))];
            double[] sorted = [.. values.Order()];
            for (int rank = 0; rank < n; rank++) Assert.Equal(sorted[rank], Middle.Place((double[])values.Clone(), rank));
        }
    }

    [Fact]
    public void Location_IsTheMedianOfWalshAverages()
    {
        // 1, 2, 9: means of pairs 1, 1.5, 5, 2, 5.5, 9; their median is 3.5 (by hand).
        Assert.Equal(3.5, Robust.Location([1, 2, 9]));
    }

    [Fact]
    public void Shift_IsTheMedianOfDifferences()
    {
        // {1, 2, 4} to {3, 7}: 2, 6, 1, 5, −1, 3; the median is 2.5 (by hand).
        Assert.Equal(2.5, Robust.Shift([1, 2, 4], [3, 7]));
    }

    [Fact]
    public void Slope_IsSens()
    {
        // The seven points of Sen (1968) (from memory, recomputed): the median of the 21 slopes is 4.
        double[] t = [1, 2, 3, 4, 10, 12, 18], x = [9, 15, 19, 20, 45, 55, 78];
        (double slope, double standard) = Robust.Slope(t, x);
        Assert.Equal(4, slope, 12);
        // One standard deviation of Kendall's S for seven is √(7·6·19/18) = 6.658: half the width between ranks 10 ± 3.329, counted from 0.
        double[] sorted = [.. Pairs(t, x).Order()];
        double At(double rank) => sorted[(int)rank] + ((rank - (int)rank) * (sorted[(int)rank + 1] - sorted[(int)rank]));
        Assert.Equal((At(13.329) - At(6.671)) / 2, standard, 4);
    }

    [Fact]
    public void WildHours_HardlyMoveTheSlope()
    {
        double[] x = [.. Enumerable.Range(0, 40).Select(i => (double)i)], y = [.. x.Select(at => 2 * at)];
        for (int i = 0; i < 40; i += 5) y[i] = 1000;
        Assert.InRange(Robust.Slope(x, y).Slope, 1.9, 2.1);
        Assert.InRange(Robust.Spread([1, 2, 3, 4, 1000]), 1.48, 1.49);
    }

    [Fact]
    public void SumsOfCorrelatedHours_VaryAsTheMatrixSays()
    {
        var noise = new HourNoise(2, 0.6, true);
        double[] weights = [1, -2, 0.5, 3], hours = [0, 1, 4, 5];
        double expected = 0;
        for (int i = 0; i < 4; i++)
        {
            for (int j = 0; j < 4; j++) expected += 4 * weights[i] * weights[j] * noise.Correlation(double.Abs(hours[i] - hours[j]));
        }

        Assert.Equal(expected, noise.Variance(weights, hours), 10);
    }

    private static IEnumerable<double> Pairs(double[] x, double[] y)
    {
        for (int i = 0; i < x.Length; i++)
        {
            for (int j = i + 1; j < x.Length; j++) yield return (y[j] - y[i]) / (x[j] - x[i]);
        }
    }
}
