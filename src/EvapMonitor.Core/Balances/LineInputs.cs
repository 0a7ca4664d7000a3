using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Balances;

/// <summary>What a balance reads in one window: the conditioned means and the shares and model errors that nobody measures.</summary>
internal sealed class LineInputs
{
    /// <summary>Makes inputs for a line, with the pseudo-measurements at their stated values.</summary>
    public LineInputs(LineInstruments instruments)
    {
        Value = new double[instruments.All.Count];
        HeatLoss = [.. instruments.Line.Effects.Select(effect => effect.HeatLoss.Value)];
        Vent = [.. instruments.Line.Effects.Select(effect => effect.Vent.Value)];
        Efficiency = [.. instruments.Line.Recompressors.Select(machine => machine.Efficiency.Value)];
    }

    /// <summary>Window means by place, SI units, pressures absolute; NaN is absent.</summary>
    public double[] Value { get; }

    /// <summary>Share of the heat that is lost, by effect.</summary>
    public double[] HeatLoss { get; }

    /// <summary>Share of the heating steam that is vented, by effect.</summary>
    public double[] Vent { get; }

    /// <summary>Share of the power that reaches the vapour, by recompressor.</summary>
    public double[] Efficiency { get; }

    /// <summary>
    /// How many of its own standard uncertainties the elevation correlation is off. One number for the line: the correlation is the same in all effects.
    /// </summary>
    public double ElevationError { get; set; }

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
}

/// <summary>The quantities of one effect that the direct way finds from one set of inputs, SI units; NaN is absent.</summary>
internal struct EffectState
{
    /// <summary>Heating temperature: saturation temperature in the chest, K.</summary>
    public double HeatingTemperature;

    /// <summary>Boiling temperature of the leaving liquor, K.</summary>
    public double BoilingTemperature;

    /// <summary>Boiling-point elevation, K.</summary>
    public double Elevation;

    /// <summary>Dissolved solids of the leaving liquor, mass fraction.</summary>
    public double Solids;

    /// <summary>Heating surface in service, m²; 0 when no body serves, NaN when it is not known.</summary>
    public double Area;

    /// <summary>Evaporation by the liquor side, kg/s.</summary>
    public double Evaporation;

    /// <summary>Duty by <see cref="DutySource"/>, W; index 0 is not used.</summary>
    public DutyBySource Duty;

    /// <summary>How the heating temperature was found.</summary>
    public HeatingTemperatureSource HeatingFrom;

    /// <summary>How the boiling temperature was found.</summary>
    public BoilingTemperatureSource BoilingFrom;

    /// <summary>True when a property was asked outside its published range.</summary>
    public bool Extrapolated;
}

/// <summary>A duty for each <see cref="DutySource"/>.</summary>
[System.Runtime.CompilerServices.InlineArray(4)]
internal struct DutyBySource
{
    private double _first;
}
