using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Plant;

/// <summary>A site as its plant file describes it: everything that is known before any reading.</summary>
public sealed record Site
{
    /// <summary>The site's name, as shown on screens.</summary>
    public required string Name { get; init; }

    /// <summary>IANA time zone in which local times of files are read and days are cut on screens.</summary>
    public required string TimeZone { get; init; }

    /// <summary>Atmospheric pressure, Pa: makes gauge pressures absolute.</summary>
    public required FixedOrMeasured Atmosphere { get; init; }

    /// <summary>Length of an evaluation window on the UTC grid; divides an hour. Default 5 min.</summary>
    public TimeSpan Window { get; init; } = TimeSpan.FromMinutes(5);

    /// <summary>Earlier readings are refused.</summary>
    public required DateTimeOffset HistoryFrom { get; init; }

    /// <summary>The lines in plant-file order.</summary>
    public required IReadOnlyList<Line> Lines { get; init; }

    /// <summary>What the plant allows when cleanings are planned; null when not given.</summary>
    public CleaningRules? CleaningRules { get; init; }
}

/// <summary>Which liquor a line boils: always the same, or told by a signal.</summary>
/// <param name="Always">The liquor when there is no signal; null otherwise.</param>
/// <param name="Signal">The signal that tells the product; null when always the same.</param>
/// <param name="ByValue">Liquor by the signal's value (rounded to the nearest whole number).</param>
public sealed record LiquorChoice(Liquor? Always, Instrument? Signal, IReadOnlyDictionary<int, Liquor> ByValue);

/// <summary>One line: effects that share a liquor and a steam train.</summary>
public sealed record Line
{
    /// <summary>The name: letters, digits, underscore, hyphen.</summary>
    public required string Name { get; init; }

    /// <summary>Earlier names whose history belongs to this line.</summary>
    public IReadOnlyList<string> Formerly { get; init; } = [];

    /// <summary>What the line boils.</summary>
    public required LiquorChoice Liquor { get; init; }

    /// <summary>
    /// How long the line needs to settle after a change; at most 6 h. Null: three times what its tanks hold over the feed flow, but no less than
    /// <see cref="LeastSettlingTime"/>, which also stands where no hold-up is known.
    /// </summary>
    public TimeSpan? SettlingTime { get; init; }

    /// <summary>Settling time where nothing else is known.</summary>
    public static TimeSpan LeastSettlingTime { get; } = TimeSpan.FromMinutes(20);

    /// <summary>The longest settling time that a line may have.</summary>
    public static TimeSpan LongestSettlingTime { get; } = TimeSpan.FromHours(6);

    /// <summary>How long an instrument must have been suspect before its readings are left out. Default 1 h; at most 6 h.</summary>
    public TimeSpan SuspectAfter { get; init; } = TimeSpan.FromHours(1);

    /// <summary>The line produces while its feed flow is above this, kg/s; null: whenever feed flows.</summary>
    public double? ProducingAboveFeedFlow { get; init; }

    /// <summary>The liquor that enters the line.</summary>
    public LiquorStream Feed { get; init; } = new();

    /// <summary>The liquor that leaves the line.</summary>
    public LiquorStream Product { get; init; } = new();

    /// <summary>The steam main.</summary>
    public SteamMain Steam { get; init; } = new();

    /// <summary>The effects in plant-file order, which is not always the order of the steam.</summary>
    public required IReadOnlyList<Effect> Effects { get; init; }

    /// <summary>Vapour that leaves the train for other users.</summary>
    public IReadOnlyList<Bleed> Bleeds { get; init; } = [];

    /// <summary>Heaters that bleeds heat.</summary>
    public IReadOnlyList<Heater> Heaters { get; init; } = [];

    /// <summary>Condensate that flashes; at most one place for each effect.</summary>
    public IReadOnlyList<CondensateFlash> CondensateFlashes { get; init; } = [];

    /// <summary>Tanks that the liquor passes.</summary>
    public IReadOnlyList<Tank> Tanks { get; init; } = [];

    /// <summary>Bodies of effects that consist of several, and spares.</summary>
    public IReadOnlyList<Body> Bodies { get; init; } = [];

    /// <summary>Recompressors.</summary>
    public IReadOnlyList<Recompressor> Recompressors { get; init; } = [];

    /// <summary>Effects that are cleaned together.</summary>
    public IReadOnlyList<CleaningGroup> CleaningGroups { get; init; } = [];

    /// <summary>Evaporation that the plant needs from the line, kg/s; null when not given.</summary>
    public double? RequiredEvaporation { get; init; }

    /// <summary>Costs; null when not given, in which case nothing is said about money.</summary>
    public Money? Money { get; init; }
}

/// <summary>Instruments on a liquor stream; each may be absent.</summary>
public sealed record LiquorStream
{
    /// <summary>Flow, mass or volume.</summary>
    public Instrument? Flow { get; init; }

    /// <summary>Dissolved solids, mass fraction.</summary>
    public Instrument? Solids { get; init; }

    /// <summary>Temperature, K.</summary>
    public Instrument? Temperature { get; init; }

    /// <summary>Laboratory value of the solids, mass fraction; each is a point, good for <see cref="LaboratoryValidFor"/>.</summary>
    public Instrument? Laboratory { get; init; }

    /// <summary>How long after its sample a laboratory value may stand in; at most 24 h.</summary>
    public TimeSpan LaboratoryValidFor { get; init; } = TimeSpan.FromHours(8);
}

/// <summary>Where the gauge of the steam main sits.</summary>
public enum SteamGaugePlace
{
    /// <summary>On the chest: it reads the chest pressure.</summary>
    Chest,
    /// <summary>Before the control valve: it never stands for the chest pressure.</summary>
    BeforeValve,
}

/// <summary>Instruments on the steam main.</summary>
public sealed record SteamMain
{
    /// <summary>Steam flow.</summary>
    public Instrument? Flow { get; init; }

    /// <summary>Steam pressure.</summary>
    public Instrument? Pressure { get; init; }

    /// <summary>Where the pressure gauge sits.</summary>
    public SteamGaugePlace PressureAt { get; init; } = SteamGaugePlace.BeforeValve;

    /// <summary>Steam temperature, K: tells superheat.</summary>
    public Instrument? Temperature { get; init; }
}

/// <summary>Vapour drawn from an effect for another user.</summary>
/// <param name="From">Name of the effect.</param>
/// <param name="To">Name of the user.</param>
/// <param name="Flow">Its flow, where measured.</param>
public sealed record Bleed(string From, string To, Instrument? Flow);

/// <summary>Effects that are cleaned together.</summary>
/// <param name="Name">Name of the group.</param>
/// <param name="Effects">Names of the effects.</param>
/// <param name="Duration">How long a cleaning takes; null when not given.</param>
/// <param name="Cost">Cost of one cleaning in the plant's currency; null when not given.</param>
public sealed record CleaningGroup(string Name, IReadOnlyList<string> Effects, TimeSpan? Duration, double? Cost)
{
    /// <summary>The signal that tells that a cleaning is going on; null when there is none.</summary>
    public ActiveSignal? Signal { get; init; }
}
