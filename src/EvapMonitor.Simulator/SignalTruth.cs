using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Properties;
using static EvapMonitor.Core.Balances.VariableKind;

namespace EvapMonitor.Simulator;

/// <summary>What an instrument at its place would read if it were perfect: SI units, gauge pressures as gauge. NaN where there is nothing to read.</summary>
internal static class SignalTruth
{
    /// <summary>The reading at a place, by the state of the line.</summary>
    /// <param name="line">The line.</param>
    /// <param name="at">The instrument and its place.</param>
    /// <param name="atmosphere">Pa.</param>
    /// <exception cref="NotSupportedException">The story has nothing for such an instrument.</exception>
    public static Func<LineMoment, double> Of(Line line, InstrumentAtPlace at, double atmosphere)
    {
        string[] place = at.Place.Split('.');
        Func<LineMoment, double> truth = at.Effect is { } effect ? OfEffect(effect, at.Place) : place switch
        {
            ["liquor"] => moment => moment.Product,
            ["feed", "flow"] => Flow(FeedFlow),
            ["feed", "solids"] or ["feed", "laboratory"] => Solids(FeedSolids),
            ["feed", "temperature"] => Temperature(FeedTemperature),
            ["product", "flow"] => Flow(ProductFlow),
            ["product", "solids"] or ["product", "laboratory"] => Solids(ProductSolids),
            ["steam", "flow"] => Flow(SteamFlow),
            ["steam", "pressure"] => Pressure(SteamPressure, ""),
            ["steam", "temperature"] => moment => moment.Point is { } point
                ? Steam.SaturationTemperature(point[SteamPressure]) + point[SteamSuperheat] : LineMoment.ColdTemperature,
            ["heaters", var heater, "flow"] => Flow(HeaterFlow, heater),
            ["heaters", var heater, "in"] => Temperature(HeaterIn, heater),
            ["heaters", var heater, "out"] => Temperature(HeaterOut, heater),
            ["bodies", var body, "serves", var served] => moment => moment.Bodies![served].Contains(body) ? 100 : 0,
            ["recompressors", var machine, "power"] => Flow(Power, machine),
            ["recompressors", var machine, "spray"] => Flow(SprayFlow, machine),
            _ when line.Bleeds.FirstOrDefault(bleed => at.Place == $"bleed from {bleed.From} to {bleed.To}") is { } bleed => Flow(BleedFlow, VariableKey.Way(bleed.From, bleed.To)),
            _ => throw new NotSupportedException($"{line.Name}: the demo has no readings for {at.Place}."),
        };

        Func<LineMoment, double> OfEffect(string name, string where) => where switch
        {
            "chest.pressure" => Pressure(ChestPressure, name),
            "chest.temperature" => moment => moment.Point is { } point ? point[HeatingTemperature, name] - moment.Gas.GetValueOrDefault(name) : LineMoment.ColdTemperature,
            "chest.condensate-flow" => Flow(CondensateFlow, name),
            "vapour.pressure" => Pressure(VapourPressure, name),
            "leaving.solids" => Solids(LeavingSolids, name),
            "leaving.flow" => Flow(LeavingFlow, name),
            "leaving.temperature" => Temperature(BoilingTemperature, name),
            _ => throw new NotSupportedException($"{line.Name}: the demo has no readings for {where} of {name}."),
        };

        Func<LineMoment, double> Pressure(VariableKind kind, string name) => moment => moment.Point is { } point ? point[kind, name] : atmosphere;

        return at.Instrument.Unit switch
        {
            { Dimension: Dimension.Pressure, Reference: PressureReference.Gauge } => moment => truth(moment) - atmosphere,
            { Dimension: Dimension.Pressure, Reference: PressureReference.Vacuum } => moment => atmosphere - truth(moment),
            _ => truth,
        };
    }

    private static Func<LineMoment, double> Flow(VariableKind kind, string place = "") => moment => moment.Point is { } point ? point[kind, place] : 0;

    /// <summary>Solids are not read in an empty pipe.</summary>
    private static Func<LineMoment, double> Solids(VariableKind kind, string place = "") => moment => moment.Point is { } point ? point[kind, place] : double.NaN;

    private static Func<LineMoment, double> Temperature(VariableKind kind, string place = "") =>
        moment => moment.Point is { } point ? point[kind, place] : LineMoment.ColdTemperature;
}
