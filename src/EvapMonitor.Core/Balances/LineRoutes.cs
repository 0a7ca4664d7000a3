using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Balances;

/// <summary>Who feeds and who heats whom in a line, by index. Plant files with a cycle are refused before this.</summary>
public sealed class LineRoutes
{
    /// <summary>Reads the routes of a line.</summary>
    /// <exception cref="ArgumentException">A name is unknown or the liquor runs in a circle.</exception>
    public LineRoutes(Line line)
    {
        var index = line.Effects.Select((effect, i) => (effect.Name, i)).ToDictionary(pair => pair.Name, pair => pair.i);
        int Of(string name) => index.TryGetValue(name, out int i) ? i : throw new ArgumentException($"Line {line.Name} has no effect {name}.");
        var machines = line.Recompressors.Select((machine, r) => (machine.Name, r)).ToDictionary(pair => pair.Name, pair => pair.r);
        Suction = [.. line.Recompressors.Select(machine => Of(machine.Suction))];
        Heating = [.. line.Effects.Select(effect => effect.Heating.Select(source =>
            source.IsSteam ? Steam : source.VapourOf is { } heater ? Of(heater) : RecompressorAt(machines[source.Recompressor!])).ToArray())];
        Liquor = [.. line.Effects.Select(effect => effect.Liquor.Select(source => Inflow(line, source, Of)).ToArray())];
        JoinedByFlash = [.. line.Effects.Select(effect => line.CondensateFlashes.Any(flash => flash.To == effect.Name))];
        Heats = [.. line.Effects.Select((_, i) => Enumerable.Range(0, line.Effects.Count).Where(k => Heating[k].Contains(i)).ToArray())];
        LeavesLine = [.. line.Effects.Select((_, i) => !Liquor.Any(inflows => inflows.Any(inflow => inflow.From == i))
            && !line.Tanks.Any(tank => tank.From is { } from && Of(from) == i))];
        SteamHeatsOnlyOne = Heating.Count(sources => sources.Contains(Steam)) == 1;
        LiquorOrder = Order(line);
    }

    /// <summary>Index that stands for the steam main.</summary>
    public const int Steam = -1;

    /// <summary>Index that stands for the feed of the line.</summary>
    public const int Feed = -1;

    /// <summary>Index that stands for a recompressor among the sources of heat.</summary>
    public static int RecompressorAt(int index) => Steam - 1 - index;

    /// <summary>Index of the recompressor that a source of heat stands for.</summary>
    public static int RecompressorOf(int source) => Steam - 1 - source;

    /// <summary>By recompressor: the effect whose vapour it draws.</summary>
    public int[] Suction { get; }

    /// <summary>By effect: true when vapour of flashing condensate joins its chest.</summary>
    public bool[] JoinedByFlash { get; }

    /// <summary>By effect: the effects whose vapour heats it, <see cref="Steam"/>, or a recompressor (<see cref="RecompressorAt"/>).</summary>
    public int[][] Heating { get; }

    /// <summary>By effect: the effects that its vapour heats.</summary>
    public int[][] Heats { get; }

    /// <summary>By effect: where its liquor comes from.</summary>
    public LiquorInflow[][] Liquor { get; }

    /// <summary>By effect: true when its liquor goes to no other effect.</summary>
    public bool[] LeavesLine { get; }

    /// <summary>True when one effect alone takes steam from the main, so that the main's flow is its flow.</summary>
    public bool SteamHeatsOnlyOne { get; }

    /// <summary>The effects in the order of the liquor.</summary>
    public int[] LiquorOrder { get; }

    private static LiquorInflow Inflow(Line line, LiquorSource source, Func<string, int> index)
    {
        if (line.Tanks.FirstOrDefault(tank => tank.Name == source.From) is { } tank)
            return new(tank.From is null ? Feed : index(tank.From), ShareOf(line, source), true);
        return new(source.From is null ? Feed : index(source.From), ShareOf(line, source), false);
    }

    /// <summary>The share of a source: as stated, or what the others leave of it, divided evenly.</summary>
    private static double ShareOf(Line line, LiquorSource source)
    {
        if (source.Share is { } stated) return stated.Value;
        var takers = line.Effects.SelectMany(effect => effect.Liquor).Where(other => other.From == source.From).ToList();
        double left = 1 - takers.Sum(taker => taker.Share?.Value ?? 0);
        return left / (takers.Count(taker => taker.Share is null) + line.Tanks.Count(tank => tank.From == source.From));
    }

    private int[] Order(Line line)
    {
        var order = new List<int>();
        while (order.Count < Liquor.Length)
        {
            int next = Enumerable.Range(0, Liquor.Length)
                .FirstOrDefault(i => !order.Contains(i) && Liquor[i].All(inflow => inflow.From == Feed || order.Contains(inflow.From)), -2);
            if (next < 0) throw new ArgumentException($"The liquor of line {line.Name} runs in a circle.");
            order.Add(next);
        }

        return [.. order];
    }
}

/// <summary>A liquor inflow of an effect.</summary>
/// <param name="From">Index of the effect it leaves, or <see cref="LineRoutes.Feed"/>.</param>
/// <param name="Share">Share of that source, 0 to 1.</param>
/// <param name="ThroughTank">True when it passes a tank, so that it need not flow as it left its source.</param>
public readonly record struct LiquorInflow(int From, double Share, bool ThroughTank);
