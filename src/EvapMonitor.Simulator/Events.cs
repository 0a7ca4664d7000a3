namespace EvapMonitor.Simulator;

/// <summary>An instant of the story. After <see cref="Season"/> days it begins again.</summary>
/// <param name="Day">Days since the first reading.</param>
public readonly record struct StoryTime(double Day)
{
    /// <summary>Days of the story, and of the history that a new demo begins with.</summary>
    public const int Season = 90;

    /// <summary>Day of the story, 0 to under <see cref="Season"/>.</summary>
    public double OfSeason => Day % Season;
}

/// <summary>A stretch of the story.</summary>
/// <param name="From">Day on which it begins.</param>
/// <param name="To">Day on which it ends.</param>
public readonly record struct Stretch(double From, double To)
{
    /// <summary>True within it.</summary>
    public bool Holds(double day) => day >= From && day < To;

    /// <summary>A stretch of some hours.</summary>
    public static Stretch Hours(double day, double hours) => new(day, day + (hours / 24));
}

/// <summary>A surface is cleaned.</summary>
/// <param name="Surface">Name of the surface.</param>
/// <param name="When">From when to when.</param>
/// <param name="Left">Share of the resistance that stays.</param>
public sealed record SurfaceCleaning(string Surface, Stretch When, double Left);

/// <summary>What the plant's people wrote into the log of cleanings.</summary>
/// <param name="Effect">Name of the effect.</param>
/// <param name="When">From when to when.</param>
/// <param name="Kind">The plant's word for it.</param>
/// <param name="Note">What else they wrote.</param>
public sealed record LogEntry(string Effect, Stretch When, string Kind, string Note = "");

/// <summary>Gas that does not condense gathers in a chest: part of the surface is blind, and the thermometer sees a lower partial pressure of steam.</summary>
/// <param name="Effect">Name of the effect.</param>
/// <param name="When">From when to when.</param>
/// <param name="ColderBy">How far the thermometer falls below saturation at the chest pressure, K.</param>
/// <param name="CoefficientShare">What is left of the coefficient.</param>
public sealed record GasInChest(string Effect, Stretch When, double ColderBy, double CoefficientShare);

/// <summary>How an instrument can go wrong.</summary>
public enum FaultKind
{
    /// <summary>Reads too much by the amount.</summary>
    Offset,
    /// <summary>Reads too much by the amount per day since the fault began.</summary>
    Drift,
    /// <summary>Stands still.</summary>
    Frozen,
    /// <summary>Gives nothing.</summary>
    Silent,
    /// <summary>Its readings are marked uncertain.</summary>
    Uncertain,
    /// <summary>Its readings are marked bad and have no value.</summary>
    Bad,
}

/// <summary>An instrument goes wrong.</summary>
/// <param name="Signal">Its signal.</param>
/// <param name="When">From when to when.</param>
/// <param name="Kind">How.</param>
/// <param name="Amount">By how much, in the unit of the plant file.</param>
public sealed record InstrumentFault(string Signal, Stretch When, FaultKind Kind, double Amount = 0);
