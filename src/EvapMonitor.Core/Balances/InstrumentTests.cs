using MathNet.Numerics.Distributions;

namespace EvapMonitor.Core.Balances;

/// <summary>
/// Names readings that do not fit the others: the measurement test on each correction (Mah and Tamhane 1982), one after the other until the rest fits. Where
/// another reading at fault would explain the window nearly as well, nothing can tell which is wrong, and both are named together.
/// </summary>
internal sealed class InstrumentTests
{
    /// <summary>
    /// Chance that a line of sound instruments has one named for good. Accuracies do not change from window to window, so that this, not the number of windows, is
    /// what false alarms depend on.
    /// </summary>
    public const double FalseAlarm = 0.01;

    /// <summary>Most that are named at a time: beyond it the readings as a whole are in doubt.</summary>
    private const int Most = 4;

    /// <summary>
    /// Two readings are told apart when one of them at fault explains the window better than the other by this much of chi-square (95 % with one degree of freedom):
    /// the square of its test is what the sum of squares loses without it.
    /// </summary>
    private const double ClearlyBetter = 3.84;

    /// <summary>A reading whose correction has less spread than this is hardly checked at all.</summary>
    private const double LeastSpread = 0.02;

    private readonly int _places;

    /// <summary>Prepares the tests of a line.</summary>
    public InstrumentTests(LineInstruments instruments)
    {
        _places = instruments.All.Count;
        // Šidák 1967: all of them together keep the chance.
        Critical = Normal.InvCDF(0, 1, 0.5 + (double.Pow(1 - FalseAlarm, 1.0 / int.Max(1, _places)) / 2));
    }

    /// <summary>A correction beyond this many of its standard deviations is too large.</summary>
    public double Critical { get; }

    /// <summary>Correction by its standard deviation; NaN where nothing checks the reading.</summary>
    public static double Test(Redundancy corrections, int place) => corrections.Spread(place) is var spread && spread > LeastSpread ? corrections.Correction(place) / spread : double.NaN;

    /// <summary>Finds the suspects of a window; afterwards the balance is that without them.</summary>
    /// <param name="balance">The balance, solved with these inputs.</param>
    /// <param name="inputs">The means; as before when this returns.</param>
    /// <param name="solve">Solves the balance anew with the inputs as they are; false when that fails.</param>
    public IReadOnlyList<IReadOnlyList<int>> Find(Reconciliation balance, LineInputs inputs, Func<bool> solve)
    {
        if (balance.Corrections.SumOfSquares < Critical * Critical) return [];
        var suspects = new List<IReadOnlyList<int>>();
        var taken = new List<(int Place, double Value)>();
        while (suspects.Count < Most)
        {
            (int worst, double size) = Worst(balance.Corrections);
            if (!(size > Critical)) break;
            suspects.Add([.. Enumerable.Range(0, _places).Where(place => place == worst || (size * size) - Square(balance.Corrections, place) < ClearlyBetter)]);
            taken.Add((worst, inputs.Value[worst]));
            inputs.Value[worst] = double.NaN;
            if (!solve()) break;
        }

        foreach ((int place, double value) in taken) inputs.Value[place] = value;
        return suspects;
    }

    private (int Place, double Size) Worst(Redundancy corrections)
    {
        (int worst, double size) = (-1, 0);
        for (int place = 0; place < _places; place++)
        {
            if (double.Abs(Test(corrections, place)) is var test && test > size) (worst, size) = (place, test);
        }

        return (worst, size);
    }

    private static double Square(Redundancy corrections, int place) => Test(corrections, place) is var test && double.IsNaN(test) ? 0 : test * test;
}
