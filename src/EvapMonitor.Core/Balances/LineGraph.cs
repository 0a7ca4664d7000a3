using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Balances;

/// <summary>Liquor on its way from one place to the next.</summary>
/// <param name="From">Index of an effect, of a tank (from <see cref="LineGraph.FirstTank"/> on), or <see cref="LineGraph.Feed"/>.</param>
/// <param name="To">Index of an effect, of a tank, or <see cref="LineGraph.Product"/>.</param>
/// <param name="Share">Share of the source; null: all that the others leave.</param>
public sealed record LiquorWay(int From, int To, UncertainShare? Share);

/// <summary>Heating steam on its way to a chest.</summary>
/// <param name="From">Index of the effect whose vapour it is, <see cref="LineGraph.Steam"/>, or a recompressor (<see cref="LineGraph.RecompressorAt"/>).</param>
/// <param name="To">Index of the effect that it heats.</param>
public sealed record HeatingWay(int From, int To)
{
    /// <summary>Index of the recompressor; negative when it is none.</summary>
    public int Recompressor => LineGraph.Steam - 1 - From;
}

/// <summary>A body in service.</summary>
/// <param name="Name">Its name; an effect's own surface has the name of the effect.</param>
/// <param name="Area">Heating surface, m².</param>
public sealed record BodyInService(string Name, double Area);

/// <summary>
/// A line as nodes and ways: who feeds, who heats, who draws from whom. Nothing depends on how many effects there are or in which order they stand in the file.
/// </summary>
public sealed class LineGraph
{
    /// <summary>Index that stands for the feed of the line.</summary>
    public const int Feed = -1;

    /// <summary>Index that stands for the product of the line.</summary>
    public const int Product = -2;

    /// <summary>Index that stands for the steam main.</summary>
    public const int Steam = -1;

    /// <summary>Builds the graph of a line.</summary>
    /// <param name="line">The line.</param>
    /// <param name="inService">Names of the bodies in service by effect; an effect that is not in it has those that it lists, or its own surface.</param>
    /// <exception cref="ArgumentException">A name is unknown.</exception>
    public LineGraph(Line line, IReadOnlyDictionary<string, IReadOnlyList<string>>? inService = null)
    {
        ArgumentNullException.ThrowIfNull(line);
        Line = line;
        FirstTank = line.Effects.Count;
        Dictionary<string, int> effects = Index(line.Effects.Select(effect => effect.Name)), machines = Index(line.Recompressors.Select(machine => machine.Name));
        Dictionary<string, int> nodes = Index(line.Effects.Select(effect => effect.Name).Concat(line.Tanks.Select(tank => tank.Name)));
        int Find(Dictionary<string, int> among, string name, string what) =>
            among.TryGetValue(name, out int i) ? i : throw new ArgumentException($"Line {line.Name} has no {what} {name}.", nameof(line));

        var ways = new List<LiquorWay>();
        for (int i = 0; i < line.Effects.Count; i++)
        {
            foreach (LiquorSource source in line.Effects[i].Liquor)
                ways.Add(new(source.From is null ? Feed : Find(nodes, source.From, "effect or tank"), i, source.Share));
        }

        for (int k = 0; k < line.Tanks.Count; k++)
            ways.Add(new(line.Tanks[k].From is { } from ? Find(effects, from, "effect") : Feed, FirstTank + k, null));
        Liquor = Completed(ways, nodes.Count);
        Heating = [.. line.Effects.SelectMany((effect, i) => effect.Heating.Select(source => new HeatingWay(
            source.IsSteam ? Steam : source.Recompressor is { } machine ? RecompressorAt(Find(machines, machine, "recompressor")) : Find(effects, source.VapourOf!, "effect"), i)))];
        BleedFrom = [.. line.Bleeds.Select(bleed => Find(effects, bleed.From, "effect"))];
        Dictionary<string, int> heaters = Index(line.Heaters.Select(heater => heater.Name));
        BleedTo = [.. line.Bleeds.Select(bleed => heaters.GetValueOrDefault(bleed.To, -1))];
        SuctionFrom = [.. line.Recompressors.Select(machine => Find(effects, machine.Suction, "effect"))];
        FlashTo = [.. Enumerable.Repeat(-1, line.Effects.Count)];
        foreach (CondensateFlash flash in line.CondensateFlashes) FlashTo[Find(effects, flash.From, "effect")] = Find(effects, flash.To, "effect");
        // Vapour that heats no other effect has a condenser to go to.
        ToCondenser = [.. line.Effects.Select((_, i) => !Heating.Any(way => way.From == i))];
        BySteamAlone = [.. line.Effects.Select((_, i) => Heating.Where(way => way.To == i).All(way => way.From == Steam))];
        Bodies = [.. line.Effects.Select(effect => BodiesOf(line, effect, inService))];
    }

    /// <summary>
    /// The graph of a line in which each effect is one surface, whichever bodies make it up: for a balance, which needs no surface, and in which a spare body may stand
    /// in several places.
    /// </summary>
    public static LineGraph OfSurfaces(Line line)
    {
        ArgumentNullException.ThrowIfNull(line);
        return new LineGraph(line, line.Effects.ToDictionary(effect => effect.Name, effect => (IReadOnlyList<string>)[effect.Name], StringComparer.Ordinal));
    }

    /// <summary>The line.</summary>
    public Line Line { get; }

    /// <summary>Index of the first tank among the liquor's nodes: the number of effects.</summary>
    public int FirstTank { get; }

    /// <summary>The ways of the liquor, those to the product among them.</summary>
    public IReadOnlyList<LiquorWay> Liquor { get; }

    /// <summary>The ways of heating steam.</summary>
    public IReadOnlyList<HeatingWay> Heating { get; }

    /// <summary>By bleed: the effect it is drawn from.</summary>
    public IReadOnlyList<int> BleedFrom { get; }

    /// <summary>By bleed: the heater it heats; −1 for another user.</summary>
    public IReadOnlyList<int> BleedTo { get; }

    /// <summary>By recompressor: the effect whose vapour it draws.</summary>
    public IReadOnlyList<int> SuctionFrom { get; }

    /// <summary>By effect: the effect whose chest its flash vapour joins; −1 when its condensate does not flash.</summary>
    public int[] FlashTo { get; }

    /// <summary>By effect: true when its vapour (less bleeds and suction) goes to a condenser.</summary>
    public bool[] ToCondenser { get; }

    /// <summary>By effect: true when steam from the main alone heats it, so that its chest has the pressure of the steam behind its valve.</summary>
    public bool[] BySteamAlone { get; }

    /// <summary>By effect: its bodies in service.</summary>
    public IReadOnlyList<IReadOnlyList<BodyInService>> Bodies { get; }

    /// <summary>True when steam from the main heats any effect.</summary>
    public bool HasSteam => Heating.Any(way => way.From == Steam);

    /// <summary>The index that stands for a recompressor as a source of heat.</summary>
    public static int RecompressorAt(int index) => Steam - 1 - index;

    /// <summary>Name of a liquor node.</summary>
    public string NameOf(int node) => node switch
    {
        Feed => "feed",
        Product => "product",
        _ => node < FirstTank ? Line.Effects[node].Name : Line.Tanks[node - FirstTank].Name,
    };

    /// <summary>
    /// What no effect takes goes to the product. Where the shares of a source are all stated and leave nothing, the last one takes the rest, so that nothing is
    /// stated twice.
    /// </summary>
    private static List<LiquorWay> Completed(List<LiquorWay> ways, int nodes)
    {
        for (int node = Feed; node < nodes; node++)
        {
            int n = node;
            List<LiquorWay> leaving = ways.FindAll(way => way.From == n);
            if (leaving.Exists(way => way.Share is null)) continue;
            if (leaving.Count > 0 && (node == Feed || leaving.Sum(way => way.Share!.Value) > 1 - 1e-9)) ways[ways.IndexOf(leaving[^1])] = leaving[^1] with { Share = null };
            else if (node != Feed) ways.Add(new(node, Product, null));
        }

        return ways;
    }

    private static IReadOnlyList<BodyInService> BodiesOf(Line line, Effect effect, IReadOnlyDictionary<string, IReadOnlyList<string>>? inService)
    {
        IReadOnlyList<string> names = inService?.GetValueOrDefault(effect.Name) ?? effect.Bodies;
        if (names.Count == 0 && effect.Bodies.Count == 0) return [new(effect.Name, effect.Area)];
        return [.. names.Select(name => name == effect.Name ? new(name, effect.Area)
            : line.Bodies.FirstOrDefault(body => body.Name == name) is { } body ? new BodyInService(name, body.Area)
            : throw new ArgumentException($"Line {line.Name} has no body {name}.", nameof(line)))];
    }

    private static Dictionary<string, int> Index(IEnumerable<string> names) =>
        names.Select((name, i) => (name, i)).ToDictionary(pair => pair.name, pair => pair.i, StringComparer.Ordinal);
}
