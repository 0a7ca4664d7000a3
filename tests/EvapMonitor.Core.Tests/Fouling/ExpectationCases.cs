using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Tests.Fouling;

/// <summary>Surfaces whose clean expectation is known, and how far the learnt one is from it.</summary>
internal static class ExpectationCases
{
    /// <summary>What came of a true flux exponent.</summary>
    /// <param name="Exponent">The estimate.</param>
    /// <param name="Standard">Its standard uncertainty.</param>
    /// <param name="Ordinary">What ordinary least squares makes of the same hours.</param>
    /// <param name="CleanlinessErrors">Errors of the hours at the end of the last campaign.</param>
    public sealed record FluxOutcome(double Exponent, double Standard, double Ordinary, double[] CleanlinessErrors);

    /// <summary>Four campaigns, each down to 0.7 of the clean coefficient; loads vary by a share, the duty is read with 2 %.</summary>
    public static FluxOutcome Flux(int state, double loadVaries, bool constantDrivingForce, double exponent = 0.2)
    {
        var surface = new SimulatedSurface(state) { LoadVaries = loadVaries, ConstantDrivingForce = constantDrivingForce, Slopes = [-0.5, 0.012, exponent] };
        // 1/U grows from 1/2500 to 1/(0.7·2500) in a campaign of fifteen days.
        surface.Growth = ((1 / 0.7) - 1) / surface.Clean / 15;
        for (int campaign = 0; campaign < 5; campaign++)
        {
            surface.Produce(15 * 24);
            if (campaign < 4) surface.CleanFor(5);
        }

        SurfaceHistory history = surface.History();
        CleanReference reference = history.References[^1];
        int last = history.Hours.Count;
        double[] errors = [.. Enumerable.Range(last - 24, 24).Select(i => history.Hours[i].Cleanliness.Value - surface.Truth[i].Cleanliness)];
        return new FluxOutcome(reference.Slopes[2], double.Sqrt(reference.SlopeCovariance[8]), Ordinary(surface), errors);
    }

    /// <summary>ln U over ln flux and the other conditions by least squares, means of days taken out: the trap.</summary>
    private static double Ordinary(SimulatedSurface surface)
    {
        List<SurfaceHour> hours = surface.Hours;
        long Day(SurfaceHour hour) => hour.Hour / Milliseconds.Day;
        double[] Column(Func<SurfaceHour, double> of)
        {
            Dictionary<long, double> means = hours.GroupBy(Day).ToDictionary(day => day.Key, day => day.Average(of));
            return [.. hours.Select(hour => of(hour) - means[Day(hour)])];
        }

        double[][] columns = [Column(hour => double.Log(hour.Solids)), Column(hour => hour.BoilingTemperature), Column(hour => double.Log(hour.Flux))];
        return OrthogonalFit.Solve(columns, Column(hour => double.Log(hour.Coefficient.Value)))!.Coefficients[2];
    }

    /// <summary>
    /// A surface that never fouls, cleaned every ten days through two months of a season, and the month after: false resistance of its hours, and of their daily means,
    /// in standard uncertainties. The last campaign goes on through the month, so that one level must serve all its conditions.
    /// </summary>
    public static (double[] Hours, double[] Days, double[] Resistance) CleanMonth(int state, double slowShare)
    {
        var surface = new SimulatedSurface(state) { Growth = 0, Season = 10, SlowShare = slowShare };
        surface.Now += (state % 12) * 30 * Milliseconds.Day;
        for (int campaign = 0; campaign < 6; campaign++)
        {
            surface.Load = 1 + (0.05 * double.Sin(campaign + state));
            surface.Produce(10 * 24);
            surface.CleanFor(5);
        }

        int from = surface.Hours.Count;
        for (int day = 0; day < 30; day++)
        {
            surface.Load = 1 + (0.08 * double.Sin(0.3 * day));
            surface.Produce(24);
        }

        SurfaceHistory history = surface.History();
        CleanHour[] month = [.. history.Hours.Skip(from + 3)];
        double[] days = [.. month.Chunk(24).Select(day => day.Average(hour => hour.Resistance.Value) / day.Average(hour => CleanPart(history, hour)))];
        return ([.. month.Select(hour => hour.Resistance.Value / hour.Resistance.Random)], days, [.. month.Select(hour => hour.Resistance.Value)]);
    }

    private static double CleanPart(SurfaceHistory history, CleanHour hour)
    {
        // A day's mean has the uncertainty of the clean value and a 24th of the scatter, as far as hours are independent.
        CleanReference reference = history.References[hour.Reference];
        double clean = hour.CleanCoefficient.Random / hour.CleanCoefficient.Value / hour.CleanCoefficient.Value;
        double[] weights = new double[24], times = new double[24];
        Array.Fill(weights, 1.0 / 24);
        for (int i = 0; i < 24; i++) times[i] = i;
        double scatter = new HourNoise(reference.HourScatter, reference.SlowShare, true).Variance(weights, times) / (hour.CleanCoefficient.Value * hour.CleanCoefficient.Value);
        return double.Sqrt((clean * clean) + scatter);
    }
}
