namespace EvapMonitor.Core.Properties;

/// <summary>The liquors known by kind, as a plant file names them.</summary>
public static class Liquors
{
    /// <summary>The kinds that <see cref="Create"/> knows. A plant's own liquor is a <see cref="CustomLiquor"/>.</summary>
    public static IReadOnlyList<string> Kinds { get; } = ["water", "sucrose", "sodium-hydroxide", "sea-water", "milk", "juice", "black-liquor"];

    /// <summary>A liquor of a known kind.</summary>
    /// <param name="kind">One of <see cref="Kinds"/>.</param>
    /// <param name="name">The name in the plant file; null: the kind.</param>
    /// <param name="purity">For sucrose alone: sucrose as a mass fraction of the solids, above 0 to 1; null: 1.</param>
    /// <exception cref="ArgumentException">The kind is unknown, or takes no purity.</exception>
    /// <exception cref="ArgumentOutOfRangeException">The purity is not above 0 and at most 1.</exception>
    public static Liquor Create(string kind, string? name = null, double? purity = null)
    {
        ArgumentNullException.ThrowIfNull(kind);
        if (purity is not null && kind != "sucrose")
            throw new ArgumentException($"Only sucrose has a purity; liquor kind '{kind}' has none.", nameof(purity));
        var called = name ?? kind;
        return kind switch
        {
            "water" => new Water { Name = called },
            "sucrose" => new Sucrose(purity ?? 1) { Name = called },
            "sodium-hydroxide" => new SodiumHydroxide { Name = called },
            "sea-water" => new SeaWater { Name = called },
            "milk" => new Milk { Name = called },
            "juice" => new Juice { Name = called },
            "black-liquor" => new BlackLiquor { Name = called },
            _ => throw new ArgumentException($"Liquor kind '{kind}' is unknown; known are {string.Join(", ", Kinds)}, and custom with the plant's own data.", nameof(kind)),
        };
    }
}
