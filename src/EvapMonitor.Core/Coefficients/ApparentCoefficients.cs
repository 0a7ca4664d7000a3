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

    /// <summary>Evaluates one window.</summary>
    /// <param name="at">Start of the window.</param>
    /// <param name="state">What the line was doing.</param>
    /// <param name="liquor">What it boiled.</param>
    /// <param name="inputs">Means.</param>
    /// <param name="systematic">Systematic standard uncertainties by place.</param>
    /// <param name="random">Random standard uncertainties by place.</param>
    /// <param name="air">Standard uncertainties of the atmosphere, systematic and random.</param>
    /// <param name="whyAbsent">Says of a place why it has no value.</param>
    public LineWindow Evaluate(
        long at, RunningState state, Liquor liquor, LineInputs inputs, ReadOnlySpan<double> systematic, ReadOnlySpan<double> random,
        (double Systematic, double Random) air, Func<int, string> whyAbsent)
    {
        if (state == RunningState.Idle) return LineWindow.Absent(at, state, graph.Line.Effects.Count, "no duty: the line is idle");
        List<int> impossible = LeaveOutImpossible(inputs);
        string WhyAbsent(int place) => impossible.Contains(place) ? $"{instruments.All[place].Signal} reads what cannot be" : whyAbsent(place);
        if (!_balances.TryGetValue(liquor, out Reconciliation? balance)) _balances[liquor] = balance = new Reconciliation(instruments, graph, liquor);
        if (!balance.Solve(inputs, systematic, random, air))
            return LineWindow.Absent(at, state, graph.Line.Effects.Count, "no balance: the readings of the line fit no state in which it could run");
        var quantities = new BalanceQuantities(balance);
        var effects = new EffectWindow[graph.Line.Effects.Count];
        for (int i = 0; i < effects.Length; i++) effects[i] = Of(i, at, state, liquor, balance, quantities, inputs, WhyAbsent);
        return new LineWindow(at, state, quantities.Of(balance.Variables.Evaporation).Value, effects);
    }

    /// <summary>A gauge that reads nonsense must cost one number and no more.</summary>
    private List<int> LeaveOutImpossible(LineInputs inputs)
    {
        var left = new List<int>();
        for (int place = 0; place < inputs.Value.Length; place++)
        {
            if (double.IsNaN(inputs.Value[place]) || Physical.IsPossible(instruments.All[place].Unit.Dimension, inputs.Value[place])) continue;
            inputs.Value[place] = double.NaN;
            left.Add(place);
        }

        return left;
    }

    private EffectWindow Of(
        int i, long at, RunningState state, Liquor liquor, Reconciliation balance, BalanceQuantities quantities, LineInputs inputs, Func<int, string> whyAbsent)
    {
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
