using EvapMonitor.Core.Plant;
using static EvapMonitor.Core.Balances.VariableKind;

namespace EvapMonitor.Core.Balances;

/// <summary>The variables of a line in one row, with their keys.</summary>
public sealed class LineVariables
{
    private readonly List<VariableKey> _keys = [];
    private readonly Dictionary<VariableKey, int> _index = [];

    /// <summary>Lays out the variables of a line.</summary>
    public LineVariables(LineGraph graph)
    {
        ArgumentNullException.ThrowIfNull(graph);
        Line line = graph.Line;
        (FeedFlow, FeedSolids, FeedTemperature) = (Add(VariableKind.FeedFlow), Add(VariableKind.FeedSolids), Add(VariableKind.FeedTemperature));
        (ProductFlow, ProductSolids) = (Add(VariableKind.ProductFlow), Add(VariableKind.ProductSolids));
        (Evaporation, ElevationError) = (Add(VariableKind.Evaporation), Add(VariableKind.ElevationError));
        (SteamFlow, SteamPressure, SteamSuperheat) = graph.HasSteam
            ? (Add(VariableKind.SteamFlow), Add(VariableKind.SteamPressure), Add(VariableKind.SteamSuperheat)) : (-1, -1, -1);
        Effects = [.. line.Effects.Select((effect, i) => new EffectVariables(
            Add(LeavingFlow, effect.Name), Add(LeavingSolids, effect.Name), Add(BoilingTemperature, effect.Name),
            Add(VapourFlow, effect.Name), Add(VapourPressure, effect.Name), Add(ChestPressure, effect.Name), Add(HeatingTemperature, effect.Name),
            Add(Duty, effect.Name), Add(Coefficient, effect.Name), Add(HeatLossShare, effect.Name), Add(VentShare, effect.Name),
            Add(CondensateFlow, effect.Name), Add(Subcooling, effect.Name), Add(Accumulation, effect.Name),
            graph.ToCondenser[i] ? Add(CondenserFlow, effect.Name) : -1,
            graph.FlashTo[i] >= 0 ? Add(FlashingFlow, effect.Name) : -1, graph.FlashTo[i] >= 0 ? Add(FlashVapour, effect.Name) : -1))];
        Bodies = [.. graph.Bodies.Select((bodies, i) => IsGroup(graph, i) ? bodies.Select(body => Add(BodyCoefficient, body.Name)).ToArray() : [])];
        Tanks = [.. line.Tanks.Select(tank => (Add(LeavingFlow, tank.Name), Add(Accumulation, tank.Name)))];
        Liquor = [.. graph.Liquor.Select(way => (
            Add(LiquorFlow, VariableKey.Way(graph.NameOf(way.From), graph.NameOf(way.To))),
            way.Share is null ? -1 : Add(LiquorShare, VariableKey.Way(graph.NameOf(way.From), graph.NameOf(way.To)))))];
        Heating = [.. graph.Heating.Select(way => Add(HeatingFlow, VariableKey.Way(SourceName(graph, way.From), graph.NameOf(way.To))))];
        Bleeds = [.. line.Bleeds.Select(bleed => Add(BleedFlow, VariableKey.Way(bleed.From, bleed.To)))];
        Heaters = [.. line.Heaters.Select(heater => new HeaterVariables(
            Add(HeaterFlow, heater.Name), Add(HeaterSolids, heater.Name), Add(HeaterIn, heater.Name), Add(HeaterOut, heater.Name), Add(HeaterDuty, heater.Name)))];
        Recompressors = [.. line.Recompressors.Select(machine => Machine(machine))];
    }

    /// <summary>How many there are.</summary>
    public int Count => _keys.Count;

    /// <summary>The keys by index.</summary>
    public IReadOnlyList<VariableKey> Keys => _keys;

    /// <summary>Index of a variable; −1 when the line has none such.</summary>
    public int this[VariableKey key] => _index.GetValueOrDefault(key, -1);

    /// <summary>Index of a variable; −1 when the line has none such.</summary>
    public int this[VariableKind kind, string place = ""] => this[new VariableKey(kind, place)];

    internal int FeedFlow { get; }

    internal int FeedSolids { get; }

    internal int FeedTemperature { get; }

    internal int ProductFlow { get; }

    internal int ProductSolids { get; }

    internal int Evaporation { get; }

    internal int ElevationError { get; }

    internal int SteamFlow { get; }

    internal int SteamPressure { get; }

    internal int SteamSuperheat { get; }

    internal EffectVariables[] Effects { get; }

    /// <summary>By effect, by body in service; none for an effect that is its own body.</summary>
    internal int[][] Bodies { get; }

    internal (int Flow, int Accumulation)[] Tanks { get; }

    internal (int Flow, int Share)[] Liquor { get; }

    internal int[] Heating { get; }

    internal int[] Bleeds { get; }

    internal HeaterVariables[] Heaters { get; }

    internal RecompressorVariables[] Recompressors { get; }

    /// <summary>A size of each variable against which its changes are judged, so that all are of like weight.</summary>
    /// <param name="flow">A typical liquor flow of the line, such as its feed, kg/s.</param>
    public double[] Scales(double flow) => [.. _keys.Select(key => Scale(key.Kind, flow))];

    private static double Scale(VariableKind kind, double flow) => kind switch
    {
        VariableKind.FeedTemperature or BoilingTemperature or HeatingTemperature or HeaterIn or HeaterOut or VariableKind.SteamSuperheat or Subcooling => 10,
        VapourPressure or ChestPressure or VariableKind.SteamPressure or DischargePressure => 1e5,
        VariableKind.FeedSolids or VariableKind.ProductSolids or LeavingSolids or HeaterSolids => 0.2,
        Duty or HeaterDuty or Power => LatentHeat * flow / 5,
        Coefficient or BodyCoefficient => 1500,
        MotiveEnthalpy or DischargeEnthalpy => 1e5,
        VariableKind.ElevationError or Efficiency or LiquorShare => 1,
        HeatLossShare or VentShare => 0.01,
        _ => flow / 5,
    };

    /// <summary>Latent heat of water near its atmospheric boiling point, J/kg, as a size.</summary>
    internal const double LatentHeat = 2.26e6;

    private static bool IsGroup(LineGraph graph, int i) => graph.Bodies[i] is not [{ } only] || only.Name != graph.Line.Effects[i].Name;

    private static string SourceName(LineGraph graph, int from) => from == LineGraph.Steam ? "steam"
        : from >= 0 ? graph.NameOf(from) : graph.Line.Recompressors[LineGraph.Steam - 1 - from].Name;

    private RecompressorVariables Machine(Recompressor machine)
    {
        bool thermal = machine.Kind == RecompressorKind.Thermal;
        return new(
            Add(SuctionFlow, machine.Name), Add(DischargeFlow, machine.Name), Add(DischargeEnthalpy, machine.Name), Add(DischargePressure, machine.Name),
            thermal ? Add(MotiveFlow, machine.Name) : -1, thermal ? Add(MotiveEnthalpy, machine.Name) : -1,
            thermal ? -1 : Add(Power, machine.Name), thermal ? -1 : Add(Efficiency, machine.Name), thermal ? -1 : Add(SprayFlow, machine.Name));
    }

    private int Add(VariableKind kind, string place = "")
    {
        var key = new VariableKey(kind, place);
        if (!_index.TryAdd(key, _keys.Count)) throw new ArgumentException($"{key} comes twice: names in a line are unique.");
        _keys.Add(key);
        return _keys.Count - 1;
    }
}

/// <summary>Indices of the variables of an effect; −1 is absent.</summary>
internal readonly record struct EffectVariables(
    int Flow, int Solids, int Boiling, int Vapour, int VapourPressure, int ChestPressure, int Heating, int Duty, int Coefficient, int HeatLoss, int Vent,
    int Condensate, int Subcooling, int Accumulation, int ToCondenser, int Flashing, int FlashVapour);

/// <summary>Indices of the variables of a heater.</summary>
internal readonly record struct HeaterVariables(int Flow, int Solids, int In, int Out, int Duty);

/// <summary>Indices of the variables of a recompressor; −1 is absent.</summary>
internal readonly record struct RecompressorVariables(
    int Suction, int Discharge, int Enthalpy, int Pressure, int Motive, int MotiveEnthalpy, int Power, int Efficiency, int Spray);
