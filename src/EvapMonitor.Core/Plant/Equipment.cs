using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Plant;

/// <summary>A heater that condenses a bleed: the bleed follows from the duty.</summary>
public sealed record Heater
{
    /// <summary>The name, which a bleed names as its user.</summary>
    public required string Name { get; init; }

    /// <summary>What is heated.</summary>
    public required Liquor Liquor { get; init; }

    /// <summary>Its dissolved solids, mass fraction; null: those of the feed of the line.</summary>
    public FixedOrMeasured? Solids { get; init; }

    /// <summary>Its flow, mass or volume.</summary>
    public Instrument? Flow { get; init; }

    /// <summary>Temperature before the heater, K.</summary>
    public Instrument? In { get; init; }

    /// <summary>Temperature behind the heater, K.</summary>
    public Instrument? Out { get; init; }
}

/// <summary>
/// Condensate that flashes: it enters a pot at the chest pressure of another effect, the vapour joins that chest, and what stays liquid joins the condensate of
/// that effect, to flash again where that one does.
/// </summary>
/// <param name="From">Name of the effect whose condensate it is.</param>
/// <param name="To">Name of the effect whose chest the vapour joins.</param>
public sealed record CondensateFlash(string From, string To);

/// <summary>A tank that liquor passes on its way. It keeps solids and temperature; what it stores is known, or none.</summary>
/// <param name="Name">The name, which effects name as the source of their liquor.</param>
/// <param name="From">Name of the effect whose liquor it takes; null: the feed of the line.</param>
/// <param name="HoldUp">What it holds when full, kg; null when not given.</param>
/// <param name="Level">Its level, m; null when not measured.</param>
public sealed record Tank(string Name, string? From, double? HoldUp, Instrument? Level);

/// <summary>
/// A body: a vessel with a heating surface of its own, which serves one effect or another. Area, campaign and cleaning belong to it.
/// </summary>
/// <param name="Name">The name, unique in its line.</param>
/// <param name="Area">Heating surface, m².</param>
/// <param name="Serves">
/// By name of an effect, the signal that tells that the body serves it. A body that an effect lists and for which no signal is given serves it always. Where
/// the effect lists no bodies, a body that serves it takes the place of the effect's own surface.
/// </param>
public sealed record Body(string Name, double Area, IReadOnlyDictionary<string, ActiveSignal> Serves);
