namespace EvapMonitor.Core.Plant;

/// <summary>What heats an effect: steam, the vapour of another effect, or what a recompressor delivers; at most one of the names is set.</summary>
/// <param name="VapourOf">Name of the effect whose vapour heats; null for the others.</param>
/// <param name="Recompressor">Name of the recompressor that heats; null for the others.</param>
public sealed record HeatSource(string? VapourOf, string? Recompressor = null)
{
    /// <summary>True for steam from the main.</summary>
    public bool IsSteam => VapourOf is null && Recompressor is null;

    /// <summary>Steam from the main.</summary>
    public static HeatSource Steam { get; } = new((string?)null);
}

/// <summary>Where an effect's liquor comes from.</summary>
/// <param name="From">Name of the effect whose leaving liquor enters, or of a tank; null for the feed of the line.</param>
/// <param name="Share">Share of that source which goes here; null: all that is left.</param>
public sealed record LiquorSource(string? From, UncertainShare? Share = null)
{
    /// <summary>All of the feed.</summary>
    public static LiquorSource Feed { get; } = new((string?)null);
}

/// <summary>One effect of a line.</summary>
public sealed record Effect
{
    /// <summary>The name: letters, digits, underscore, hyphen; unique in its line.</summary>
    public required string Name { get; init; }

    /// <summary>Earlier names whose history belongs to this effect.</summary>
    public IReadOnlyList<string> Formerly { get; init; } = [];

    /// <summary>What heats it; at least one.</summary>
    public required IReadOnlyList<HeatSource> Heating { get; init; }

    /// <summary>Where its liquor comes from; at least one.</summary>
    public required IReadOnlyList<LiquorSource> Liquor { get; init; }

    /// <summary>Heating surface, m²; of an effect of several bodies, of all that it lists.</summary>
    public required double Area { get; init; }

    /// <summary>Names of the bodies it consists of; empty: it is one body, always in service unless another takes its place.</summary>
    public IReadOnlyList<string> Bodies { get; init; } = [];

    /// <summary>The design value of the coefficient with clean surfaces, W/(m²·K); null when not given.</summary>
    public double? CleanCoefficient { get; init; }

    /// <summary>Share of the heat that the steam gives up and the liquor does not receive. Default 1 % ± 1 % (half-width).</summary>
    public UncertainShare HeatLoss { get; init; } = new(0.01, 0.01 / double.Sqrt(3));

    /// <summary>Share of the heating steam that leaves through the vent uncondensed. Default 0.5 % ± 0.5 % (half-width).</summary>
    public UncertainShare Vent { get; init; } = new(0.005, 0.005 / double.Sqrt(3));

    /// <summary>Instruments on the chest.</summary>
    public Chest Chest { get; init; } = new();

    /// <summary>Instruments on the vapour space.</summary>
    public VapourSpace Vapour { get; init; } = new();

    /// <summary>Instruments on the liquor that leaves.</summary>
    public LeavingLiquor Leaving { get; init; } = new();

    /// <summary>Liquor level, m; null when not measured.</summary>
    public Instrument? Level { get; init; }

    /// <summary>Liquor that it holds over the range of its level, kg; null when not given: then it stores nothing.</summary>
    public double? HoldUp { get; init; }

    /// <summary>Pressure of the chest less that of the vapour space, Pa; null when not measured.</summary>
    public Instrument? PressureDifference { get; init; }

    /// <summary>When a cleaning is due; null: no limit is set.</summary>
    public DueLimits? DueWhen { get; init; }
}

/// <summary>Instruments on the chest, the side on which the heating steam condenses.</summary>
public sealed record Chest
{
    /// <summary>Pressure in the chest.</summary>
    public Instrument? Pressure { get; init; }

    /// <summary>What the vapour line to the chest loses, Pa: the chest is that much below the vapour that heats it. Default 0.</summary>
    public double LineLoss { get; init; }

    /// <summary>A thermometer in the chest.</summary>
    public Instrument? Temperature { get; init; }

    /// <summary>True when that thermometer sees saturation.</summary>
    public bool TemperatureSeesSaturation { get; init; }

    /// <summary>Condensate that leaves the chest.</summary>
    public Instrument? CondensateFlow { get; init; }

    /// <summary>Its temperature; without it, condensate leaves saturated at the chest pressure.</summary>
    public Instrument? CondensateTemperature { get; init; }
}

/// <summary>Instruments on the vapour space.</summary>
public sealed record VapourSpace
{
    /// <summary>Pressure above the boiling liquor.</summary>
    public Instrument? Pressure { get; init; }

    /// <summary>Temperature of the vapour.</summary>
    public Instrument? Temperature { get; init; }
}

/// <summary>Instruments on the liquor that leaves an effect.</summary>
public sealed record LeavingLiquor
{
    /// <summary>Flow, mass or volume.</summary>
    public Instrument? Flow { get; init; }

    /// <summary>Dissolved solids, mass fraction.</summary>
    public Instrument? Solids { get; init; }

    /// <summary>Temperature.</summary>
    public Instrument? Temperature { get; init; }

    /// <summary>True when that thermometer sees liquor that has flashed to the vapour pressure.</summary>
    public bool TemperatureSeesFlashedLiquor { get; init; }
}

/// <summary>When a cleaning is due: the earliest limit binds. Absent limits do not count.</summary>
/// <param name="CoefficientBelow">Floor of the apparent coefficient, W/(m²·K).</param>
/// <param name="CleanlinessBelow">Floor of the cleanliness, 0 to 1.</param>
/// <param name="HoursSinceCleaning">Longest time between cleanings, h.</param>
public sealed record DueLimits(double? CoefficientBelow, double? CleanlinessBelow, double? HoursSinceCleaning);
