using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Balances;

/// <summary>What a balance reads in one window: the conditioned means.</summary>
internal sealed class LineInputs(LineInstruments instruments)
{
    /// <summary>Window means by place, SI units, pressures absolute; of a level that tells what is stored, the rate, m/s. NaN is absent.</summary>
    public double[] Value { get; } = new double[instruments.All.Count];

    /// <summary>By effect: height of its liquor, m, with the two parts of its standard uncertainty; NaN is absent.</summary>
    public (double Value, double Systematic, double Random)[] Heights { get; } = [.. Enumerable.Repeat((double.NaN, double.NaN, double.NaN), instruments.Effects.Count)];

    /// <summary>A place's value; NaN when the place is absent.</summary>
    public double At(int place) => place < 0 ? double.NaN : Value[place];
}

/// <summary>How a heating temperature was found.</summary>
public enum HeatingTemperatureSource : byte
{
    /// <summary>It was not.</summary>
    None,
    /// <summary>Saturation at the chest pressure.</summary>
    ChestPressure,
    /// <summary>Saturation at the vapour pressure of the effect that heats it.</summary>
    HeatingVapourPressure,
    /// <summary>Saturation at the steam main, whose gauge is at the chest.</summary>
    SteamPressure,
    /// <summary>A chest thermometer that sees saturation.</summary>
    ChestThermometer,
    /// <summary>The balance of the line.</summary>
    Balance,
}

/// <summary>How a boiling temperature was found.</summary>
public enum BoilingTemperatureSource : byte
{
    /// <summary>It was not.</summary>
    None,
    /// <summary>Saturation at the vapour pressure, and the elevation.</summary>
    VapourPressure,
    /// <summary>Saturation at the pressure of the chest that the vapour heats, and the elevation.</summary>
    HeatedChestPressure,
    /// <summary>A thermometer that sees flashed liquor.</summary>
    LiquorThermometer,
    /// <summary>The balance of the line.</summary>
    Balance,
}

/// <summary>How a duty was found.</summary>
public enum DutySource : byte
{
    /// <summary>It was not.</summary>
    None,
    /// <summary>From the steam that enters the chest.</summary>
    Steam,
    /// <summary>From the condensate that leaves the chest.</summary>
    Condensate,
    /// <summary>From the liquor: what it brings, what it takes along, what evaporates.</summary>
    Liquor,
    /// <summary>From the reconciled balance of the whole line. The ways before this one stand in results of earlier versions.</summary>
    Balance,
}
