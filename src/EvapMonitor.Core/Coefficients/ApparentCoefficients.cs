using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Coefficients;

/// <summary>
/// The apparent coefficient U = Q/(A·(Ts − Tb)) of each effect of a line in one window, from the reconciled balance, with its standard uncertainty, or the reason
/// why there is none.
/// </summary>
internal sealed class ApparentCoefficients(LineInstruments instruments, LineGraph graph)
{
    /// <summary>Least driving force, K, for a coefficient to be worth its name.</summary>
    public const double LeastDrivingForce = 0.5;

    /// <summary>The driving force must stand this many of its standard uncertainties above zero.</summary>
    public const double LeastDrivingForceInStandards = 3;

    /// <summary>A coefficient with a larger share of uncertainty is too uncertain to be shown.</summary>
    public const double LargestUncertainty = 0.25;

    private readonly Dictionary<Liquor, Reconciliation> _balances = [];
    private readonly InstrumentTests _tests = new(instruments);
    private LineInputs? _solved;

    /// <summary>Names the instruments that do not fit the others in one window.</summary>
    public IReadOnlyList<IReadOnlyList<int>> Suspects(in WindowReadings readings)
    {
        if (readings.State == RunningState.Idle) return [];
        LeaveOutImpossible(readings.Inputs);
        WindowReadings these = readings;
        Reconciliation balance = BalanceOf(readings.Liquor);
        bool Solve() => balance.Solve(these.Inputs, these.Systematic, these.Random, these.Air);
        _solved = null;
        if (!Solve()) return [];
        IReadOnlyList<IReadOnlyList<int>> suspects = _tests.Find(balance, readings.Inputs, Solve);
        if (suspects.Count == 0) _solved = readings.Inputs;
        return suspects;
    }

    /// <summary>Evaluates one window.</summary>
    /// <param name="at">Start of the window.</param>
    /// <param name="readings">What was read.</param>
    /// <param name="suspects">Instruments that do not fit the others.</param>
    /// <param name="leftOut">Instruments that have been suspect for long enough: their readings do not count.</param>
    /// <param name="whyAbsent">Says of a place why it has no value.</param>
    public LineWindow Evaluate(long at, in WindowReadings readings, IReadOnlyList<IReadOnlyList<int>> suspects, IReadOnlyList<int> leftOut, Func<int, string> whyAbsent)
    {
        (RunningState state, LineInputs inputs, int count) = (readings.State, readings.Inputs, graph.Line.Effects.Count);
        if (state == RunningState.Idle) return LineWindow.Absent(at, state, count, "no duty: the line is idle");
        List<int> impossible = LeaveOutImpossible(inputs);
        double[] read = leftOut.Count == 0 ? inputs.Value : [.. inputs.Value];
        foreach (int place in leftOut) inputs.Value[place] = double.NaN;
        string WhyAbsent(int place) => impossible.Contains(place) ? $"{instruments.All[place].Signal} reads what cannot be"
            : leftOut.Contains(place) ? $"{instruments.All[place].Signal} does not fit the other readings and was left out" : whyAbsent(place);
        Reconciliation balance = BalanceOf(readings.Liquor);
        // Judging it has solved it already, when nothing was found and nothing is left out.
        bool solved = ReferenceEquals(_solved, inputs) && leftOut.Count == 0;
        if (!solved && !balance.Solve(inputs, readings.Systematic, readings.Random, readings.Air))
            return LineWindow.Absent(at, state, count, "no balance: the readings of the line fit no state in which it could run");
        var quantities = new BalanceQuantities(balance);
        var effects = new EffectWindow[count];
        for (int i = 0; i < effects.Length; i++) effects[i] = Of(i, at, readings, balance, quantities, WhyAbsent);
        return new LineWindow(at, state, quantities.Of(balance.Variables.Evaporation).Value, effects) { Balance = quantities.Window(readings, read, suspects, leftOut) };
    }

    private Reconciliation BalanceOf(Liquor liquor)
    {
        if (!_balances.TryGetValue(liquor, out Reconciliation? balance)) _balances[liquor] = balance = new Reconciliation(instruments, graph, liquor);
        return balance;
    }

    /// <summary>A gauge that reads nonsense must cost one number and no more.</summary>
    private List<int> LeaveOutImpossible(LineInputs inputs)
    {
        var left = new List<int>();
        for (int place = 0; place < inputs.Value.Length; place++)
        {
            if (double.IsNaN(inputs.Value[place]) || instruments.IsDifference(place) || Physical.IsPossible(instruments.All[place].Unit.Dimension, inputs.Value[place])) continue;
            inputs.Value[place] = double.NaN;
            left.Add(place);
        }

        return left;
    }

    private EffectWindow Of(
        int i, long at, in WindowReadings readings, Reconciliation balance, BalanceQuantities quantities, Func<int, string> whyAbsent)
    {
        (RunningState state, Liquor liquor, LineInputs inputs) = (readings.State, readings.Liquor, readings.Inputs);
        EffectVariables its = balance.Variables.Effects[i];
        Measured heating = quantities.Of(its.Heating), boiling = quantities.Of(its.Boiling), duty = quantities.Of(its.Duty);
        Measured force = quantities.Difference(its.Heating, its.Boiling), solids = quantities.Of(its.Solids);
        double area = instruments.Surfaces[i].At(inputs);
        Measured coefficient = quantities.Coefficient(its, area);
        string? reason = WhyNone(i, heating, boiling, force, duty, coefficient, area, inputs, whyAbsent);
        return new EffectWindow
        {
            At = at,
            State = state,
            HeatingTemperature = heating,
            BoilingTemperature = boiling,
            Elevation = quantities.Elevation(its),
            DrivingForce = force,
            HeadCorrectedDrivingForce = quantities.HeadCorrectedDifference(its, inputs.Heights[i], liquor),
            Duty = duty,
            Coefficient = reason is null ? coefficient : Measured.Absent,
            Solids = solids.Value,
            HeatingFrom = heating.IsPresent ? HeatingFrom(i, inputs) : HeatingTemperatureSource.None,
            BoilingFrom = boiling.IsPresent ? BoilingFrom(i, inputs) : BoilingTemperatureSource.None,
            DutyFrom = duty.IsPresent ? DutySource.Balance : DutySource.None,
            Extrapolated = solids.IsPresent && boiling.IsPresent && (!Physical.IsSaturated(boiling.Value) || liquor.BoilingPointElevation(double.Clamp(solids.Value, 0, 0.99), boiling.Value).Extrapolated),
            Reason = reason,
        };
    }

    /// <summary>The surest of the instruments that tell the heating temperature, by the order of the method.</summary>
    private HeatingTemperatureSource HeatingFrom(int i, LineInputs inputs)
    {
        bool Has(int place) => !double.IsNaN(inputs.At(place));
        if (Has(instruments.Effects[i].ChestPressure)) return HeatingTemperatureSource.ChestPressure;
        foreach (HeatingWay way in graph.Heating)
        {
            if (way.To == i && way.From >= 0 && Has(instruments.Effects[way.From].VapourPressure)) return HeatingTemperatureSource.HeatingVapourPressure;
            if (way.To == i && way.From == LineGraph.Steam && graph.Line.Steam.PressureAt == Plant.SteamGaugePlace.Chest && Has(instruments.SteamPressure))
                return HeatingTemperatureSource.SteamPressure;
        }

        return graph.Line.Effects[i].Chest.TemperatureSeesSaturation && Has(instruments.Effects[i].ChestTemperature)
            ? HeatingTemperatureSource.ChestThermometer : HeatingTemperatureSource.Balance;
    }

    private BoilingTemperatureSource BoilingFrom(int i, LineInputs inputs)
    {
        bool Has(int place) => !double.IsNaN(inputs.At(place));
        if (Has(instruments.Effects[i].VapourPressure)) return BoilingTemperatureSource.VapourPressure;
        foreach (HeatingWay way in graph.Heating)
        {
            if (way.From == i && Has(instruments.Effects[way.To].ChestPressure)) return BoilingTemperatureSource.HeatedChestPressure;
        }

        return graph.Line.Effects[i].Leaving.TemperatureSeesFlashedLiquor && Has(instruments.Effects[i].LeavingTemperature)
            ? BoilingTemperatureSource.LiquorThermometer : BoilingTemperatureSource.Balance;
    }

    private string? WhyNone(
        int i, Measured heating, Measured boiling, Measured force, Measured duty, Measured coefficient, double area, LineInputs inputs, Func<int, string> whyAbsent)
    {
        if (!heating.IsPresent) return "no heating temperature: " + AbsenceReasons.Heating(instruments, i, inputs, whyAbsent);
        if (!boiling.IsPresent) return "no boiling temperature: " + AbsenceReasons.Boiling(instruments, i, inputs, whyAbsent);
        if (force.Value < LeastDrivingForce) return "no driving force: under 0.5 K";
        if (force.Value < LeastDrivingForceInStandards * force.Standard) return "no driving force: under three standard uncertainties";
        if (double.IsNaN(area)) return "no coefficient: " + AbsenceReasons.Surface(instruments, i, inputs, whyAbsent);
        if (area == 0) return "no coefficient: no body is in service";
        if (!duty.IsPresent) return "no duty: " + AbsenceReasons.Duty(instruments, i, inputs, whyAbsent);
        if (duty.Value <= 0) return "no duty: no heat flows from the chest to the liquor";
        return coefficient.Standard > LargestUncertainty * coefficient.Value ? "too uncertain: over 25 %" : null;
    }
}

/// <summary>What was read in one window.</summary>
/// <param name="State">What the line was doing.</param>
/// <param name="Liquor">What it boiled.</param>
/// <param name="Inputs">Means by place.</param>
/// <param name="Systematic">Systematic standard uncertainties by place.</param>
/// <param name="Random">Random standard uncertainties by place.</param>
/// <param name="Air">Standard uncertainties of the atmosphere.</param>
internal readonly record struct WindowReadings(
    RunningState State, Liquor Liquor, LineInputs Inputs, double[] Systematic, double[] Random, (double Systematic, double Random) Air);
