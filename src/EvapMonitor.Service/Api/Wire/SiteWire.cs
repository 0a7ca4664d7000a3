using System.Text.Json.Serialization;

namespace EvapMonitor.Service.Api.Wire;

/// <summary>The site and the state of its data.</summary>
/// <param name="Name">Name of the site.</param>
/// <param name="TimeZone">IANA zone of its local times.</param>
/// <param name="Now">The service's clock, UTC.</param>
/// <param name="LatestReadingAt">Instant of the youngest reading; null when there is none.</param>
/// <param name="Readings">live (under 15 min old), stale, none.</param>
/// <param name="PlantRevision">The plant revision in force.</param>
/// <param name="WindowS">Length of an evaluation window, s.</param>
/// <param name="ImportsRunning">Imports that run or wait.</param>
/// <param name="DaysWaiting">Days of readings that wait for evaluation, all lines together.</param>
/// <param name="Notices">What the operator should know as long as it lasts.</param>
public sealed record SiteWire(
    string Name, string TimeZone, DateTimeOffset Now, DateTimeOffset? LatestReadingAt, string Readings, int PlantRevision, int WindowS, int ImportsRunning, int DaysWaiting,
    IReadOnlyList<NoticeWire> Notices);

/// <summary>All lines.</summary>
/// <param name="Lines">In plant-file order.</param>
public sealed record LinesWire(IReadOnlyList<LineWire> Lines);

/// <summary>A line and its effects as they are now.</summary>
/// <param name="Name">Name of the line.</param>
/// <param name="Liquor">What it boils; null when a signal tells.</param>
/// <param name="State">producing, filling, idle, water run, cleaning, unknown.</param>
/// <param name="AsOf">End of the last evaluated window.</param>
/// <param name="LatestReadingAt">Instant of its youngest reading.</param>
/// <param name="Readings">live, stale, none.</param>
/// <param name="EvaporationKgS">Water evaporated in the last hour, kg/s.</param>
/// <param name="RequiredEvaporationKgS">What the plant needs, kg/s; null when not given.</param>
/// <param name="Effects">In plant-file order.</param>
public sealed record LineWire(
    string Name, string? Liquor, string State, DateTimeOffset? AsOf, DateTimeOffset? LatestReadingAt, string Readings, double? EvaporationKgS,
    double? RequiredEvaporationKgS, IReadOnlyList<EffectWire> Effects);

/// <summary>One effect as it is now. This one object feeds sentence, picture and table.</summary>
/// <param name="Name">Name of the effect.</param>
/// <param name="Line">Name of its line.</param>
/// <param name="AreaM2">Heating surface, m².</param>
/// <param name="CleanCoefficientWM2k">The clean coefficient in use, W/(m²·K); null when unknown.</param>
/// <param name="Now">The latest hour; null when there is none.</param>
/// <param name="Limits">Limits of the plant file.</param>
/// <param name="Due">Whether a cleaning is due.</param>
/// <param name="LastCleaning">The last cleaning that has ended; null when none is logged.</param>
/// <param name="CleaningSince">Start of a cleaning that goes on; null otherwise.</param>
/// <param name="Growth">Fouling resistance at the end of each week since the last cleaning, oldest first, m²·K/W.</param>
/// <param name="Surface">The surface that serves: the effect's own, or its bodies joined by +; null when not known.</param>
/// <param name="Campaign">Its present campaign; null until that is computed.</param>
public sealed record EffectWire(
    string Name,
    string Line,
    [property: JsonPropertyName("area_m2")] double AreaM2,
    [property: JsonPropertyName("clean_coefficient_w_m2k")] double? CleanCoefficientWM2k,
    EffectNowWire? Now,
    LimitsWire Limits,
    DueWire Due,
    CleaningWire? LastCleaning,
    DateTimeOffset? CleaningSince,
    IReadOnlyList<double> Growth,
    string? Surface,
    CampaignWire? Campaign);

/// <summary>The latest hour of an effect. A number that could not be computed is null, and <paramref name="Reason"/> says why. Each <c>_u</c> is a standard uncertainty.</summary>
/// <param name="At">Start of the hour that is summed up: the one before the end of the last window.</param>
/// <param name="Hours">Length, h.</param>
/// <param name="CoefficientWM2k">Apparent coefficient, W/(m²·K).</param>
/// <param name="CoefficientU">Its standard uncertainty, both parts.</param>
/// <param name="CoefficientURandom">The random part.</param>
/// <param name="HeatingTemperatureC">Heating temperature, °C.</param>
/// <param name="BoilingTemperatureC">Boiling temperature, °C.</param>
/// <param name="ElevationK">Boiling-point elevation, K.</param>
/// <param name="DrivingForceK">Driving force, K.</param>
/// <param name="DrivingForceU">Its standard uncertainty.</param>
/// <param name="HeadCorrectedDrivingForceK">Driving force with boiling at half the liquor's height, K; null without a level.</param>
/// <param name="HeadCorrectedDrivingForceU">Its standard uncertainty.</param>
/// <param name="DutyKw">Duty, kW.</param>
/// <param name="DutyU">Its standard uncertainty.</param>
/// <param name="HeatFluxKwM2">Duty by surface, kW/m².</param>
/// <param name="Cleanliness">Coefficient by clean coefficient, 0 to 1 and above.</param>
/// <param name="CleanlinessU">Its standard uncertainty, from that of the coefficient.</param>
/// <param name="FoulingResistanceM2kW">Fouling resistance, m²·K/W; may be negative.</param>
/// <param name="FoulingResistanceU">Its standard uncertainty.</param>
/// <param name="CleanCoefficientWM2k">What the effect would do if clean at the conditions of this hour, W/(m²·K).</param>
/// <param name="CleanCoefficientU">Its standard uncertainty.</param>
/// <param name="CoefficientAtReferenceWM2k">Coefficient that the surface with this resistance would have at the reference conditions, W/(m²·K).</param>
/// <param name="CoefficientAtReferenceU">Its standard uncertainty.</param>
/// <param name="CleanFrom">Where the clean coefficient comes from.</param>
/// <param name="DutyFrom">Where the duty comes from.</param>
/// <param name="HeatingTemperatureFrom">Where the heating temperature comes from.</param>
/// <param name="BoilingTemperatureFrom">Where the boiling temperature comes from.</param>
/// <param name="Reason">Why there is no coefficient; null when there is one.</param>
public sealed record EffectNowWire(
    DateTimeOffset At,
    double Hours,
    [property: JsonPropertyName("coefficient_w_m2k")] double? CoefficientWM2k,
    double? CoefficientU,
    double? CoefficientURandom,
    double? HeatingTemperatureC,
    double? BoilingTemperatureC,
    double? ElevationK,
    double? DrivingForceK,
    double? DrivingForceU,
    double? HeadCorrectedDrivingForceK,
    double? HeadCorrectedDrivingForceU,
    double? DutyKw,
    double? DutyU,
    [property: JsonPropertyName("heat_flux_kw_m2")] double? HeatFluxKwM2,
    double? Cleanliness,
    double? CleanlinessU,
    [property: JsonPropertyName("fouling_resistance_m2k_w")] double? FoulingResistanceM2kW,
    double? FoulingResistanceU,
    [property: JsonPropertyName("clean_coefficient_w_m2k")] double? CleanCoefficientWM2k,
    double? CleanCoefficientU,
    [property: JsonPropertyName("coefficient_at_reference_w_m2k")] double? CoefficientAtReferenceWM2k,
    double? CoefficientAtReferenceU,
    string? CleanFrom,
    string? DutyFrom,
    string? HeatingTemperatureFrom,
    string? BoilingTemperatureFrom,
    string? Reason);

/// <summary>The limits of an effect; absent ones are null.</summary>
/// <param name="CoefficientWM2k">Floor of the coefficient, W/(m²·K).</param>
/// <param name="Cleanliness">Floor of the cleanliness, 0 to 1.</param>
/// <param name="HoursSinceCleaning">Longest time between cleanings, h.</param>
/// <param name="ResistanceM2kW">Resistance at which the first of the two floors is reached, m²·K/W.</param>
public sealed record LimitsWire(
    [property: JsonPropertyName("coefficient_w_m2k")] double? CoefficientWM2k,
    double? Cleanliness,
    double? HoursSinceCleaning,
    [property: JsonPropertyName("resistance_m2k_w")] double? ResistanceM2kW);

/// <summary>Whether a cleaning is due.</summary>
/// <param name="State">due, not due, no limit, unknown.</param>
/// <param name="Limit">The binding limit: coefficient, cleanliness, hours; null without limits.</param>
/// <param name="Since">Since when it is due.</param>
/// <param name="Sentence">The same in words.</param>
/// <param name="Evidence">Every limit with what was held against it.</param>
public sealed record DueWire(string State, string? Limit, DateTimeOffset? Since, string Sentence, IReadOnlyList<EvidenceWire> Evidence);

/// <summary>One limit with what was held against it.</summary>
/// <param name="Limit">coefficient, cleanliness, hours.</param>
/// <param name="Value">The present value; null when unknown.</param>
/// <param name="Bound">The limit.</param>
/// <param name="Unit">Unit of both.</param>
/// <param name="State">due, not due, unknown.</param>
/// <param name="Since">Since when it is reached.</param>
public sealed record EvidenceWire(string Limit, double? Value, double Bound, string Unit, string State, DateTimeOffset? Since);

/// <summary>Effects with their due state, due ones first.</summary>
/// <param name="AsOf">The instant of the verdicts.</param>
/// <param name="Effects">The effects.</param>
public sealed record CleaningDueWire(DateTimeOffset AsOf, IReadOnlyList<EffectDueWire> Effects);

/// <summary>The due state of one effect.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="Effect">Name of the effect.</param>
/// <param name="Due">The verdict.</param>
public sealed record EffectDueWire(string Line, string Effect, DueWire Due);
