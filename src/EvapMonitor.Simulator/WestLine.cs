using EvapMonitor.Core.Outlook;
using static EvapMonitor.Simulator.Stretch;

namespace EvapMonitor.Simulator;

/// <summary>One effect with a fan for its vapour. It takes what the fan and the surface allow. Every third day it is cleaned; runs of whey and permeate take turns.</summary>
public sealed class WestLine : DemoLine
{
    private const int RunDays = 3, Whey = 1, Permeate = 2, Water = 0;
    private const double CleaningHours = 4, ZeroCelsius = 273.15, TonsPerHour = 1 / 3.6;

    /// <summary>Runs that end with three hours of water before the cleaning.</summary>
    private static readonly int[] WaterAfter = [9, 19, 29];

    /// <summary>The run whose cleaning had no acid: most of the scale stayed.</summary>
    private const int PoorCleaning = 13;

    private static readonly IReadOnlyList<int> Runs = [.. Enumerable.Range(0, StoryTime.Season / RunDays)];

    /// <inheritdoc/>
    public override string Name => "west";

    /// <inheritdoc/>
    public override IReadOnlyList<Surface> Surfaces { get; } =
        [new("W1", 2100, FoulingLaw.Levelling(1.1e-4, 2.4e-4)) { SolidsReference = 0.3, SolidsExponent = -0.2 }];

    /// <inheritdoc/>
    public override IReadOnlyList<SurfaceCleaning> Cleanings { get; } = [.. Runs.Select(run => new SurfaceCleaning("W1", CleaningAfter(run), run == PoorCleaning ? 0.6 : 0.03))];

    /// <inheritdoc/>
    public override IReadOnlyList<LogEntry> Log { get; } = [.. Runs.Select(run => new LogEntry(
        "W1", CleaningAfter(run), run == PoorCleaning ? "caustic only" : "caustic and acid", run == PoorCleaning ? "acid tank empty" : ""))];

    /// <inheritdoc/>
    public override IReadOnlyList<Stretch> Stops { get; } = [.. Runs.Select(CleaningAfter)];

    /// <inheritdoc/>
    public override IReadOnlyList<InstrumentFault> Faults { get; } =
        [new("W.FT-90", Hours(25, 12), FaultKind.Uncertain), new("W1.PT-1", Hours(64, 6), FaultKind.Bad)];

    /// <inheritdoc/>
    public override int ProductAt(StoryTime time)
    {
        int run = (int)(time.OfSeason / RunDays);
        if (WaterAfter.Contains(run) && time.OfSeason >= CleaningAfter(run).From - (3 / 24.0)) return Water;
        return run % 3 == 2 ? Permeate : Whey;
    }

    /// <inheritdoc/>
    public override RatingConditions ConditionsAt(StoryTime time, IReadOnlyDictionary<string, double> coefficients)
    {
        int product = ProductAt(time);
        return new()
        {
            Coefficients = coefficients,
            FeedFlow = product == Water ? 45 * TonsPerHour : null,
            FeedSolids = product switch { Whey => 0.06, Permeate => 0.05, _ => 0 } * (1 + (0.02 * Wander("feed solids", time, 0.5))),
            FeedTemperature = ZeroCelsius + 85 + (0.5 * Wander("feed temperature", time, 0.5)),
            ProductSolids = product switch { Whey => 0.30 + (0.003 * Wander("product solids", time, 0.4)), Permeate => 0.20 + (0.002 * Wander("product solids", time, 0.4)), _ => null },
            LastVapourPressure = 5e4 + (2e2 * Wander("pressure", time, 0.5)),
        };
    }

    private static Stretch CleaningAfter(int run) => Hours((run * RunDays) + RunDays - (CleaningHours / 24), CleaningHours);
}
