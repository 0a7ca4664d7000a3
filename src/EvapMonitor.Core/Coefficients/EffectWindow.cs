using EvapMonitor.Core.Balances;

namespace EvapMonitor.Core.Coefficients;

/// <summary>What the line was doing in a window. The numbers are stored: never renumber.</summary>
public enum RunningState : byte
{
    /// <summary>It cannot be told.</summary>
    Unknown,
    /// <summary>No feed.</summary>
    Idle,
    /// <summary>Evaporating product.</summary>
    Producing,
    /// <summary>Evaporating water: a clean test of the surface.</summary>
    WaterRun,
    /// <summary>Being cleaned.</summary>
    Cleaning,
    /// <summary>Feed flows after a stop, but no product leaves yet.</summary>
    Filling,
}

/// <summary>What evaluation leaves of one effect and one window. Values are SI; an absent one is NaN and <see cref="Reason"/> says why there is no coefficient.</summary>
public sealed record EffectWindow
{
    /// <summary>Start of the window, ms since 1970-01-01T00:00:00Z.</summary>
    public required long At { get; init; }

    /// <summary>What the line was doing.</summary>
    public required RunningState State { get; init; }

    /// <summary>True: the line was steady and the effect not being cleaned. False: it was not. Null: it could not be judged.</summary>
    public bool? Steady { get; init; }

    /// <summary>What boiled, by its name in the plant file; null when not known.</summary>
    public string? Product { get; init; }

    /// <summary>Names of the bodies in service, joined by +; empty for the effect's own surface; null when not known.</summary>
    public string? Bodies { get; init; }

    /// <summary>Feed of the line as read, kg/s (a volume counts as that of water); NaN without a reading.</summary>
    public double FeedFlow { get; init; } = double.NaN;

    /// <summary>Heating temperature, K.</summary>
    public required Measured HeatingTemperature { get; init; }

    /// <summary>Boiling temperature, K.</summary>
    public required Measured BoilingTemperature { get; init; }

    /// <summary>Boiling-point elevation, K.</summary>
    public required Measured Elevation { get; init; }

    /// <summary>Driving force, K.</summary>
    public required Measured DrivingForce { get; init; }

    /// <summary>
    /// Driving force with the liquor boiling at the pressure at half its height, p + ρ·g·h/2, with the elevation it has at the surface, K; absent without a level.
    /// </summary>
    public Measured HeadCorrectedDrivingForce { get; init; } = Measured.Absent;

    /// <summary>Duty, W.</summary>
    public required Measured Duty { get; init; }

    /// <summary>Apparent coefficient, W/(m²·K).</summary>
    public required Measured Coefficient { get; init; }

    /// <summary>Dissolved solids of the leaving liquor, mass fraction.</summary>
    public required double Solids { get; init; }

    /// <summary>How the heating temperature was found.</summary>
    public required HeatingTemperatureSource HeatingFrom { get; init; }

    /// <summary>How the boiling temperature was found.</summary>
    public required BoilingTemperatureSource BoilingFrom { get; init; }

    /// <summary>How the duty was found.</summary>
    public required DutySource DutyFrom { get; init; }

    /// <summary>True when a property was used outside its published range.</summary>
    public required bool Extrapolated { get; init; }

    /// <summary>Why there is no coefficient; null when there is one.</summary>
    public required string? Reason { get; init; }

    /// <summary>A window of which nothing is known but why.</summary>
    public static EffectWindow Absent(long at, RunningState state, string reason) => new()
    {
        At = at,
        State = state,
        HeatingTemperature = Measured.Absent,
        BoilingTemperature = Measured.Absent,
        Elevation = Measured.Absent,
        DrivingForce = Measured.Absent,
        Duty = Measured.Absent,
        Coefficient = Measured.Absent,
        Solids = double.NaN,
        HeatingFrom = HeatingTemperatureSource.None,
        BoilingFrom = BoilingTemperatureSource.None,
        DutyFrom = DutySource.None,
        Extrapolated = false,
        Reason = reason,
    };
}

/// <summary>What evaluation leaves of a line and one window.</summary>
/// <param name="At">Start of the window, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="State">What the line was doing.</param>
/// <param name="Evaporation">Water evaporated, kg/s; NaN when not known.</param>
/// <param name="Effects">The effects in plant-file order.</param>
public sealed record LineWindow(long At, RunningState State, double Evaporation, IReadOnlyList<EffectWindow> Effects)
{
    /// <summary>True: the line was steady. False: it was not. Null: it could not be judged.</summary>
    public bool? Steady { get; init; }

    /// <summary>The reconciled balance; null when there is none.</summary>
    public BalanceWindow? Balance { get; init; }

    /// <summary>A window of which nothing is known but why.</summary>
    public static LineWindow Absent(long at, RunningState state, int effects, string reason) =>
        new(at, state, double.NaN, [.. Enumerable.Range(0, effects).Select(_ => EffectWindow.Absent(at, state, reason))]);
}
