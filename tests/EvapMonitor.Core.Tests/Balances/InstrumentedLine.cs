using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Tests.Balances;

/// <summary>A line at a known operating point with instruments on it, all of which can be read exactly or with errors.</summary>
internal sealed class InstrumentedLine
{
    private readonly Dictionary<string, (VariableKey Key, double Relative, double Absolute)> _sees = [];
    private readonly Dictionary<string, double> _motive;
    private readonly LineInstruments _instruments;

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

    /// <summary>Instruments that do not fit the others.</summary>
    public IReadOnlyList<IReadOnlyList<int>> Suspects(double[] readings)
    {
        var inputs = new LineInputs(_instruments);
        readings.CopyTo(inputs.Value, 0);
        double[] standards = Standards(), none = new double[readings.Length];
        bool Again() => Balance.Solve(inputs, standards, none, (0, 0));
        Assert.True(Again());
        return new InstrumentTests(_instruments).Find(Balance, inputs, Again);
    }

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
    public bool Solve(double[] readings, Gaussian? stated = null)
    {
        var inputs = new LineInputs(_instruments);
        readings.CopyTo(inputs.Value, 0);
        for (int k = 0; k < Balance.Stated.Length; k++)
        {
            (_, double value, double standard, _) = Balance.Measurements.StatedOnes[k];
            Balance.Stated[k] = value + (stated is null ? 0 : standard * stated.Next());
        }

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
                Solids = heater.Liquor is Core.Properties.Water ? null : new FixedOrMeasured(null, Solids(heater.Name + "-solids", VariableKind.HeaterSolids, heater.Name)),
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
