using System.Diagnostics;
using EvapMonitor.Benchmarks.Proofs;
using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Properties;
using EvapMonitor.Core.Tests.Balances;

namespace EvapMonitor.Benchmarks.Balances;

/// <summary>How many windows of a five-effect line a core reconciles in a second, and where the time goes.</summary>
internal static class SpeedProof
{
    private const int Windows = 4_000, State = 3;

    public static int Run()
    {
        var proof = new Proof("speed", "Windows reconciled in a second");
        InstrumentedLine line = Five();
        double[] exact = line.Exact(), standard = line.Standards();
        var noise = new Gaussian(State);
        double[][] readings = [.. Enumerable.Range(0, Windows).Select(_ => exact.Select((value, i) => value + (standard[i] * noise.Next())).ToArray())];
        var instruments = new LineInstruments(line.Graph.Line);
        var coefficients = new ApparentCoefficients(instruments, line.Graph);
        Liquor liquor = line.Graph.Line.Liquor.Always!;
        double[] none = new double[exact.Length];
        WindowReadings Read(double[] values)
        {
            var inputs = new LineInputs(instruments);
            values.CopyTo(inputs.Value, 0);
            return new WindowReadings(RunningState.Producing, liquor, inputs, standard, none, (300, 0));
        }

        int steps = 0;
        double solve = Time(readings, values =>
        {
            if (!line.Solve(values)) throw new InvalidOperationException("No balance.");
            steps += line.Balance.Steps;
        });
        double whole = Time(readings, values =>
        {
            WindowReadings read = Read(values);
            coefficients.Evaluate(0, read, coefficients.Suspects(read), [], _ => "");
        });
        var rows = new ConstraintRows();
        var equations = new LineEquations(line.Graph, new LineProperties(liquor), 50);
        double[] state = [.. line.Balance.State];
        double evaluate = Time(readings, _ => equations.Evaluate(state, rows));
        double perSolve = (double)steps / (2 * Windows);
        proof.Say($"Five effects in forward feed, {exact.Length} instruments, {line.Balance.Variables.Count} variables, {line.Balance.Corrections.Degrees} checks; noise in every reading; one core, {Windows:N0} windows, the second pass counted.");
        proof.Say("");
        proof.Say("| what | windows/s | µs a window |");
        proof.Say("|---|---|---|");
        proof.Say($"| all: judge the instruments, reconcile, uncertainties, coefficients, the balance to be stored | {1 / whole:N0} | {whole * 1e6:0} |");
        proof.Say($"| of this the reconciled state ({perSolve:0.0} steps from a cold start) | {1 / solve:N0} | {solve * 1e6:0} |");
        proof.Say($"| of this the line's equations with the steam tables, per window | | {evaluate * perSolve * 1e6:0} |");
        long before = GC.GetAllocatedBytesForCurrentThread();
        foreach (double[] values in readings) line.Solve(values);
        proof.Say("");
        proof.Say($"Allocated by the solution of a window: {(GC.GetAllocatedBytesForCurrentThread() - before) / Windows:N0} bytes.");
        proof.Write(State);
        return 0;
    }

    /// <summary>The line of five effects with the instruments that a well-equipped one has.</summary>
    private static InstrumentedLine Five()
    {
        TestLines.Case five = TestLines.Named("cascade");
        return InstrumentedLine.Of(
            five with { Graph = new(five.Graph.Line with { Bleeds = [], Heaters = [], CondensateFlashes = [] }) },
            name => !name.EndsWith("-chest", StringComparison.Ordinal) && !name.EndsWith("-flow", StringComparison.Ordinal));
    }

    private static double Time(double[][] readings, Action<double[]> work)
    {
        foreach (double[] values in readings) work(values);
        long began = Stopwatch.GetTimestamp();
        foreach (double[] values in readings) work(values);
        return Stopwatch.GetElapsedTime(began).TotalSeconds / readings.Length;
    }
}
