using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.Api;

/// <summary>The instruments of each place of a flow sheet, named in words.</summary>
internal static class SheetInstruments
{
    public static InstrumentHere? Here(string what, Instrument? instrument) => instrument is null ? null : new(what, instrument, instrument.StaleAfter);

    public static IReadOnlyList<InstrumentHere> Of(Effect effect) => Present(
        ("chest pressure", effect.Chest.Pressure), ("chest temperature", effect.Chest.Temperature), ("condensate flow", effect.Chest.CondensateFlow),
        ("condensate temperature", effect.Chest.CondensateTemperature), ("vapour pressure", effect.Vapour.Pressure), ("vapour temperature", effect.Vapour.Temperature),
        ("flow leaving", effect.Leaving.Flow), ("solids leaving", effect.Leaving.Solids), ("temperature leaving", effect.Leaving.Temperature), ("level", effect.Level), ("pressure of chest less vapour", effect.PressureDifference));

    public static IReadOnlyList<InstrumentHere> Of(LiquorStream stream)
    {
        IReadOnlyList<InstrumentHere> online = Present(("flow", stream.Flow), ("solids", stream.Solids), ("temperature", stream.Temperature));
        return stream.Laboratory is { } laboratory ? [.. online, new InstrumentHere("solids in the laboratory", laboratory, stream.LaboratoryValidFor)] : online;
    }

    public static IReadOnlyList<InstrumentHere> Of(SteamMain steam) => Present(
        ("flow", steam.Flow), (steam.PressureAt == SteamGaugePlace.Chest ? "pressure at the chest" : "pressure before the valve", steam.Pressure), ("temperature", steam.Temperature));

    public static IReadOnlyList<InstrumentHere> Of(Tank tank) => Present(("level", tank.Level));

    public static IReadOnlyList<InstrumentHere> Of(Heater heater) =>
        Present(("flow", heater.Flow), ("temperature before", heater.In), ("temperature behind", heater.Out), ("solids", heater.Solids?.Measured));

    public static IReadOnlyList<InstrumentHere> Of(Recompressor machine) => Present(("power", machine.Power), ("spray", machine.Spray));

    public static IReadOnlyList<InstrumentHere> Of(MotiveSteam motive) => Present(("flow", motive.Flow), ("pressure", motive.Pressure), ("temperature", motive.Temperature));

    private static IReadOnlyList<InstrumentHere> Present(params (string What, Instrument? Instrument)[] places) => [.. places.Select(place => Here(place.What, place.Instrument)).OfType<InstrumentHere>()];
}
