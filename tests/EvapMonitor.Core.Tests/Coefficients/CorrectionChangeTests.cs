using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Readings;
using EvapMonitor.Core.Tests.Balances;

namespace EvapMonitor.Core.Tests.Coefficients;

public class CorrectionChangeTests
{
    private const int Signals = 30;

    [Fact]
    public void HealthyInstruments_AreAccusedLessThanOnceALineAndYear()
    {
        // 20 lines of 30 instruments over half a year each: ten expected at one a line and year, and up to 20 in 998 of 1,000 such draws (Poisson). Days scatter by 0.3 more than their hours do.
        var gaussian = new Gaussian(11);
        int accused = 0;
        for (int instrument = 0; instrument < 20 * Signals; instrument++)
        {
            if (CorrectionChange.Find(Hours(gaussian, 182, _ => 0), 1, null, Signals) is not null) accused++;
        }

        Assert.InRange(accused, 0, 20);
    }

    [Theory]
    [InlineData(3.0)]
    [InlineData(-3.0)]
    public void Step_IsFoundWithItsDayAndSize(double sigmas)
    {
        double size = sigmas * 0.3;
        var found = new List<CorrectionChange>();
        for (int trial = 0; trial < 50; trial++)
        {
            if (CorrectionChange.Find(Hours(new Gaussian(100 + trial), 60, day => day >= 50 ? size : 0), 1, null, Signals) is { } change) found.Add(change);
        }

        Assert.InRange(found.Count, 45, 50);
        Assert.InRange(found.Average(change => change.Change), double.Min(0.8 * size, 1.2 * size), double.Max(0.8 * size, 1.2 * size));
        Assert.InRange(found.Average(change => change.Since / (double)Milliseconds.Day), 45, 51.5);
    }

    [Fact]
    public void Drift_IsFound()
    {
        int found = Enumerable.Range(0, 50).Count(trial => CorrectionChange.Find(Hours(new Gaussian(300 + trial), 80, day => double.Max(0, day - 50) * 0.06), 1, null, Signals) is { Change: > 0 });
        Assert.InRange(found, 45, 50);
    }

    [Fact]
    public void Recalibration_BeginsAnew()
    {
        IReadOnlyList<(long, double)> hours = Hours(new Gaussian(5), 70, day => day >= 50 ? 3 : 0);
        Assert.NotNull(CorrectionChange.Find(hours, 1, null, Signals));
        Assert.Null(CorrectionChange.Find(hours, 1, 50 * Milliseconds.Day, Signals));
    }

    [Fact]
    public void WhatWasPutRight_IsNoChangeAnyMore()
    {
        IReadOnlyList<(long Hour, double Difference)> hours = Hours(new Gaussian(5), 90, day => day is >= 50 and < 65 ? 3 : 0);
        Assert.NotNull(CorrectionChange.Find([.. hours.Where(hour => hour.Hour < 65 * Milliseconds.Day)], 1, null, Signals));
        Assert.Null(CorrectionChange.Find(hours, 1, null, Signals));
    }

    [Fact]
    public void SureButSmall_IsNotWorthAWord() => Assert.Null(CorrectionChange.Find(Hours(new Gaussian(5), 70, day => day >= 50 ? 3 : 0), 20, null, Signals));

    [Fact]
    public void FewDays_SayNothing()
    {
        Assert.Null(CorrectionChange.Find([], 1, null, Signals));
        Assert.Null(CorrectionChange.Find(Hours(new Gaussian(5), CorrectionChange.LeastDays, day => day * 10), 1, null, Signals));
    }

    [Fact]
    public void ReadingsWithoutScatter_AreNotAccusedOfRounding() =>
        Assert.Null(CorrectionChange.Find([.. Hours(new Gaussian(5), 60, _ => 0).Select((hour, i) => (hour.Hour, i < 1000 ? 0.0 : 1e-6))], 1, null, Signals));

    [Fact]
    public void Limit_IsThatOfTheRunLength()
    {
        // From a table of run lengths of one-sided sums (Hawkins and Olwell 1998; from memory): k = 0.5, h = 5 gives 930; Siegmund's form gives 938.
        double b = 5 + 1.166, length = (double.Exp(b) - b - 1) / 0.5;
        Assert.Equal(930, length, 20.0);
        b = CorrectionChange.Limit(Signals) + 1.166;
        Assert.Equal(365.0 * 2 * Signals, (double.Exp(b) - b - 1) / 0.5, 1.0);
    }

    /// <summary>Hours that scatter by 1 around a day's value, which scatters by 0.2 itself.</summary>
    private static List<(long Hour, double Difference)> Hours(Gaussian gaussian, int days, Func<int, double> off)
    {
        var hours = new List<(long, double)>();
        for (int day = 0; day < days; day++)
        {
            double own = off(day) + (0.2 * gaussian.Next());
            for (int hour = 0; hour < 24; hour++) hours.Add(((day * Milliseconds.Day) + (hour * Milliseconds.Hour), own + gaussian.Next()));
        }

        return hours;
    }
}
