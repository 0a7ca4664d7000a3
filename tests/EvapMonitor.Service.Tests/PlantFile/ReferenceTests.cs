using EvapMonitor.Core.Plant;
using EvapMonitor.Service.PlantFile;

namespace EvapMonitor.Service.Tests.PlantFile;

public sealed class ReferenceTests
{
    private const string Heater2 = "heating: vapour of E1";
    private const string Liquor2 = "liquor: E1";

    [Theory]
    [InlineData(Heater2, "heating: vapour of E9", "effects[1].heating")]
    [InlineData(Heater2, "heating: vapour of", "effects[1].heating")]
    [InlineData(Heater2, "heating: [steam, steam]", "effects[1].heating[1]")]
    [InlineData(Heater2, "heating: []", "effects[1].heating")]
    [InlineData(Heater2, "heating: {}", "effects[1].heating")]
    [InlineData(Heater2, "heating: vapour of E2", "effects[1].heating")]
    [InlineData("heating: steam", "heating: vapour of E2", "effects[0].heating")]
    [InlineData(Liquor2, "liquor: E9", "effects[1].liquor")]
    [InlineData(Liquor2, "liquor: E2", "effects[1].liquor")]
    [InlineData("liquor: feed", "liquor: E2", "effects[0].liquor")]
    [InlineData("liquor: feed", "liquor: [{from: feed}, {from: E2}]", "effects[0].liquor")]
    [InlineData(Liquor2, "liquor: feed", "effects[1].liquor")]
    [InlineData(Liquor2, "liquor: [{from: E1, share: 60 %}, {from: E1}]", "effects[1].liquor[1]")]
    [InlineData("liquor: feed", "liquor: {from: feed, share: 60 %}", "effects[0].liquor")]
    [InlineData(Liquor2, "liquor: {from: E1, share: 120 %}", "effects[1].liquor.share")]
    [InlineData("name: E2", "name: E1", "effects[1].name")]
    [InlineData("name: E2", "name: feed", "effects[1].name")]
    [InlineData("area: 610 m2\n    - name: E2", "area: 610 m2\n      formerly: E2\n    - name: E2", "effects[0].formerly")]
    [InlineData("area: 610 m2\n    - name", "area: 0 m2\n    - name", "effects[0].area")]
    [InlineData("area: 610 m2\n    - name", "area: 610 kg\n    - name", "effects[0].area")]
    [InlineData("area: 610 m2\n    - name", "area: 610 m2\n      due-when: {}\n    - name", "effects[0].due-when")]
    [InlineData("unit: t/h, ", "unit: t/h, range: [5, 5], ", "feed.flow.range")]
    [InlineData("unit: t/h, ", "unit: t/h, range: [5], ", "feed.flow.range")]
    [InlineData("unit: t/h, ", "unit: t/h, stale-after: 7 h, ", "feed.flow.stale-after")]
    [InlineData("unit: t/h, ", "unit: t/h, frozen-after: 7 h, ", "feed.flow.frozen-after")]
    [InlineData("unit: t/h, ", "unit: t/h, frozen-after: 30, ", "feed.flow.frozen-after")]
    [InlineData("unit: t/h, ", "unit: t/h, resolution: -1, ", "feed.flow.resolution")]
    [InlineData("unit: t/h, ", "unit: t/h, interpolation: cubic, ", "feed.flow.interpolation")]
    [InlineData("unit: t/h, ", "unit: , ", "feed.flow.unit")]
    [InlineData("signal: F, ", "", "feed.flow.signal")]
    [InlineData("solids: {signal: X", "solids: {signal: F", "feed.solids.signal")]
    [InlineData("solids: {", "laboratory: {valid-for: 25 h, ", "feed.laboratory.valid-for")]
    [InlineData("    feed:", "    settling-time: 7 h\n    feed:", "settling-time")]
    [InlineData("    feed:", "    producing-when: {feed-flow-above: 30 m3/h}\n    feed:", "producing-when.feed-flow-above")]
    [InlineData("    feed:", "    bleeds: [{from: E9, to: pans}]\n    feed:", "bleeds[0].from")]
    [InlineData("    feed:", "    bleeds: [{from: E1, to: E2}]\n    feed:", "bleeds[0].to")]
    [InlineData("    feed:", "    bleeds: [{from: E1, to: pans}, {from: E1, to: pans}]\n    feed:", "bleeds[1]")]
    [InlineData("    feed:", "    cleaning-groups: {all: {effects: [E1, E9]}}\n    feed:", "cleaning-groups.all.effects[1]")]
    [InlineData("    feed:", "    cleaning-groups: {all: {effects: [E1], signal: {signal: S, active: yes}}}\n    feed:", "cleaning-groups.all.signal.active")]
    [InlineData("    feed:", "    money: {currency: EUR, steam: 31 EUR/t}\n    feed:", "money.steam")]
    [InlineData("    feed:", "    money: {currency: euro}\n    feed:", "money.currency")]
    [InlineData("    feed:", "    steam: {pressure: {signal: P, unit: bar, at: roof}}\n    feed:", "steam.pressure.at")]
    [InlineData("liquor: water", "liquor: {signal: P, values: {one: water}}", "liquor.values.one")]
    [InlineData("liquor: water", "liquor: {signal: P, values: {1: syrup}}", "liquor.values.1")]
    [InlineData("liquor: water", "liquor: {signal: P}", "liquor.values")]
    [InlineData("    liquor: water\n", "", "liquor")]
    public void WrongReferenceOrValueInALine_IsOneProblemAtItsPlace(string old, string changed, string path) =>
        Assert.Equal("lines.one." + path, Examples.OnlyProblem(Examples.With(old, changed)).Path);

    [Theory]
    [InlineData("site: Lyngdal", "site: ''", "site")]
    [InlineData("time-zone: UTC", "time-zone: Middle/Earth", "time-zone")]
    [InlineData("time-zone: UTC\n", "", "time-zone")]
    [InlineData("atmosphere: 1013 mbar", "atmosphere: 1013 degC", "atmosphere")]
    [InlineData("atmosphere: 1013 mbar", "atmosphere: 1013 bar", "atmosphere")]
    [InlineData("atmosphere: 1013 mbar", "atmosphere: 1.013 bar(g)", "atmosphere")]
    [InlineData("atmosphere: 1013 mbar", "atmosphere: {signal: A, unit: mbar(g)}", "atmosphere")]
    [InlineData("atmosphere: 1013 mbar", "window: 61 min", "window")]
    [InlineData("atmosphere: 1013 mbar", "window: 30 s", "window")]
    [InlineData("atmosphere: 1013 mbar", "window: 5", "window")]
    [InlineData("history-from: 2026-01-01", "history-from: 2026-02-30", "history-from")]
    [InlineData("history-from: 2026-01-01", "history-from: 2026-01-01T00:00:00", "history-from")]
    [InlineData("history-from: 2026-01-01", "history-from: 0001-01-01T00:00:00Z", "history-from")]
    [InlineData("  one:", "  line one:", "lines.line one")]
    [InlineData("lines:", "liquors: {syrup: {kind: honey}}\nlines:", "liquors.syrup.kind")]
    [InlineData("lines:", "liquors: {syrup: {kind: milk, purity: 91 %}}\nlines:", "liquors.syrup.purity")]
    [InlineData("lines:", "liquors: {syrup: {kind: sucrose, purity: 191 %}}\nlines:", "liquors.syrup.purity")]
    [InlineData("lines:", "liquors: {water: {kind: milk}}\nlines:", "liquors.water")]
    [InlineData("lines:", "cleaning-rules: {at-once: 0}\nlines:", "cleaning-rules.at-once")]
    [InlineData("lines:", "cleaning-rules: {at-once: 1.5}\nlines:", "cleaning-rules.at-once")]
    [InlineData("lines:", "cleaning-rules: {allowed: weekdays}\nlines:", "cleaning-rules.allowed")]
    [InlineData("lines:", "cleaning-rules: {allowed: 'Mon-Fri 06:00-25:00'}\nlines:", "cleaning-rules.allowed")]
    [InlineData("lines:", "cleaning-rules: {not-together: [[E1]]}\nlines:", "cleaning-rules.not-together[0]")]
    [InlineData("lines:", "cleaning-rules: {not-together: [[E1, E9]]}\nlines:", "cleaning-rules.not-together[0][1]")]
    public void WrongValueInTheSite_IsOneProblemAtItsPlace(string old, string changed, string path) =>
        Assert.Equal(path, Examples.OnlyProblem(Examples.With(old, changed)).Path);

    [Theory]
    [InlineData("unit: t/h", "unit: T/H", "perhaps t/h")]
    [InlineData("unit: t/h", "unit: t/hh", "perhaps t/h")]
    [InlineData("unit: \"%\"", "unit: C", "(unknown unit \"C\")")]
    [InlineData("unit: \"%\"", "unit: bar", "(bar is the unit of a pressure)")]
    [InlineData("area: 610 m2", "area: 610", "(without a unit)")]
    [InlineData("area: 610 m2", "area: 1,450 m2", "\"1,450 m2\"")]
    public void WrongUnit_SaysWhatItIsOrMayHaveMeant(string old, string changed, string found) =>
        Assert.Contains(found, PlantFileReader.Read(Examples.With(old, changed)).Problems[0].Found, StringComparison.Ordinal);

    [Fact]
    public void GaugeWithoutAtmosphere_AsksForIt()
    {
        string text = Examples.With("atmosphere: 1013 mbar\n", "").Replace("    feed:", "    steam: {pressure: {signal: P, unit: barg, at: chest}}\n    feed:", StringComparison.Ordinal);
        PlantFileProblem problem = Examples.OnlyProblem(text);
        Assert.Equal("atmosphere", problem.Path);
        Assert.Contains("P in line 7 reads against the atmosphere", problem.Allowed, StringComparison.Ordinal);
    }

    [Fact]
    public void SameSignalAtTwoPlacesInOneUnit_IsAllowed()
    {
        Site site = Examples.Sound(Examples.With("    effects:", "    product:\n      solids: {signal: X, unit: °Bx, accuracy: 0.3 abs}\n    effects:"));
        Assert.Equal("X", site.Lines[0].Product.Solids!.Signal);
    }

    [Fact]
    public void EffectOfTheSameNameInTwoLines_IsNamedWithItsLineInRules()
    {
        string second = Examples.Small[(Examples.Small.IndexOf("  one:", StringComparison.Ordinal))..].Replace("  one:", "  two:", StringComparison.Ordinal);
        string text = Examples.Small + "\n" + second + "\ncleaning-rules: {not-together: [[one.E1, two.E1]]}\n";
        Assert.Equal([new("one", "E1"), new EffectOfLine("two", "E1")], Examples.Sound(text).CleaningRules!.NotTogether[0]);
        Assert.Contains("which is in several lines", Examples.OnlyProblem(text.Replace("[[one.E1", "[[E1", StringComparison.Ordinal)).Found, StringComparison.Ordinal);
    }

    [Fact]
    public void BackwardFeed_HasNoCircle()
    {
        Line line = Examples.Sound(Examples.Text("backward-three-effects.yaml")).Lines[0];
        Assert.Equal(["E2", "E3", null], line.Effects.Select(e => e.Liquor[0].From));
    }

    [Fact]
    public void CircleOfHeating_NamesItsEffects()
    {
        PlantFileProblem problem = Examples.OnlyProblem(Examples.With("heating: steam", "heating: vapour of E2"));
        Assert.Equal("heating that goes round in a circle: E1, E2", problem.Found);
    }
}
