using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.PlantFile;

namespace EvapMonitor.Service.Tests.PlantFile;

public sealed class PlantCheckTests
{
    [Fact]
    public void Report_SaysOfEachEffectHowSureItIs_OnWhatThatRests_AndWhatOneMoreWouldBring()
    {
        Assert.Equal(
            """
            Site Ostmarsch (Europe/Berlin), windows of 5 min, history from 2025-02-28 23:00 UTC

            Line pilot: liquor blend
              A: 85 m2, heated by steam, liquor from the feed
                coefficient:         about ±3.9 % (standard); its uncertainty comes from A.PV 44 %, A.TC 33 %, elevation correlation 22 %
                one more instrument: a thermometer in flashed liquor of A (±3.2 %) would make it surer
              B: 85 m2, heated by vapour of A, liquor from the feed and A
                coefficient:         about ±5.2 % (standard); its uncertainty comes from B.PV 57 %, A.PV 23 %, elevation correlation 19 %
                one more instrument: a thermometer in flashed liquor of B (±3.6 %) would make it surer
              accuracy assumed: FEED.T ±0.5 °C
              2 of 2 effects have a coefficient
            """.ReplaceLineEndings("\n"),
            string.Join('\n', PlantCheck.Report(Examples.Sound(Examples.Text("own-liquor.yaml")))));
    }

    [Theory]
    [InlineData("backward-three-effects.yaml")]
    [InlineData("bleeds-and-flash.yaml")]
    [InlineData("forward-four-effects.yaml")]
    [InlineData("mechanical-recompression.yaml")]
    [InlineData("mixed-seven-effects.yaml")]
    [InlineData("thermal-recompression.yaml")]
    public void Examples_HaveACoefficientInEveryEffect(string name) =>
        Assert.All(Examples.Bases(Examples.Sound(Examples.Text(name)).Lines[0]), basis => Assert.InRange(basis.RelativeStandard ?? 9, 0.005, 0.25));

    [Fact]
    public void NoInstrumentsAtAll_NoSingleOneIsEnough()
    {
        IReadOnlyList<string> report = PlantCheck.Report(Examples.Sound(Examples.Small));
        Assert.Contains("    coefficient:         none: it does not follow from these instruments", report);
        Assert.Contains("    one more instrument: no single one is enough", report);
    }

    [Fact]
    public void TheMissingInstrument_IsNamed()
    {
        string text = string.Join('\n', Examples.Text("own-liquor.yaml").Split('\n').Where(line => !line.Contains("B.PV,", StringComparison.Ordinal)));
        CoefficientBasis second = Examples.Bases(Examples.Sound(text).Lines[0])[1];
        Assert.Null(second.RelativeStandard);
        Assert.Contains(second.OneMore, one => one.Instrument == "a vapour pressure of B");
    }

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
