using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>Gathers hours on water into tests.</summary>
internal static class WaterRuns
{
    /// <summary>Hours further apart than this are of two tests, ms.</summary>
    private const long Apart = 3 * Milliseconds.Hour;

    /// <summary>The tests in order of time.</summary>
    public static IReadOnlyList<WaterTest> TestsOf(IReadOnlyList<SurfaceHour> water, IEnumerable<long> recalibrations)
    {
        long[] breaks = [.. recalibrations];
        var tests = new List<WaterTest>();
        for (int from = 0, to = 1; from < water.Count; from = to, to++)
        {
            while (to < water.Count && water[to].Effect == water[from].Effect && water[to].Hour - water[to - 1].Hour - Milliseconds.Hour < Apart) to++;
            SurfaceHour[] hours = [.. water.Skip(from).Take(to - from)];
            long start = hours[0].Hour;
            Measured mean = Mean(hours);
            WaterTest? before = tests.FindLast(test => test.Effect == hours[0].Effect);
            bool comparable = before is not null && !Array.Exists(breaks, at => at > before.Start && at <= start);
            tests.Add(new WaterTest(start, hours[^1].Hour + Milliseconds.Hour, hours.Length, mean, comparable ? Since(before!.Coefficient, mean) : Measured.Absent, hours[0].Effect));
        }

        return tests;
    }

    private static Measured Mean(SurfaceHour[] hours)
    {
        double mean = hours.Average(hour => hour.Coefficient.Value), squares = hours.Sum(hour => hour.Coefficient.Random * hour.Coefficient.Random);
        // The scatter of the hours where there are enough of them to show one, and never less than what each brings.
        double scatter = hours.Length < 3 ? 0 : hours.Sum(hour => (hour.Coefficient.Value - mean) * (hour.Coefficient.Value - mean)) / (hours.Length - 1);
        return new Measured(mean, hours.Average(hour => hour.Coefficient.Systematic), double.Sqrt(double.Max(squares / hours.Length, scatter) / hours.Length));
    }

    private static Measured Since(Measured before, Measured now)
    {
        double one = before.Random / (before.Value * before.Value), other = now.Random / (now.Value * now.Value);
        return new Measured((1 / now.Value) - (1 / before.Value), 0, double.Hypot(one, other));
    }
}
