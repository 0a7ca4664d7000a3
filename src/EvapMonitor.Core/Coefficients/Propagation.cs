using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Coefficients;

/// <summary>
/// Carries the uncertainty of every input through the balance: each input is moved up and down by its own standard uncertainty and half the difference is its
/// contribution (JCGM 100, 5.1.3 note 2). An input that enters several times moves everywhere at once, so that what is shared cancels as it should.
/// </summary>
internal sealed class Propagation
{
    /// <summary>Result columns of one effect.</summary>
    public const int Heating = 0, Boiling = 1, Elevation = 2, Force = 3, DutyFirst = 4, CoefficientFirst = 8, Columns = 12;

    private readonly LineInstruments _instruments;
    private readonly DirectBalance _balance;
    private readonly EffectState[] _states;
    private readonly double[] _up;
    private readonly double[] _down;

    public Propagation(LineInstruments instruments, DirectBalance balance)
    {
        _instruments = instruments;
        _balance = balance;
        int effects = instruments.Effects.Count;
        _states = new EffectState[effects];
        Nominal = new double[effects * Columns];
        SystematicSquares = new double[effects * Columns];
        RandomSquares = new double[effects * Columns];
        (_up, _down) = (new double[effects * Columns], new double[effects * Columns]);
        NominalStates = new EffectState[effects];
    }

    /// <summary>Results at the inputs as they are.</summary>
    public double[] Nominal { get; }

    /// <summary>Squares of the systematic standard uncertainties.</summary>
    public double[] SystematicSquares { get; }

    /// <summary>Squares of the random standard uncertainties.</summary>
    public double[] RandomSquares { get; }

    /// <summary>States at the inputs as they are.</summary>
    public EffectState[] NominalStates { get; }

    /// <summary>Evaluates and propagates one window.</summary>
    public void Run(Properties.Liquor liquor, LineInputs inputs, ReadOnlySpan<double> systematic, ReadOnlySpan<double> random, double airSystematic, double airRandom)
    {
        Evaluate(liquor, inputs, Nominal);
        _states.CopyTo(NominalStates, 0);
        Array.Clear(SystematicSquares);
        Array.Clear(RandomSquares);
        for (int place = 0; place < inputs.Value.Length; place++)
        {
            double value = inputs.Value[place];
            if (double.IsNaN(value)) continue;
            int index = place;
            Contribute(liquor, inputs, systematic[place], random[place], step => inputs.Value[index] = value + step);
        }

        Contribute(liquor, inputs, airSystematic, airRandom, step => MoveGauges(inputs, step));
        Contribute(liquor, inputs, 1, 0, step => inputs.ElevationError = step);
        for (int i = 0; i < _instruments.Effects.Count; i++)
        {
            int index = i;
            UncertainShare loss = _instruments.Line.Effects[i].HeatLoss, vent = _instruments.Line.Effects[i].Vent;
            Contribute(liquor, inputs, loss.Standard, 0, step => inputs.HeatLoss[index] = loss.Value + step);
            Contribute(liquor, inputs, vent.Standard, 0, step => inputs.Vent[index] = vent.Value + step);
        }

        for (int r = 0; r < _instruments.Line.Recompressors.Count; r++)
        {
            int index = r;
            UncertainShare efficiency = _instruments.Line.Recompressors[r].Efficiency;
            Contribute(liquor, inputs, efficiency.Standard, 0, step => inputs.Efficiency[index] = efficiency.Value + step);
        }
    }

    private double _gaugesAt;

    private void MoveGauges(LineInputs inputs, double step)
    {
        for (int place = 0; place < inputs.Value.Length; place++)
        {
            if (Conditioning.Atmosphere.SignOf(_instruments.All[place]) != 0) inputs.Value[place] += step - _gaugesAt;
        }

        _gaugesAt = step;
    }

    private void Contribute(Properties.Liquor liquor, LineInputs inputs, double systematic, double random, Action<double> move)
    {
        double total = double.Sqrt((systematic * systematic) + (random * random));
        if (!(total > 0)) return;
        move(total);
        Evaluate(liquor, inputs, _up);
        move(-total);
        Evaluate(liquor, inputs, _down);
        move(0);
        double systematicShare = systematic / total, randomShare = random / total;
        for (int k = 0; k < Nominal.Length; k++)
        {
            double half = (_up[k] - _down[k]) / 2;
            // A move that leaves the range of the steam tables would make the whole result absent: take the side that stays.
            if (double.IsNaN(half)) half = double.IsNaN(_up[k]) ? Nominal[k] - _down[k] : _up[k] - Nominal[k];
            if (half == 0) continue;
            double s = half * systematicShare, r = half * randomShare;
            SystematicSquares[k] += s * s;
            RandomSquares[k] += r * r;
        }
    }

    private void Evaluate(Properties.Liquor liquor, LineInputs inputs, double[] results)
    {
        _balance.Solve(liquor, inputs, _states);
        for (int i = 0; i < _states.Length; i++)
        {
            ref EffectState state = ref _states[i];
            Span<double> row = results.AsSpan(i * Columns, Columns);
            double force = state.HeatingTemperature - state.BoilingTemperature;
            row[Heating] = state.HeatingTemperature;
            row[Boiling] = state.BoilingTemperature;
            row[Elevation] = state.Elevation;
            row[Force] = force;
            for (int source = 1; source < 4; source++)
            {
                row[DutyFirst + source] = state.Duty[source];
                row[CoefficientFirst + source] = HeatBalance.Coefficient(state.Duty[source], state.Area, force);
            }
        }
    }
}
