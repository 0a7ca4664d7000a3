namespace EvapMonitor.Core.Outlook;

/// <summary>
/// What a line is rated at. Of feed flow, product solids, evaporation and steam (its pressure; for a thermal recompressor the flow of its motive steam) two are
/// given and the others follow. A line that lives on a compressor alone has no steam to adjust: there one of the first three is given.
/// </summary>
public sealed record RatingConditions
{
    /// <summary>Coefficient of each effect, or of each body in service where an effect consists of several, W/(m²·K).</summary>
    public required IReadOnlyDictionary<string, double> Coefficients { get; init; }

    /// <summary>Solids of the feed, mass fraction.</summary>
    public required double FeedSolids { get; init; }

    /// <summary>Temperature of the feed, K.</summary>
    public required double FeedTemperature { get; init; }

    /// <summary>Solids of the product, mass fraction; not for water, which has none.</summary>
    public double? ProductSolids { get; init; }

    /// <summary>Vapour pressure of the effects whose vapour goes to the condenser, Pa.</summary>
    public required double LastVapourPressure { get; init; }

    /// <summary>Pressure of the heating steam at the chests, Pa.</summary>
    public double? SteamPressure { get; init; }

    /// <summary>Feed flow, kg/s.</summary>
    public double? FeedFlow { get; init; }

    /// <summary>Water to be evaporated, kg/s.</summary>
    public double? Evaporation { get; init; }

    /// <summary>Superheat of the heating steam at the chest pressure, K. Default 0.</summary>
    public double SteamSuperheat { get; init; }

    /// <summary>Vapour to users other than heaters, kg/s, by <see cref="Balances.VariableKey.Way"/>. Not given: none.</summary>
    public IReadOnlyDictionary<string, double> Bleeds { get; init; } = new Dictionary<string, double>();

    /// <summary>What flows through the heaters, by name; each heater of the line needs its own.</summary>
    public IReadOnlyDictionary<string, HeaterConditions> Heaters { get; init; } = new Dictionary<string, HeaterConditions>();

    /// <summary>Motive steam of each thermal recompressor, by name.</summary>
    public IReadOnlyDictionary<string, MotiveConditions> Motive { get; init; } = new Dictionary<string, MotiveConditions>();

    /// <summary>Steam through a valve into a chest that something else heats too, kg/s, by effect. Not given: what a compressor leaves short; none elsewhere.</summary>
    public IReadOnlyDictionary<string, double> MakeUpSteam { get; init; } = new Dictionary<string, double>();
}

/// <summary>What a heater does.</summary>
/// <param name="Flow">kg/s.</param>
/// <param name="Solids">Mass fraction.</param>
/// <param name="In">Temperature before it, K.</param>
/// <param name="Out">Temperature behind it, K.</param>
public sealed record HeaterConditions(double Flow, double Solids, double In, double Out);

/// <summary>Motive steam of a thermal recompressor.</summary>
/// <param name="Pressure">Before the nozzle, Pa.</param>
/// <param name="Superheat">There, K.</param>
/// <param name="Flow">kg/s; null where it follows from the others.</param>
public sealed record MotiveConditions(double Pressure, double Superheat = 0, double? Flow = null);
