using EvapMonitor.Core.Advice;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Wording;

namespace EvapMonitor.Service.Api;

/// <summary>Puts together what is known of an effect now: the one object that feeds sentence, picture and table.</summary>
public sealed class EffectStates(TrendStore trends, CleaningStore cleanings, SurfaceStore cleanHours, SurfaceStates surfaces, TimeProvider clock)
{
    private const double ZeroCelsius = 273.15;

    /// <summary>How far back growth and due states look when no cleaning is logged.</summary>
    private static readonly TimeSpan LookBack = TimeSpan.FromDays(400);

    /// <summary>The state of one effect.</summary>
    public async Task<EffectWire> OfAsync(LinePlace line, Effect effect, int effectId, CancellationToken stop)
    {
        DateTimeOffset now = clock.GetUtcNow();
        IReadOnlyList<LoggedCleaning> logged = [.. (await cleanings.ListAsync(line.LineId, effectId, stop)).Where(cleaning => !cleaning.Rejected)];
        LoggedCleaning? running = logged.FirstOrDefault(cleaning => cleaning.Start <= now && (cleaning.End is null || cleaning.End > now));
        DateTimeOffset? lastWindow = await trends.LastWindowAsync(line.LineId, effectId, stop);
        SurfacesOfEffect its = SurfacesOfEffect.Of(await surfaces.OfAsync(line.LineId, stop), effect.Name);
        // Where bodies take turns, what was logged of another one is no cleaning of this.
        LoggedCleaning? last = logged.FirstOrDefault(cleaning => cleaning.End is not null && !its.All.Any(other => other != its.Serving && other.History.Cleanings.Any(one => one.Ids.Contains(cleaning.Id))));
        Campaign? campaign = its.Serving?.History.Campaigns is [.., var latestCampaign] ? latestCampaign : null;
        // The log is known at once, what was recognised in it a moment later.
        long? cleaned = Later(last?.End?.ToUnixTimeMilliseconds(), campaign is { StartedBy: not CleaningSource.FirstData } ? campaign.Start : null);
        DateTimeOffset since = cleaned is { } instant ? Utc(instant) : now - LookBack;
        IReadOnlyList<EffectHour> hours = trends.Hours(line.LineId, effectId, HourQuantity.Coefficient, since, now);
        IReadOnlyList<CleanHour> clean = its.Serving is not { } serving ? []
            : [.. cleanHours.Hours(line.LineId, effectId, since, now).Where(hour => hour.Surface == serving.Name).Select(hour => hour.Clean)];
        // Of an effect in which bodies take turns the hours of the one that serves count.
        if (clean.Count > 0 && its.All.Count > 1) hours = [.. hours.Where(hour => clean.Any(one => one.Hour == hour.Hour) || hour.Hour > clean[^1].Hour)];
        EffectNowWire? latest = lastWindow is { } at ? await NowOfAsync(line, effect, effectId, at, stop) : null;
        CleanExpectation? inUse = latest is { CleanCoefficientWM2k: { } coefficient, CleanFrom: { } source } ? new CleanExpectation(coefficient, source) : CleanExpectation.Design(effect);
        DueVerdict verdict = CleaningDue.Judge(
            effect.DueWhen, [.. hours.Select(hour => (hour.Hour, hour.Median))], Cleanliness(hours, clean, its.Version, inUse), cleaned, now.ToUnixTimeMilliseconds());
        return new EffectWire(
            effect.Name,
            line.Line.Name,
            effect.Area,
            inUse?.Coefficient,
            latest,
            new LimitsWire(effect.DueWhen?.CoefficientBelow, effect.DueWhen?.CleanlinessBelow, effect.DueWhen?.HoursSinceCleaning, CleanComparison.LimitResistance(effect.DueWhen, inUse)),
            DueOf(effect.Name, verdict, now),
            last is null ? null : CleaningHandlers.WireOf(line, last, its.All),
            running?.Start,
            Growth(hours, clean, its.Version, inUse),
            its.Serving?.Name,
            campaign is null ? null : CampaignStates.WireOf(its.Serving!.Name, campaign));
    }

    private static long? Later(long? one, long? other) => one is { } a && other is { } b ? long.Max(a, b) : one ?? other;

    /// <summary>Cleanliness by the hour; against the value in use until the surfaces have been computed.</summary>
    private static IReadOnlyList<(long, double)> Cleanliness(IReadOnlyList<EffectHour> hours, IReadOnlyList<CleanHour> clean, long version, CleanExpectation? inUse) => version > 0
        ? [.. clean.Where(hour => hour.Cleanliness.IsPresent).Select(hour => (hour.Hour, hour.Cleanliness.Value))]
        : inUse is null ? [] : [.. hours.Select(hour => (hour.Hour, hour.Median / inUse.Coefficient))];

    private static DueWire DueOf(string effect, DueVerdict verdict, DateTimeOffset now) => new(
        Words.Of(verdict.State),
        verdict.Binding is { } binding ? Words.Of(binding.Limit) : null,
        verdict.State == DueState.Due ? Utc(verdict.Binding!.Since!.Value) : null,
        Words.Sentence(effect, verdict, now.ToUnixTimeMilliseconds()),
        [.. verdict.Evidence.Select(one => new EvidenceWire(
            Words.Of(one.Limit), Number(one.Value), one.Bound, Words.UnitOf(one.Limit), Words.Of(one.State), one.Since is { } since ? Utc(since) : null))]);

    private async Task<EffectNowWire?> NowOfAsync(LinePlace line, Effect effect, int effectId, DateTimeOffset lastWindow, CancellationToken stop)
    {
        DateTimeOffset from = lastWindow.AddHours(-1).AddMilliseconds(1);
        IReadOnlyList<EffectWindow> windows = trends.Windows(line.LineId, effectId, from, lastWindow.AddMilliseconds(1));
        Measured Mean(HourQuantity quantity) => MeanOf([.. windows.Where(EffectHour.Counts).Select(window => EffectHour.Of(window, quantity)).Where(value => value.IsPresent)]);
        Measured coefficient = Mean(HourQuantity.Coefficient), duty = Mean(HourQuantity.Duty), force = Mean(HourQuantity.DrivingForce), corrected = Mean(HourQuantity.HeadCorrectedDrivingForce);
        CleanInTime clean = await surfaces.CleanAsync(line.LineId, effectId, effect.Name, from, lastWindow.AddMilliseconds(1), stop);
        CleanReference? reference = windows.Count == 0 ? null : clean.At(windows[^1].At)?.Reference;
        double solids = windows.Where(EffectHour.Counts).Select(window => window.Solids).Where(double.IsFinite).DefaultIfEmpty(double.NaN).Average();
        CleanComparisonResult compared = reference?.Compare(coefficient, SurfaceConditions.Of(solids, Mean(HourQuantity.BoilingTemperature).Value, Mean(HourQuantity.HeatFlux).Value))
            ?? Designed(coefficient, CleanExpectation.Design(effect));
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
            Number(compared.Cleanliness.Value), Number(compared.Cleanliness.Standard), Number(compared.Resistance.Value), Number(compared.Resistance.Standard),
            Number(compared.CleanCoefficient.Value), Number(compared.CleanCoefficient.Standard), Number(compared.AtReference.Value), Number(compared.AtReference.Standard),
            reference?.Source ?? CleanExpectation.Design(effect)?.Source, Words.Of(lastOne.DutyFrom), Words.Of(lastOne.HeatingFrom), Words.Of(lastOne.BoilingFrom), reason);
    }

    /// <summary>Until the surfaces have been computed, the design value is what there is.</summary>
    private static CleanComparisonResult Designed(Measured coefficient, CleanExpectation? design) => design is null ? CleanComparisonResult.Absent
        : new(new Measured(design.Coefficient, 0, 0), CleanComparison.Cleanliness(coefficient, design), CleanComparison.Resistance(coefficient, design), Measured.Absent, false);

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
    private static double[] Growth(IReadOnlyList<EffectHour> hours, IReadOnlyList<CleanHour> clean, long version, CleanExpectation? inUse)
    {
        (long Hour, double Resistance)[] all = version > 0 ? [.. clean.Where(hour => hour.Resistance.IsPresent).Select(hour => (hour.Hour, hour.Resistance.Value))]
            : inUse is null ? [] : [.. hours.Select(hour => (hour.Hour, (1 / hour.Median) - (1 / inUse.Coefficient)))];
        if (all.Length == 0) return [];
        const long week = 7 * Milliseconds.Day;
        long start = all[0].Hour;
        return [.. all
            .GroupBy(hour => (hour.Hour - start) / week)
            .Select(weekly => weekly.Where(hour => hour.Hour > weekly.Max(other => other.Hour) - Milliseconds.Day).Select(hour => hour.Resistance).Order().ToArray())
            .Select(day => day[day.Length / 2])];
    }

    private static double? Celsius(double mean, double last) => Number((double.IsFinite(mean) ? mean : last) - ZeroCelsius);

    private static double? Number(double value) => double.IsFinite(value) ? value : null;

    private static DateTimeOffset Utc(long at) => DateTimeOffset.FromUnixTimeMilliseconds(at);
}
