using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Tests.Fouling;

/// <summary>What times out of production are taken for.</summary>
public class CleaningsTests
{
    [Fact]
    public void AMixtureOfHappenings_IsTakenForWhatItWas()
    {
        Happening[] all = [.. Enumerable.Range(1, 6).SelectMany(state => CampaignCases.Year(state, 40))];
        Happening[] recovered = [.. all.Where(one => one.Kind == HappenedKind.UnloggedCleaning && one.Rise > 3 * one.Standard)];
        Assert.True(recovered.Length > 20);
        Assert.True(recovered.Count(one => one.TakenFor is not null) >= 0.9 * recovered.Length);
        Happening[] nothing = [.. all.Where(one => one.Kind is HappenedKind.Stop or HappenedKind.LoadChange or HappenedKind.ProductChange)];
        Assert.True(nothing.Length > 60);
        Assert.True(nothing.Count(one => one.TakenFor is not null) <= 0.02 * nothing.Length);
        Happening[] failed = [.. all.Where(one => one.Kind == HappenedKind.FailedLoggedCleaning)];
        Assert.True(failed.Count(one => one.TakenFor!.Verdict == CleaningVerdict.DidNotClean) >= 0.9 * failed.Length);
        Assert.All(all.Where(one => one.Kind == HappenedKind.LoggedCleaning), one => Assert.NotEqual(CleaningVerdict.DidNotClean, one.TakenFor!.Verdict));
    }

    [Fact]
    public void AnUnloggedCleaning_IsRecognised_UnlessItIsRejected()
    {
        SimulatedSurface surface = Fouled(21);
        long at = surface.Now;
        surface.CleanFor(4, logged: false);
        surface.Produce(40);
        SurfaceCleaning found = surface.History().Cleanings[^1];
        Assert.Equal((CleaningSource.Recognised, CleaningVerdict.Cleaned, at), (found.Source, found.Verdict, found.Start));
        Assert.InRange(surface.History().Campaigns[^1].Confidence, 0.999, 1);
        surface.Events.Add(new SurfaceEvent(at, at + Milliseconds.Hour, SurfaceEventKind.RejectedCleaning, "", null));
        SurfaceHistory rejected = surface.History();
        Assert.DoesNotContain(rejected.Cleanings, cleaning => cleaning.Source == CleaningSource.Recognised);
        Assert.Equal("rejected as a cleaning", rejected.Stops[^1].Reason);
    }

    [Fact]
    public void AShorterStandstill_IsNoCandidate()
    {
        SimulatedSurface surface = Fouled(22);
        surface.CleanFor(2, logged: false);
        surface.Produce(40);
        Assert.Equal(CleaningSource.Recognised, surface.History().Cleanings[^1].Source);
        Assert.Equal(CleaningSource.Logged, surface.History(settings: new SurfaceSettings(null) { MinimumStandstill = TimeSpan.FromHours(3) }).Cleanings[^1].Source);
    }

    [Fact]
    public void EntriesSignalAndStandstillTogether_AreOneCleaning()
    {
        SimulatedSurface surface = Fouled(23);
        long at = surface.Now;
        var first = new Guid(7, 0, 0, new byte[8]);
        var second = new Guid(8, 0, 0, new byte[8]);
        surface.Events.Add(new SurfaceEvent(at + Milliseconds.Hour, at + (2 * Milliseconds.Hour), SurfaceEventKind.Cleaning, "caustic", first));
        surface.Events.Add(new SurfaceEvent(at + (5 * Milliseconds.Hour), at + (6 * Milliseconds.Hour), SurfaceEventKind.Cleaning, "acid", second));
        surface.Spans.Add(new SurfaceSpan(at + (3 * Milliseconds.Hour), at + (4 * Milliseconds.Hour), SpanKind.Cleaning));
        surface.CleanFor(8, logged: false);
        surface.Produce(40);
        SurfaceCleaning found = surface.History().Cleanings[^1];
        Assert.Equal((at + Milliseconds.Hour, at + (6 * Milliseconds.Hour)), (found.Start, found.End));
        Assert.Equal("caustic, acid", found.Word);
        Assert.Equal([first, second], found.Ids);
        Assert.Equal(CleaningSource.Logged, found.Source);
    }

    [Fact]
    public void ABodyThatWasCleanedWhileAnotherServed_IsSeen()
    {
        SimulatedSurface surface = Fouled(24);
        surface.Stand(30, SpanKind.OutOfService);
        surface.Resistance = 0;
        surface.Produce(40);
        Assert.Equal(CleaningSource.Recognised, surface.History().Cleanings[^1].Source);
    }

    [Fact]
    public void ACleaningThatDidNotClean_EndsTheCampaign_ButNotTheHoursSinceTheLastOne()
    {
        SimulatedSurface surface = Fouled(25);
        surface.CleanFor(4, removes: 0);
        surface.Produce(100);
        SurfaceHistory history = surface.History();
        Assert.Equal(CleaningVerdict.DidNotClean, history.Cleanings[^1].Verdict);
        Campaign last = history.Campaigns[^1];
        Assert.Equal(100, last.ProductionHours, 6);
        Assert.Equal(300, last.HoursSinceCleaned, 6);
        // What it left is still seen: against the best of the cleanings, not against itself.
        Assert.InRange(history.Cleanings[^1].Left.Value, 0.7 * surface.Growth * 200 / 24, 1.3 * surface.Growth * 200 / 24);
        Assert.InRange(history.Hours[^1].Resistance.Value, 0.7 * surface.Resistance, 1.3 * surface.Resistance);
    }

    [Fact]
    public void ACleaningThatGoesOn_IsAwaited()
    {
        SimulatedSurface surface = Fouled(26);
        surface.Events.Add(new SurfaceEvent(surface.Now, long.MaxValue, SurfaceEventKind.Cleaning, "boil-out", null));
        SurfaceHistory before = surface.History();
        Assert.Equal((CleaningVerdict.AwaitingHours, null), (before.Cleanings[^1].Verdict, before.Cleanings[^1].End));
        Assert.Null(before.Campaigns[^1].End);
        surface.CleanFor(4, logged: false);
        SurfaceHistory during = surface.History();
        Assert.Equal(CleaningVerdict.AwaitingHours, during.Cleanings[^1].Verdict);
        Assert.NotNull(during.Campaigns[^1].End);
        surface.Produce(5);
        Assert.Equal("3 of 12 hours after it are there", surface.History().Cleanings[^1].Reason);
        surface.Produce(20);
        Assert.Equal(CleaningVerdict.Cleaned, surface.History().Cleanings[^1].Verdict);
    }

    [Fact]
    public void AProductWhoseCleanCoefficientIsNotLearnt_CannotBeCompared()
    {
        SimulatedSurface surface = Fouled(27);
        surface.Stand(4);
        surface.Product = "other";
        surface.Clean = 3500;
        surface.Produce(40);
        SurfaceHistory history = surface.History();
        Assert.Contains("the clean coefficient with other is not learnt", history.Stops[^1].Reason, StringComparison.Ordinal);
        Assert.False(history.Hours[^1].Cleanliness.IsPresent);
        Assert.Contains("too few hours with this product after a cleaning", history.References[^1].Source, StringComparison.Ordinal);
    }

    [Fact]
    public void AProductThatFollowsAnotherWithoutAStop_TakesTheResistanceOver()
    {
        SimulatedSurface surface = Fouled(30);
        int changed = surface.Hours.Count;
        surface.Product = "other";
        surface.Clean = 3500;
        surface.Produce(100);
        SurfaceHistory history = surface.History();
        Assert.StartsWith("level carried over from product usual at 1 of the last 1 changes", history.References[^1].Source, StringComparison.Ordinal);
        double[] errors = [.. Enumerable.Range(changed, 100).Select(i => (history.Hours[i].Resistance.Value - surface.Truth[i].Resistance) / history.Hours[i].Resistance.Random)];
        Assert.InRange(errors.Average(), -2, 2);
        Assert.True(errors.Count(error => double.Abs(error) < 2) >= 80);
        // It is frozen after its first day.
        SurfaceHistory part = SurfaceHistory.Of(new SurfaceSettings(null), surface.Hours[..(changed + 40)], [], surface.Spans, surface.Events);
        Assert.Equal(history.Hours.Take(changed + 40), part.Hours);
    }

    [Fact]
    public void ARecalibration_EndsTheBaseline_UntilTheNextCleaning()
    {
        SimulatedSurface surface = Fouled(28);
        surface.Events.Add(new SurfaceEvent(surface.Now, surface.Now, SurfaceEventKind.Recalibration, "steam flow", null));
        int changed = surface.Hours.Count;
        surface.Clean *= 1.1;
        surface.Produce(60);
        surface.CleanFor(4);
        surface.Produce(60);
        SurfaceHistory history = surface.History();
        Assert.True(history.Hours[changed - 1].Cleanliness.IsPresent);
        Assert.False(history.Hours[changed].Cleanliness.IsPresent);
        Assert.Contains("recalibrated", history.References[history.Hours[changed].Reference].Source, StringComparison.Ordinal);
        Assert.InRange(history.Hours[^1].Resistance.Value - surface.Resistance, -4 * history.Hours[^1].Resistance.Random, 4 * history.Hours[^1].Resistance.Random);
        Assert.Contains("level of 1 of the last 1", history.References[^1].Source, StringComparison.Ordinal);
        // Slopes are kept: a recalibration moves levels.
        Assert.Equal(ReferenceBasis.Conditions, history.References[^1].Basis);
    }

    [Fact]
    public void RunsOnWater_AreASeriesOfTheirOwn()
    {
        SimulatedSurface surface = Fouled(29);
        long at = surface.Now;
        foreach ((int hour, double coefficient) in new[] { (0, 3000.0), (1, 3010), (30, 2800), (31, 2790), (32, 2795) })
            surface.Water.Add(surface.Hours[0] with { Hour = at + (hour * Milliseconds.Hour), Coefficient = new(coefficient, 30, 5) });
        IReadOnlyList<WaterTest> tests = surface.History().WaterTests;
        Assert.Equal([3005.0, 2795], tests.Select(test => test.Coefficient.Value));
        Assert.False(tests[0].ResistanceSincePrevious.IsPresent);
        Assert.Equal((1 / 2795.0) - (1 / 3005.0), tests[1].ResistanceSincePrevious.Value, 12);
    }

    /// <summary>Three campaigns with logged cleanings, and 200 hours of scale since the last.</summary>
    private static SimulatedSurface Fouled(int state)
    {
        SimulatedSurface surface = SurfaceHistoryTests.Campaigns(state, 3, 200, product: "usual");
        surface.Produce(200);
        return surface;
    }
}
