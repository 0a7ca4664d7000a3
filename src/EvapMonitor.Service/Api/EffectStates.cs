using EvapMonitor.Core.Advice;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Api;

/// <summary>Puts together what is known of an effect now: the one object that feeds sentence, picture and table.</summary>
public sealed class EffectStates(TrendStore trends, CleaningStore cleanings, TimeProvider clock)
{
    private const double ZeroCelsius = 273.15;

    /// <summary>How far back growth and due states look when no cleaning is logged.</summary>
    private static readonly TimeSpan LookBack = TimeSpan.FromDays(400);

    /// <summary>The state of one effect.</summary>
    public async Task<EffectWire> OfAsync(LinePlace line, Effect effect, int effectId, CancellationToken stop)
    {
        DateTimeOffset now = clock.GetUtcNow();
        IReadOnlyList<LoggedCleaning> logged = await cleanings.ListAsync(line.LineId, effectId, stop);
        LoggedCleaning? last = logged.FirstOrDefault(cleaning => cleaning.End is not null);
        LoggedCleaning? running = logged.FirstOrDefault(cleaning => cleaning.Start <= now && (cleaning.End is null || cleaning.End > now));
        DateTimeOffset? lastWindow = await trends.LastWindowAsync(line.LineId, effectId, stop);
        CleanExpectation? clean = CleanExpectation.Design(effect);
        DateTimeOffset since = last?.End ?? now - LookBack;
        IReadOnlyList<EffectHour> hours = trends.Hours(line.LineId, effectId, HourQuantity.Coefficient, since, now);
        DueVerdict verdict = CleaningDue.Judge(
            effect.DueWhen, [.. hours.Select(hour => (hour.Hour, hour.Median))], clean?.Coefficient, last?.End?.ToUnixTimeMilliseconds(), now.ToUnixTimeMilliseconds());
        return new EffectWire(
            effect.Name,
            line.Line.Name,
            effect.Area,
            clean?.Coefficient,
            lastWindow is { } at ? NowOf(line, effect, effectId, at, clean) : null,
            new LimitsWire(effect.DueWhen?.CoefficientBelow, effect.DueWhen?.CleanlinessBelow, effect.DueWhen?.HoursSinceCleaning, CleanComparison.LimitResistance(effect.DueWhen, clean)),
            DueOf(effect.Name, verdict, now),
            last is null ? null : WireOf(last, line.Line.Name, effect.Name),
            running?.Start,
            Growth(hours, clean));
    }

    /// <summary>A cleaning as it goes out.</summary>
    internal static CleaningWire WireOf(LoggedCleaning cleaning, string line, string effect) =>
        new(cleaning.Id, line, effect, cleaning.Start, cleaning.End, cleaning.Kind, cleaning.Note, cleaning.LoggedAt);

    private static DueWire DueOf(string effect, DueVerdict verdict, DateTimeOffset now) => new(
        Words.Of(verdict.State),
        verdict.Binding is { } binding ? Words.Of(binding.Limit) : null,
        verdict.State == DueState.Due ? Utc(verdict.Binding!.Since!.Value) : null,
        Words.Sentence(effect, verdict, now.ToUnixTimeMilliseconds()),
        [.. verdict.Evidence.Select(one => new EvidenceWire(
            Words.Of(one.Limit), Number(one.Value), one.Bound, Words.UnitOf(one.Limit), Words.Of(one.State), one.Since is { } since ? Utc(since) : null))]);

    private EffectNowWire? NowOf(LinePlace line, Effect effect, int effectId, DateTimeOffset lastWindow, CleanExpectation? clean)
    {
        DateTimeOffset from = lastWindow.AddHours(-1).AddMilliseconds(1);
        IReadOnlyList<EffectWindow> windows = trends.Windows(line.LineId, effectId, from, lastWindow.AddMilliseconds(1));
        Measured Mean(HourQuantity quantity) => MeanOf([.. windows.Where(EffectHour.Counts).Select(window => EffectHour.Of(window, quantity)).Where(value => value.IsPresent)]);
        Measured coefficient = Mean(HourQuantity.Coefficient), duty = Mean(HourQuantity.Duty), force = Mean(HourQuantity.DrivingForce), corrected = Mean(HourQuantity.HeadCorrectedDrivingForce);
        Measured cleanliness = CleanComparison.Cleanliness(coefficient, clean), resistance = CleanComparison.Resistance(coefficient, clean);
        // The day may be rewritten between the two questions.
        if (windows.Count == 0) return null;
        EffectWindow lastOne = windows[^1];
        string? reason = coefficient.IsPresent ? null : lastOne.Reason ?? NotCounting(lastOne);
        return new EffectNowWire(
            Utc(windows[0].At), 1,
            Number(coefficient.Value), Number(coefficient.Standard), Number(coefficient.Random),
            Celsius(Mean(HourQuantity.HeatingTemperature).Value, lastOne.HeatingTemperature.Value), Celsius(Mean(HourQuantity.BoilingTemperature).Value, lastOne.BoilingTemperature.Value),
            Number(Mean(HourQuantity.Elevation).Value), Number(force.Value), Number(force.Standard), Number(corrected.Value), Number(corrected.Standard),
            Number(duty.Value / 1000), Number(duty.Standard / 1000), Number(Mean(HourQuantity.HeatFlux).Value / 1000),
            Number(cleanliness.Value), Number(cleanliness.Standard), Number(resistance.Value), Number(resistance.Standard),
            clean?.Source, Words.Of(lastOne.DutyFrom), Words.Of(lastOne.HeatingFrom), Words.Of(lastOne.BoilingFrom), reason);
    }

    private static string NotCounting(EffectWindow last) => last.State switch
    {
        RunningState.Idle => "the line is idle: no feed",
        RunningState.Cleaning => "the effect is being cleaned",
        RunningState.WaterRun => "the line runs on water",
        RunningState.Filling => "the line is filling: no product leaves yet",
        _ when last.Steady == false => "the line has not been steady in the last hour",
        _ => "no coefficient in the last hour",
    };

    /// <summary>Mean of windows: the random part shrinks with their number, the systematic part stays.</summary>
    private static Measured MeanOf(Measured[] values) => values.Length == 0
        ? Measured.Absent
        : new Measured(
            values.Average(value => value.Value), values.Average(value => value.Systematic), double.Sqrt(values.Sum(value => value.Random * value.Random)) / values.Length);

    /// <summary>Resistance at the end of each week since the last cleaning: the median of the week's last day.</summary>
    private static double[] Growth(IReadOnlyList<EffectHour> hours, CleanExpectation? clean)
    {
        if (clean is null || hours.Count == 0) return [];
        const long week = 7 * Milliseconds.Day;
        long start = hours[0].Hour;
        return [.. hours
            .GroupBy(hour => (hour.Hour - start) / week)
            .Select(weekly => weekly.Where(hour => hour.Hour > weekly.Max(other => other.Hour) - Milliseconds.Day).Select(hour => hour.Median).Order().ToArray())
            .Select(day => (1 / day[day.Length / 2]) - (1 / clean.Coefficient))];
    }

    private static double? Celsius(double mean, double last) => Number((double.IsFinite(mean) ? mean : last) - ZeroCelsius);

    private static double? Number(double value) => double.IsFinite(value) ? value : null;

    private static DateTimeOffset Utc(long at) => DateTimeOffset.FromUnixTimeMilliseconds(at);
}
