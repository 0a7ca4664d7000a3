using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Balances;

/// <summary>
/// How each instrument sees the state of a line: one equation for each role that an instrument plays, in the variables of the line and in one column for each
/// measured quantity. Shares and model errors that nobody measures are measured quantities too, with their stated value and uncertainty. What is known for
/// certain (no superheat without a thermometer, no accumulation) is fixed instead.
/// </summary>
internal sealed partial class MeasurementEquations
{
    private readonly LineInstruments _at;
    private readonly LineGraph _graph;
    private readonly LineVariables _variables;
    private readonly LineProperties _properties;
    private readonly double _flow;
    private readonly List<Equation> _all = [];
    private readonly List<(int Variable, double Value, double Standard, string Name)> _stated = [];
    private readonly List<(int Variable, int[] Unless)> _certain = [];

    /// <summary>Lays out the equations of a line for one liquor.</summary>
    public MeasurementEquations(LineInstruments instruments, LineGraph graph, LineVariables variables, LineProperties properties, double typicalFlow)
    {
        (_at, _graph, _variables, _properties, _flow) = (instruments, graph, variables, properties, typicalFlow);
        AirColumn = instruments.All.Count;
        Liquors();
        Main();
        for (int i = 0; i < graph.Line.Effects.Count; i++) Effect(i);
        Others();
        // Shared by all effects: the correlation is the same one.
        Stated(variables.ElevationError, 0, 1, "elevation correlation");
    }

    /// <summary>The column of the atmosphere's error; the instruments' own columns stand before it, in their places.</summary>
    public int AirColumn { get; }

    /// <summary>How many columns of measured quantities there are: instruments by place, the atmosphere, the stated ones.</summary>
    public int Columns => AirColumn + 1 + _stated.Count;

    /// <summary>The stated quantities, in the order of their columns after <see cref="AirColumn"/>.</summary>
    public IReadOnlyList<(int Variable, double Value, double Standard, string Name)> StatedOnes => _stated;

    /// <summary>The places of the instruments that measure a variable.</summary>
    public int[] On(int variable) =>
        [.. _all.Where(one => one.Variable == variable && one.Place >= 0 && one.Kind is (Reading.Plain or Reading.LiquorVolume or Reading.WaterVolume or Reading.Stored)).Select(one => one.Place).Distinct()];

    /// <summary>What an instrument's reading says of a variable at a state of the line.</summary>
    public double ReadingOf(int variable, int place, double reading, double[] state)
    {
        Equation equation = _all.Find(one => one.Variable == variable && one.Place == place);
        return equation.Kind switch
        {
            Reading.Stored => reading * equation.Factor,
            Reading.LiquorVolume => reading * Density(equation, state),
            Reading.WaterVolume => Physical.WaterMassFlow(reading, _at.All[place].Unit, state[equation.First]),
            _ => reading,
        };
    }

    /// <summary>What an instrument reads at a state of the line; NaN when it sees nothing of the balance.</summary>
    public double WouldRead(int place, double[] state)
    {
        foreach (Equation equation in _all)
        {
            if (equation.Place != place && equation.Second != place) continue;
            double at = state[equation.Variable];
            switch (equation.Kind)
            {
                case Reading.Plain: return at;
                case Reading.LiquorVolume: return at / Density(equation, state);
                case Reading.WaterVolume: return at / Physical.WaterMassFlow(1, _at.All[place].Unit, state[equation.First]);
                case Reading.Difference: return at - state[equation.First];
                case Reading.Subcooling: return state[equation.First] - at;
                case Reading.Superheat: return _properties.SaturationTemperature(state[equation.First]).Value + at;
                default:
                    // Steam before a valve or a nozzle: dry, at some pressure above the chest's.
                    const double before = 8e5;
                    return equation.Second == place ? _properties.SaturationTemperature(before).Value + 5 : before;
            }
        }

        return double.NaN;
    }

    /// <summary>The equations that hold while some places have a value.</summary>
    public List<Equation> Active(Func<int, bool> hasValue) => _all.FindAll(equation => (equation.Place < 0 || hasValue(equation.Place)) && (equation.Second < 0 || hasValue(equation.Second))
        && (equation.Unless < 0 || !hasValue(equation.Unless)));

    /// <summary>Variables that are fixed while some places have a value, with what they are fixed at.</summary>
    public IEnumerable<(int Variable, double Value)> Fixed(Func<int, bool> hasValue)
    {
        foreach ((int variable, int[] unless) in _certain)
        {
            if (!unless.Any(hasValue)) yield return (variable, 0);
        }

        foreach ((int variable, double value, double standard, _) in _stated)
        {
            if (standard == 0) yield return (variable, value);
        }

        if (_properties.Liquor is Water) yield return (_variables.FeedSolids, 0);
        for (int h = 0; h < _variables.Heaters.Length; h++)
        {
            Heater heater = _graph.Line.Heaters[h];
            if (heater.Solids?.Fixed is { } solids) yield return (_variables.Heaters[h].Solids, solids);
            else if (heater.Liquor is Water) yield return (_variables.Heaters[h].Solids, 0);
        }
    }

    /// <summary>Residual of an equation and its slopes: by variables of the line into <paramref name="x"/>, by measured columns into <paramref name="z"/>.</summary>
    public double Evaluate(in Equation equation, double[] state, double[] measured, Span<double> x, Span<double> z)
    {
        double Here(int variable) => state[variable];
        double reading = equation.Place < 0 ? double.NaN : measured[equation.Place];
        x[equation.Variable] += 1;
        switch (equation.Kind)
        {
            case Reading.Plain:
                z[equation.Place] -= 1;
                if (equation.BySign == 0) return Here(equation.Variable) - reading;
                z[AirColumn] -= 1;
                return Here(equation.Variable) - reading - measured[AirColumn];
            case Reading.Stored:
                z[equation.Place] -= equation.Factor;
                return Here(equation.Variable) - (reading * equation.Factor);
            case Reading.LiquorVolume:
                // Density moves by less than a thousandth with what is corrected here, so that its slopes are left out; its value is followed.
                double density = Density(equation, state);
                z[equation.Place] -= density;
                return Here(equation.Variable) - (reading * density);
            case Reading.WaterVolume:
                double water = Physical.WaterMassFlow(1, _at.All[equation.Place].Unit, Here(equation.First));
                z[equation.Place] -= water;
                return Here(equation.Variable) - (reading * water);
            case Reading.Difference:
                x[equation.First] -= 1;
                z[equation.Place] -= 1;
                return Here(equation.Variable) - Here(equation.First) - reading;
            case Reading.Same:
                x[equation.First] -= 1;
                return Here(equation.Variable) - Here(equation.First);
            case Reading.Subcooling:
                x[equation.First] -= 1;
                z[equation.Place] += 1;
                return Here(equation.Variable) - Here(equation.First) + reading;
            case Reading.Superheat:
                Sloped saturation = _properties.SaturationTemperature(Here(equation.First));
                x[equation.First] += saturation.First;
                z[equation.Place] -= 1;
                return Here(equation.Variable) + saturation.Value - reading;
            case Reading.Throttled:
            case Reading.ThrottledSaturated:
                x[equation.Variable] -= 1;
                Sloped behind = _properties.Superheated(Here(equation.First), Here(equation.Variable));
                x[equation.First] += behind.First;
                x[equation.Variable] += behind.Second;
                return behind.Value - Before(equation, measured, z);
            case Reading.Enthalpy:
            case Reading.Saturated:
                return Here(equation.Variable) - Before(equation, measured, z);
            default:
                z[equation.Column] -= 1;
                return Here(equation.Variable) - measured[equation.Column];
        }
    }

    /// <summary>A size of an equation's terms, to judge residuals by.</summary>
    public double Scale(in Equation equation, double[] scales) => equation.Kind is Reading.Throttled or Reading.ThrottledSaturated ? 1e5 : scales[equation.Variable];

    /// <summary>Enthalpy of steam where pressure and temperature are measured, or saturated at the pressure.</summary>
    private double Before(in Equation equation, double[] measured, Span<double> z)
    {
        double pressure = measured[equation.Place] + (equation.BySign * measured[AirColumn]);
        double slope;
        double enthalpy;
        if (equation.Second >= 0)
        {
            Sloped steam = _properties.VapourEnthalpy(pressure, measured[equation.Second]);
            (enthalpy, slope) = (steam.Value, steam.First);
            z[equation.Second] -= steam.Second;
        }
        else
        {
            Sloped steam = _properties.SaturatedVapour(pressure);
            (enthalpy, slope) = (steam.Value, steam.First);
        }

        z[equation.Place] -= slope;
        z[AirColumn] -= equation.BySign * slope;
        return enthalpy;
    }

    private static double Density(in Equation equation, double[] state) =>
        Physical.LiquorDensity(equation.Liquor!, double.Clamp(state[equation.First], 0, 0.95), state[equation.Other]);

    /// <summary>What an instrument sees.</summary>
    internal enum Reading
    {
        /// <summary>The variable itself; a gauge pressure with the error of the atmosphere.</summary>
        Plain,
        /// <summary>What is stored, by how fast a level rises.</summary>
        Stored,
        /// <summary>A mass flow by its volume and the density of the liquor.</summary>
        LiquorVolume,
        /// <summary>A mass flow by its volume and the density of condensate.</summary>
        WaterVolume,
        /// <summary>Nothing: a variable is what another is.</summary>
        Same,
        /// <summary>A variable less another.</summary>
        Difference,
        /// <summary>How far a thermometer is under saturation.</summary>
        Subcooling,
        /// <summary>How far a thermometer is over saturation.</summary>
        Superheat,
        /// <summary>Superheat behind a valve, by pressure and temperature before it.</summary>
        Throttled,
        /// <summary>Superheat behind a valve, by the pressure before it, where steam is saturated.</summary>
        ThrottledSaturated,
        /// <summary>An enthalpy by pressure and temperature.</summary>
        Enthalpy,
        /// <summary>An enthalpy by pressure, saturated.</summary>
        Saturated,
        /// <summary>A stated quantity.</summary>
        Stated,
    }

    /// <summary>One equation.</summary>
    /// <param name="Kind">What is seen.</param>
    /// <param name="Variable">The variable it is about.</param>
    /// <param name="Place">The instrument's place; −1 for a stated quantity.</param>
    internal readonly record struct Equation(Reading Kind, int Variable, int Place)
    {
        /// <summary>A variable it depends on as well.</summary>
        public int First { get; init; } = -1;

        /// <summary>Another.</summary>
        public int Other { get; init; } = -1;

        /// <summary>The place of a second instrument.</summary>
        public int Second { get; init; } = -1;

        /// <summary>The place of an instrument that takes over when it has a value.</summary>
        public int Unless { get; init; } = -1;

        /// <summary>The column of a stated quantity.</summary>
        public int Column { get; init; } = -1;

        /// <summary>What a unit of the reading stands for, in the unit of the variable.</summary>
        public double Factor { get; init; }

        /// <summary>1 for a gauge pressure.</summary>
        public int BySign { get; init; }

        /// <summary>The liquor whose density counts.</summary>
        public Liquor? Liquor { get; init; }
    }
}
