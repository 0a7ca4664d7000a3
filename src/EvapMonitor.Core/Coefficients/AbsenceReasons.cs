using EvapMonitor.Core.Balances;

namespace EvapMonitor.Core.Coefficients;

/// <summary>Says which instrument is missing when a quantity could not be computed: the first of the ways to it that the plant has instruments for.</summary>
internal static class AbsenceReasons
{
    /// <summary>Why an effect has no heating temperature.</summary>
    public static string Heating(LineInstruments at, int i, LineInputs inputs, Func<int, string> whyAbsent)
    {
        EffectPlaces places = at.Effects[i];
        bool steam = at.Line.Effects[i].Heating.Any(source => source.IsSteam);
        int heater = -1;
        if (at.Line.Effects[i].Heating[0].VapourOf is { } name) heater = IndexOf(at, name);
        int pressure = heater >= 0 ? at.Effects[heater].VapourPressure
            : steam && at.Line.Steam.PressureAt == Plant.SteamGaugePlace.Chest ? at.SteamPressure : -1;
        int thermometer = at.Line.Effects[i].Chest.TemperatureSeesSaturation ? places.ChestTemperature : -1;
        return FirstAbsent(inputs, whyAbsent, places.ChestPressure, pressure, thermometer)
            ?? "needs a pressure of the chest, or of what heats it, or a chest thermometer that sees saturation";
    }

    /// <summary>Why it is not known which bodies serve an effect.</summary>
    public static string Surface(LineInstruments at, int i, LineInputs inputs, Func<int, string> whyAbsent) =>
        FirstAbsent(inputs, whyAbsent, [.. at.Surfaces[i].Signals]) ?? "it is not known which bodies serve";

    /// <summary>Why an effect has no boiling temperature.</summary>
    public static string Boiling(LineInstruments at, int i, LineInputs inputs, Func<int, string> whyAbsent)
    {
        EffectPlaces places = at.Effects[i];
        int thermometer = at.Line.Effects[i].Leaving.TemperatureSeesFlashedLiquor ? places.LeavingTemperature : -1;
        string? pressure = FirstAbsent(inputs, whyAbsent, places.VapourPressure, thermometer);
        if (pressure is not null) return pressure;
        if (places.VapourPressure < 0) return "needs a vapour pressure, or a thermometer that sees flashed liquor";
        return FirstAbsent(inputs, whyAbsent, places.LeavingSolids, at.Product.Solids, at.Feed.Flow, at.Feed.Solids)
            ?? "needs the solids or the flow of the leaving liquor";
    }

    /// <summary>Why an effect has no duty.</summary>
    public static string Duty(LineInstruments at, int i, LineInputs inputs, Func<int, string> whyAbsent)
    {
        EffectPlaces places = at.Effects[i];
        Plant.Effect effect = at.Line.Effects[i];
        int steam = effect.Heating[0].IsSteam ? at.SteamFlow : -1;
        if (effect.Heating.Any(source => source.Recompressor is not null)) return Recompressed(at, i, inputs, whyAbsent);
        string? tank = effect.Liquor.Select(source => source.From).FirstOrDefault(from => at.Line.Tanks.Any(tank => tank.Name == from));
        if (tank is not null && places.CondensateFlow < 0 && steam < 0) return $"needs a flow of condensate: the flow out of tank {tank} is not known";
        if (steam >= 0 && places.CondensateFlow < 0 && at.Line.CondensateFlashes.Any(flash => flash.To == effect.Name))
            return "needs a flow of condensate: vapour of flashing condensate joins the steam";
        return FirstAbsent(inputs, whyAbsent, places.CondensateFlow, steam, at.Feed.Flow, at.Feed.Solids, places.LeavingSolids)
            ?? "needs a flow of steam or condensate, or the flow and solids of the liquor that enters and leaves";
    }

    private static string Recompressed(LineInstruments at, int i, LineInputs inputs, Func<int, string> whyAbsent)
    {
        Plant.Effect effect = at.Line.Effects[i];
        if (effect.Heating.Count > 1) return "needs the flow and solids of the liquor that enters and leaves: a recompressor and another source heat the chest in shares not known";
        int r = 0;
        while (at.Line.Recompressors[r].Name != effect.Heating[0].Recompressor) r++;
        RecompressorPlaces machine = at.Recompressors[r];
        return FirstAbsent(inputs, whyAbsent, at.Effects[i].CondensateFlow, machine.MotiveFlow, machine.MotivePressure, machine.Power, machine.Spray)
            ?? (at.Line.Recompressors[r].Kind == Plant.RecompressorKind.Thermal
                ? $"needs a flow of condensate, and flow and pressure of the motive steam of {at.Line.Recompressors[r].Name}"
                : $"needs a flow of condensate, and the power of {at.Line.Recompressors[r].Name}");
    }

    private static int IndexOf(LineInstruments at, string effect)
    {
        for (int i = 0; i < at.Line.Effects.Count; i++)
        {
            if (at.Line.Effects[i].Name == effect) return i;
        }

        return -1;
    }

    private static string? FirstAbsent(LineInputs inputs, Func<int, string> whyAbsent, params ReadOnlySpan<int> places)
    {
        foreach (int place in places)
        {
            if (place >= 0 && double.IsNaN(inputs.Value[place])) return whyAbsent(place);
        }

        return null;
    }
}
