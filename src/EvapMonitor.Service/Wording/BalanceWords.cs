using System.Globalization;
using EvapMonitor.Core.Balances;

namespace EvapMonitor.Service.Wording;

/// <summary>The words for what a balance says of a line's instruments.</summary>
internal static class BalanceWords
{
    /// <summary>Where a variable belongs: an effect, tank, heater or recompressor by name, feed, product, steam, line, or ways.</summary>
    public static string Place(VariableKey key) => key.Kind switch
    {
        VariableKind.FeedFlow or VariableKind.FeedSolids or VariableKind.FeedTemperature => "feed",
        VariableKind.ProductFlow or VariableKind.ProductSolids => "product",
        VariableKind.SteamFlow or VariableKind.SteamPressure => "steam",
        VariableKind.Evaporation => "line",
        VariableKind.LiquorFlow or VariableKind.HeatingFlow or VariableKind.BleedFlow => "ways",
        _ => key.Place,
    };

    /// <summary>What a variable is, beside its place.</summary>
    public static string What(VariableKey key) => key.Kind switch
    {
        VariableKind.FeedFlow or VariableKind.ProductFlow or VariableKind.SteamFlow => "flow",
        VariableKind.FeedSolids or VariableKind.ProductSolids => "solids",
        VariableKind.FeedTemperature => "temperature",
        VariableKind.SteamPressure => "pressure at the chest",
        VariableKind.Evaporation => "water evaporated",
        VariableKind.LeavingFlow => "flow leaving",
        VariableKind.LeavingSolids => "solids leaving",
        VariableKind.BoilingTemperature => "boiling temperature",
        VariableKind.VapourFlow => "vapour",
        VariableKind.VapourPressure => "vapour pressure",
        VariableKind.ChestPressure => "chest pressure",
        VariableKind.HeatingTemperature => "heating temperature",
        VariableKind.Duty or VariableKind.HeaterDuty => "duty",
        VariableKind.CondensateFlow => "condensate flow",
        VariableKind.FlashVapour => "vapour from flashing condensate",
        VariableKind.LiquorFlow => $"liquor {key.Place}",
        VariableKind.HeatingFlow => key.Place.StartsWith("steam to ", StringComparison.Ordinal) ? key.Place : $"vapour {key.Place}",
        VariableKind.BleedFlow => $"bleed {key.Place}",
        VariableKind.CondenserFlow => "vapour to the condenser",
        VariableKind.HeaterFlow => "flow",
        VariableKind.HeaterIn => "temperature before",
        VariableKind.HeaterOut => "temperature behind",
        VariableKind.SuctionFlow => "vapour drawn",
        VariableKind.DischargeFlow => "vapour delivered",
        VariableKind.MotiveFlow => "motive steam",
        VariableKind.Power => "power",
        VariableKind.SprayFlow => "spray",
        _ => key.Kind.ToString(),
    };

    /// <summary>What is to be said of the instruments on a variable; empty when nothing is.</summary>
    public static string Suspicion(BalanceWindow balance, int variable) =>
        string.Join("; ", balance.Layout.Instruments[variable].Select(place => Of(balance, place)).Where(words => words.Length > 0));

    /// <summary>One of several instruments is wrong.</summary>
    public static string Set(IReadOnlyList<string> signals) => signals.Count == 1
        ? $"{signals[0]} does not fit the other readings."
        : $"{string.Join(", ", signals.SkipLast(1))} or {signals[^1]} is wrong; these readings cannot tell them apart.";

    /// <summary>An instrument that does not count.</summary>
    public static string LeftOut(string signal) => $"{signal} does not fit the other readings and is left out of the balance.";

    /// <summary>How the readings of a window fit together as a whole.</summary>
    public static string Check(BalanceWindow balance)
    {
        if (balance.Degrees == 0) return "Nothing checks the readings: there are just as many as the balance needs.";
        string checks = balance.Degrees == 1 ? "1 independent check" : $"{balance.Degrees} independent checks";
        // The sum over all is blunt: an instrument's own test may find what it does not.
        string verdict = balance.ChiSquare > balance.ChiSquareLimit ? "The readings do not fit together"
            : balance.Suspects.Any(set => !set.Any(balance.LeftOut.Contains)) ? "Taken all together the readings show nothing unusual, but not one by one" : "The readings fit together";
        return string.Create(CultureInfo.InvariantCulture,
            $"{verdict}: chi-square {balance.ChiSquare:0.0} from {checks}; as good as the plant file says, they exceed {balance.ChiSquareLimit:0.0} once in a hundred windows.");
    }

    private static string Of(BalanceWindow balance, int place)
    {
        string signal = balance.Layout.Signals[place];
        if (balance.LeftOut.Contains(place)) return $"{signal} left out";
        if (balance.Suspects.FirstOrDefault(set => set.Contains(place)) is not { } suspects) return "";
        return suspects.Count == 1 ? $"{signal} does not fit" : string.Join(" or ", suspects.Select(one => balance.Layout.Signals[one]));
    }
}
