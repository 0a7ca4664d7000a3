using EvapMonitor.Core.Outlook;
using static EvapMonitor.Simulator.Stretch;

namespace EvapMonitor.Simulator;

/// <summary>Four effects in forward feed. The steam follows the juice that comes until it is at its highest pressure; then less juice is taken.</summary>
public sealed class NorthLine : DemoLine
{
    private const double HighestSteam = 1.85e5, ZeroCelsius = 273.15, TonsPerHour = 1 / 3.6;

    private static readonly Stretch Vacuum = new(47.25, 47.875), Superheat = new(31, 34);

    private static readonly (double From, double Feed)[] Loads = [(0, 190), (20, 170), (26, 190), (56, 204), (60, 190)];

    /// <inheritdoc/>
    public override string Name => "north";

    /// <inheritdoc/>
    public override IReadOnlyList<Surface> Surfaces { get; } =
    [
        new("N1", 2900, FoulingLaw.Constant(1.3e-6)) { SolidsReference = 0.18, SolidsExponent = -0.1 },
        new("N2", 2450, FoulingLaw.Levelling(8e-6, 8e-5)) { SolidsReference = 0.26, SolidsExponent = -0.15 },
        new("N3", 1850, FoulingLaw.Constant(6.5e-6)) { SolidsReference = 0.37, SolidsExponent = -0.2 },
        new("N4", 980, FoulingLaw.WithFlux(2.1e-5, 14_500)) { SolidsReference = 0.58, SolidsExponent = -0.3 },
    ];

    /// <inheritdoc/>
    public override IReadOnlyList<SurfaceCleaning> Cleanings { get; } =
    [
        new("N4", Hours(10, 8), 0.06), new("N3", Hours(17, 8), 0.1), new("N4", Hours(28, 8), 0.6),
        new("N1", Hours(36, 8), 0.1), new("N2", Hours(36, 8), 0.1), new("N4", Hours(36, 8), 0.05), new("N3", Hours(46, 8), 0.08),
        new("N4", Hours(54, 8), 0.08), new("N1", Hours(72, 10), 0.1), new("N2", Hours(72, 10), 0.1), new("N3", Hours(72, 10), 0.1), new("N4", Hours(72, 10), 0.04),
    ];

    /// <inheritdoc/>
    public override IReadOnlyList<LogEntry> Log { get; } =
    [
        new("N4", Hours(10, 8), "boil-out", "soda, two rounds"), new("N3", Hours(17, 8), "boil-out", "soda"), new("N4", Hours(28, 8), "boil-out", "steam was short, one round only"),
        new("N1", Hours(36, 8), "chemical"), new("N2", Hours(36, 8), "chemical"), new("N4", Hours(36, 8), "chemical", "acid after soda"), new("N3", Hours(46, 8), "boil-out"),
        new("N1", Hours(72, 10), "chemical"), new("N2", Hours(72, 10), "chemical"), new("N3", Hours(72, 10), "chemical"), new("N4", Hours(72, 10), "mechanical", "lances"),
    ];

    /// <inheritdoc/>
    public override IReadOnlyList<Stretch> Stops { get; } =
        [Hours(10, 8), Hours(17, 8), Hours(28, 8), Hours(36, 8), Hours(46, 8), Hours(54, 8), Hours(63, 10), Hours(72, 10)];

    /// <inheritdoc/>
    public override IReadOnlyList<GasInChest> Gas { get; } = [new("N3", new(39, 43), 2.5, 0.8)];

    /// <inheritdoc/>
    public override IReadOnlyList<InstrumentFault> Faults { get; } =
    [
        new("N2.FT-3", Hours(22, 12), FaultKind.Silent), new("N3.DT-2", Hours(52.25, 18), FaultKind.Frozen), new("N.DT-90", new(58, 84), FaultKind.Drift, 0.04),
    ];

    /// <inheritdoc/>
    public override RatingConditions ConditionsAt(StoryTime time, IReadOnlyDictionary<string, double> coefficients)
    {
        double day = time.OfSeason, feed = (LoadAt(day) + (2.5 * Wander("load", time, 0.4))) * TonsPerHour;
        double raw = 160 * TonsPerHour;
        return new()
        {
            Coefficients = coefficients,
            FeedFlow = feed,
            FeedSolids = 0.135 + (0.003 * Wander("feed solids", time, 1.5)),
            FeedTemperature = ZeroCelsius + 98 + (0.8 * Wander("feed temperature", time, 1)),
            ProductSolids = 0.58 + (0.005 * Wander("product solids", time, 0.7)),
            LastVapourPressure = (Vacuum.Holds(day) ? 3.3e4 : 1.95e4) + (3e2 * Wander("vacuum", time, 0.5)),
            SteamSuperheat = Superheat.Holds(day) ? 25 : 0.5,
            Bleeds = new Dictionary<string, double> { ["N2 to pans"] = 2.2 + (0.1 * Wander("pans", time, 0.3)) },
            Heaters = new Dictionary<string, HeaterConditions>
            {
                ["H1"] = new(raw, 0.135, ZeroCelsius + 76, ZeroCelsius + 85),
                ["H2"] = new(raw, 0.135, ZeroCelsius + 64 + Wander("raw juice", time, 0.8), ZeroCelsius + 76),
            },
        };
    }

    /// <inheritdoc/>
    public override RatingConditions? Limited(StoryTime time, RatingConditions conditions, OperatingPoint? point)
    {
        ArgumentNullException.ThrowIfNull(conditions);
        return point is null || point[Core.Balances.VariableKind.SteamPressure] > HighestSteam ? conditions with { FeedFlow = null, SteamPressure = HighestSteam } : null;
    }

    /// <summary>Juice that comes, t/h: a new load is reached within two hours.</summary>
    private static double LoadAt(double day)
    {
        double load = Loads[0].Feed;
        foreach ((double from, double feed) in Loads) load += (feed - load) * double.Clamp((day - from) * 12, 0, 1);
        return load;
    }
}
