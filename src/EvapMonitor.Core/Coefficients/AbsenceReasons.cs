using EvapMonitor.Core.Balances;

namespace EvapMonitor.Core.Coefficients;

/// <summary>Says which instrument is missing when a quantity could not be computed: the first of the ways to it that the plant has instruments for.</summary>
internal static class AbsenceReasons
{
    /// <summary>Why an effect has no heating temperature.</summary>
    public static string Heating(LineInstruments at, int i, LineInputs inputs, Func<int, string> whyAbsent)
    {
        EffectPlaces places = at.Effects[i];
        int heater = -1;
        if (at.Line.Effects[i].Heating[0].VapourOf is { } name) heater = IndexOf(at, name);
        int pressure = heater >= 0 ? at.Effects[heater].VapourPressure
            : at.Line.Steam.PressureAt == Plant.SteamGaugePlace.Chest ? at.SteamPressure : -1;
        int thermometer = at.Line.Effects[i].Chest.TemperatureSeesSaturation ? places.ChestTemperature : -1;
        return FirstAbsent(inputs, whyAbsent, places.ChestPressure, pressure, thermometer)
            ?? "needs a pressure of the chest, or of what heats it, or a chest thermometer that sees saturation";
    }

    /// <summary>Why an effect has no boiling temperature.</summary>
    public static string Boiling(LineInstruments at, int i, in EffectState found, LineInputs inputs, Func<int, string> whyAbsent)
    {
        EffectPlaces places = at.Effects[i];
        int thermometer = at.Line.Effects[i].Leaving.TemperatureSeesFlashedLiquor ? places.LeavingTemperature : -1;
        string? pressure = FirstAbsent(inputs, whyAbsent, places.VapourPressure, thermometer);
        if (pressure is not null) return pressure;
        if (!double.IsNaN(found.Solids)) return "needs a vapour pressure, or a thermometer that sees flashed liquor";
        return FirstAbsent(inputs, whyAbsent, places.LeavingSolids, at.Product.Solids, at.Feed.Flow, at.Feed.Solids)
            ?? "needs the solids or the flow of the leaving liquor";
    }

    /// <summary>Why an effect has no duty.</summary>
    public static string Duty(LineInstruments at, int i, LineInputs inputs, Func<int, string> whyAbsent)
    {
        EffectPlaces places = at.Effects[i];
        int steam = at.Line.Effects[i].Heating[0].VapourOf is null ? at.SteamFlow : -1;
        return FirstAbsent(inputs, whyAbsent, places.CondensateFlow, steam, at.Feed.Flow, at.Feed.Solids, places.LeavingSolids)
            ?? "needs a flow of steam or condensate, or the flow and solids of the liquor that enters and leaves";
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
