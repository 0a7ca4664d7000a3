using EvapMonitor.Core.Coefficients;

namespace EvapMonitor.Core.Fouling;

/// <content>What an interruption is taken for, and what a cleaning brought.</content>
internal sealed partial class CampaignWalk
{
    /// <summary>Chance of taking a stop for a cleaning: with a hundred stops a year, one in twenty years.</summary>
    private const double Recognised = 5e-4;

    /// <summary>Least rise of ln U that is worth the name of a cleaning nobody logged.</summary>
    private const double LeastRise = 0.01;

    /// <summary>Chance of taking a logged or signalled cleaning that did nothing for one that cleaned.</summary>
    private const double Confirmed = 0.01;

    /// <summary>Share of the fall of ln U, and the least of it, that a cleaning must bring back before it is said not to have failed.</summary>
    private const double WorthwhileShare = 0.3, WorthwhileRise = 0.02;

    private static bool IsRecognised(Interruption interruption, Recovery recovery) =>
        !interruption.Rejected && recovery.Test is { } test && test.Significance < Recognised && test.Rise.Value > LeastRise;

    private static SurfaceCleaning Cleaning(Interruption interruption, RecoveryTest? test, Recovery told, CleaningVerdict verdict, string reason) => new()
    {
        Start = interruption.IsCleaning ? interruption.CleaningStart : interruption.Start,
        End = interruption.IsCleaning ? (interruption.CleaningEnd == long.MaxValue ? null : interruption.CleaningEnd) : interruption.End,
        Source = interruption.Source,
        Word = string.Join(", ", interruption.Words),
        Ids = interruption.Ids,
        Verdict = verdict,
        Reason = reason,
        Test = test,
        Before = Less(told.Before, told.Clean),
        Left = Less(told.After, told.Clean),
        Removed = Less(told.Before, told.After),
    };

    private static (CleaningVerdict Verdict, string Reason) Verdict(Interruption interruption, Recovery recovery)
    {
        if (interruption.End == long.MaxValue) return (CleaningVerdict.AwaitingHours, interruption.CleaningEnd == long.MaxValue ? "it goes on" : "nothing was produced since");
        if (recovery.Awaiting) return (CleaningVerdict.AwaitingHours, recovery.Reason);
        if (recovery.Test is not { } test) return (CleaningVerdict.CannotBeTold, recovery.Reason);
        if (test.Significance < Confirmed) return (CleaningVerdict.Cleaned, "");
        double fall = double.Log(recovery.Before.Value / recovery.Clean.Value), width = double.Hypot(recovery.Before.Random / recovery.Before.Value, recovery.Clean.Random / recovery.Clean.Value);
        if (fall < double.Max(WorthwhileRise, 2 * width)) return (CleaningVerdict.CannotBeTold, "the surface was clean before, as far as can be told");
        double worthwhile = double.Max(WorthwhileRise, double.IsFinite(fall) ? WorthwhileShare * fall : 0);
        return test.Rise.Value + (1.645 * test.Rise.Random) < worthwhile
            ? (CleaningVerdict.DidNotClean, "")
            : (CleaningVerdict.CannotBeTold, FormattableString.Invariant($"the hours scatter too much: ln U rose by {test.Rise.Value:0.000} ± {test.Rise.Random:0.000}"));
    }

    private static Measured Less(Measured one, Measured other) =>
        one.IsPresent && other.IsPresent ? new(one.Value - other.Value, 0, double.Hypot(one.Random, other.Random)) : Measured.Absent;
}
