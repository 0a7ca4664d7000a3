namespace EvapMonitor.Service.PlantFile;

/// <summary>Every kind of mapping in the plant file with its keys: the one list that reader, schema and tests share.</summary>
internal static class PlantFileKeys
{
    private static readonly string[] OfAnyInstrument =
        ["signal", "unit", "accuracy", "range", "interpolation", "stale-after", "frozen-after", "resolution"];

    public static readonly KeySet Site = new(
        "site", "site", "time-zone", "atmosphere", "window", "history-from", "liquors", "lines", "cleaning-rules");

    public static readonly KeySet Instrument = new("instrument", OfAnyInstrument);
    public static readonly KeySet SteamPressure = new("steam-pressure", [.. OfAnyInstrument, "at"]);
    public static readonly KeySet SeeingThermometer = new("seeing-thermometer", [.. OfAnyInstrument, "sees"]);
    public static readonly KeySet Laboratory = new("laboratory", [.. OfAnyInstrument, "valid-for"]);
    public static readonly KeySet ActiveSignal = new("active-signal", "signal", "active", "stale-after", "frozen-after");

    public static readonly KeySet Liquor = new("liquor", "kind", "purity", "boiling-point-elevation", "heat-capacity", "density");
    public static readonly KeySet Curve = new("curve", "polynomial", "table");
    public static readonly KeySet ElevationCurve = new("elevation-curve", "polynomial", "table", "duhring");
    public static readonly KeySet LiquorChoice = new("liquor-choice", "signal", "values", "stale-after", "frozen-after");

    public static readonly KeySet Line = new(
        "line", "formerly", "liquor", "settling-time", "suspect-after", "producing-when", "feed", "product", "steam", "effects", "bleeds", "heaters",
        "condensate", "tanks", "bodies", "recompressors", "cleaning-groups", "required-evaporation", "money");

    public static readonly KeySet ProducingWhen = new("producing-when", "feed-flow-above");
    public static readonly KeySet LiquorStream = new("liquor-stream", "flow", "solids", "temperature", "laboratory");
    public static readonly KeySet Steam = new("steam", "flow", "pressure", "temperature");
    public static readonly KeySet Motive = new("motive", "flow", "pressure", "temperature");

    public static readonly KeySet Effect = new(
        "effect", "name", "formerly", "heating", "liquor", "area", "bodies", "clean-coefficient", "heat-loss", "vent", "chest", "vapour",
        "leaving", "level", "hold-up", "pressure-difference", "due-when");

    public static readonly KeySet LiquorSource = new("liquor-source", "from", "share");
    public static readonly KeySet Chest = new("chest", "pressure", "line-loss", "temperature", "condensate-flow", "condensate-temperature");
    public static readonly KeySet Vapour = new("vapour", "pressure", "temperature");
    public static readonly KeySet Leaving = new("leaving", "temperature", "solids", "flow");
    public static readonly KeySet DueWhen = new("due-when", "coefficient-below", "cleanliness-below", "hours-since-cleaning");

    public static readonly KeySet Bleed = new("bleed", "from", "to", "flow");
    public static readonly KeySet Heater = new("heater", "liquor", "solids", "flow", "in", "out");
    public static readonly KeySet CondensateFlash = new("condensate-flash", "flash-to");
    public static readonly KeySet Tank = new("tank", "from", "hold-up", "level");
    public static readonly KeySet Body = new("body", "area", "serves");
    public static readonly KeySet Recompressor = new("recompressor", "kind", "suction", "motive", "power", "efficiency", "spray", "curve");

    public static readonly KeySet MachineCurve = new("machine-curve", "entrainment", "flow-unit", "pressure-ratio", "isentropic-efficiency");

    public static readonly KeySet CleaningGroup = new("cleaning-group", "effects", "duration", "cost", "signal");
    public static readonly KeySet CleaningRules = new("cleaning-rules", "at-once", "allowed", "not-together");
    public static readonly KeySet Money = new("money", "currency", "steam", "lost-evaporation", "objective");

    public static readonly IReadOnlyList<KeySet> All =
    [
        Site, Instrument, SteamPressure, SeeingThermometer, Laboratory, ActiveSignal, Liquor, Curve, ElevationCurve, LiquorChoice, Line,
        ProducingWhen, LiquorStream, Steam, Effect, LiquorSource, Chest, Vapour, Leaving, DueWhen, Bleed, Heater, CondensateFlash, Tank, Body, Recompressor,
        Motive, MachineCurve, CleaningGroup, CleaningRules, Money,
    ];
}
