namespace EvapMonitor.Core.Balances;

/// <summary>What a variable of a line is. Flows kg/s, solids and shares 0 to 1, temperatures K, pressures Pa absolute, duties and power W.</summary>
public enum VariableKind
{
    /// <summary>Flow of the feed, kg/s.</summary>
    FeedFlow,
    /// <summary>Dissolved solids of the feed, mass fraction.</summary>
    FeedSolids,
    /// <summary>Temperature of the feed, K.</summary>
    FeedTemperature,
    /// <summary>Flow of the product, kg/s.</summary>
    ProductFlow,
    /// <summary>Dissolved solids of the product, mass fraction.</summary>
    ProductSolids,
    /// <summary>Water evaporated in the whole line, kg/s.</summary>
    Evaporation,
    /// <summary>How many of its own standard uncertainties the elevation correlation is off, one number for the line.</summary>
    ElevationError,
    /// <summary>Steam from the main to chests, kg/s; motive steam is not in it.</summary>
    SteamFlow,
    /// <summary>Pressure of that steam at the chests, Pa.</summary>
    SteamPressure,
    /// <summary>Its superheat at that pressure, K.</summary>
    SteamSuperheat,
    /// <summary>Flow of the liquor that leaves an effect or a tank, kg/s.</summary>
    LeavingFlow,
    /// <summary>Its dissolved solids, mass fraction.</summary>
    LeavingSolids,
    /// <summary>Boiling temperature of the liquor that leaves an effect, K.</summary>
    BoilingTemperature,
    /// <summary>Vapour of an effect, kg/s.</summary>
    VapourFlow,
    /// <summary>Pressure above the boiling liquor, Pa.</summary>
    VapourPressure,
    /// <summary>Pressure in the chest, Pa.</summary>
    ChestPressure,
    /// <summary>Saturation temperature in the chest, K.</summary>
    HeatingTemperature,
    /// <summary>Heat that the liquor receives, W.</summary>
    Duty,
    /// <summary>Apparent coefficient of an effect over all its bodies in service, W/(m²·K).</summary>
    Coefficient,
    /// <summary>Coefficient of a body, W/(m²·K).</summary>
    BodyCoefficient,
    /// <summary>Share of the heat that the steam gives up and the liquor does not receive.</summary>
    HeatLossShare,
    /// <summary>Share of the heating steam that leaves through the vent.</summary>
    VentShare,
    /// <summary>Condensate of the chest itself, kg/s.</summary>
    CondensateFlow,
    /// <summary>How far that condensate is under saturation, K.</summary>
    Subcooling,
    /// <summary>Condensate that enters the flash pot, with what joined from pots before, kg/s.</summary>
    FlashingFlow,
    /// <summary>Vapour from the flash pot, kg/s.</summary>
    FlashVapour,
    /// <summary>Liquor that an effect or a tank stores, kg/s; negative when it gives some back.</summary>
    Accumulation,
    /// <summary>Vapour that goes to the condenser, kg/s.</summary>
    CondenserFlow,
    /// <summary>Liquor on one way ("N1 to N2"), kg/s.</summary>
    LiquorFlow,
    /// <summary>Share of its source that takes that way.</summary>
    LiquorShare,
    /// <summary>Heating steam on one way ("steam to N1", "N1 to N2", "J1 to N1"), kg/s.</summary>
    HeatingFlow,
    /// <summary>Vapour to another user ("N1 to H1"), kg/s.</summary>
    BleedFlow,
    /// <summary>Flow through a heater, kg/s.</summary>
    HeaterFlow,
    /// <summary>Solids of what is heated, mass fraction.</summary>
    HeaterSolids,
    /// <summary>Temperature before a heater, K.</summary>
    HeaterIn,
    /// <summary>Temperature behind a heater, K.</summary>
    HeaterOut,
    /// <summary>Duty of a heater, W.</summary>
    HeaterDuty,
    /// <summary>Vapour that a recompressor draws, kg/s.</summary>
    SuctionFlow,
    /// <summary>What it delivers, kg/s.</summary>
    DischargeFlow,
    /// <summary>Enthalpy of that, J/kg.</summary>
    DischargeEnthalpy,
    /// <summary>Pressure of that, Pa.</summary>
    DischargePressure,
    /// <summary>Motive steam, kg/s.</summary>
    MotiveFlow,
    /// <summary>Its enthalpy, J/kg.</summary>
    MotiveEnthalpy,
    /// <summary>Power drawn by a recompressor, W.</summary>
    Power,
    /// <summary>Share of that power which reaches the vapour.</summary>
    Efficiency,
    /// <summary>Water sprayed in, kg/s, with the enthalpy of condensate at the discharge pressure.</summary>
    SprayFlow,
}

/// <summary>A variable by what it is and where: how instruments find theirs.</summary>
/// <param name="Kind">What it is.</param>
/// <param name="Place">The name of the effect, tank, body, heater or recompressor; a way as "N1 to N2"; empty for the line.</param>
public readonly record struct VariableKey(VariableKind Kind, string Place = "")
{
    /// <summary>The place of a way or a bleed.</summary>
    public static string Way(string from, string to) => $"{from} to {to}";

    /// <inheritdoc/>
    public override string ToString() => Place.Length == 0 ? Kind.ToString() : $"{Kind} of {Place}";
}
