using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.Api;

/// <summary>An instrument at its place.</summary>
/// <param name="What">What it measures, in words.</param>
/// <param name="Instrument">The instrument.</param>
/// <param name="ValidFor">How long a reading stands.</param>
internal sealed record InstrumentHere(string What, Instrument Instrument, TimeSpan ValidFor);

/// <summary>A place of a flow sheet; <paramref name="Effect"/> is the index of the effect, −1 for others.</summary>
internal sealed record SheetPlace(string Id, string Kind, string Name, IReadOnlyList<InstrumentHere> Instruments, int Effect = -1);

/// <summary>A way of a flow sheet; <paramref name="Flow"/> is set where an instrument sees this way and no other, <paramref name="Variable"/> is its flow in the balance.</summary>
internal sealed record SheetWay(string From, string To, string Kind, UncertainShare? Share = null, InstrumentHere? Flow = null, VariableKey? Variable = null);

/// <summary>A line as places and ways, from the graph that the balances use. Nothing depends on how many effects there are or in which order they stand.</summary>
internal sealed class FlowSheet
{
    private const string Steam = "steam", Feed = "feed", Product = "product", Condenser = "condenser", Condensate = "condensate";

    private readonly List<SheetPlace> _places = [];
    private readonly List<SheetWay> _ways = [];

    /// <summary>Reads the sheet of a line.</summary>
    public FlowSheet(Line line)
    {
        var graph = new LineGraph(line);
        AddPlaces(line, graph);
        AddVapour(line, graph);
        AddLiquor(line, graph);
        AddCondensate(line, graph);
    }

    /// <summary>Effects in plant-file order, then what stands around them.</summary>
    public IReadOnlyList<SheetPlace> Places => _places;

    /// <summary>The ways: heating, bleeds, recompression, liquor, condensate.</summary>
    public IReadOnlyList<SheetWay> Ways => _ways;

    private void AddPlaces(Line line, LineGraph graph)
    {
        for (int i = 0; i < line.Effects.Count; i++) _places.Add(new(Of(line.Effects[i]), "effect", line.Effects[i].Name, SheetInstruments.Of(line.Effects[i]), i));
        if (graph.HasSteam) _places.Add(new(Steam, Steam, "steam", SheetInstruments.Of(line.Steam)));
        _places.Add(new(Feed, Feed, "feed", SheetInstruments.Of(line.Feed)));
        _places.Add(new(Product, Product, "product", SheetInstruments.Of(line.Product)));
        if (graph.ToCondenser.Contains(true)) _places.Add(new(Condenser, Condenser, "condenser", []));
        _places.Add(new(Condensate, Condensate, "condensate", []));
        _places.AddRange(line.Tanks.Select(tank => new SheetPlace(OfTank(tank.Name), "tank", tank.Name, SheetInstruments.Of(tank))));
        _places.AddRange(line.Heaters.Select(heater => new SheetPlace($"heater/{heater.Name}", "heater", heater.Name, SheetInstruments.Of(heater))));
        _places.AddRange(line.Bleeds.Where((_, b) => graph.BleedTo[b] < 0).Select(bleed => bleed.To).Distinct().Select(user => new SheetPlace($"user/{user}", "user", user, [])));
        foreach (Recompressor machine in line.Recompressors)
        {
            bool thermal = machine.Kind == RecompressorKind.Thermal;
            _places.Add(new(OfMachine(machine), thermal ? "thermal recompressor" : "mechanical recompressor", machine.Name, SheetInstruments.Of(machine)));
            if (thermal) _places.Add(new($"motive/{machine.Name}", "motive steam", "motive steam", SheetInstruments.Of(machine.Motive)));
        }
    }

    private void AddVapour(Line line, LineGraph graph)
    {
        // The main's flow is that of a way only while a single chest takes it.
        InstrumentHere? main = graph.Heating.Count(way => way.From == LineGraph.Steam) == 1 ? SheetInstruments.Here("flow", line.Steam.Flow) : null;
        foreach (HeatingWay way in graph.Heating)
        {
            string to = Of(line.Effects[way.To]);
            string from = way.From == LineGraph.Steam ? Steam : way.Recompressor >= 0 ? line.Recompressors[way.Recompressor].Name : line.Effects[way.From].Name;
            var flow = new VariableKey(VariableKind.HeatingFlow, VariableKey.Way(from, line.Effects[way.To].Name));
            if (way.From == LineGraph.Steam) _ways.Add(new(Steam, to, "steam", Flow: main, Variable: flow));
            else _ways.Add(new(way.Recompressor >= 0 ? OfMachine(line.Recompressors[way.Recompressor]) : Of(line.Effects[way.From]), to, "vapour", Variable: flow));
        }

        for (int i = 0; i < line.Effects.Count; i++)
        {
            if (graph.ToCondenser[i]) _ways.Add(new(Of(line.Effects[i]), Condenser, "vapour", Variable: new(VariableKind.CondenserFlow, line.Effects[i].Name)));
        }

        for (int b = 0; b < line.Bleeds.Count; b++)
        {
            Bleed bleed = line.Bleeds[b];
            _ways.Add(new(Of(line.Effects[graph.BleedFrom[b]]), $"{(graph.BleedTo[b] < 0 ? "user" : "heater")}/{bleed.To}", "bleed",
                Flow: SheetInstruments.Here("flow", bleed.Flow), Variable: new(VariableKind.BleedFlow, VariableKey.Way(bleed.From, bleed.To))));
        }

        for (int r = 0; r < line.Recompressors.Count; r++)
        {
            Recompressor machine = line.Recompressors[r];
            _ways.Add(new(Of(line.Effects[graph.SuctionFrom[r]]), OfMachine(machine), "vapour", Variable: new(VariableKind.SuctionFlow, machine.Name)));
            if (machine.Kind == RecompressorKind.Thermal) _ways.Add(new($"motive/{machine.Name}", OfMachine(machine), "motive",
                Flow: SheetInstruments.Here("flow", machine.Motive.Flow), Variable: new(VariableKind.MotiveFlow, machine.Name)));
        }
    }

    private void AddLiquor(Line line, LineGraph graph)
    {
        string Node(int node) => node switch
        {
            LineGraph.Feed => Feed,
            LineGraph.Product => Product,
            _ => node < graph.FirstTank ? Of(line.Effects[node]) : OfTank(line.Tanks[node - graph.FirstTank].Name),
        };
        foreach (LiquorWay way in graph.Liquor)
        {
            bool allOfSource = graph.Liquor.Count(other => other.From == way.From) == 1, allOfTarget = graph.Liquor.Count(other => other.To == way.To) == 1;
            InstrumentHere? leaving = !allOfSource ? null
                : way.From == LineGraph.Feed ? SheetInstruments.Here("flow", line.Feed.Flow)
                : way.From < graph.FirstTank ? SheetInstruments.Here("flow leaving", line.Effects[way.From].Leaving.Flow) : null;
            _ways.Add(new(Node(way.From), Node(way.To), "liquor", way.Share, leaving ?? (way.To == LineGraph.Product && allOfTarget ? SheetInstruments.Here("flow", line.Product.Flow) : null),
                new(VariableKind.LiquorFlow, VariableKey.Way(graph.NameOf(way.From), graph.NameOf(way.To)))));
        }
    }

    private void AddCondensate(Line line, LineGraph graph)
    {
        string Vessel(int effect) => $"flash/{line.Effects[effect].Name}";
        string After(int effect) => graph.FlashTo[effect] is >= 0 and var to ? Vessel(to) : Condensate;
        foreach (int to in graph.FlashTo.Where(to => to >= 0).Distinct().Order())
        {
            _places.Add(new(Vessel(to), "flash vessel", $"flash to {line.Effects[to].Name}", []));
            // A vessel that several effects share has no variable of its own.
            int[] sources = [.. Enumerable.Range(0, line.Effects.Count).Where(i => graph.FlashTo[i] == to)];
            _ways.Add(new(Vessel(to), Of(line.Effects[to]), "vapour", Variable: sources is [var only] ? new(VariableKind.FlashVapour, line.Effects[only].Name) : null));
            _ways.Add(new(Vessel(to), After(to), Condensate));
        }

        for (int i = 0; i < line.Effects.Count; i++)
            _ways.Add(new(Of(line.Effects[i]), After(i), Condensate, Flow: SheetInstruments.Here("condensate flow", line.Effects[i].Chest.CondensateFlow),
                Variable: new(VariableKind.CondensateFlow, line.Effects[i].Name)));
    }

    private static string Of(Effect effect) => $"effect/{effect.Name}";

    private static string OfTank(string name) => $"tank/{name}";

    private static string OfMachine(Recompressor machine) => $"recompressor/{machine.Name}";
}
