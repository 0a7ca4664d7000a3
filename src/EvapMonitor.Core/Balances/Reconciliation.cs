using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Balances;

/// <summary>
/// The reconciled balance of a line in one window: the state nearest to what was measured, each correction counted in standard uncertainties, among the states in
/// which the equations of the line hold. Successive linearisation; in each step the unknowns are eliminated, what is left binds measured quantities alone and
/// gives their corrections (weighted least squares with constraints, VDI 2048-1). Not for use by two threads at a time.
/// </summary>
internal sealed partial class Reconciliation
{
    private const int MostSteps = 30, MostWaits = 8, MostPlans = 256;

    /// <summary>A step under this, by the variables' scales, is the last: the next would be its square.</summary>
    private const double Converged = 1e-4;

    private readonly LineInstruments _instruments;
    private readonly LineEquations _equations;
    private readonly LineVariables _variables;
    private readonly LineProperties _properties;
    private readonly MeasurementEquations _measurements;
    private readonly BalanceStart _start;
    private readonly StateSteps _steps;
    private readonly Elimination _system;
    private readonly Redundancy _redundancy;
    private readonly double[] _scale, _known, _unknown, _moved, _next, _measured, _reading, _standard;
    private readonly double _typicalFlow;
    private readonly ConstraintRows _rows = new();
    private readonly bool[] _hasValue, _planFor;
    private readonly int[] _pivotRow, _free;
    private readonly Dictionary<string, Plan> _plans = new(StringComparer.Ordinal);
    private readonly Dictionary<string, int> _ways;
    private Plan _plan = new([], [], [], [], false);
    private bool _planned;

    private (int Row, int Column)[] _pivots = [];

    /// <summary>Prepares the reconciliation of a line that boils one liquor.</summary>
    public Reconciliation(LineInstruments instruments, LineGraph graph, Liquor liquor)
    {
        _instruments = instruments;
        _properties = new LineProperties(liquor);
        // A flow that such surfaces could evaporate at 1,000 W/(m²·K) and 10 K: only a size.
        _typicalFlow = double.Max(1, graph.Line.Effects.Sum(effect => effect.Area) * 1e4 / LineVariables.LatentHeat);
        _equations = new LineEquations(graph, _properties, _typicalFlow);
        _variables = _equations.Variables;
        _measurements = new MeasurementEquations(instruments, graph, _variables, _properties, _typicalFlow);
        Layout = new BalanceLayout(instruments, _variables, _measurements);
        Stated = [.. _measurements.StatedOnes.Select(one => one.Value)];
        _start = new BalanceStart(graph, _variables, _properties);
        _scale = _variables.Scales(_typicalFlow);
        _steps = new StateSteps(_variables.Keys, _scale);
        int n = _variables.Count, columns = _measurements.Columns;
        _system = new Elimination(n, columns);
        _redundancy = new Redundancy(_system, n, columns);
        (State, _known, _unknown, _moved, _next) = (new double[n], new double[n], new double[n], new double[n], new double[n]);
        (_measured, _reading, _standard) = (new double[columns], new double[columns], new double[columns]);
        (_hasValue, _planFor, _pivotRow, _free) = (new bool[instruments.All.Count], new bool[instruments.All.Count], new int[n], new int[n]);
        _ways = graph.Heating.Select((way, k) => (_variables.Keys[_variables.Heating[k]].Place, k)).ToDictionary(pair => pair.Place, pair => pair.k, StringComparer.Ordinal);
    }

    /// <summary>The variables of the line.</summary>
    public LineVariables Variables => _variables;

    /// <summary>Properties of water and of the liquor.</summary>
    public LineProperties Properties => _properties;

    /// <summary>The reconciled state; where a variable does not follow from what is measured, its value means nothing.</summary>
    public double[] State { get; }

    /// <summary>The measured quantities behind the columns.</summary>
    public MeasurementEquations Measurements => _measurements;

    /// <summary>What is stated instead of measured, in the order of the columns; starts as the plant states it.</summary>
    public double[] Stated { get; }

    /// <summary>How many steps the last window took.</summary>
    public int Steps { get; private set; }

    /// <summary>What a window of this balance shows.</summary>
    public BalanceLayout Layout { get; }

    /// <summary>What an instrument's reading says of a variable: a volume as a mass, with the density of the reconciled state.</summary>
    public double ReadingOf(int variable, int place, double reading) => _measurements.ReadingOf(variable, place, reading, State);

    /// <summary>What a column of measured quantities is, in words.</summary>
    public string NameOf(int column) => column < _instruments.All.Count ? _instruments.All[column].Signal
        : column == _measurements.AirColumn ? "atmosphere" : _measurements.StatedOnes[column - _measurements.AirColumn - 1].Name;

    /// <summary>Fills inputs with what the instruments would read at the plain state from which a window without any reading begins.</summary>
    public void Typical(LineInputs inputs)
    {
        Array.Fill(_known, double.NaN);
        _start.Fill(State, _typicalFlow, _known);
        ReadFrom(State, inputs);
    }

    /// <summary>Fills inputs with what the instruments read at a state; absent where an instrument sees nothing of the balance.</summary>
    public void ReadFrom(double[] state, LineInputs inputs)
    {
        for (int place = 0; place < inputs.Value.Length; place++) inputs.Value[place] = _measurements.WouldRead(place, state);
    }

    /// <summary>Corrections of the measured quantities in their standard uncertainties, and what is left of each.</summary>
    public Redundancy Corrections => _redundancy;

    /// <summary>Reconciles one window.</summary>
    /// <param name="inputs">Means; NaN is absent.</param>
    /// <param name="systematic">Systematic standard uncertainties by place.</param>
    /// <param name="random">Random standard uncertainties by place.</param>
    /// <param name="air">Standard uncertainties of the atmosphere.</param>
    /// <returns>False when no state was found in which the equations hold.</returns>
    public bool Solve(LineInputs inputs, ReadOnlySpan<double> systematic, ReadOnlySpan<double> random, (double Systematic, double Random) air)
    {
        Measure(inputs, systematic, random, air);
        Choose();
        // A way that does not lead to the state at full steps may do so at shorter ones.
        return Iterate(1) || Iterate(0.4);
    }

    private bool Iterate(double longest)
    {
        _start.Fill(State, _typicalFlow, _known);
        foreach ((int variable, double value) in _plan.Fixed) State[variable] = value;
        _reading.CopyTo(_measured, 0);
        int waited = 0;
        for (Steps = 1; Steps <= MostSteps; Steps++)
        {
            (double largest, double loose) = Step(Steps < MostSteps / 2 ? longest : 1);
            if (!double.IsFinite(largest)) return false;
            // What does not follow from the readings should come to rest too, since the equations bend; but it need not.
            if (largest >= Converged || (loose >= Converged && waited++ < MostWaits)) continue;
            _redundancy.Weigh();
            return IsSane();
        }

        return false;
    }

    /// <summary>True when a variable follows from what is measured.</summary>
    public bool IsObservable(int variable) => _unknown[variable] == 0 && (_plan.HasFlow || !IsAmount(_variables.Keys[variable].Kind));

    /// <summary>
    /// How a variable moves, in its own unit, with each measured quantity by one of its standard uncertainties, all corrections made anew; nothing where it is fixed.
    /// </summary>
    /// <param name="variable">The variable.</param>
    /// <param name="factor">Multiplies the answer.</param>
    /// <param name="sum">The answer is added to this, by column.</param>
    public void AddSensitivity(int variable, double factor, Span<double> sum)
    {
        if (_pivotRow[variable] >= 0) _redundancy.AddSensitivity(_pivotRow[variable], -factor * _scale[variable], sum);
    }

    /// <summary>Standard uncertainty of a variable that follows from what is measured, in its own unit.</summary>
    public double Standard(int variable) => _pivotRow[variable] >= 0 ? _scale[variable] * _redundancy.Standard(_pivotRow[variable]) : 0;

    /// <summary>The equations may hold at a state that no line can have: with few instruments they have more than one solution.</summary>
    private bool IsSane()
    {
        for (int i = 0; i < State.Length; i++)
        {
            if (!IsObservable(i)) continue;
            bool sane = _variables.Keys[i].Kind switch
            {
                VariableKind.VapourPressure or VariableKind.ChestPressure or VariableKind.SteamPressure or VariableKind.DischargePressure => State[i] is > 500 and < 1.7e7,
                VariableKind.BoilingTemperature or VariableKind.HeatingTemperature => State[i] is > 270 and < 630,
                VariableKind.LeavingSolids or VariableKind.FeedSolids or VariableKind.ProductSolids => State[i] is > -0.05 and < 1,
                _ => true,
            };
            if (!sane) return false;
        }

        return true;
    }

    /// <summary>One step; gives the largest change of what follows from the readings, and of what does not.</summary>
    private (double Largest, double Loose) Step(double longest)
    {
        Assemble();
        if (!_system.Run(_plan.Steps))
        {
            // The state is too far from where the order of elimination was chosen: choose one for this state alone.
            Assemble();
            _pivots = _system.Choose(_plan.Allowed);
        }
        else _pivots = _plan.Pivots;

        _redundancy.Project(_pivots);
        Observe();
        Array.Clear(_moved);
        (double largest, double loose, double share) = (0, 0, longest);
        foreach ((int row, int column) in _pivots)
        {
            double change = _redundancy.Change(row);
            if (!double.IsFinite(change)) return (double.NaN, double.NaN);
            _moved[column] = change * _scale[column];
            double allowed = _steps.Allowed(column, State[column], _moved[column]);
            if (_unknown[column] > 0)
            {
                // What does not follow from the readings may go where it will, but it must not hold up what does.
                _moved[column] *= allowed;
                loose = double.Max(loose, double.Abs(change));
                continue;
            }

            share = double.Min(share, allowed);
            largest = double.Max(largest, double.Abs(change));
        }

        _steps.Move(State, _moved, share, _next);
        foreach (double value in _next)
        {
            if (!double.IsFinite(value)) return (double.NaN, double.NaN);
        }

        _next.CopyTo(State, 0);
        for (int column = 0; column < _measured.Length; column++)
            _measured[column] += share * (_reading[column] + (_standard[column] * _redundancy.Correction(column)) - _measured[column]);
        return (largest, loose);
    }

    /// <summary>Unknowns that were not eliminated, and those that depend on one of them.</summary>
    private void Observe()
    {
        Array.Fill(_pivotRow, -1);
        foreach ((int row, int column) in _pivots) _pivotRow[column] = row;
        int free = 0;
        for (int i = 0; i < _unknown.Length; i++)
        {
            _unknown[i] = 0;
            if (!_plan.Allowed[i] || _pivotRow[i] >= 0) continue;
            _unknown[i] = 1;
            _free[free++] = i;
        }

        if (free == 0) return;
        foreach ((int row, int column) in _pivots)
        {
            ReadOnlySpan<double> entries = _system.Row(row);
            double most = 0;
            foreach (int i in _free.AsSpan(0, free)) most = double.Max(most, double.Abs(entries[i]));
            _unknown[column] = most > 1e-6 ? most : 0;
        }
    }

    private void Assemble()
    {
        _equations.Evaluate(State, _rows);
        _system.Clear(_plan.Rows.Length + _plan.Equations.Count, _plan.Filled);
        int at = 0;
        foreach (int row in _plan.Rows)
        {
            Span<double> target = _system.Row(at++);
            double scale = 1 / _rows.Scale(row);
            ReadOnlySpan<int> columns = _rows.Columns(row);
            ReadOnlySpan<double> slopes = _rows.Slopes(row);
            for (int e = 0; e < columns.Length; e++)
            {
                if (_plan.Allowed[columns[e]]) target[columns[e]] = slopes[e] * scale * _scale[columns[e]];
            }

            target[_system.Right] = -_rows.Residual(row) * scale;
        }

        int n = _variables.Count;
        for (int e = 0; e < _plan.Equations.Count; e++)
        {
            MeasurementEquations.Equation equation = _plan.Equations[e];
            Span<double> target = _system.Row(at++), x = target[..n], z = target[n.._system.Right];
            double scale = 1 / _measurements.Scale(equation, _scale);
            double right = -_measurements.Evaluate(equation, State, _measured, x, z);
            // While the plan is made it is not known yet what an equation names.
            if (e < _plan.Seen.Length) foreach (int column in _plan.Seen[e]) Take(x, z, column, scale, ref right);
            else for (int column = 0; column < _system.Right; column++) Take(x, z, column, scale, ref right);

            target[_system.Right] = right * scale;
        }
    }

    private void Take(Span<double> x, Span<double> z, int column, double scale, ref double right)
    {
        if (column < x.Length)
        {
            x[column] *= _plan.Allowed[column] ? scale * _scale[column] : 0;
            return;
        }

        // Measured quantities are counted from their readings, in standard uncertainties.
        int k = column - x.Length;
        right -= z[k] * (_reading[k] - _measured[k]);
        z[k] *= scale * _standard[k];
    }

    private void Measure(LineInputs inputs, ReadOnlySpan<double> systematic, ReadOnlySpan<double> random, (double Systematic, double Random) air)
    {
        for (int place = 0; place < _hasValue.Length; place++)
        {
            double value = inputs.Value[place];
            _hasValue[place] = double.IsFinite(value);
            _reading[place] = _hasValue[place] ? value : 0;
            _standard[place] = _hasValue[place] ? double.Hypot(systematic[place], random[place]) : 0;
            _redundancy.SetShare(place, systematic[place], random[place]);
        }

        _standard[_measurements.AirColumn] = double.Hypot(air.Systematic, air.Random);
        _redundancy.SetShare(_measurements.AirColumn, air.Systematic, air.Random);
        for (int k = 0; k < _measurements.StatedOnes.Count; k++)
        {
            int column = _measurements.AirColumn + 1 + k;
            (_reading[column], _standard[column]) = (Stated[k], _measurements.StatedOnes[k].Standard);
            _redundancy.SetShare(column, 1, 0);
        }

        Array.Fill(_known, double.NaN);
    }
}
