using EvapMonitor.Core.Plant;
using EvapMonitor.Service.PlantFile;

namespace EvapMonitor.Service.Tests.PlantFile;

public sealed class PlantFileReaderTests
{
    [Fact]
    public void DocumentedExamples_AreSound()
    {
        Assert.Equal(7, Examples.Files.Count);
        foreach (string file in Examples.Files) Examples.Sound(File.ReadAllText(file));
    }

    [Fact]
    public void ForwardExample_GivesEveryMember()
    {
        Site site = Examples.Sound(Examples.Text("forward-four-effects.yaml"));
        Assert.Equal(("Tarnholt", "Europe/Copenhagen", TimeSpan.FromMinutes(5)), (site.Name, site.TimeZone, site.Window));
        // Midnight in Copenhagen in winter is 23:00 UTC of the day before.
        Assert.Equal(new DateTimeOffset(2024, 12, 31, 23, 0, 0, TimeSpan.Zero), site.HistoryFrom);
        Assert.Equal("SITE.PT-ATM", site.Atmosphere.Measured!.Signal);

        Line line = Assert.Single(site.Lines);
        Assert.Equal("west", line.Name);
        Assert.Equal([0, 1], line.Liquor.ByValue.Keys.Order());
        Assert.Equal(("juice", "water"), (line.Liquor.ByValue[1].Name, line.Liquor.ByValue[0].Name));
        Assert.Equal(40_000 / 3600.0, line.ProducingAboveFeedFlow!.Value, 1e-9);
        Assert.Equal(0, line.Feed.Flow!.Range!.Value.Low);
        Assert.Equal(250_000 / 3600.0, line.Feed.Flow.Range.Value.High, 1e-9);
        Assert.Equal(new Accuracy(0.01, 0, AccuracyMeaning.HalfWidth), line.Feed.Flow.Accuracy);
        Assert.Equal(0.001, line.Product.Laboratory!.Accuracy.Absolute, 1e-12);
        Assert.Equal((AccuracyMeaning.NinetyFivePercent, TimeSpan.FromHours(8)), (line.Product.Laboratory.Accuracy.Meaning, line.Product.LaboratoryValidFor));
        Assert.Equal((SteamGaugePlace.Chest, PressureReference.Gauge), (line.Steam.PressureAt, line.Steam.Pressure!.Unit.Reference));

        Assert.Equal(["W1", "W2", "W3", "W4"], line.Effects.Select(e => e.Name));
        Effect first = line.Effects[0];
        Assert.Equal(HeatSource.Steam, Assert.Single(first.Heating));
        Assert.Equal(LiquorSource.Feed, Assert.Single(first.Liquor));
        Assert.Equal((1450, 2900), (first.Area, first.CleanCoefficient));
        Assert.Equal(0.01 / double.Sqrt(3), first.HeatLoss.Standard, 1e-12);
        Assert.True(first.Leaving.TemperatureSeesFlashedLiquor);
        Assert.Equal((1700, 600), (first.DueWhen!.CoefficientBelow, first.DueWhen.HoursSinceCleaning));
        Assert.Equal(0.7, first.DueWhen.CleanlinessBelow!.Value, 1e-12);
        Assert.Equal(new HeatSource("W1"), Assert.Single(line.Effects[1].Heating));
        Assert.Equal(new LiquorSource("W1"), Assert.Single(line.Effects[1].Liquor));
        Assert.Equal(PressureReference.Vacuum, line.Effects[3].Vapour.Pressure!.Unit.Reference);
        Assert.True(line.Effects[3].Level!.Accuracy.Assumed);
        Assert.Equal(0.125, line.Effects[3].Level!.Accuracy.Absolute, 1e-12);

        Assert.Equal([("W1", "juice-heater"), ("W2", "pans")], line.Bleeds.Select(b => (b.From, b.To)));
        CleaningGroup group = Assert.Single(line.CleaningGroups);
        Assert.Equal(("circuit", TimeSpan.FromHours(9), 4200), (group.Name, group.Duration, group.Cost));
        Assert.True(group.Signal!.IsActive(1));
        Assert.False(group.Signal.IsActive(0.5));
        Assert.Equal(120_000 / 3600.0, line.RequiredEvaporation!.Value, 1e-9);
        Assert.Equal(("EUR", CampaignObjective.PerTime), (line.Money!.Currency, line.Money.Objective));
        Assert.Equal(0.031, line.Money.Steam!.Value, 1e-12);

        Assert.Equal(1, site.CleaningRules!.AtOnce);
        AllowedHours hours = Assert.Single(site.CleaningRules.Allowed);
        Assert.Equal([DayOfWeek.Monday, DayOfWeek.Tuesday, DayOfWeek.Wednesday, DayOfWeek.Thursday, DayOfWeek.Friday], hours.Days);
        Assert.Equal((TimeSpan.FromHours(6), TimeSpan.FromHours(22)), (hours.From, hours.To));
        Assert.Equal([new("west", "W1"), new EffectOfLine("west", "W2")], Assert.Single(site.CleaningRules.NotTogether));
    }

    [Fact]
    public void SplitFeedExample_KeepsShares()
    {
        Line line = Examples.Sound(Examples.Text("own-liquor.yaml")).Lines[0];
        LiquorSource split = Assert.Single(line.Effects[0].Liquor);
        Assert.Equal(0.6, split.Share!.Value, 1e-12);
        Assert.Equal(0.05 / double.Sqrt(3), split.Share.Standard, 1e-12);
        Assert.Equal([LiquorSource.Feed, new("A")], line.Effects[1].Liquor);
        Assert.Equal(new UncertainShare(0, 0), line.Effects[1].HeatLoss);
        Instrument condensate = line.Effects[0].Chest.CondensateFlow!;
        Assert.Equal((TimeSpan.FromMinutes(10), Interpolation.Linear), (condensate.StaleAfter, condensate.Interpolation));
        Assert.Equal(100, line.Effects[0].Vapour.Pressure!.Resolution, 1e-9);
    }

    [Fact]
    public void MinimalFile_TakesDefaults()
    {
        Site site = Examples.Sound(Examples.Small);
        Line line = site.Lines[0];
        Assert.Equal((TimeSpan.FromMinutes(5), (TimeSpan?)null), (site.Window, line.SettlingTime));
        Assert.Equal("water", line.Liquor.Always!.Name);
        Assert.Equal(101_300, site.Atmosphere.Fixed!.Value, 1e-9);
        Assert.Null(site.CleaningRules);
        Assert.Equal(new UncertainShare(0.005, 0.005 / double.Sqrt(3)), line.Effects[0].Vent);
    }

    [Fact]
    public void BlockStyleAsProgramsWriteIt_IsSoundAndComplete()
    {
        Site site = Examples.Sound(Examples.Own("block-style.yaml"));
        Line line = Assert.Single(site.Lines);
        Assert.Equal(new DateTimeOffset(2026, 1, 1, 0, 0, 0, TimeSpan.Zero), site.HistoryFrom);
        Assert.Equal("mixture", line.Liquor.Always!.Name);
        Assert.All(Examples.Bases(line), basis => Assert.NotNull(basis.RelativeStandard));
        Assert.Equal(new UncertainShare(0, 0), line.Effects[0].HeatLoss);
        Assert.Equal((0.01, 0.005), (line.Effects[1].HeatLoss.Value, line.Effects[1].Vent.Value));
        Assert.Equal("heater", Assert.Single(line.Bleeds).To);
        Assert.Equal(["B1", "B2"], Assert.Single(line.CleaningGroups).Effects);
    }

    [Fact]
    public void BlockStyleWithQuotes_ReadsAsFlowStyle()
    {
        string text = Examples.With("""{signal: X, unit: "%", accuracy: 0.3 abs}""", "\n        signal: 'X'\n        unit: '%'\n        accuracy: \"0.3 abs\"");
        Assert.Equal(0.003, Examples.Sound(text.Replace("\n", "\r\n", StringComparison.Ordinal)).Lines[0].Feed.Solids!.Accuracy.Absolute, 1e-12);
    }

    [Fact]
    public void ElevenMistakes_AreAllToldWithTheirPlaces()
    {
        const string Text = """
            site: Lyngdal
            time-zone: Europe/Oslow
            atmosphere: 1013
            window: 7 min
            history-from: yesterday
            lines:
              one:
                liquor: syrup
                feeed: {}
                feed:
                  flow: {signal: F, unit: degC, accuracy: 1 %}
                  temperature: {signal: T, unit: degC, accuracy: 1 %}
                effects:
                - name: E1
                  heating: steam
                  liquor: feed
                  area: 1450 bars
                - name: E2
                  heating: vapour of E7
                  liquor: E1
                  area: 10 m2
                  area: 12 m2
            """;
        PlantFileResult result = PlantFileReader.Read(Text);
        Assert.Null(result.Site);
        Assert.Equal(
            [
                "plant.yaml:2:12 time-zone: found \"Europe/Oslow\"; allowed: an IANA time zone such as Europe/Copenhagen or UTC; perhaps Europe/Oslo",
                "plant.yaml:3:13 atmosphere: found \"1013\" (without a unit); allowed: a pressure such as 1008 mbar (bar, bar(a), bar(g), mbar, kPa, Pa, MPa, psi, psi(g), mmHg, mmHg vacuum), from 500 to 1100 mbar, or an instrument {signal: …, unit: mbar}",
                "plant.yaml:4:9 window: found \"7 min\"; allowed: a time such as 20 min (s, min, h, d), from 1 to 60 min, dividing an hour",
                "plant.yaml:5:15 history-from: found \"yesterday\"; allowed: a date such as 2025-01-01 (midnight at the site) or an instant such as 2025-01-01T06:00:00Z, from 1970 to 2199",
                "plant.yaml:8:13 lines.one.liquor: found \"syrup\"; allowed: the name of a liquor: water or {signal: N.PRODUCT, values: {1: juice, 0: water}}",
                "plant.yaml:9:5 lines.one.feeed: found the unknown key \"feeed\"; allowed: feed (of formerly, liquor, settling-time, suspect-after, producing-when, feed, product, steam, effects, bleeds, heaters, condensate, tanks, bodies, recompressors, cleaning-groups, required-evaporation, money)",
                "plant.yaml:11:31 lines.one.feed.flow.unit: found \"degC\" (degC is the unit of a temperature); allowed: a unit of a mass flow such as 30 t/h (t/h, kg/h, kg/s, t/d, lb/h) or of a volume flow such as 30 m3/h (m3/h, m³/h, l/min, l/s)",
                "plant.yaml:12:54 lines.one.feed.temperature.accuracy: found \"1 %\", a share of a temperature whose zero is arbitrary; allowed: an accuracy in degC such as 0.3 abs, or 1 % of range",
                "plant.yaml:17:13 lines.one.effects[0].area: found \"1450 bars\" (unknown unit \"bars\"); allowed: an area such as 1450 m2 (m2, m², ft2), more than 0",
                "plant.yaml:19:16 lines.one.effects[1].heating: found \"vapour of E7\"; allowed: vapour of E1, vapour of E2",
                "plant.yaml:22:7 lines.one.effects[1].area: found the key \"area\" a second time; allowed: each key once (the first is in line 21)",
            ],
            result.Problems.Select(p => p.ToLine("plant.yaml")));
    }
}
