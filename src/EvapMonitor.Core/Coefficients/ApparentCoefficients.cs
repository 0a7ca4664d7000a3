using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Coefficients;

/// <summary>
/// The apparent coefficient U = Q/(A·(Ts − Tb)) of each effect of a line in one window, with its standard uncertainty, or the reason why there is none.
/// </summary>
internal sealed class ApparentCoefficients
{
    /// <summary>Least driving force, K, for a coefficient to be worth its name.</summary>
    public const double LeastDrivingForce = 0.5;

    /// <summary>The driving force must stand this many of its standard uncertainties above zero.</summary>
    public const double LeastDrivingForceInStandards = 3;

    /// <summary>A coefficient with a larger share of uncertainty is too uncertain to be shown.</summary>
    public const double LargestUncertainty = 0.25;

    /// <summary>
    /// A later way to the duty (steam, then condensate, then liquor) must be this much surer than an earlier one to be taken, so that the choice does not
    /// flicker between two that are alike.
    /// </summary>
    private const double ClearlySurer = 0.75;

    private readonly LineInstruments _instruments;
    private readonly Propagation _propagation;

    public ApparentCoefficients(LineInstruments instruments, DirectBalance balance)
    {
        _instruments = instruments;
        _propagation = new Propagation(instruments, balance);
    }

    /// <summary>Evaluates one window.</summary>
    /// <param name="at">Start of the window.</param>
    /// <param name="state">What the line was doing.</param>
    /// <param name="liquor">What it boiled.</param>
    /// <param name="inputs">Means.</param>
    /// <param name="systematic">Systematic standard uncertainties by place.</param>
    /// <param name="random">Random standard uncertainties by place.</param>
    /// <param name="air">Standard uncertainties of the atmosphere, systematic and random.</param>
    /// <param name="whyAbsent">Says of a place why it has no value.</param>
    public EffectWindow[] Evaluate(
        long at, RunningState state, Liquor liquor, LineInputs inputs, ReadOnlySpan<double> systematic, ReadOnlySpan<double> random,
        (double Systematic, double Random) air, Func<int, string> whyAbsent)
    {
        _propagation.Run(liquor, inputs, systematic, random, air.Systematic, air.Random);
        var windows = new EffectWindow[_instruments.Effects.Count];
        for (int i = 0; i < windows.Length; i++)
        {
            DutySource source = Surest(i);
            Measured force = At(i, Propagation.Force), duty = At(i, Propagation.DutyFirst + (int)source), coefficient = At(i, Propagation.CoefficientFirst + (int)source);
            string? reason = WhyNone(i, source, force, duty, coefficient, inputs, whyAbsent);
            EffectState found = _propagation.NominalStates[i];
            windows[i] = new EffectWindow
            {
                At = at,
                State = state,
                HeatingTemperature = At(i, Propagation.Heating),
                BoilingTemperature = At(i, Propagation.Boiling),
                Elevation = At(i, Propagation.Elevation),
                DrivingForce = force,
                Duty = source == DutySource.None ? Measured.Absent : duty,
                Coefficient = reason is null ? coefficient : Measured.Absent,
                Solids = found.Solids,
                HeatingFrom = found.HeatingFrom,
                BoilingFrom = found.BoilingFrom,
                DutyFrom = source,
                Extrapolated = found.Extrapolated,
                Reason = reason,
            };
        }

        return windows;
    }

    private Measured At(int effect, int column)
    {
        int k = (effect * Propagation.Columns) + column;
        double value = _propagation.Nominal[k];
        return double.IsFinite(value)
            ? new Measured(value, double.Sqrt(_propagation.SystematicSquares[k]), double.Sqrt(_propagation.RandomSquares[k]))
            : Measured.Absent;
    }

    private DutySource Surest(int effect)
    {
        var best = DutySource.None;
        double least = double.PositiveInfinity;
        for (var source = DutySource.Steam; source <= DutySource.Liquor; source++)
        {
            Measured duty = At(effect, Propagation.DutyFirst + (int)source);
            if (duty.IsPresent && duty.Standard < least * ClearlySurer) (best, least) = (source, duty.Standard);
        }

        return best;
    }

    private string? WhyNone(int i, DutySource source, Measured force, Measured duty, Measured coefficient, LineInputs inputs, Func<int, string> whyAbsent)
    {
        EffectState found = _propagation.NominalStates[i];
        if (found.HeatingFrom == HeatingTemperatureSource.None) return "no heating temperature: " + AbsenceReasons.Heating(_instruments, i, inputs, whyAbsent);
        if (found.BoilingFrom == BoilingTemperatureSource.None) return "no boiling temperature: " + AbsenceReasons.Boiling(_instruments, i, found, inputs, whyAbsent);
        if (force.Value < LeastDrivingForce) return "no driving force: under 0.5 K";
        if (force.Value < LeastDrivingForceInStandards * force.Standard) return "no driving force: under three standard uncertainties";
        if (double.IsNaN(found.Area)) return "no coefficient: " + AbsenceReasons.Surface(_instruments, i, inputs, whyAbsent);
        if (found.Area == 0) return "no coefficient: no body is in service";
        if (source == DutySource.None) return "no duty: " + AbsenceReasons.Duty(_instruments, i, inputs, whyAbsent);
        if (duty.Value <= 0) return "no duty: no heat flows from the chest to the liquor";
        return coefficient.Standard > LargestUncertainty * coefficient.Value ? "too uncertain: over 25 %" : null;
    }
}
