using EvapMonitor.Core.Outlook;
using static EvapMonitor.Simulator.Stretch;

namespace EvapMonitor.Simulator;

/// <summary>Three effects in backward feed with a spare body. The steam follows the liquor that comes until it is at its highest pressure.</summary>
public sealed class SouthLine : DemoLine
{
    private const double HighestSteam = 3.2e5, ZeroCelsius = 273.15, TonsPerHour = 1 / 3.6;

    /// <summary>Who serves the second and the third effect, by the day from which on.</summary>
    private static readonly (double From, string Second, string Third)[] Turns =
    [
        (0, "SB", "SC"), (12, "SD", "SC"), (24, "SB", "SC"), (30, "SB", "SD"), (42, "SB", "SC"), (48, "SD", "SC"), (58, "SB", "SC"), (62, "SB", "SD"),
        (72, "SB", "SC"), (76, "SD", "SC"), (84, "SB", "SC"),
    ];

    /// <inheritdoc/>
    public override string Name => "south";

    /// <inheritdoc/>
    public override IReadOnlyList<Surface> Surfaces { get; } =
    [
        new("SA", 1350, FoulingLaw.Constant(7e-6), 2e-5) { SolidsReference = 0.47, SolidsExponent = -0.3 },
        new("SB", 1800, FoulingLaw.WithFlux(9e-6, 21_000), 1e-5) { SolidsReference = 0.27, SolidsExponent = -0.15 },
        new("SC", 1700, FoulingLaw.Levelling(9e-6, 1.2e-4), 1e-5) { SolidsReference = 0.2, SolidsExponent = -0.1 },
        new("SD", 1750, FoulingLaw.WithFlux(8e-6, 21_000)) { SolidsReference = 0.24, SolidsExponent = -0.12 },
    ];

    /// <inheritdoc/>
    public override IReadOnlyList<SurfaceCleaning> Cleanings { get; } =
    [
        new("SA", Hours(20, 10), 0.08), new("SA", Hours(50, 10), 0.1), new("SA", Hours(75, 10), 0.08),
        new("SB", Hours(12.5, 12), 0.05), new("SD", Hours(24.5, 12), 0.04), new("SC", Hours(30.5, 12), 0.05), new("SD", Hours(42.5, 12), 0.05), new("SB", Hours(48.5, 12), 0.06),
        new("SD", Hours(58.5, 12), 0.05), new("SC", Hours(62.5, 12), 0.7), new("SD", Hours(72.5, 12), 0.05), new("SB", Hours(76.5, 12), 0.04), new("SD", Hours(84.5, 12), 0.02),
    ];

    /// <inheritdoc/>
    public override IReadOnlyList<LogEntry> Log { get; } =
    [
        new("S1", Hours(20, 10), "boil-out"), new("S1", Hours(50, 10), "boil-out"), new("S1", Hours(75, 10), "boil-out", "acid added"),
        .. Turns.Skip(1).Select((turn, i) => turn.Second != Turns[i].Second
            ? new LogEntry("S2", Hours(turn.From, 1), "change of body", $"{turn.Second} in, {Turns[i].Second} out to be cleaned")
            : new LogEntry("S3", Hours(turn.From, 1), "change of body", $"{turn.Third} in, {Turns[i].Third} out to be cleaned")),
    ];

    /// <inheritdoc/>
    public override IReadOnlyList<Stretch> Stops { get; } = [Hours(20, 10), Hours(36, 8), Hours(50, 10), Hours(75, 10)];

    /// <inheritdoc/>
    public override IReadOnlyList<InstrumentFault> Faults { get; } =
    [
        new("S2.PT-2", new(0, StoryTime.Season), FaultKind.Offset, 0.015), new("S3.DT-2", Hours(33, 12), FaultKind.Bad), new("S.FT-90", Hours(70, 9), FaultKind.Uncertain),
    ];

    /// <inheritdoc/>
    public override IReadOnlyDictionary<string, IReadOnlyList<string>>? BodiesAt(StoryTime time)
    {
        (_, string second, string third) = Turns.Last(turn => turn.From <= time.OfSeason);
        return new Dictionary<string, IReadOnlyList<string>> { ["S1"] = ["SA"], ["S2"] = [second], ["S3"] = [third] };
    }

    /// <inheritdoc/>
    public override RatingConditions ConditionsAt(StoryTime time, IReadOnlyDictionary<string, double> coefficients) => new()
    {
        Coefficients = coefficients,
        FeedFlow = (105 + (2 * Wander("load", time, 0.6)) + (time.OfSeason is > 54 and < 58 ? -14 : 0)) * TonsPerHour,
        FeedSolids = 0.165 + (0.003 * Wander("feed solids", time, 2)),
        FeedTemperature = ZeroCelsius + 68 + Wander("feed temperature", time, 1),
        ProductSolids = 0.47 + (0.005 * Wander("product solids", time, 0.8)),
        LastVapourPressure = 1.5e4 + (3e2 * Wander("vacuum", time, 0.5)),
    };

    /// <inheritdoc/>
    public override RatingConditions? Limited(StoryTime time, RatingConditions conditions, OperatingPoint? point)
    {
        ArgumentNullException.ThrowIfNull(conditions);
        return point is null || point[Core.Balances.VariableKind.SteamPressure] > HighestSteam ? conditions with { FeedFlow = null, SteamPressure = HighestSteam } : null;
    }
}
