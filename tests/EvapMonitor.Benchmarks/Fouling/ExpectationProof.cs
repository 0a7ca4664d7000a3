using System.Globalization;
using EvapMonitor.Benchmarks.Proofs;
using EvapMonitor.Core.Tests.Fouling;

namespace EvapMonitor.Benchmarks.Fouling;

/// <summary>
/// What a clean surface is expected to do, against surfaces whose truth is known: the flux exponent where flux and coefficient share the duty's error, and conditions
/// alone, which must not show as scale. Argument: surfaces of each kind (default 100).
/// </summary>
internal static class ExpectationProof
{
    public static int Run(string[] arguments)
    {
        int count = arguments.Length > 0 ? int.Parse(arguments[0], CultureInfo.InvariantCulture) : 100;
        var proof = new Proof("expectation", "The clean expectation against surfaces whose truth is known");
        proof.Say("## The flux exponent");
        proof.Say("");
        proof.Say($"{count} surfaces for each row, five campaigns of 15 days, each down to 0.7 of the clean coefficient (resistance in series). The duty of an hour is read with 2 %, which enters coefficient and flux alike; feed flow with 0.5 %. Cleanliness errors are means over the last day of the last campaign.");
        proof.Say("");
        proof.Say("| flux | load varies, % | true | ordinary least squares | two stages, mean | its scatter | stated, mean | within 2u, % | held at 0, % | cleanliness error, mean | largest |");
        proof.Say("|---|---|---|---|---|---|---|---|---|---|---|");
        foreach (bool constant in new[] { false, true })
        {
            foreach ((double load, double exponent) in new[] { (0.02, 0.2), (0.05, 0.2), (0.02, 0.0), (0.05, 0.0), (0.05, 0.5) }) Flux(proof, count, constant, load, exponent);
        }

        proof.Say("");
        proof.Say("## Conditions alone");
        proof.Say("");
        proof.Say($"{count} surfaces for each row that never foul, cleaned every ten days through two months; then a month without a cleaning, judged by what was learnt before. Solids vary by 3 %, load by 5 % and in swings of 8 %, boiling temperature by 1 K within days and 20 K over the year. The duty of an hour is read with 2 %, a share of whose square lasts for about a day. False resistance in its own standard uncertainties; by chance 68.3 % and 95.4 % are within 1 and 2.");
        proof.Say("");
        proof.Say("| slow share | hours within 1u, % | within 2u, % | daily means within 1u, % | within 2u, % | mean of a month, share of 1/U_clean: mean | scatter | largest |");
        proof.Say("|---|---|---|---|---|---|---|---|");
        foreach (double slow in new[] { 0, 0.2, 0.5 }) Months(proof, count, slow);
        proof.Write(1);
        return 0;
    }

    private static void Flux(Proof proof, int count, bool constant, double load, double exponent)
    {
        ExpectationCases.FluxOutcome[] found = [.. Enumerable.Range(1, count).Select(state => ExpectationCases.Flux(state, load, constant, exponent))];
        double mean = found.Average(one => one.Exponent), scatter = double.Sqrt(found.Average(one => (one.Exponent - mean) * (one.Exponent - mean)));
        proof.Say($"| {(constant ? "follows U at constant driving force" : "follows the load")} | {100 * load:0} | {exponent:0.0} | {found.Average(one => one.Ordinary):0.00} | {mean:0.000} | {scatter:0.000} | {found.Average(one => one.Standard):0.000} | {100.0 * found.Count(one => double.Abs(one.Exponent - exponent) < 2 * one.Standard) / count:0} | {100.0 * found.Count(one => one.Exponent == 0) / count:0} | {found.Average(one => one.CleanlinessErrors.Average()):0.0000} | {found.Max(one => double.Abs(one.CleanlinessErrors.Average())):0.000} |");
    }

    private static void Months(Proof proof, int count, double slow)
    {
        (double[] Hours, double[] Days, double[] Resistance)[] months = [.. Enumerable.Range(1, count).Select(state => ExpectationCases.CleanMonth(state, slow))];
        double[] hours = [.. months.SelectMany(month => month.Hours)], days = [.. months.SelectMany(month => month.Days)];
        double[] means = [.. months.Select(month => month.Resistance.Average() * new SimulatedSurface(1).Clean)];
        proof.Say($"| {slow:0.0} | {Share(hours, 1):0.0} | {Share(hours, 2):0.0} | {Share(days, 1):0.0} | {Share(days, 2):0.0} | {means.Average():0.0000} | {double.Sqrt(means.Average(one => (one - means.Average()) * (one - means.Average()))):0.0000} | {means.Max(double.Abs):0.000} |");
    }

    private static double Share(double[] errors, double limit) => 100.0 * errors.Count(error => double.Abs(error) < limit) / errors.Length;
}
