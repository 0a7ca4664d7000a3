using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Simulator;

/// <summary>What the instruments of a line write: the truth with their noise, their faults and their digits. A reading depends on its signal and instant alone.</summary>
public sealed class LineReadings
{
    /// <summary>Scatter of a single reading as a share of the instrument's standard uncertainty.</summary>
    private const double Scatter = 0.5;

    /// <summary>Scatter of a flow meter at rest, kg/s.</summary>
    private const double Trembling = 0.004;

    private readonly LineSimulation _simulation;
    private readonly ILookup<string, InstrumentFault> _faults;
    private readonly ulong[] _keys;

    /// <summary>The readings of a line.</summary>
    public LineReadings(LineSimulation simulation, IEnumerable<InstrumentFault> faults)
    {
        ArgumentNullException.ThrowIfNull(simulation);
        _simulation = simulation;
        _faults = faults.ToLookup(fault => fault.Signal);
        _keys = [.. simulation.Instruments.Select(at => Noise.KeyOf(at.Instrument.Signal))];
    }

    /// <summary>The line behind them.</summary>
    public LineSimulation Simulation => _simulation;

    /// <summary>The reading of an instrument; null when there is none.</summary>
    /// <param name="instrument">Index in the simulation's instruments.</param>
    /// <param name="at">The instant, ms since 1970-01-01T00:00:00Z.</param>
    public Reading? At(int instrument, long at)
    {
        double day = _simulation.DayOf(at), season = day % StoryTime.Season, begun = day - season;
        double added = 0;
        long read = at;
        Quality quality = Quality.Good;
        foreach (InstrumentFault fault in _faults[_simulation.Instruments[instrument].Instrument.Signal])
        {
            if (!fault.When.Holds(season)) continue;
            switch (fault.Kind)
            {
                case FaultKind.Silent: return null;
                case FaultKind.Bad: return new Reading(at, double.NaN, Quality.Bad);
                case FaultKind.Uncertain: quality = Quality.Uncertain; break;
                case FaultKind.Frozen: read = at - (long)((day - begun - fault.When.From) * TimeSpan.MillisecondsPerDay); break;
                case FaultKind.Offset: added += fault.Amount; break;
                default: added += fault.Amount * (season - fault.When.From); break;
            }
        }

        double written = Written(instrument, read, added);
        return double.IsNaN(written) ? null : new Reading(at, written, quality);
    }

    private double Written(int instrument, long at, double added)
    {
        Instrument gauge = _simulation.Instruments[instrument].Instrument;
        double truth = _simulation.TruthAt(instrument, at);
        if (gauge.Unit.Dimension == Dimension.Number || double.IsNaN(truth)) return truth;
        // An accuracy in shares of the reading is meant in °C, not in K.
        double seen = gauge.Unit.Dimension == Dimension.Temperature ? truth - 273.15 : truth;
        double scatter = Scatter * gauge.Accuracy.Standard(seen) * Noise.At(_keys[instrument], at);
        // A flow meter at rest trembles a little above zero.
        if (truth == 0 && gauge.Unit.Dimension == Dimension.MassFlow) scatter = double.Abs(Trembling * Noise.At(_keys[instrument], at));
        return double.Round(gauge.Unit.FromSi(truth + scatter) + added, Digits(gauge.Unit));
    }

    private static int Digits(UnitOfMeasure unit) => unit.Dimension switch
    {
        Dimension.Pressure => unit.Factor > 1e4 ? 5 : 2,
        Dimension.MassFlow => unit.Factor > 0.1 ? 3 : 1,
        Dimension.Power => 1,
        _ => 3,
    };
}
