using System.Text.Json.Serialization;

namespace EvapMonitor.Service.Api.Wire;

/// <summary>A line as places and the ways between them, with what is measured and computed there now.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="Now">The service's clock: the instant of the reading states, UTC.</param>
/// <param name="State">producing, filling, idle, water run, cleaning, unknown.</param>
/// <param name="AsOf">End of the last evaluated window; null when there is none.</param>
/// <param name="LatestReadingAt">Instant of the line's youngest reading; null when there is none.</param>
/// <param name="Readings">live, stale, none.</param>
/// <param name="Places">The places: effects in plant-file order, then what stands around them.</param>
/// <param name="Ways">The ways between them.</param>
public sealed record FlowSheetWire(
    string Line, DateTimeOffset Now, string State, DateTimeOffset? AsOf, DateTimeOffset? LatestReadingAt, string Readings, IReadOnlyList<PlaceWire> Places, IReadOnlyList<WayWire> Ways);

/// <summary>A place of a line.</summary>
/// <param name="Id">Key within this answer, which ways name.</param>
/// <param name="Kind">effect, steam, feed, product, condenser, condensate, tank, heater, user, flash vessel, thermal recompressor, mechanical recompressor, motive steam.</param>
/// <param name="Name">Its name.</param>
/// <param name="Measured">What is measured there, in plant-file order.</param>
/// <param name="Effect">The effect as it is now; null at other places.</param>
/// <param name="Bodies">Bodies that may serve the effect; empty when it is its own body.</param>
public sealed record PlaceWire(string Id, string Kind, string Name, IReadOnlyList<MeasuredNowWire> Measured, EffectWire? Effect, IReadOnlyList<BodyNowWire> Bodies);

/// <summary>A way from one place to another.</summary>
/// <param name="From">Id of the place it leaves.</param>
/// <param name="To">Id of the place it enters.</param>
/// <param name="Kind">steam, vapour, bleed, motive, liquor, condensate.</param>
/// <param name="Share">Share of what leaves the source on ways of this kind, 0 to 1; null: all that the others leave.</param>
/// <param name="ShareU">Standard uncertainty of that share.</param>
/// <param name="Flow">Its flow, where an instrument sees this way and no other; null otherwise.</param>
/// <param name="Balance">Its flow by the last balance; null where that cannot be told.</param>
public sealed record WayWire(string From, string To, string Kind, double? Share, double? ShareU, MeasuredNowWire? Flow, BalanceFlowWire? Balance);

/// <summary>The last reading of an instrument at its place.</summary>
/// <param name="What">What it measures, in words.</param>
/// <param name="Signal">Name of the signal.</param>
/// <param name="Value">Its value in the plant's unit; null when there is none.</param>
/// <param name="Unit">The unit as the plant file writes it.</param>
/// <param name="At">Instant of the reading; null when there is none.</param>
/// <param name="State">good, uncertain, bad, stale (older than the plant file lets it stand), none (no reading yet).</param>
public sealed record MeasuredNowWire(string What, string Signal, double? Value, string Unit, DateTimeOffset? At, string State);

/// <summary>A body that may serve an effect.</summary>
/// <param name="Name">Its name.</param>
/// <param name="AreaM2">Heating surface, m².</param>
/// <param name="Serving">True while it serves this effect; null when its signal does not tell.</param>
public sealed record BodyNowWire(string Name, [property: JsonPropertyName("area_m2")] double AreaM2, bool? Serving);
