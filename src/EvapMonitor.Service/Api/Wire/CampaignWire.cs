using System.Text.Json.Serialization;

namespace EvapMonitor.Service.Api.Wire;

/// <summary>A number with its standard uncertainty; both null when it is not known.</summary>
/// <param name="Value">The number.</param>
/// <param name="U">Its standard uncertainty.</param>
public sealed record UncertainWire(double? Value, double? U);

/// <summary>The time between two cleanings of a surface.</summary>
/// <param name="Surface">The surface: the effect's own, or its bodies joined by +.</param>
/// <param name="Start">End of the cleaning before it, or the first data.</param>
/// <param name="End">Begin of the next cleaning; null while it goes on.</param>
/// <param name="StartedBy">first data, logged, signal, recognised.</param>
/// <param name="Confidence">How sure that is, 0 to 1.</param>
/// <param name="Products">Products made, in order.</param>
/// <param name="InitialResistanceM2kW">Fouling resistance at its start, m²·K/W.</param>
/// <param name="FinalResistanceM2kW">At its end, or in the latest hours, m²·K/W.</param>
/// <param name="RemovedShare">Share of the resistance that the cleaning before it removed; null when not known.</param>
/// <param name="RateM2kWPerDay">Growth of the resistance, m²·K/W in a day of production.</param>
/// <param name="ProductionHours">Hours of production.</param>
/// <param name="HoursSinceCleaned">Hours of production at its end since the last cleaning that cleaned, or may have.</param>
public sealed record CampaignWire(
    string Surface, DateTimeOffset Start, DateTimeOffset? End, string StartedBy, double Confidence, IReadOnlyList<string> Products,
    [property: JsonPropertyName("initial_resistance_m2k_w")] UncertainWire InitialResistanceM2kW,
    [property: JsonPropertyName("final_resistance_m2k_w")] UncertainWire FinalResistanceM2kW,
    double? RemovedShare,
    [property: JsonPropertyName("rate_m2k_w_per_day")] UncertainWire RateM2kWPerDay,
    double ProductionHours, double HoursSinceCleaned);

/// <summary>A time out of production after which the surface was as before.</summary>
/// <param name="Surface">The surface.</param>
/// <param name="Start">Begin.</param>
/// <param name="End">End; null while it goes on.</param>
/// <param name="Reason">Why it is not taken for a cleaning.</param>
public sealed record StopWire(string Surface, DateTimeOffset Start, DateTimeOffset? End, string Reason);

/// <summary>A run on water: a test of the surface without solids or elevation.</summary>
/// <param name="Surface">The surface.</param>
/// <param name="Start">Begin of its first hour.</param>
/// <param name="End">End of its last.</param>
/// <param name="CoefficientWM2k">Coefficient on water, W/(m²·K).</param>
/// <param name="ResistanceSincePreviousM2kW">Resistance gained since the test before, m²·K/W.</param>
public sealed record WaterTestWire(
    string Surface, DateTimeOffset Start, DateTimeOffset End, [property: JsonPropertyName("coefficient_w_m2k")] UncertainWire CoefficientWM2k,
    [property: JsonPropertyName("resistance_since_previous_m2k_w")] UncertainWire ResistanceSincePreviousM2kW);

/// <summary>What the effect would do if clean, as it is learnt for the present campaign and one product.</summary>
/// <param name="Surface">The surface.</param>
/// <param name="Product">The product; empty when there is only one.</param>
/// <param name="Since">From when on it holds.</param>
/// <param name="Source">In plain words: what it rests on, or why there is none.</param>
/// <param name="CoefficientWM2k">Clean coefficient at the reference conditions, W/(m²·K).</param>
/// <param name="BySolids">ln U by ln solids.</param>
/// <param name="ByBoilingTemperature">ln U by boiling temperature, 1/K.</param>
/// <param name="ByHeatFlux">ln U by ln heat flux.</param>
/// <param name="ReferenceSolids">Solids of the reference, mass fraction; null when it does not follow them.</param>
/// <param name="ReferenceBoilingTemperatureC">Boiling temperature of the reference, °C.</param>
/// <param name="ReferenceHeatFluxKwM2">Heat flux of the reference, kW/m².</param>
public sealed record CleanReferenceWire(
    string Surface, string Product, DateTimeOffset Since, string Source, [property: JsonPropertyName("coefficient_w_m2k")] UncertainWire CoefficientWM2k,
    UncertainWire BySolids, UncertainWire ByBoilingTemperature, UncertainWire ByHeatFlux, double? ReferenceSolids, double? ReferenceBoilingTemperatureC,
    [property: JsonPropertyName("reference_heat_flux_kw_m2")] double? ReferenceHeatFluxKwM2);

/// <summary>Campaigns of the surfaces that served an effect.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="Effect">Name of the effect.</param>
/// <param name="Surface">The surface that serves now; null when not known.</param>
/// <param name="Campaigns">Newest first.</param>
/// <param name="Stops">Newest first.</param>
/// <param name="WaterTests">Newest first.</param>
/// <param name="CleanReferences">Clean expectations of the present campaign.</param>
/// <param name="Version">Grows when they change; 0 before they were first computed.</param>
public sealed record CampaignsWire(
    string Line, string Effect, string? Surface, IReadOnlyList<CampaignWire> Campaigns, IReadOnlyList<StopWire> Stops, IReadOnlyList<WaterTestWire> WaterTests,
    IReadOnlyList<CleanReferenceWire> CleanReferences, long Version);
