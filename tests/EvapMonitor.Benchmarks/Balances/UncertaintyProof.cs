using System.Globalization;
using EvapMonitor.Benchmarks.Proofs;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Tests.Balances;

namespace EvapMonitor.Benchmarks.Balances;

/// <summary>
/// Whether the stated uncertainty of a coefficient is what it says: many draws of all readings and of all that is stated instead of measured, on four lines with three
/// sets of instruments each. Argument: draws (default 2,000).
/// </summary>
internal static class UncertaintyProof
{
    private const int State = 17;
    private static readonly double RootOfThree = double.Sqrt(3);

    public static int Run(string[] arguments)
    {
        int draws = arguments.Length > 0 ? int.Parse(arguments[0], CultureInfo.InvariantCulture) : 2_000;
        var proof = new Proof("uncertainty", "The stated uncertainty against many draws");
        proof.Say($"{draws:N0} draws of every reading and of what is stated (heat losses, vents, shares, elevation correlation), independent; each draw is also one line whose instruments are off by a constant. The figures are of all effects with a coefficient together.");
        proof.Say("");
        proof.Say("| line | instruments | checks | effects without a coefficient | median error, % | to 0.67 of the stated | direct by condensate, median error, % | Gaussian: within 1u, % | within 2u, % | rectangular: within 1u, % (linear theory) | within 2u, % (linear theory) | no balance |");
        proof.Say("|---|---|---|---|---|---|---|---|---|---|---|---|");
        foreach ((string name, string set, Func<InstrumentedLine> make) in ProofLines.All())
        {
            InstrumentedLine line = make();
            Figures gaussian = Draw(line, draws, rectangular: false), box = Draw(line, draws, rectangular: true);
            if (gaussian.Errors.Count == 0)
            {
                proof.Say($"| {name} | {set} ({line.Instruments.Count}) | {line.Balance.Corrections.Degrees} | {gaussian.Without} of {line.Point.Effects.Count} | | | | | | | | {gaussian.Failed + box.Failed} |");
                continue;
            }

            double[] errors = [.. gaussian.Errors.Order()], relative = [.. gaussian.ErrorsInStandards.Order()], direct = [.. gaussian.Direct.Order()];
            proof.Say($"| {name} | {set} ({line.Instruments.Count}) | {line.Balance.Corrections.Degrees} | {gaussian.Without} of {line.Point.Effects.Count} | {100 * Median(errors):0.00} | {Median(relative) / 0.6745:0.00} | {(direct.Length > 0 ? (100 * Median(direct)).ToString("0.00", CultureInfo.InvariantCulture) : "")} | {100 * Share(gaussian.ErrorsInStandards, 1):0.0} | {100 * Share(gaussian.ErrorsInStandards, 2):0.0} | {100 * Share(box.ErrorsInStandards, 1):0.0} ({100 * Share(box.Linear, 1):0.0}) | {100 * Share(box.ErrorsInStandards, 2):0.0} ({100 * Share(box.Linear, 2):0.0}) | {gaussian.Failed + box.Failed} |");
        }

        proof.Write(State);
        return 0;
    }

    private sealed record Figures(List<double> Errors, List<double> ErrorsInStandards, List<double> Linear, List<double> Direct, int Without, int Failed);

    private static Figures Draw(InstrumentedLine line, int draws, bool rectangular)
    {
        var noise = new Gaussian(State);
        var random = new Random(State);
        double One() => rectangular ? RootOfThree * ((2 * random.NextDouble()) - 1) : noise.Next();
        double[] exact = line.Exact(), standard = line.Standards(), read = new double[exact.Length];
        if (!line.Solve(exact)) throw new InvalidOperationException("No balance.");
        EffectPoint[] with = [.. line.Point.Effects.Where(effect => line.Coefficient(effect.Name) is { IsPresent: true } found && found.Standard < ApparentCoefficients.LargestUncertainty * found.Value)];
        double[][] sensitivities = [.. with.Select(effect => line.SensitivityOfCoefficient(effect.Name))];
        double[] stated = [.. with.Select(effect => line.Coefficient(effect.Name).Standard)];
        var figures = new Figures([], [], [], [], line.Point.Effects.Count - with.Length, 0);
        int failed = 0;
        double[] drawn = new double[line.Balance.Measurements.Columns];
        for (int draw = 0; draw < draws; draw++)
        {
            for (int column = 0; column < drawn.Length; column++) drawn[column] = One();
            for (int i = 0; i < read.Length; i++) read[i] = exact[i] + (standard[i] * drawn[i]);
            if (!line.SolveDrawn(read, drawn))
            {
                failed++;
                continue;
            }

            for (int e = 0; e < with.Length; e++)
            {
                EffectPoint effect = with[e];
                Measured found = line.Coefficient(effect.Name);
                double error = found.Value - effect.Coefficient;
                figures.Errors.Add(double.Abs(error / effect.Coefficient));
                figures.ErrorsInStandards.Add(double.Abs(error) / found.Standard);
                figures.Linear.Add(double.Abs(sensitivities[e].Zip(drawn, (slope, by) => slope * by).Sum()) / stated[e]);
                if (line.DirectError(effect, read, drawn) is { } direct) figures.Direct.Add(double.Abs(direct));
            }
        }

        return figures with { Failed = failed };
    }

    private static double Median(double[] sorted) => sorted[sorted.Length / 2];

    private static double Share(List<double> sizes, double limit) => sizes.Count(size => size < limit) / (double)sizes.Count;
}
