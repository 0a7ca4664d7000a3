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
        Heating = [.. line.Effects.Select(effect => effect.Heating.Select(source => source.VapourOf is null ? Steam : Of(source.VapourOf)).ToArray())];
        Liquor = [.. line.Effects.Select(effect => effect.Liquor
            .Select(source => new LiquorInflow(source.From is null ? Feed : Of(source.From), ShareOf(line, source))).ToArray())];
        Heats = [.. line.Effects.Select((_, i) => Enumerable.Range(0, line.Effects.Count).Where(k => Heating[k].Contains(i)).ToArray())];
        LeavesLine = [.. line.Effects.Select((_, i) => !Liquor.Any(inflows => inflows.Any(inflow => inflow.From == i)))];
        SteamHeatsOnlyOne = Heating.Count(sources => sources.Contains(Steam)) == 1;
        LiquorOrder = Order(line);
    }

    /// <summary>Index that stands for the steam main.</summary>
    public const int Steam = -1;

    /// <summary>Index that stands for the feed of the line.</summary>
    public const int Feed = -1;

    /// <summary>By effect: the effects whose vapour heats it, or <see cref="Steam"/>.</summary>
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

    /// <summary>The share of a source: as stated, or what the others leave of it, divided evenly.</summary>
    private static double ShareOf(Line line, LiquorSource source)
    {
        if (source.Share is { } stated) return stated.Value;
        var takers = line.Effects.SelectMany(effect => effect.Liquor).Where(other => other.From == source.From).ToList();
        double left = 1 - takers.Sum(taker => taker.Share?.Value ?? 0);
        return left / takers.Count(taker => taker.Share is null);
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
public readonly record struct LiquorInflow(int From, double Share);
