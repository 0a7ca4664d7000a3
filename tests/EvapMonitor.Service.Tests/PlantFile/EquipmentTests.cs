using EvapMonitor.Core.Plant;
using EvapMonitor.Service.PlantFile;

namespace EvapMonitor.Service.Tests.PlantFile;

public sealed class EquipmentTests
{
    private static string WithSection(string section) => Examples.With("    feed:", $"    {section}\n    feed:");

    [Fact]
    public void MixedSevenEffects_KnowTheirBodiesAndTheSpare()
    {
        Line line = Examples.Sound(Examples.Text("mixed-seven-effects.yaml")).Lines[0];
        Assert.Equal(8, line.Bodies.Count);
        Assert.Equal(["B2", "B8"], line.Effects[1].Bodies);
        Assert.Equal(3800, line.Effects[1].Area);
        Assert.Equal(["N2", "N3"], line.Bodies[7].Serves.Keys);
        Assert.Equal(Comparison.Above, line.Bodies[7].Serves["N3"].Comparison);
        Assert.All(Examples.Bases(line), basis => Assert.NotNull(basis.RelativeStandard));
    }

    [Fact]
    public void ThermalRecompression_HeatsTheFirstEffectByItsName()
    {
        Line line = Examples.Sound(Examples.Text("thermal-recompression.yaml")).Lines[0];
        Recompressor jet = Assert.Single(line.Recompressors);
        Assert.Equal((RecompressorKind.Thermal, "F1"), (jet.Kind, jet.Suction));
        Assert.Equal(1.3, jet.Curve!.At(1.3).Value, 1e-12);
        Assert.Equal(new HeatSource(null, "J1"), Assert.Single(line.Effects[0].Heating));
        Assert.Contains("D.F13", Examples.Bases(line)[0].RestsOn.Select(one => one.Name));
    }

    [Fact]
    public void BleedsAndFlash_AreReadAndReported()
    {
        Site site = Examples.Sound(Examples.Text("bleeds-and-flash.yaml"));
        Line line = site.Lines[0];
        Assert.Equal([new("E2", "E3"), new("E3", "E4"), new CondensateFlash("E4", "E5")], line.CondensateFlashes);
        Assert.Equal(["H1", "H2", "H3"], line.Heaters.Select(h => h.Name));
        Assert.Equal(500, line.Effects[1].Chest.LineLoss, 1e-9);
        IReadOnlyList<string> report = PlantCheck.Report(site);
        Assert.Contains("  H1: bleed of E1 follows from its duty: S.F10, S.TH2, S.TH1", report);
        Assert.Contains("  condensate of E2 flashes into the chest of E3, and what is left goes on with its condensate", report);
        Assert.Contains("  condensate of E4 flashes into the chest of E5", report);
    }

    [Fact]
    public void MechanicalRecompression_HasItsCurveInSi()
    {
        Site site = Examples.Sound(Examples.Text("mechanical-recompression.yaml"));
        Recompressor fan = site.Lines[0].Recompressors[0];
        Assert.Equal(100_000 / 3600.0, fan.Curve!.Points[1].X, 1e-9);
        Assert.Equal(0.78, fan.Curve.IsentropicEfficiency);
        Assert.Equal(0.94, fan.Efficiency.Value, 1e-12);
        Assert.Equal(0.02 / double.Sqrt(3), fan.Efficiency.Standard, 1e-12);
        Assert.Contains("  FAN: mechanical recompressor on vapour of E1; curve given", PlantCheck.Report(site));
        Assert.Contains("  E1: 1500 m2, heated by FAN, liquor from the feed", PlantCheck.Report(site));
    }

    [Fact]
    public void RecompressorWithoutCurve_SaysThatTheLineCannotBeRated()
    {
        string text = WithSection("recompressors: {M1: {kind: mechanical, suction: vapour of E1}}").Replace("heating: steam", "heating: [M1, steam]", StringComparison.Ordinal);
        IReadOnlyList<string> report = PlantCheck.Report(Examples.Sound(text));
        Assert.Contains("  M1: mechanical recompressor on vapour of E1; no curve: the line cannot be rated", report);
    }

    [Fact]
    public void TankBetweenEffects_HidesWhatLeavesIt()
    {
        string text = WithSection("tanks: {T1: {from: E1, hold-up: 120 t, level: {signal: TL, unit: m}}}").Replace("liquor: E1", "liquor: T1", StringComparison.Ordinal);
        Line line = Examples.Sound(text).Lines[0];
        Assert.Equal(new LiquorSource("T1"), line.Effects[1].Liquor[0]);
        Assert.Equal(120_000, line.Tanks[0].HoldUp);
        Assert.Null(Examples.Bases(line)[1].RelativeStandard);
    }

    [Theory]
    [InlineData("heaters: {H1: {liquor: syrup}}", "heaters.H1.liquor", "syrup")]
    [InlineData("heaters: {H1: {liquor: water, solids: 100 %}}", "heaters.H1.solids", "100 %")]
    [InlineData("condensate: {E1: {flash-to: E9}}", "condensate.E1.flash-to", "E9")]
    [InlineData("condensate: {E1: {flash-to: E1}}", "condensate.E1.flash-to", "own chest")]
    [InlineData("condensate: {E1: {flash-to: E2}, E2: {flash-to: E1}}", "condensate", "round in a circle: E1, E2")]
    [InlineData("tanks: {T1: {from: E2, hold-up: 120 m}}", "tanks.T1.hold-up", "120 m")]
    [InlineData("tanks: {E1: {from: E2}}", "tanks.E1", "which an effect has")]
    [InlineData("bodies: {NA: {area: 100 m}}", "bodies.NA.area", "100 m")]
    [InlineData("bodies: {E2: {area: 100 m2}}", "bodies.E2", "which an effect has")]
    [InlineData("recompressors: {M1: {kind: jet, suction: vapour of E1}}", "recompressors.M1.kind", "jet")]
    [InlineData("recompressors: {M1: {kind: thermal, suction: vapour of E1}}", "recompressors.M1", "heats no effect")]
    [InlineData("recompressors: {M1: {kind: thermal, suction: vapour of E1, power: {signal: P, unit: kW}}}", "recompressors.M1.power", "power of a thermal")]
    [InlineData("recompressors: {M1: {kind: mechanical, suction: vapour of E1, efficiency: 0 %}}", "recompressors.M1.efficiency", "0 %")]
    [InlineData("recompressors: {M1: {kind: mechanical, suction: vapour of E1, curve: {entrainment: [[1, 2], [2, 1]]}}}", "recompressors.M1.curve.entrainment", "entrainment")]
    [InlineData("recompressors: {M1: {kind: thermal, suction: vapour of E1, curve: {entrainment: [[1, 2], [2, 3]]}}}", "recompressors.M1.curve.entrainment", "[[1, 2], [2, 3]]")]
    [InlineData("recompressors: {M1: {kind: mechanical, suction: vapour of E1, curve: {pressure-ratio: [[1, 2], [2, 1.5]]}}}", "recompressors.M1.curve.flow-unit", "nothing")]
    public void WrongEquipment_IsAProblemWhereItStands(string section, string path, string found) => Assert.Contains(
        PlantFileReader.Read(WithSection(section)).Problems, p => p.Path == "lines.one." + path && p.Found.Contains(found, StringComparison.Ordinal));

    [Fact]
    public void LiquorRoundThroughATank_IsACircle()
    {
        string text = WithSection("tanks: {T1: {from: E2}}").Replace("liquor: feed", "liquor: [{from: feed}, {from: T1}]", StringComparison.Ordinal);
        Assert.Equal("liquor that goes round in a circle: E1, E2", Examples.OnlyProblem(text).Found);
    }

    [Fact]
    public void TankAndEffectThatBothTakeTheRest_AreRefused()
    {
        PlantFileProblem problem = Examples.OnlyProblem(WithSection("tanks: {T1: {from: E1}}"));
        Assert.Equal("T1 taking all that is left of E1, as E2 does", problem.Found);
    }

    [Fact]
    public void AreaBesideBodies_IsRefused()
    {
        string text = WithSection("bodies: {NA: {area: 100 m2}}").Replace("      liquor: feed", "      bodies: [NA]\n      liquor: feed", StringComparison.Ordinal);
        PlantFileProblem problem = Examples.OnlyProblem(text);
        Assert.Equal("an area beside bodies", problem.Found);
    }

    [Fact]
    public void BodyInTwoEffects_NeedsASignalForEach()
    {
        string text = WithSection("bodies: {NA: {area: 100 m2, serves: {E1: {signal: V, active: \">0.5\"}}}}").ReplaceLineEndings("\n")
            .Replace("liquor: E1\n      area: 610 m2", "liquor: E1\n      bodies: [NA]", StringComparison.Ordinal);
        Assert.Equal("NA, which can serve several effects, without a signal for E2", Examples.OnlyProblem(text).Found);
    }
}
