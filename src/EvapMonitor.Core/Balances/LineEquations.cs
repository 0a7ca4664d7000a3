using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Balances;

/// <summary>
/// The constraints of a line at a state of its variables: residuals and derivatives. Written once; reconciliation, rating and simulator call them.
/// A state is one value for each of <see cref="Variables"/>, in their order.
/// </summary>
public sealed partial class LineEquations
{
    private readonly LineGraph _graph;
    private readonly LineVariables _at;
    private readonly LineProperties _properties;
    private readonly EffectProperties[] _effects;
    private readonly double[] _areas;
    private readonly double _flow, _heat;
    private readonly bool _withMachineCurves;
    private double[] _x = [];
    private ConstraintRows _rows = new();
    private Sloped _steam, _feed;

    /// <summary>The constraints of a line. Not for use by two threads at a time: it keeps its scratch space.</summary>
    /// <param name="graph">The line.</param>
    /// <param name="properties">Properties of water and liquor.</param>
    /// <param name="typicalFlow">A typical liquor flow, such as the feed, kg/s: the size against which residuals are judged.</param>
    /// <param name="withMachineCurves">
    /// True: recompressors keep to their curves, and spray takes all superheat away, as a rating needs it. False: what the machines do is measured.
    /// </param>
    /// <exception cref="ArgumentException">Machine curves are wanted and one is missing, or the typical flow is not above 0.</exception>
    public LineEquations(LineGraph graph, LineProperties properties, double typicalFlow, bool withMachineCurves = false)
    {
        ArgumentNullException.ThrowIfNull(graph);
        if (!(typicalFlow > 0)) throw new ArgumentException("The typical flow is not above 0.", nameof(typicalFlow));
        if (withMachineCurves && graph.Line.Recompressors.FirstOrDefault(machine => machine.Curve is null) is { } bare)
            throw new ArgumentException($"The curve of {bare.Name} is missing.", nameof(withMachineCurves));
        (_graph, _properties, _withMachineCurves) = (graph, properties, withMachineCurves);
        _at = new LineVariables(graph);
        _effects = new EffectProperties[graph.Line.Effects.Count];
        _areas = [.. graph.Bodies.Select(bodies => bodies.Sum(body => body.Area))];
        (_flow, _heat) = (typicalFlow, typicalFlow * LineVariables.LatentHeat / 5);
    }

    /// <summary>The variables.</summary>
    public LineVariables Variables => _at;

    /// <summary>The line.</summary>
    public LineGraph Graph => _graph;

    /// <summary>Evaluates all constraints.</summary>
    /// <param name="state">A value for each variable.</param>
    /// <param name="rows">Receives residuals and derivatives.</param>
    /// <exception cref="ArgumentException">The state has another length.</exception>
    public void Evaluate(double[] state, ConstraintRows rows)
    {
        ArgumentNullException.ThrowIfNull(state);
        ArgumentNullException.ThrowIfNull(rows);
        if (state.Length != _at.Count) throw new ArgumentException($"The state has {state.Length} values where the line has {_at.Count} variables.", nameof(state));
        rows.Clear();
        (_x, _rows) = (state, rows);
        for (int i = 0; i < _effects.Length; i++) _effects[i] = PropertiesOf(i);
        _feed = _properties.LiquorEnthalpy(state[_at.FeedSolids], state[_at.FeedTemperature]);
        if (_graph.HasSteam) _steam = _properties.Superheated(state[_at.SteamPressure], state[_at.SteamSuperheat]);
        LiquorWays();
        for (int i = 0; i < _effects.Length; i++)
        {
            LiquorSide(i);
            ChestSide(i);
            Transfer(i);
            VapourOf(i);
            Flash(i);
        }

        HeatingPressures();
        Whole();
        Heaters();
        for (int r = 0; r < _graph.Line.Recompressors.Count; r++) Recompress(r);
    }

    private Effect EffectAt(int i) => _graph.Line.Effects[i];

    private EffectProperties PropertiesOf(int i)
    {
        EffectVariables at = _at.Effects[i];
        Sloped water = _properties.SaturationTemperature(_x[at.VapourPressure]);
        Sloped elevation = _properties.Elevation(_x[at.Solids], water.Value, _x[_at.ElevationError], out double standard);
        return new(
            water, elevation, standard,
            _properties.VapourEnthalpy(_x[at.VapourPressure], _x[at.Boiling]), _properties.LiquorEnthalpy(_x[at.Solids], _x[at.Boiling]),
            _properties.SaturationTemperature(_x[at.ChestPressure]), _properties.Condensate(_x[at.ChestPressure], _x[at.Subcooling]));
    }

    /// <summary>Adds factor·x.</summary>
    private void Term(int index, double factor = 1)
    {
        _rows.Value(factor * _x[index]);
        _rows.Slope(index, factor);
    }

    /// <summary>Adds factor·x·y.</summary>
    private void Product(int one, int other, double factor = 1)
    {
        _rows.Value(factor * _x[one] * _x[other]);
        _rows.Slope(one, factor * _x[other]);
        _rows.Slope(other, factor * _x[one]);
    }

    /// <summary>Adds factor·flow·h(a, b); an argument of −1 is no variable.</summary>
    private void Carry(int flow, in Sloped h, int a, int b, double factor = 1)
    {
        _rows.Value(factor * _x[flow] * h.Value);
        _rows.Slope(flow, factor * h.Value);
        if (a >= 0) _rows.Slope(a, factor * _x[flow] * h.First);
        if (b >= 0) _rows.Slope(b, factor * _x[flow] * h.Second);
    }

    /// <summary>Properties of an effect at the state: of its liquor and vapour (by pressure and boiling temperature) and of its chest.</summary>
    private readonly record struct EffectProperties(
        Sloped Water, Sloped Elevation, double ElevationStandard, Sloped Vapour, Sloped Liquor, Sloped Heating, Sloped Condensate);
}
