using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Coefficients;

/// <summary>Quantities of a reconciled window with their standard uncertainties, each by how it follows the readings (JCGM 100, 5.2: what is shared cancels).</summary>
internal sealed class BalanceQuantities(Reconciliation balance)
{
    /// <summary>Standard acceleration of free fall, m/s² (3rd General Conference on Weights and Measures, 1901).</summary>
    private const double StandardGravity = 9.80665;

    private readonly double[] _sensitivity = new double[balance.Measurements.Columns];

    /// <summary>A variable; absent when it does not follow from what is measured.</summary>
    public Measured Of(int variable)
    {
        if (!balance.IsObservable(variable)) return Measured.Absent;
        Array.Clear(_sensitivity);
        balance.AddSensitivity(variable, 1, _sensitivity);
        return With(balance.State[variable]);
    }

    /// <summary>The difference of two variables.</summary>
    public Measured Difference(int one, int other)
    {
        if (!balance.IsObservable(one) || !balance.IsObservable(other)) return Measured.Absent;
        Array.Clear(_sensitivity);
        balance.AddSensitivity(one, 1, _sensitivity);
        balance.AddSensitivity(other, -1, _sensitivity);
        return With(balance.State[one] - balance.State[other]);
    }

    /// <summary>Boiling temperature less the saturation temperature at the vapour pressure.</summary>
    public Measured Elevation(in EffectVariables its)
    {
        if (!balance.IsObservable(its.Boiling) || !balance.IsObservable(its.VapourPressure)) return Measured.Absent;
        Sloped saturation = balance.Properties.SaturationTemperature(balance.State[its.VapourPressure]);
        Array.Clear(_sensitivity);
        balance.AddSensitivity(its.Boiling, 1, _sensitivity);
        balance.AddSensitivity(its.VapourPressure, -saturation.First, _sensitivity);
        return With(balance.State[its.Boiling] - saturation.Value);
    }

    /// <summary>
    /// Ts − Tb with the saturation temperature taken at half the liquor's height: (Ts − Tb) − [Tsat(p + ρ·g·h/2) − Tsat(p)]. The elevation stays that of the
    /// surface. Absent without a level, and where a height under zero is read.
    /// </summary>
    /// <param name="its">Variables of the effect.</param>
    /// <param name="height">Its level, m: no part of the balance, so that its error is independent of it.</param>
    /// <param name="liquor">What boils.</param>
    public Measured HeadCorrectedDifference(in EffectVariables its, (double Value, double Systematic, double Random) height, Liquor liquor)
    {
        if (!(height.Value >= 0) || !balance.IsObservable(its.Heating) || !balance.IsObservable(its.Boiling) || !balance.IsObservable(its.VapourPressure)) return Measured.Absent;
        // Without solids the liquor counts as water: density enters the small term only.
        double solids = balance.IsObservable(its.Solids) ? double.Clamp(balance.State[its.Solids], 0, 0.95) : 0;
        PropertyValue density = liquor.Density(solids, balance.State[its.Boiling]);
        double pressure = balance.State[its.VapourPressure], half = StandardGravity / 2;
        Sloped above = balance.Properties.SaturationTemperature(pressure), within = balance.Properties.SaturationTemperature(pressure + (density.Value * half * height.Value));
        Array.Clear(_sensitivity);
        balance.AddSensitivity(its.Heating, 1, _sensitivity);
        balance.AddSensitivity(its.Boiling, -1, _sensitivity);
        balance.AddSensitivity(its.VapourPressure, above.First - within.First, _sensitivity);
        Measured found = With(balance.State[its.Heating] - balance.State[its.Boiling] - (within.Value - above.Value));
        double perMetre = within.First * half * density.Value, ofDensity = within.First * half * height.Value * density.Standard;
        return found with
        {
            Systematic = double.Sqrt((found.Systematic * found.Systematic) + (perMetre * height.Systematic * perMetre * height.Systematic) + (ofDensity * ofDensity)),
            Random = double.Sqrt((found.Random * found.Random) + (perMetre * height.Random * perMetre * height.Random)),
        };
    }

    /// <summary>Q/(A·(Ts − Tb)).</summary>
    public Measured Coefficient(in EffectVariables its, double area)
    {
        if (!(area > 0) || !balance.IsObservable(its.Duty) || !balance.IsObservable(its.Heating) || !balance.IsObservable(its.Boiling)) return Measured.Absent;
        double duty = balance.State[its.Duty], force = balance.State[its.Heating] - balance.State[its.Boiling];
        double coefficient = HeatBalance.Coefficient(duty, area, force);
        Array.Clear(_sensitivity);
        balance.AddSensitivity(its.Duty, coefficient / duty, _sensitivity);
        balance.AddSensitivity(its.Heating, -coefficient / force, _sensitivity);
        balance.AddSensitivity(its.Boiling, coefficient / force, _sensitivity);
        return With(coefficient);
    }

    /// <summary>Of the quantity asked last: the share of its variance that each measured and each stated quantity brings.</summary>
    public IEnumerable<(string Name, double Share)> LastShares()
    {
        double all = 0;
        foreach (double one in _sensitivity) all += one * one;
        for (int column = 0; column < _sensitivity.Length && all > 0; column++) yield return (balance.NameOf(column), _sensitivity[column] * _sensitivity[column] / all);
    }

    /// <summary>All that the balance shows.</summary>
    /// <param name="readings">What the balance rests on.</param>
    /// <param name="read">What was read, with what was left out.</param>
    /// <param name="suspects">Instruments that do not fit the others.</param>
    /// <param name="leftOut">Instruments that do not count.</param>
    public BalanceWindow Window(in WindowReadings readings, double[] read, IReadOnlyList<IReadOnlyList<int>> suspects, IReadOnlyList<int> leftOut)
    {
        BalanceLayout layout = balance.Layout;
        int variables = layout.Variables.Count, signals = layout.Signals.Count;
        var window = new BalanceWindow
        {
            Layout = layout, Measured = new double[variables], Reconciled = new double[variables], Standard = new double[variables], Class = new VariableClass[variables],
            Correction = new double[signals], Wanted = new double[signals], Test = new double[signals], ChiSquare = balance.Corrections.SumOfSquares,
            Degrees = balance.Corrections.Degrees, Suspects = suspects, LeftOut = leftOut,
        };
        for (int place = 0; place < signals; place++)
        {
            bool counts = !double.IsNaN(readings.Inputs.Value[place]);
            window.Correction[place] = counts ? balance.Corrections.Correction(place) : double.NaN;
            window.Wanted[place] = window.Correction[place] * double.Hypot(readings.Systematic[place], readings.Random[place]);
            window.Test[place] = counts ? InstrumentTests.Test(balance.Corrections, place) : double.NaN;
        }

        for (int k = 0; k < variables; k++) Fill(window, k, readings, read);
        return window;
    }

    private void Fill(BalanceWindow window, int k, in WindowReadings readings, double[] read)
    {
        int variable = window.Layout.Index[k];
        bool isPresent = balance.IsObservable(variable);
        double value = isPresent ? balance.State[variable] : double.NaN;
        (window.Reconciled[k], window.Standard[k], window.Measured[k]) = (value, isPresent ? balance.Standard(variable) : double.NaN, double.NaN);
        bool isChecked = false;
        foreach (int place in window.Layout.Instruments[k])
        {
            isChecked |= !double.IsNaN(window.Test[place]);
            if (!window.LeftOut.Contains(place) || double.IsNaN(read[place]) || !isPresent) continue;
            double says = balance.ReadingOf(variable, place, read[place]), standard = double.Hypot(readings.Systematic[place], readings.Random[place]);
            window.Wanted[place] = (value - says) * (says == 0 ? 1 : read[place] / says);
            window.Correction[place] = window.Wanted[place] / standard;
        }

        if (window.InstrumentOf(k) is >= 0 and var shown) window.Measured[k] = balance.ReadingOf(variable, shown, read[shown]);
        window.Class[k] = !isPresent ? VariableClass.Unobservable : isChecked ? VariableClass.Redundant : VariableClass.Observable;
    }

    private Measured With(double value)
    {
        (double systematic, double random) = balance.Corrections.Uncertainty(_sensitivity);
        return new Measured(value, systematic, random);
    }
}
