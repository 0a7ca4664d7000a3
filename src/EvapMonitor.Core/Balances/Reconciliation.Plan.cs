using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Balances;

/// <summary>The plan of an elimination: which equations count, what is fixed, in which order. One for each set of instruments with a value.</summary>
internal sealed partial class Reconciliation
{
    /// <summary>
    /// The plan for what is measured in this window. It is made at a state that depends on the plant alone, so that the same readings give the same bits whatever was
    /// computed before.
    /// </summary>
    private void Choose()
    {
        if (!_planned || !_hasValue.AsSpan().SequenceEqual(_planFor))
        {
            _planned = true;
            _hasValue.CopyTo(_planFor, 0);
            string key = string.Concat(_hasValue.Select(has => has ? '1' : '0'));
            if (!_plans.TryGetValue(key, out Plan? plan))
            {
                if (_plans.Count >= MostPlans) _plans.Clear();
                _plans[key] = plan = Make();
            }

            _plan = plan;
        }

        foreach (MeasurementEquations.Equation equation in _plan.Equations)
        {
            // The first instrument on a variable starts it; several that disagree are weighed afterwards.
            if (equation.Kind == MeasurementEquations.Reading.Plain && double.IsNaN(_known[equation.Variable])) _known[equation.Variable] = _reading[equation.Place];
        }

        foreach ((int variable, double value) in _plan.Fixed) _known[variable] = value;
    }

    private Plan Make()
    {
        bool Has(int place) => place >= 0 && _hasValue[place];
        List<MeasurementEquations.Equation> equations = _measurements.Active(Has);
        bool hasFlow = Enumerable.Range(0, _hasValue.Length).Any(place => _hasValue[place] && _instruments.All[place].Unit.Dimension is Dimension.MassFlow or Dimension.VolumeFlow or Dimension.Power);
        // Without any flow all flows could be nothing and every balance would hold: one is taken for granted, and no flow is told.
        (int, double)[] known = [.. _measurements.Fixed(Has), .. hasFlow ? [] : new[] { (_variables.FeedFlow, _typicalFlow) }];
        bool[] allowed = new bool[_variables.Count];
        for (int i = 0; i < allowed.Length; i++) allowed[i] = _variables.Keys[i].Kind is not (VariableKind.Coefficient or VariableKind.BodyCoefficient);
        foreach ((int variable, _) in known) allowed[variable] = false;
        Array.Fill(_known, double.NaN);
        foreach ((int variable, double value) in known) _known[variable] = value;
        _start.Fill(State, _typicalFlow, _known);
        Array.Fill(_known, double.NaN);
        _equations.Evaluate(State, _rows);
        int[] rows = [.. Enumerable.Range(0, _rows.Count).Where(row => Counts(_rows.Key(row), Has))];
        _plan = new Plan(rows, equations, known, allowed, hasFlow);
        double[] reading = [.. _reading];
        // At the plan's state an instrument reads what is there.
        foreach (MeasurementEquations.Equation equation in equations)
        {
            if (equation.Place >= 0) _measured[equation.Place] = Nominal(equation);
            if (equation.Second >= 0) _measured[equation.Second] = 420;
        }

        for (int column = _measurements.AirColumn; column < _measured.Length; column++) _measured[column] = _reading[column];
        _measured.CopyTo(_reading, 0);
        Assemble();
        reading.CopyTo(_reading, 0);
        bool[][] present = Present(out int[][] seen);
        (int, int)[] pivots = _system.Choose(allowed);
        EliminationStep[] steps = _system.Plan(pivots, present, out int[] filled);
        return _plan with { Pivots = pivots, Steps = steps, Filled = filled, Seen = seen };
    }

    /// <summary>Where the system of the plan can have entries: what an equation names, whatever its slope, and what an instrument sees, however sure it is.</summary>
    private bool[][] Present(out int[][] seen)
    {
        int n = _variables.Count;
        bool[][] present = [.. Enumerable.Range(0, _system.Rows).Select(_ => new bool[_system.Right + 1])];
        for (int at = 0; at < _plan.Rows.Length; at++)
        {
            foreach (int column in _rows.Columns(_plan.Rows[at])) present[at][column] = _plan.Allowed[column];
        }

        double[] x = new double[n], z = new double[_measured.Length];
        seen = new int[_plan.Equations.Count][];
        for (int k = 0; k < _plan.Equations.Count; k++)
        {
            Array.Clear(x);
            Array.Clear(z);
            _measurements.Evaluate(_plan.Equations[k], State, _measured, x, z);
            seen[k] = [.. Enumerable.Range(0, n).Where(i => x[i] != 0), .. Enumerable.Range(0, z.Length).Where(i => z[i] != 0).Select(i => n + i)];
            bool[] row = present[_plan.Rows.Length + k];
            for (int i = 0; i < n; i++) row[i] = x[i] != 0 && _plan.Allowed[i];
            for (int i = 0; i < z.Length; i++) row[n + i] = z[i] != 0;
        }

        foreach (bool[] row in present) row[_system.Right] = true;
        return present;
    }

    private double Nominal(in MeasurementEquations.Equation equation) => equation.Kind switch
    {
        MeasurementEquations.Reading.LiquorVolume or MeasurementEquations.Reading.WaterVolume => State[equation.Variable] / 1000,
        MeasurementEquations.Reading.Difference => State[equation.Variable] - State[equation.First],
        MeasurementEquations.Reading.Subcooling => State[equation.First],
        MeasurementEquations.Reading.Superheat => _properties.SaturationTemperature(State[equation.First]).Value,
        MeasurementEquations.Reading.Plain => State[equation.Variable],
        _ => 2e5,
    };

    /// <summary>
    /// The coefficient is defined by its equation and binds nothing. A chest with a gauge of its own need not have the very pressure of the vapour's gauge: what the
    /// vapour line loses is not known.
    /// </summary>
    private bool Counts(ConstraintKey key, Func<int, bool> has)
    {
        if (key.Says is "heat transfer" or "bodies") return false;
        if (key.Says != "chest pressure") return true;
        HeatingWay way = _equations.Graph.Heating[_ways[key.Place]];
        return way.From < 0 || !has(_instruments.Effects[way.To].ChestPressure) || !has(_instruments.Effects[way.From].VapourPressure);
    }

    /// <summary>True for what grows with the size of the line.</summary>
    private static bool IsAmount(VariableKind kind) => kind is not (VariableKind.FeedSolids or VariableKind.FeedTemperature or VariableKind.ProductSolids or VariableKind.ElevationError
        or VariableKind.SteamPressure or VariableKind.SteamSuperheat or VariableKind.LeavingSolids or VariableKind.BoilingTemperature or VariableKind.VapourPressure
        or VariableKind.ChestPressure or VariableKind.HeatingTemperature or VariableKind.HeatLossShare or VariableKind.VentShare or VariableKind.Subcooling
        or VariableKind.LiquorShare or VariableKind.HeaterSolids or VariableKind.HeaterIn or VariableKind.HeaterOut or VariableKind.DischargeEnthalpy
        or VariableKind.DischargePressure or VariableKind.MotiveEnthalpy or VariableKind.Efficiency);

    /// <summary>What belongs to a set of available instruments.</summary>
    /// <param name="Rows">The equations of the line that count.</param>
    /// <param name="Equations">The equations of the instruments.</param>
    /// <param name="Fixed">Variables that are fixed, and at what.</param>
    /// <param name="Allowed">By variable: true when it is an unknown.</param>
    /// <param name="HasFlow">True when any flow or power is measured.</param>
    private sealed record Plan(int[] Rows, List<MeasurementEquations.Equation> Equations, (int Variable, double Value)[] Fixed, bool[] Allowed, bool HasFlow)
    {
        /// <summary>The order of elimination.</summary>
        public (int Row, int Column)[] Pivots { get; init; } = [];

        /// <summary>What each step of it touches.</summary>
        public EliminationStep[] Steps { get; init; } = [];

        /// <summary>By equation of the instruments: the columns that it names.</summary>
        public int[][] Seen { get; init; } = [];

        /// <summary>Where it leaves entries.</summary>
        public int[] Filled { get; init; } = [];
    }
}
