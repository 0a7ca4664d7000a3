using System.Globalization;
using EvapMonitor.Core.Advice;
using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Service.Wording;

/// <summary>The words under which states, sources and verdicts go out. One place, so that a sentence and a table never differ.</summary>
internal static class Words
{
    public static string Of(RunningState state) => state switch
    {
        RunningState.Idle => "idle",
        RunningState.Producing => "producing",
        RunningState.WaterRun => "water run",
        RunningState.Cleaning => "cleaning",
        RunningState.Filling => "filling",
        _ => "unknown",
    };

    /// <summary>Whether a window was steady; empty where it was not judged.</summary>
    public static string OfSteady(bool? steady) => steady switch
    {
        true => "yes",
        false => "no",
        null => "",
    };

    public static string? Of(HeatingTemperatureSource source) => source switch
    {
        HeatingTemperatureSource.ChestPressure => "chest pressure",
        HeatingTemperatureSource.HeatingVapourPressure => "vapour pressure of what heats it",
        HeatingTemperatureSource.SteamPressure => "steam pressure at the chest",
        HeatingTemperatureSource.ChestThermometer => "chest thermometer",
        HeatingTemperatureSource.Balance => "balance of the line",
        _ => null,
    };

    public static string? Of(BoilingTemperatureSource source) => source switch
    {
        BoilingTemperatureSource.VapourPressure => "vapour pressure and elevation",
        BoilingTemperatureSource.HeatedChestPressure => "pressure of the chest it heats, and elevation",
        BoilingTemperatureSource.LiquorThermometer => "liquor thermometer",
        BoilingTemperatureSource.Balance => "balance of the line",
        _ => null,
    };

    public static string? Of(DutySource source) => source switch
    {
        DutySource.Steam => "steam flow",
        DutySource.Condensate => "condensate flow",
        DutySource.Liquor => "liquor side",
        DutySource.Balance => "balance of the line",
        _ => null,
    };

    public static string Of(Quality quality) => quality switch
    {
        Quality.Good => "good",
        Quality.Uncertain => "uncertain",
        _ => "bad",
    };

    public static string Of(VariableClass known) => known switch
    {
        VariableClass.Redundant => "checked by others",
        VariableClass.Observable => "follows from others",
        _ => "cannot be told",
    };

    public static string Of(CleaningSource source) => source switch
    {
        CleaningSource.Logged => "logged",
        CleaningSource.Signal => "signal",
        CleaningSource.Recognised => "recognised",
        _ => "first data",
    };

    public static string Of(CleaningVerdict verdict) => verdict switch
    {
        CleaningVerdict.Cleaned => "cleaned",
        CleaningVerdict.DidNotClean => "did not clean",
        CleaningVerdict.CannotBeTold => "cannot be told",
        _ => "awaiting hours",
    };

    public static string Of(DueState state) => state switch
    {
        DueState.Due => "due",
        DueState.NotDue => "not due",
        DueState.NoLimit => "no limit",
        _ => "unknown",
    };

    public static string Of(DueLimit limit) => limit switch
    {
        DueLimit.Coefficient => "coefficient",
        DueLimit.Cleanliness => "cleanliness",
        _ => "hours",
    };

    public static string UnitOf(DueLimit limit) => limit switch
    {
        DueLimit.Coefficient => "W/(m2.K)",
        DueLimit.Cleanliness => "1",
        _ => "h",
    };

    /// <summary>The verdict on an effect as one sentence.</summary>
    public static string Sentence(string effect, DueVerdict verdict, long now)
    {
        if (verdict.Binding is not { } binding) return $"{effect} has no cleaning limit in the plant file.";
        if (verdict.State == DueState.Unknown)
        {
            return binding.Limit == DueLimit.Hours
                ? $"{effect}: no cleaning is logged, so the hours since then are not known."
                : $"{effect} has no coefficient to hold against its limit.";
        }

        string value = Quantity(binding.Limit, binding.Value), bound = Quantity(binding.Limit, binding.Bound);
        if (verdict.State == DueState.NotDue) return $"{effect} is not due: {Named(binding.Limit)} {value}, limit {bound}.";
        return binding.Limit == DueLimit.Hours
            ? $"{effect} is due for cleaning: {value} since the last one, limit {bound}."
            : $"{effect} has been under its {Named(binding.Limit)} limit for {Span(now - binding.Since!.Value)}: {value}, limit {bound}.";
    }

    private static string Named(DueLimit limit) => limit == DueLimit.Hours ? "time since cleaning" : Of(limit);

    private static string Quantity(DueLimit limit, double value) => limit switch
    {
        DueLimit.Coefficient => string.Create(CultureInfo.InvariantCulture, $"{value:0} W/(m²·K)"),
        DueLimit.Cleanliness => string.Create(CultureInfo.InvariantCulture, $"{value * 100:0} %"),
        _ => string.Create(CultureInfo.InvariantCulture, $"{value:0} h"),
    };

    private static string Span(long milliseconds)
    {
        // Whole hours that have passed, as the dashboard counts them too.
        double hours = double.Floor(milliseconds / (double)Milliseconds.Hour);
        return hours < 48
            ? string.Create(CultureInfo.InvariantCulture, $"{hours:0} h")
            : string.Create(CultureInfo.InvariantCulture, $"{double.Floor(hours / 24):0} days");
    }
}
