using EvapMonitor.Core.Plant;
using EvapMonitor.Service.PlantFile;

namespace EvapMonitor.Service.Tests.PlantFile;

public sealed class PlantCheckTests
{
    [Fact]
    public void ForwardExample_ReportsEveryWayAndWhatIsMissing()
    {
        Assert.Equal(
            """
            Site Tarnholt (Europe/Copenhagen), windows of 5 min, history from 2024-12-31 23:00 UTC

            Line west: liquor told by W.PRODUCT (0 water, 1 juice)
              W1: 1450 m2, heated by steam, liquor from the feed
                heating temperature: chest pressure W1.PT-1; also steam main gauge W.PT-01 at the chest
                boiling temperature: thermometer W1.TT-2 that sees flashed liquor
                duty:                steam flow W.FT-01; also condensate flow W1.FT-3
                coefficient:         from these
              W2: 1300 m2, heated by vapour of W1, liquor from W1
                heating temperature: vapour pressure W1.PT-2 of W1
                boiling temperature: vapour pressure W2.PT-2 and elevation at solids W2.DT-2
                duty:                condensate flow W2.FT-3
                coefficient:         from these
              W3: 1300 m2, heated by vapour of W2, liquor from W2
                heating temperature: vapour pressure W2.PT-2 of W2
                boiling temperature: missing: the solids leaving W3 (for the elevation), or a thermometer that sees flashed liquor
                duty:                condensate flow W3.FT-3
                coefficient:         not from these alone; the balance of the line may still give it
              W4: 1200 m2, heated by vapour of W3, liquor from W3
                heating temperature: vapour pressure W3.PT-2 of W3
                boiling temperature: vapour pressure W4.PT-2 and elevation at product solids W.DT-90
                duty:                condensate flow W4.FT-3
                coefficient:         from these
              accuracy assumed: W4.LT-2 ±0.125 m
              3 of 4 effects have a coefficient from their own instruments
            """.ReplaceLineEndings("\n"),
            string.Join('\n', PlantCheck.Report(Examples.Sound(Examples.Text("forward-four-effects.yaml")))));
    }

    [Fact]
    public void BackwardExample_TakesTheLiquorSide()
    {
        IReadOnlyList<EffectCheck> checks = EffectCheck.Of(Examples.Sound(Examples.Text("backward-three-effects.yaml")).Lines[0]);
        Assert.Equal("steam flow F101; also liquor side: flow F122 and solids A122 with product solids A190", checks[0].Duty.From);
        Assert.Equal("liquor side: flow F132 and solids A132 with solids A122", checks[1].Duty.From);
        Assert.Equal("liquor side: feed flow F100 and feed solids A100 with solids A132", checks[2].Duty.From);
        Assert.Equal("vapour pressure P122 of E2", checks[2].Heating.From);
        Assert.All(checks, check => Assert.True(check.IsComplete));
    }

    [Fact]
    public void NoInstrumentsAtAll_NamesThoseThatWouldHelp()
    {
        Line line = Examples.Sound(Examples.Small).Lines[0];
        EffectCheck second = EffectCheck.Of(line)[1];
        Assert.Equal(new Sourced(null, "a chest pressure of E2, or a vapour pressure of E1, or a chest thermometer that sees saturation"), second.Heating);
        Assert.Equal(new Sourced(null, "a vapour pressure of E2, or a thermometer that sees flashed liquor"), second.Boiling);
        Assert.Equal(
            new Sourced(null, "a condensate flow of E2, or on the liquor side the flow entering E2 and the flow or the solids leaving E2"), second.Duty);
    }

    [Theory]
    [InlineData("before-valve", false)]
    [InlineData("chest", true)]
    public void SteamGauge_StandsForTheChestOnlyAtTheChest(string at, bool usable)
    {
        string text = Examples.With("    feed:", $"    steam: {{pressure: {{signal: P, unit: bar, at: {at}}}}}\n    feed:");
        Assert.Equal(usable, EffectCheck.Of(Examples.Sound(text).Lines[0])[0].Heating.From is not null);
    }

    [Fact]
    public void SteamFlow_IsNoDutyWhereSteamHeatsTwoEffects()
    {
        string one = Examples.With("    feed:", "    steam: {flow: {signal: S, unit: t/h}}\n    feed:");
        Assert.Equal("steam flow S", EffectCheck.Of(Examples.Sound(one).Lines[0])[0].Duty.From);
        string two = one.Replace("heating: vapour of E1", "heating: [steam, vapour of E1]", StringComparison.Ordinal);
        Assert.All(EffectCheck.Of(Examples.Sound(two).Lines[0]), check => Assert.Null(check.Duty.From));
    }

    [Fact]
    public void SplitFeed_IsNoKnownFlowIntoAnEffect() =>
        Assert.All(EffectCheck.Of(Examples.Sound(Examples.Text("own-liquor.yaml")).Lines[0]), check =>
            Assert.DoesNotContain("liquor side", check.Duty.From ?? "", StringComparison.Ordinal));

    [Fact]
    public void InstrumentsOfTheSite_AreAllListed()
    {
        Site site = Examples.Sound(Examples.Text("forward-four-effects.yaml"));
        string text = Examples.Text("forward-four-effects.yaml");
        Assert.Equal(text.Split("signal: ").Length - 1 - 1, SiteInstruments.Of(site).Count); // a group's signal holds a mapping with its own key
        Assert.Equal(("SITE.PT-ATM", null), (SiteInstruments.Of(site)[0].Instrument.Signal, SiteInstruments.Of(site)[0].Line));
        Assert.Contains(SiteInstruments.Of(site), i => i is { Line: "west", Effect: "W4", Place: "level" });
    }
}
