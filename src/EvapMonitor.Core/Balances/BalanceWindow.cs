using MathNet.Numerics.Distributions;

namespace EvapMonitor.Core.Balances;

/// <summary>How well a variable is known from what is measured.</summary>
public enum VariableClass : byte
{
    /// <summary>It does not follow from what is measured.</summary>
    Unobservable,
    /// <summary>It follows, and nothing checks it.</summary>
    Observable,
    /// <summary>It is measured, and the balance checks the reading.</summary>
    Redundant,
}

/// <summary>Which variables of a line a balance shows, and by which instrument each is measured. The same for all windows of a plant revision and liquor.</summary>
public sealed class BalanceLayout
{
    private static readonly VariableKind[] Shown =
    [
        VariableKind.FeedFlow, VariableKind.FeedSolids, VariableKind.FeedTemperature, VariableKind.ProductFlow, VariableKind.ProductSolids, VariableKind.Evaporation,
        VariableKind.SteamFlow, VariableKind.SteamPressure, VariableKind.LeavingFlow, VariableKind.LeavingSolids, VariableKind.BoilingTemperature, VariableKind.VapourFlow,
        VariableKind.VapourPressure, VariableKind.ChestPressure, VariableKind.HeatingTemperature, VariableKind.Duty, VariableKind.CondensateFlow, VariableKind.FlashVapour,
        VariableKind.LiquorFlow, VariableKind.HeatingFlow, VariableKind.CondenserFlow, VariableKind.BleedFlow, VariableKind.HeaterFlow, VariableKind.HeaterIn,
        VariableKind.HeaterOut, VariableKind.HeaterDuty, VariableKind.SuctionFlow, VariableKind.DischargeFlow, VariableKind.MotiveFlow, VariableKind.Power,
        VariableKind.SprayFlow,
    ];

    /// <summary>A layout as it was kept.</summary>
    /// <exception cref="ArgumentException">There are not as many lists of instruments as variables.</exception>
    public BalanceLayout(IReadOnlyList<VariableKey> variables, IReadOnlyList<IReadOnlyList<int>> instruments, IReadOnlyList<string> signals)
    {
        ArgumentNullException.ThrowIfNull(variables);
        ArgumentNullException.ThrowIfNull(instruments);
        if (variables.Count != instruments.Count) throw new ArgumentException($"{variables.Count} variables and {instruments.Count} lists of instruments.", nameof(instruments));
        (Variables, Instruments, Signals, Index) = (variables, instruments, signals, []);
    }

    internal BalanceLayout(LineInstruments instruments, LineVariables variables, MeasurementEquations measurements)
    {
        Index = [.. Enumerable.Range(0, variables.Count).Where(i => Shown.Contains(variables.Keys[i].Kind))];
        Variables = [.. Index.Select(i => variables.Keys[i])];
        Instruments = [.. Index.Select(i => (IReadOnlyList<int>)measurements.On(i))];
        Signals = [.. instruments.All.Select(instrument => instrument.Signal)];
    }

    /// <summary>The variables.</summary>
    public IReadOnlyList<VariableKey> Variables { get; }

    /// <summary>By variable: the instruments that measure it, as indices into <see cref="Signals"/>.</summary>
    public IReadOnlyList<IReadOnlyList<int>> Instruments { get; }

    /// <summary>The signals of the line's instruments.</summary>
    public IReadOnlyList<string> Signals { get; }

    /// <summary>By variable: its index in the state of the line; empty in a layout that was kept.</summary>
    internal int[] Index { get; }

    /// <summary>The SI unit of a variable as text: kg/s, kg/kg, K, Pa, W.</summary>
    public static string UnitOf(VariableKind kind) => kind switch
    {
        VariableKind.FeedSolids or VariableKind.ProductSolids or VariableKind.LeavingSolids => "kg/kg",
        VariableKind.FeedTemperature or VariableKind.BoilingTemperature or VariableKind.HeatingTemperature or VariableKind.HeaterIn or VariableKind.HeaterOut => "K",
        VariableKind.SteamPressure or VariableKind.VapourPressure or VariableKind.ChestPressure => "Pa",
        VariableKind.Duty or VariableKind.HeaterDuty or VariableKind.Power => "W",
        _ => "kg/s",
    };
}

/// <summary>The reconciled balance of a line in one window. Arrays beside the layout's variables or its signals; NaN is absent.</summary>
public sealed record BalanceWindow
{
    /// <summary>What the arrays belong to.</summary>
    public required BalanceLayout Layout { get; init; }

    /// <summary>By variable: what its first instrument with a value read, in the variable's unit (a volume as a mass); one that was left out speaks only where no other does.</summary>
    public required double[] Measured { get; init; }

    /// <summary>By variable: the reconciled value.</summary>
    public required double[] Reconciled { get; init; }

    /// <summary>By variable: its standard uncertainty.</summary>
    public required double[] Standard { get; init; }

    /// <summary>By variable: how well it is known.</summary>
    public required VariableClass[] Class { get; init; }

    /// <summary>
    /// By signal: what the balance wants to add to the reading, in its standard uncertainty; NaN without a reading, 0 where nothing checks it. For a reading that was
    /// left out, what is between it and the balance of the others.
    /// </summary>
    public required double[] Correction { get; init; }

    /// <summary>By signal: the same correction in the SI unit of the reading.</summary>
    public required double[] Wanted { get; init; }

    /// <summary>By signal: that correction by its own standard deviation: beyond about ±4 the reading does not fit the others.</summary>
    public required double[] Test { get; init; }

    /// <summary>Sum of the squared corrections.</summary>
    public required double ChiSquare { get; init; }

    /// <summary>Its degrees of freedom: how many independent checks there are.</summary>
    public required int Degrees { get; init; }

    /// <summary>Sets of signals of which one is wrong; a set of several cannot be told apart by these readings. Indices into the layout's signals.</summary>
    public required IReadOnlyList<IReadOnlyList<int>> Suspects { get; init; }

    /// <summary>Signals that were left out of this window, because they had been suspect for long enough.</summary>
    public required IReadOnlyList<int> LeftOut { get; init; }

    /// <summary>What <see cref="ChiSquare"/> exceeds by chance once in a hundred windows of sound instruments; NaN without any check.</summary>
    public double ChiSquareLimit => Degrees > 0 ? ChiSquared.InvCDF(Degrees, 0.99) : double.NaN;

    /// <summary>The instrument whose reading stands in <see cref="Measured"/>, as an index into the layout's signals; −1 when there is none.</summary>
    public int InstrumentOf(int variable)
    {
        int leftOut = -1;
        foreach (int place in Layout.Instruments[variable])
        {
            if (double.IsNaN(Correction[place])) continue;
            if (!LeftOut.Contains(place)) return place;
            if (leftOut < 0) leftOut = place;
        }

        return leftOut;
    }
}
