using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Tests.Fouling;

public class SurfaceHistoryTests
{
    [Fact]
    public void Campaigns_TellWhatIsTrue()
    {
        SimulatedSurface surface = Campaigns(2, 8, 240, removes: 0.9);
        SurfaceHistory history = surface.History();
        Assert.Equal(8, history.Campaigns.Count);
        Assert.Equal([CleaningSource.FirstData, .. Enumerable.Repeat(CleaningSource.Logged, 7)], history.Campaigns.Select(campaign => campaign.StartedBy));
        Assert.All(history.Campaigns.SkipLast(1), campaign => Assert.NotNull(campaign.End));
        Campaign last = history.Campaigns[^1];
        AssertNear(surface.Growth, last.GrowthRate, 4);
        // A tenth is always left: the best of the cleanings is what counts as clean.
        AssertNear(surface.Truth[^1].Resistance - surface.Truth[^241].Resistance * 0.1, last.FinalResistance with { Value = last.FinalResistance.Value - last.InitialResistance.Value }, 4);
        Assert.InRange(last.RemovedShare, 0.93, 1.07);
        Assert.Equal(240, last.ProductionHours, 6);
        Assert.Equal(240, last.HoursSinceCleaned, 6);
        Assert.All(history.Cleanings.SkipLast(1), cleaning => Assert.Equal(CleaningVerdict.Cleaned, cleaning.Verdict));
        Assert.Equal(CleaningVerdict.AwaitingHours, history.Cleanings[^1].Verdict);
        Assert.All(history.Cleanings, cleaning => Assert.Equal("boil-out", cleaning.Word));
        Assert.All(history.Cleanings, cleaning => Assert.Single(cleaning.Ids));
        Assert.Equal(surface.Hours.Select(hour => hour.Hour), history.Hours.Select(hour => hour.Hour));
    }

    [Fact]
    public void LaterDays_MoveNothingBeforeTheirCampaign()
    {
        SimulatedSurface surface = Campaigns(3, 6, 240);
        surface.Produce(100);
        SurfaceHistory whole = surface.History();
        // What comes after is cut off, hour by hour over two days around a cleaning and then coarsely.
        foreach (int kept in Enumerable.Range(4 * 240, 50).Concat([1100, 1200, 1300, 1400]))
        {
            long end = surface.Hours[kept - 1].Hour + Milliseconds.Hour;
            SurfaceHistory part = SurfaceHistory.Of(new SurfaceSettings(null), surface.Hours[..kept], [], [.. surface.Spans.Where(span => span.Start < end)], [.. surface.Events.Where(one => one.Start < end)]);
            int campaign = whole.Hours[kept - 1].Campaign;
            int settled = Enumerable.Range(0, kept).First(i => whole.Hours[i].Campaign == campaign);
            Assert.Equal(whole.Hours.Take(settled), part.Hours.Take(settled));
            // Once the first day and two hours of a campaign are known, its own hours stay as well.
            if (kept >= settled + 26) Assert.Equal(whole.Hours.Take(kept), part.Hours);
        }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(3)]
    [InlineData(4)]
    [InlineData(5)]
    public void LaterDays_MoveNothing_WhateverHappens(int state)
    {
        SimulatedSurface surface = CampaignCases.Jumble(state);
        var random = new Random(state);
        SurfaceHistory whole = surface.History();
        for (int cut = 0; cut < 20; cut++)
        {
            int kept = random.Next(200, surface.Hours.Count);
            long end = surface.Hours[kept - 1].Hour + Milliseconds.Hour;
            SurfaceHistory part = SurfaceHistory.Of(new SurfaceSettings(null), surface.Hours.GetRange(0, kept), [], [.. surface.Spans.Where(span => span.Start < end)], [.. surface.Events.Where(one => one.Start < end)]);
            int first = Enumerable.Range(0, kept).First(i => whole.Hours[i].Campaign == whole.Hours[kept - 1].Campaign);
            Assert.Equal(whole.Hours.Take(first), part.Hours.Take(first));
            // Nor within the campaign, but for the first days of it and of a product.
            if (kept > first + 110) Assert.Equal(whole.Hours.Take(kept - 80), part.Hours.Take(kept - 80));
        }
    }

    [Fact]
    public void WhateverComes_IsTakenWithoutAFault()
    {
        var random = new Random(7);
        double Any(double usual) => random.Next(40) switch { 0 => double.NaN, 1 => 0, 2 => double.PositiveInfinity, _ => usual * (0.5 + random.NextDouble()) };
        for (int run = 0; run < 300; run++)
        {
            List<SurfaceHour> hours = [];
            List<SurfaceSpan> spans = [];
            List<SurfaceEvent> events = [];
            long now = 0;
            for (int count = random.Next(300); count > 0; count--)
            {
                now += Milliseconds.Hour * (random.Next(10) == 0 ? random.Next(1, 100) : 1);
                hours.Add(new SurfaceHour(now, random.Next(50) == 0 ? "N2" : "N1", random.Next(30) == 0 ? "B" : "A", 12, new(1 + (2000 * random.NextDouble()), 1, Any(10)), Any(10), Any(350), Any(0.4), Any(3e4), Any(10)));
            }

            for (int count = random.Next(30); count > 0; count--)
            {
                long at = random.NextInt64(now + 1), length = random.NextInt64(-1000, 50 * Milliseconds.Hour);
                spans.Add(new SurfaceSpan(at, at + length, (SpanKind)random.Next(4)));
                if (random.Next(2) == 0) events.Add(new SurfaceEvent(at / 2, random.Next(5) == 0 ? long.MaxValue : (at / 2) + length, (SurfaceEventKind)random.Next(3), "w", null));
            }

            SurfaceHistory history = SurfaceHistory.Of(new SurfaceSettings(random.Next(2) == 0 ? null : 2200), hours, hours, spans, events);
            Assert.Equal(hours.Count, history.Hours.Count);
            Assert.DoesNotContain(history.Hours, hour => hour is null || hour.Cleanliness.IsPresent && !(hour.Cleanliness.Random >= 0));
            for (int k = 1; k < history.Campaigns.Count; k++) Assert.True(history.Campaigns[k - 1].Start <= history.Campaigns[k - 1].End && history.Campaigns[k - 1].End <= history.Campaigns[k].Start);
        }
    }

    [Fact]
    public void SameHours_GiveTheSameBits()
    {
        SurfaceHistory one = Campaigns(4, 5, 200).History(), other = Campaigns(4, 5, 200).History();
        Assert.Equal(one.Hours, other.Hours);
        Assert.Equal(one.Campaigns.Select(campaign => campaign.GrowthRate), other.Campaigns.Select(campaign => campaign.GrowthRate));
    }

    [Fact]
    public void BeforeAnyCleaning_TheDesignValueServes_AndSaysSo()
    {
        var surface = new SimulatedSurface(5);
        surface.Produce(100);
        SurfaceHistory without = surface.History(), with = surface.History(design: 2600);
        Assert.All(without.Hours, hour => Assert.False(hour.Cleanliness.IsPresent));
        Assert.StartsWith("none: no cleaning was seen yet", without.References[0].Source, StringComparison.Ordinal);
        Assert.All(with.Hours, hour => Assert.Equal(2600, hour.CleanCoefficient.Value, 9));
        Assert.StartsWith("design value", with.References[0].Source, StringComparison.Ordinal);
    }

    [Fact]
    public void HoursThatDoNotAscend_AreRefused()
    {
        var surface = new SimulatedSurface(6);
        surface.Produce(3);
        (surface.Hours[0], surface.Hours[1]) = (surface.Hours[1], surface.Hours[0]);
        Assert.Contains("does not come after", Assert.Throws<ArgumentException>(() => surface.History()).Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Nothing_GivesNothing()
    {
        SurfaceHistory history = SurfaceHistory.Of(new SurfaceSettings(null), [], [], [], []);
        Assert.Empty(history.Campaigns);
        Assert.Empty(history.Hours);
    }

    internal static SimulatedSurface Campaigns(int state, int campaigns, int hours, double removes = 1, string product = "")
    {
        var surface = new SimulatedSurface(state) { Season = 8, Product = product };
        for (int k = 0; k < campaigns; k++)
        {
            surface.Produce(hours);
            surface.CleanFor(5, removes);
        }

        return surface;
    }

    private static void AssertNear(double truth, Core.Coefficients.Measured found, double standards) =>
        Assert.InRange(found.Value, truth - (standards * found.Random), truth + (standards * found.Random));
}
