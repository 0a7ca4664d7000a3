using System.Diagnostics;
using EvapMonitor.Benchmarks.Rating;
using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;

namespace EvapMonitor.Benchmarks.Proofs;

/// <summary>How surely and how fast a five-effect line is rated: 10,000 random lines and conditions, and 10,000 random states to start from.</summary>
internal static class RatingProof
{
    private const int Count = 10_000, Seed = 20260;

    /// <summary>Prints the table; 0 when every line found its operating point.</summary>
    public static int Run()
    {
        var proof = new Proof("rating", "Rating of five-effect lines");
        proof.Say("Lines of five effects with random surfaces, coefficients, routes of the liquor, bleeds and flash, at random steam, condenser, feed and product.");
        proof.Say("");
        var random = new Random(Seed);
        for (int warm = 0; warm < 50; warm++) Solve(RandomLines.Next(new Random(warm)), null);
        int found = 0, steps = 0, most = 0;
        var reasons = new Dictionary<string, int>();
        var times = new List<double>(Count);
        for (int i = 0; i < Count; i++)
        {
            var drawn = RandomLines.Next(random);
            long begin = Stopwatch.GetTimestamp();
            RatingResult result = Solve(drawn, null);
            times.Add(Stopwatch.GetElapsedTime(begin).TotalMilliseconds);
            if (result.Point is { } point)
            {
                found++;
                steps += point.Steps;
                most = Math.Max(most, point.Steps);
            }
            else
            {
                string kind = new([.. result.Reason!.Where(c => !char.IsDigit(c) && c != '.')]);
                reasons[kind] = reasons.GetValueOrDefault(kind) + 1;
            }
        }

        times.Sort();
        proof.Say("| what | figure |");
        proof.Say("|---|---|");
        proof.Say($"| random lines and conditions | {Count:N0} |");
        proof.Say($"| operating point found | {found} ({100.0 * found / Count:0.00} %) |");
        proof.Say($"| Newton steps, mean and most | {(double)steps / Math.Max(1, found):0.0}, {most} |");
        proof.Say($"| time per rating, median, 99 %, most | {times[Count / 2]:0.000} ms, {times[Count * 99 / 100]:0.000} ms, {times[^1]:0.0} ms |");
        foreach ((string reason, int count) in reasons.OrderByDescending(pair => pair.Value)) proof.Say($"| {reason} | {count} |");
        int fromElsewhere = FromElsewhere();
        proof.Say($"| random states to start from, same point found | {fromElsewhere} of {Count} |");
        proof.Write(Seed);
        return found == Count && fromElsewhere == Count ? 0 : 1;
    }

    /// <summary>Each line again, from the operating point of quite another line.</summary>
    private static int FromElsewhere()
    {
        var random = new Random(Seed + 1);
        int same = 0;
        for (int i = 0; i < Count; i++)
        {
            var drawn = RandomLines.Next(random);
            var rating = new Core.Outlook.Rating(drawn.Graph, RandomLines.Properties);
            RatingConditions other = drawn.Conditions with
            {
                SteamPressure = drawn.Conditions.SteamPressure * (0.8 + (0.5 * random.NextDouble())),
                FeedTemperature = 320 + (60 * random.NextDouble()),
                ProductSolids = 0.3 + (0.35 * random.NextDouble()),
                Coefficients = drawn.Conditions.Coefficients.ToDictionary(pair => pair.Key, pair => pair.Value * (0.6 + (0.8 * random.NextDouble()))),
            };
            if (rating.Solve(drawn.Conditions).Point is not { } here) continue;
            if (rating.Solve(other).Point is not { } there || rating.Solve(drawn.Conditions, there).Point is not { } again) continue;
            if (Math.Abs((again.FeedFlow / here.FeedFlow) - 1) < 1e-8) same++;
        }

        return same;
    }

    private static RatingResult Solve((LineGraph Graph, RatingConditions Conditions) drawn, OperatingPoint? near) =>
        new Core.Outlook.Rating(drawn.Graph, RandomLines.Properties).Solve(drawn.Conditions, near);
}
