using System.Diagnostics;
using System.Globalization;
using EvapMonitor.Benchmarks.Proofs;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Tests.Fouling;

namespace EvapMonitor.Benchmarks.Fouling;

/// <summary>What times out of production are taken for, against what they were. Argument: surfaces (default 40, sixty happenings each).</summary>
internal static class CampaignsProof
{
    private const int Happenings = 60;

    public static int Run(string[] arguments)
    {
        int count = arguments.Length > 0 ? int.Parse(arguments[0], CultureInfo.InvariantCulture) : 40;
        var proof = new Proof("campaigns", "What times out of production are taken for");
        Happening[] all = [.. Enumerable.Range(1, count).SelectMany(state => CampaignCases.Year(state, Happenings))];
        proof.Say($"{count} surfaces with {Happenings} happenings each, three to eight days apart, after six logged cleanings to learn from. Two products (clean coefficients 2,500 and 2,000 W/(m²·K)), loads of 1 and 0.8, a season, hours that scatter by 1 to 3 % (a fifth of its square slow), half of the surfaces at constant driving force. Unlogged cleanings remove 30 to 100 % of what there is.");
        proof.Say("");
        proof.Say("| what happened | number | taken for a cleaning that cleaned | that did not clean | cannot be told | stop | right, % |");
        proof.Say("|---|---|---|---|---|---|---|");
        bool enough = true;
        foreach (HappenedKind kind in Enum.GetValues<HappenedKind>())
        {
            Happening[] of = [.. all.Where(one => one.Kind == kind && (kind != HappenedKind.UnloggedCleaning || one.Rise > 3 * one.Standard))];
            int cleaned = Count(of, CleaningVerdict.Cleaned), failed = Count(of, CleaningVerdict.DidNotClean), untold = Count(of, CleaningVerdict.CannotBeTold), stops = of.Count(one => one.TakenFor is null);
            int right = kind switch { HappenedKind.UnloggedCleaning or HappenedKind.LoggedCleaning => cleaned, HappenedKind.FailedLoggedCleaning => failed, _ => stops };
            enough &= right >= 0.95 * of.Length;
            proof.Say($"| {Word(kind)} | {of.Length} | {cleaned} | {failed} | {untold} | {stops} | {100.0 * right / of.Length:0.0} |");
        }

        Happening[] recognised = [.. all.Where(one => one.TakenFor?.Source == CleaningSource.Recognised)], said = [.. all.Where(one => one.TakenFor?.Verdict == CleaningVerdict.DidNotClean)];
        double truly = 100.0 * recognised.Count(one => one.Kind == HappenedKind.UnloggedCleaning) / recognised.Length, trulyFailed = 100.0 * said.Count(one => one.Kind == HappenedKind.FailedLoggedCleaning) / said.Length;
        int stood = all.Count(one => one.Kind is HappenedKind.Stop or HappenedKind.ProductChange or HappenedKind.LoadChange), weak = all.Count(one => one.Kind == HappenedKind.UnloggedCleaning && !(one.Rise > 3 * one.Standard));
        proof.Say("");
        proof.Say($"Of {recognised.Length} recognised cleanings {truly:0.0} % were cleanings; {stood} stops, changes of product and changes of load made {recognised.Count(one => one.Kind != HappenedKind.UnloggedCleaning)} false ones. Of {said.Length} verdicts \"did not clean\" {trulyFailed:0.0} % were right. {weak} unlogged cleanings that brought back less than three standard uncertainties, or could not be compared, are not in the table.");
        Speed(proof);
        proof.Write(1);
        return enough && truly >= 95 && trulyFailed >= 95 ? 0 : 1;
    }

    private static void Speed(Proof proof)
    {
        var surface = new SimulatedSurface(1) { Season = 8 };
        for (int campaign = 0; campaign < 30; campaign++)
        {
            surface.Produce(287);
            surface.CleanFor(5);
        }

        double[] times = [.. Enumerable.Range(0, 40).Select(_ =>
        {
            var clock = Stopwatch.StartNew();
            surface.History();
            return clock.Elapsed.TotalMilliseconds;
        })];
        proof.Say("");
        proof.Say($"A year of {surface.Hours.Count:N0} hours with 30 campaigns: {times.Min():0} ms at the least, {times.Order().ElementAt(20):0} ms in the middle of 40 runs.");
    }

    private static int Count(Happening[] of, CleaningVerdict verdict) => of.Count(one => one.TakenFor?.Verdict == verdict);

    private static string Word(HappenedKind kind) => kind switch
    {
        HappenedKind.UnloggedCleaning => "cleaning that nobody logged, recovery above 3u",
        HappenedKind.Stop => "stop",
        HappenedKind.FailedLoggedCleaning => "logged cleaning that did nothing",
        HappenedKind.ProductChange => "stop with a change of product",
        HappenedKind.LoadChange => "stop with a change of load",
        _ => "logged cleaning that cleaned",
    };
}
