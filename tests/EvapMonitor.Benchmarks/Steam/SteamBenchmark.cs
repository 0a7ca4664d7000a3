using System.Diagnostics;
using System.Globalization;
using Tables = EvapMonitor.Core.Properties.Steam;

namespace EvapMonitor.Benchmarks.Steam;

/// <summary>Medians over alternating rounds.</summary>
/// <param name="Call">What was called.</param>
/// <param name="Nanoseconds">Ours, per call.</param>
/// <param name="HandTunedNanoseconds">The hand-tuned C++, per call.</param>
/// <param name="Ratio">Median of the ratios round by round, so that a slow spell of the machine meets both sides.</param>
public sealed record SteamTiming(string Call, double Nanoseconds, double HandTunedNanoseconds, double Ratio);

/// <summary>Steam tables in C# beside the same equations hand-tuned in C++: same random inputs, same process, rounds in turn.</summary>
public static class SteamBenchmark
{
    private const int States = 4096;
    private const int Repeats = 24;
    private const int Rounds = 41;

    /// <summary>Prints the table; 0 when it was measured, 1 when there is nothing to compare with.</summary>
    public static int Run()
    {
        if (Measure() is not { } timings)
            return 1;
        Console.WriteLine("call          ours ns   hand-tuned ns   ratio");
        foreach (var timing in timings)
            Console.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{timing.Call,-12} {timing.Nanoseconds,8:F1} {timing.HandTunedNanoseconds,15:F1} {timing.Ratio,7:F2}"));
        return 0;
    }

    /// <summary>The figures, or null without a C++ compiler.</summary>
    public static IReadOnlyList<SteamTiming>? Measure()
    {
        using var handTuned = HandTunedSteam.Build();
        if (handTuned is null)
            return null;
        var random = new Random(97);
        double[] pressures = new double[States], temperatures = new double[States];
        for (var k = 0; k < States; k++)
        {
            // evaporators: 5 kPa to 500 kPa, vapour up to 60 K superheated
            pressures[k] = 5e3 * double.Pow(100, random.NextDouble());
            temperatures[k] = Tables.SaturationTemperature(pressures[k]) + 60 * random.NextDouble();
        }
        return
        [
            Compare("h''(p)", SaturatedVapour, handTuned.Function("batch_saturated_vapour_enthalpy"), pressures, temperatures),
            Compare("h'(p)", SaturatedLiquid, handTuned.Function("batch_saturated_liquid_enthalpy"), pressures, temperatures),
            Compare("h(p,T) vapour", Vapour, handTuned.Function("batch_vapour_enthalpy"), pressures, temperatures),
            Compare("Tsat(p)", Temperature, handTuned.Function("batch_saturation_temperature"), pressures, temperatures),
        ];
    }

    private static SteamTiming Compare(string call, HandTunedSteam.Batch ours, HandTunedSteam.Batch handTuned, double[] pressures, double[] temperatures)
    {
        double[] mine = new double[States], theirs = new double[States];
        for (var k = 0; k < 60; k++) // past the tiers of the just-in-time compiler
        {
            Time(ours, pressures, temperatures, mine);
            Time(handTuned, pressures, temperatures, theirs);
        }
        for (var k = 0; k < States; k++)
        {
            if (!(double.Abs(mine[k] - theirs[k]) <= 1e-11 * double.Abs(theirs[k])))
                throw new InvalidOperationException($"{call} differs from the hand-tuned implementation at {pressures[k]} Pa: {mine[k]:R}, {theirs[k]:R}.");
        }
        var rounds = Enumerable.Range(0, Rounds)
            .Select(_ => (Mine: Time(ours, pressures, temperatures, mine), Theirs: Time(handTuned, pressures, temperatures, theirs))).ToList();
        return new SteamTiming(call, Median(rounds.Select(r => r.Mine)), Median(rounds.Select(r => r.Theirs)), Median(rounds.Select(r => r.Mine / r.Theirs)));
    }

    private static double Time(HandTunedSteam.Batch batch, double[] pressures, double[] temperatures, double[] answers)
    {
        var start = Stopwatch.GetTimestamp();
        for (var k = 0; k < Repeats; k++)
            batch(pressures, temperatures, answers, States);
        return Stopwatch.GetElapsedTime(start).TotalNanoseconds / (States * Repeats);
    }

    private static double Median(IEnumerable<double> values)
    {
        var sorted = values.Order().ToList();
        return sorted[sorted.Count / 2];
    }

    private static void SaturatedVapour(double[] pressures, double[] temperatures, double[] answers, nuint count)
    {
        for (var k = 0; k < pressures.Length; k++)
            answers[k] = Tables.SaturatedVapourEnthalpy(pressures[k]);
    }

    private static void SaturatedLiquid(double[] pressures, double[] temperatures, double[] answers, nuint count)
    {
        for (var k = 0; k < pressures.Length; k++)
            answers[k] = Tables.SaturatedLiquidEnthalpy(pressures[k]);
    }

    private static void Vapour(double[] pressures, double[] temperatures, double[] answers, nuint count)
    {
        for (var k = 0; k < pressures.Length; k++)
            answers[k] = Tables.VapourEnthalpy(pressures[k], temperatures[k]);
    }

    private static void Temperature(double[] pressures, double[] temperatures, double[] answers, nuint count)
    {
        for (var k = 0; k < pressures.Length; k++)
            answers[k] = Tables.SaturationTemperature(pressures[k]);
    }
}
