using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Tests.Balances;

/// <summary>A line at a known operating point with instruments on it, all of which can be read exactly or with errors.</summary>
internal sealed class InstrumentedLine
{
    private readonly Dictionary<string, (VariableKey Key, double Relative, double Absolute)> _sees = [];
    private readonly Dictionary<string, double> _motive;
    private readonly LineInstruments _instruments;
    private ApparentCoefficients? _coefficients;

    private InstrumentedLine(TestLines.Case one, Func<string, bool> has)
    {
        Point = one.Solved();
        _motive = one.Conditions.Motive.ToDictionary(pair => pair.Key + "-pressure", pair => pair.Value.Pressure);
        foreach ((string machine, MotiveConditions motive) in one.Conditions.Motive)
            _motive[machine + "-temperature"] = Core.Properties.Steam.SaturationTemperature(motive.Pressure) + motive.Superheat;
        Line line = Instrument(one.Graph.Line, has);
        _instruments = new LineInstruments(line);
        Graph = new LineGraph(line);
        Balance = new Reconciliation(_instruments, Graph, line.Liquor.Always!);
    }

    public OperatingPoint Point { get; }

    public LineGraph Graph { get; }

    public Reconciliation Balance { get; }

    public IReadOnlyList<Instrument> Instruments => _instruments.All;

    public double this[VariableKind kind, string place = ""] => Balance.State[Balance.Variables[kind, place]];

    /// <summary>Instruments on a line.</summary>
    /// <param name="one">The line and its point.</param>
    /// <param name="has">By the name of a place of an instrument: whether it is there; null for all.</param>
    public static InstrumentedLine Of(TestLines.Case one, Func<string, bool>? has = null) => new(one, has ?? (_ => true));

    public bool IsObservable(VariableKind kind, string place = "") => Balance.IsObservable(Balance.Variables[kind, place]);

    /// <summary>What the instruments read without error, by place.</summary>
    public double[] Exact() => [.. _instruments.All.Select(instrument =>
        _motive.TryGetValue(instrument.Signal, out double pressure) ? pressure : Point[_sees[instrument.Signal].Key.Kind, _sees[instrument.Signal].Key.Place])];

    /// <summary>Their standard uncertainties.</summary>
    public double[] Standards() => [.. _instruments.All.Zip(Exact()).Select(pair => _sees[pair.First.Signal] is var sees ? (sees.Relative * double.Abs(pair.Second)) + sees.Absolute : 0)];

    public int PlaceOf(string name) => Enumerable.Range(0, Instruments.Count).First(place => Instruments[place].Signal == name);

    /// <summary>Instruments that do not fit the others; null where no state fits the readings at all.</summary>
    public IReadOnlyList<IReadOnlyList<int>>? Suspects(double[] readings)
    {
        var inputs = new LineInputs(_instruments);
        readings.CopyTo(inputs.Value, 0);
        double[] standards = Standards(), none = new double[readings.Length];
        bool Again() => Balance.Solve(inputs, standards, none, (0, 0));
        if (!Again()) return null;
        return new InstrumentTests(_instruments).Find(Balance, inputs, Again);
    }

    /// <summary>Coefficient of an effect in the window solved last.</summary>
    public Measured Coefficient(string effect) => new BalanceQuantities(Balance).Coefficient(VariablesOf(effect), AreaOf(effect));

    /// <summary>How that coefficient follows each measured quantity, by one of its standard uncertainties.</summary>
    public double[] SensitivityOfCoefficient(string effect)
    {
        EffectVariables its = VariablesOf(effect);
        double[] sum = new double[Balance.Measurements.Columns];
        double value = Coefficient(effect).Value, force = Balance.State[its.Heating] - Balance.State[its.Boiling];
        Balance.AddSensitivity(its.Duty, value / Balance.State[its.Duty], sum);
        Balance.AddSensitivity(its.Heating, -value / force, sum);
        Balance.AddSensitivity(its.Boiling, value / force, sum);
        return sum;
    }

    /// <summary>
    /// Relative error of the coefficient by condensate and the two nearest gauges alone, with the stated loss and the elevation of the correlation at the true solids;
    /// null without these instruments.
    /// </summary>
    public double? DirectError(EffectPoint effect, double[] readings, double[] drawn)
    {
        double? Read(string name) => Instruments.Any(one => one.Signal == name) ? readings[PlaceOf(name)] : null;
        int i = Graph.Line.Effects.Select((one, k) => (one.Name, k)).First(pair => pair.Name == effect.Name).k;
        double? heating = Read(effect.Name + "-chest");
        foreach (HeatingWay way in Graph.Heating.Where(way => way.To == i))
            heating ??= way.From >= 0 ? Read(Graph.Line.Effects[way.From].Name + "-vapour") : way.From == LineGraph.Steam ? Read("steam-pressure") : null;
        if (Read(effect.Name + "-condensate") is not { } condensate || heating is not { } chest || Read(effect.Name + "-vapour") is not { } vapour) return null;
        double water = Core.Properties.Steam.SaturationTemperature(effect.VapourPressure);
        double Drawn(VariableKind kind, string place) => Balance.Measurements.StatedOnes.Select((one, k) => (one, k)).Where(pair => pair.one.Variable == Balance.Variables[kind, place])
            .Sum(pair => pair.one.Standard * drawn[Balance.Measurements.AirColumn + 1 + pair.k]);
        double elevation = effect.BoilingTemperature - water
            + (Drawn(VariableKind.ElevationError, "") * Graph.Line.Liquor.Always!.BoilingPointElevation(effect.LeavingSolids, water).Standard);
        double kept = 1 - (Drawn(VariableKind.HeatLossShare, effect.Name) / (1 - Graph.Line.Effects[i].HeatLoss.Value));
        double force = Core.Properties.Steam.SaturationTemperature(chest) - Core.Properties.Steam.SaturationTemperature(vapour) - elevation;
        return (condensate / effect.Condensate * kept * (effect.HeatingTemperature - effect.BoilingTemperature) / force) - 1;
    }

    /// <summary>Solves a window with what is stated drawn too.</summary>
    /// <param name="readings">By place.</param>
    /// <param name="drawn">By column: how many standard uncertainties it is off.</param>
    public bool SolveDrawn(double[] readings, double[] drawn)
    {
        for (int k = 0; k < Balance.Stated.Length; k++)
        {
            (_, double value, double standard, _) = Balance.Measurements.StatedOnes[k];
            Balance.Stated[k] = value + (standard * drawn[Balance.Measurements.AirColumn + 1 + k]);
        }

        return SolveAsStated(readings);
    }

    /// <summary>Evaluates a window as the program does.</summary>
    public LineWindow Evaluate(double[] readings)
    {
        var inputs = new LineInputs(_instruments);
        readings.CopyTo(inputs.Value, 0);
        _coefficients ??= new ApparentCoefficients(_instruments, Graph);
        var read = new WindowReadings(RunningState.Producing, Graph.Line.Liquor.Always!, inputs, Standards(), new double[readings.Length], (0, 0));
        return _coefficients.Evaluate(0, read, _coefficients.Suspects(read), [], place => Instruments[place].Signal + " has no reading");
    }

    private EffectVariables VariablesOf(string effect) => Balance.Variables.Effects[Graph.Line.Effects.Select((one, k) => (one.Name, k)).First(pair => pair.Name == effect).k];

    private double AreaOf(string effect) =>
        Graph.Bodies[Graph.Line.Effects.Select((one, k) => (one.Name, k)).First(pair => pair.Name == effect).k].Sum(body => body.Area);

    /// <summary>Standard uncertainty of a variable in the window solved last.</summary>
    public double Standard(VariableKind kind, string place = "")
    {
        double[] sensitivity = new double[Balance.Measurements.Columns];
        Balance.AddSensitivity(Balance.Variables[kind, place], 1, sensitivity);
        (double systematic, double random) = Balance.Corrections.Uncertainty(sensitivity);
        return double.Hypot(systematic, random);
    }

    /// <summary>Solves a window.</summary>
    /// <param name="readings">By place.</param>
    /// <param name="stated">Draws what is stated instead of measured; null takes it as it stands.</param>
    public bool Solve(double[] readings, Gaussian? stated = null) =>
        SolveDrawn(readings, [.. Enumerable.Range(0, Balance.Measurements.Columns).Select(_ => stated?.Next() ?? 0)]);

    private bool SolveAsStated(double[] readings)
    {
        var inputs = new LineInputs(_instruments);
        readings.CopyTo(inputs.Value, 0);
        return Balance.Solve(inputs, Standards(), new double[readings.Length], (0, 0));
    }

    private Instrument? See(Func<string, bool> has, string name, VariableKind kind, string place, double relative, double absolute)
    {
        if (!has(name)) return null;
        _sees[name] = (new VariableKey(kind, place), relative, absolute);
        Dimension dimension = kind switch
        {
            VariableKind.VapourPressure or VariableKind.SteamPressure or VariableKind.ChestPressure => Dimension.Pressure,
            VariableKind.FeedTemperature or VariableKind.BoilingTemperature or VariableKind.HeatingTemperature or VariableKind.HeaterIn or VariableKind.HeaterOut => Dimension.Temperature,
            VariableKind.FeedSolids or VariableKind.ProductSolids or VariableKind.LeavingSolids or VariableKind.HeaterSolids => Dimension.Fraction,
            VariableKind.Power => Dimension.Power,
            _ => Dimension.MassFlow,
        };
        return new Instrument { Signal = name, Unit = new UnitOfMeasure("SI", dimension, 1), Accuracy = new Accuracy(relative, absolute, AccuracyMeaning.Standard) };
    }

    private Line Instrument(Line line, Func<string, bool> has)
    {
        Instrument? Flow(string name, VariableKind kind, string place = "") => See(has, name, kind, place, 0.01, 0);
        Instrument? Solids(string name, VariableKind kind, string place = "") => See(has, name, kind, place, 0, 0.002);
        Instrument? Temperature(string name, VariableKind kind, string place = "") => See(has, name, kind, place, 0, 0.2);
        Instrument? Pressure(string name, VariableKind kind, string place = "") => See(has, name, kind, place, 0, 400);
        return line with
        {
            Feed = new() { Flow = Flow("feed", VariableKind.FeedFlow), Solids = Solids("feed-solids", VariableKind.FeedSolids), Temperature = Temperature("feed-temperature", VariableKind.FeedTemperature) },
            Product = new() { Flow = Flow("product", VariableKind.ProductFlow), Solids = Solids("product-solids", VariableKind.ProductSolids) },
            Steam = new LineGraph(line).HasSteam
                ? new() { Flow = Flow("steam", VariableKind.SteamFlow), Pressure = Pressure("steam-pressure", VariableKind.SteamPressure), PressureAt = SteamGaugePlace.Chest } : new(),
            Bleeds = [.. line.Bleeds.Select(bleed => bleed with { Flow = Flow($"{bleed.From} to {bleed.To}", VariableKind.BleedFlow, VariableKey.Way(bleed.From, bleed.To)) })],
            Heaters = [.. line.Heaters.Select(heater => heater with
            {
                Flow = Flow(heater.Name, VariableKind.HeaterFlow, heater.Name), In = Temperature(heater.Name + "-in", VariableKind.HeaterIn, heater.Name),
                Solids = heater.Liquor is not Core.Properties.Water && Solids(heater.Name + "-solids", VariableKind.HeaterSolids, heater.Name) is { } meter ? new FixedOrMeasured(null, meter) : null,
                Out = Temperature(heater.Name + "-out", VariableKind.HeaterOut, heater.Name),
            })],
            Recompressors = [.. line.Recompressors.Select(machine => machine.Kind == RecompressorKind.Thermal
                ? machine with { Motive = new(Flow(machine.Name, VariableKind.MotiveFlow, machine.Name), Pressure(machine.Name + "-pressure", VariableKind.SteamPressure), Temperature(machine.Name + "-temperature", VariableKind.FeedTemperature)) }
                : machine with { Power = See(has, machine.Name, VariableKind.Power, machine.Name, 0.01, 0), Spray = machine.Spray is null ? null : Flow(machine.Name + "-spray", VariableKind.SprayFlow, machine.Name) })],
            Effects = [.. line.Effects.Select(effect => effect with
            {
                Chest = effect.Chest with { CondensateFlow = Flow(effect.Name + "-condensate", VariableKind.CondensateFlow, effect.Name), Pressure = Pressure(effect.Name + "-chest", VariableKind.ChestPressure, effect.Name) },
                Vapour = new() { Pressure = Pressure(effect.Name + "-vapour", VariableKind.VapourPressure, effect.Name) },
                Leaving = new()
                {
                    Flow = Flow(effect.Name + "-flow", VariableKind.LeavingFlow, effect.Name), Solids = Solids(effect.Name + "-solids", VariableKind.LeavingSolids, effect.Name),
                    Temperature = Temperature(effect.Name + "-liquor", VariableKind.BoilingTemperature, effect.Name), TemperatureSeesFlashedLiquor = true,
                },
            })],
        };
    }
}
