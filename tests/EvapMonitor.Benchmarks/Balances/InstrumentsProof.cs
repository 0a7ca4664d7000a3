using System.Globalization;
using EvapMonitor.Benchmarks.Proofs;
using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Conditioning;
using EvapMonitor.Core.Tests.Balances;
using MathNet.Numerics.Distributions;

namespace EvapMonitor.Benchmarks.Balances;

/// <summary>
/// Instruments at fault: how often a sound line is alarmed, how often an instrument that is off by five or ten of its standard uncertainties is found, against what
/// theory allows, and whether the right one is named. Argument: line-weeks (default 200).
/// </summary>
internal static class InstrumentsProof
{
    private const int State = 23, WindowsOfWeek = 2016, Lines = 40;
    private const long Window = 5 * 60_000;

    /// <summary>Share of the uncertainty that changes from window to window; the rest is the instrument's accuracy, which does not.</summary>
    private const double RandomShare = 0.4;

    private static readonly double RootOfThree = double.Sqrt(3);

    public static int Run(string[] arguments)
    {
        int weeks = arguments.Length > 0 ? int.Parse(arguments[0], CultureInfo.InvariantCulture) : 200;
        var proof = new Proof("instruments", "Instruments at fault");
        Healthy(proof, weeks);
        proof.Say("");
        Faulty(proof);
        proof.Write(State);
        return 0;
    }

    private static void Healthy(Proof proof, int weeks)
    {
        proof.Say($"{weeks} weeks of sound lines, each with its own accuracies (rectangular, constant over the week) and noise (Gaussian, {RandomShare:0.0} of the standard uncertainty) in each of {WindowsOfWeek:N0} windows. An alarm is an instrument left out; for good when it is so in the last window.");
        proof.Say("");
        proof.Say("| line | instruments | alarms a line and week | lines alarmed for good, % | windows without a balance |");
        proof.Say("|---|---|---|---|---|");
        foreach ((string name, string set, Func<InstrumentedLine> make) in ProofLines.All().Where(one => one.Set == "usual"))
        {
            (int alarms, int forGood, int without) = (0, 0, 0);
            object gate = new();
            Parallel.For(0, weeks, new ParallelOptions { MaxDegreeOfParallelism = 2 }, make, (week, _, line) =>
            {
                (int raised, bool last, int missing) = Week(line, State + (1000 * week));
                lock (gate) (alarms, forGood, without) = (alarms + raised, forGood + (last ? 1 : 0), without + missing);
                return line;
            }, _ => { });
            proof.Say($"| {name} | {set} | {alarms / (double)weeks:0.000} | {100.0 * forGood / weeks:0.0} | {without} |");
        }
    }

    private static (int Alarms, bool ForGood, int Without) Week(InstrumentedLine line, int state)
    {
        var noise = new Gaussian(state);
        var random = new Random(state);
        double[] exact = line.Exact(), standard = line.Standards(), read = new double[exact.Length];
        double[] off = [.. exact.Select((_, i) => standard[i] * double.Sqrt(1 - (RandomShare * RandomShare)) * RootOfThree * ((2 * random.NextDouble()) - 1))];
        var suspicions = new Suspicions(Window, TimeSpan.FromHours(1));
        var before = new HashSet<int>();
        (int alarms, int without) = (0, 0);
        for (int k = 0; k < WindowsOfWeek; k++)
        {
            for (int i = 0; i < read.Length; i++) read[i] = exact[i] + off[i] + (RandomShare * standard[i] * noise.Next());
            // A window without a balance judges nobody.
            if (line.Suspects(read) is { } suspects) suspicions.Keep(k * Window, [.. suspects.Where(set => set.Count == 1).Select(set => set[0])]);
            else without++;
            IReadOnlyList<int> now = suspicions.LeftOutAt(k * Window);
            alarms += now.Count(place => !before.Contains(place));
            before = [.. now];
            suspicions.Forget(long.MaxValue, (k - 24) * Window);
        }

        return (alarms, before.Count > 0, without);
    }

    private static void Faulty(Proof proof)
    {
        proof.Say($"Each instrument in turn off by 5 and by 10 of its standard uncertainties, on {Lines} lines each with accuracies and noise as above. Found: named in the window. Theory: the power of a test on that correction alone. Instruments that nothing checks are left out of the count. Alone: named as the only one, else with those that the readings cannot tell from it.");
        proof.Say("");
        proof.Say("| line | instruments | off by | checked | found, % | theory, % | found rightly, of those found, % | alone, of those, % | windows until left out, median | no balance at all |");
        proof.Say("|---|---|---|---|---|---|---|---|---|---|");
        foreach ((string name, string set, Func<InstrumentedLine> make) in ProofLines.All().Where(one => one.Set != "few"))
        {
            foreach (double size in new[] { 5.0, 10.0 })
            {
                Tally all = Try(make(), size);
                proof.Say($"| {name} | {set} | {size:0} u | {all.Instruments} | {100.0 * all.Found / all.Tried:0.0} | {100 * all.Power / all.Tried:0.0} | {100.0 * all.Right / int.Max(1, all.Found):0.0} | {100.0 * all.Alone / int.Max(1, all.Right):0.0} | {(all.Until.Count > 0 ? all.Until.Order().ElementAt(all.Until.Count / 2) : double.NaN)} | {all.Without} |");
            }
        }
    }

    private sealed record Tally(List<int> Until)
    {
        public int Instruments { get; set; }

        public int Tried { get; set; }

        public int Found { get; set; }

        public int Right { get; set; }

        public int Alone { get; set; }

        public double Power { get; set; }

        public int Without { get; set; }
    }

    private static Tally Try(InstrumentedLine line, double size)
    {
        var tally = new Tally([]);
        var random = new Random(State);
        var noise = new Gaussian(State);
        double[] exact = line.Exact(), standard = line.Standards(), read = new double[exact.Length];
        double critical = new InstrumentTests(new LineInstruments(line.Graph.Line)).Critical;
        if (!line.Solve(exact)) throw new InvalidOperationException("No balance.");
        double[] spread = [.. exact.Select((_, place) => line.Balance.Corrections.Spread(place))];
        for (int place = 0; place < exact.Length; place++)
        {
            if (spread[place] < 0.02) continue;
            tally.Instruments++;
            // A bias of δ moves the test by δ·spread; two-sided.
            double moved = size * spread[place], power = Normal.CDF(0, 1, moved - critical) + Normal.CDF(0, 1, -moved - critical);
            for (int one = 0; one < Lines; one++)
            {
                double[] off = [.. exact.Select((_, i) => standard[i] * double.Sqrt(1 - (RandomShare * RandomShare)) * RootOfThree * ((2 * random.NextDouble()) - 1))];
                int sign = random.Next(2) == 0 ? -1 : 1;
                var suspicions = new Suspicions(Window, TimeSpan.FromHours(1));
                // Sound windows before it.
                for (int k = 1; k <= 24; k++) suspicions.Keep(-k * Window, []);
                tally.Tried++;
                tally.Power += power;
                for (int k = 0; k < 36; k++)
                {
                    for (int i = 0; i < read.Length; i++) read[i] = exact[i] + off[i] + (RandomShare * standard[i] * noise.Next());
                    read[place] += sign * size * standard[place];
                    if (line.Suspects(read) is not { } suspects)
                    {
                        tally.Without++;
                        break;
                    }

                    if (k == 0)
                    {
                        if (suspects.Count > 0) tally.Found++;
                        if (suspects.Any(set => set.Contains(place))) tally.Right++;
                        if (suspects.Any(set => set.Count == 1 && set[0] == place)) tally.Alone++;
                        // How long it takes is looked at on a few lines only.
                        if (one >= 4 || !suspects.Any(set => set.Count == 1 && set[0] == place)) break;
                    }

                    suspicions.Keep(k * Window, [.. suspects.Where(set => set.Count == 1).Select(set => set[0])]);
                    if (!suspicions.LeftOutAt(k * Window).Contains(place)) continue;
                    tally.Until.Add(k + 1);
                    break;
                }
            }
        }

        return tally;
    }
}
