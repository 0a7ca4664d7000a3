using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.Wording;

/// <summary>Units in which the variables of a balance go out: a fixed one in files, the plant's own on pages.</summary>
internal sealed class BalanceUnits
{
    private static readonly UnitOfMeasure Flow = new("kg/s", Dimension.MassFlow, 1), Temperature = new("degC", Dimension.Temperature, 1, 273.15),
        Pressure = new("kPa", Dimension.Pressure, 1000), Fraction = new("kg/kg", Dimension.Fraction, 1), Power = new("kW", Dimension.Power, 1000);

    private readonly LineInstruments _instruments;
    private readonly Dictionary<string, UnitOfMeasure> _bySignal;

    /// <summary>The units of a line.</summary>
    public BalanceUnits(Line line)
    {
        _instruments = new LineInstruments(line);
        _bySignal = _instruments.All.ToDictionary(instrument => instrument.Signal, instrument => instrument.Unit, StringComparer.Ordinal);
    }

    /// <summary>The unit of a kind in files: SI, but degC, kPa and kW.</summary>
    public static UnitOfMeasure Plain(VariableKind kind) => BalanceLayout.UnitOf(kind) switch
    {
        "kg/kg" => Fraction,
        "K" => Temperature,
        "Pa" => Pressure,
        "W" => Power,
        _ => Flow,
    };

    /// <summary>The unit in which the plant writes a variable: its instrument's, else the first that the line's instruments use for such a quantity. Pressures are absolute.</summary>
    public UnitOfMeasure Shown(BalanceLayout layout, int variable)
    {
        UnitOfMeasure plain = Plain(layout.Variables[variable].Kind);
        IEnumerable<UnitOfMeasure> own = layout.Instruments[variable].Select(place => _bySignal.GetValueOrDefault(layout.Signals[place])).OfType<UnitOfMeasure>();
        return own.Concat(_instruments.All.Select(instrument => instrument.Unit))
            .FirstOrDefault(unit => unit.Dimension == plain.Dimension && unit.Reference == PressureReference.Absolute) ?? plain;
    }

    /// <summary>A difference of readings of a signal in its own unit, with the words for that unit; null for a signal of another plant revision.</summary>
    public (double Value, string Unit)? Difference(string signal, double si)
    {
        if (!_bySignal.TryGetValue(signal, out UnitOfMeasure? unit)) return null;
        // A vacuum reads less where the pressure is higher.
        double sign = unit.Reference == PressureReference.Vacuum ? -1 : 1;
        string written = unit.Dimension != Dimension.Temperature ? unit.Written : unit.Factor == 1 ? "K" : unit.Written;
        return (sign * si / unit.Factor, written.Replace("(g)", "", StringComparison.Ordinal));
    }
}
