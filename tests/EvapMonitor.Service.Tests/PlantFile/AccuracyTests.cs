using EvapMonitor.Core.Plant;
using EvapMonitor.Service.PlantFile;

namespace EvapMonitor.Service.Tests.PlantFile;

public sealed class AccuracyTests
{
    private const string Flow = "flow: {signal: F, unit: t/h, accuracy: 1 %}";

    [Theory]
    [InlineData("1 %", 0.01, 0, AccuracyMeaning.HalfWidth)]
    [InlineData("1%", 0.01, 0, AccuracyMeaning.HalfWidth)]
    [InlineData("0.5 % of reading", 0.005, 0, AccuracyMeaning.HalfWidth)]
    [InlineData("1 % of range", 0, 2, AccuracyMeaning.HalfWidth)]
    [InlineData("1 % of range 95 %", 0, 2, AccuracyMeaning.NinetyFivePercent)]
    [InlineData("0.36 abs", 0, 0.36, AccuracyMeaning.HalfWidth)]
    [InlineData("0.36 abs 95 %", 0, 0.36, AccuracyMeaning.NinetyFivePercent)]
    [InlineData("0.36 abs 95%", 0, 0.36, AccuracyMeaning.NinetyFivePercent)]
    [InlineData("0.36 abs standard", 0, 0.36, AccuracyMeaning.Standard)]
    [InlineData("1 % standard", 0.01, 0, AccuracyMeaning.Standard)]
    [InlineData("0 abs", 0, 0, AccuracyMeaning.HalfWidth)]
    public void Form_GivesAccuracyInUnit(string stated, double ofReading, double absolute, AccuracyMeaning meaning)
    {
        string text = Examples.With(Flow, $"flow: {{signal: F, unit: kg/s, accuracy: {stated}, range: [50, 250]}}");
        Accuracy accuracy = Examples.Sound(text).Lines[0].Feed.Flow!.Accuracy;
        Assert.Equal(ofReading, accuracy.OfReading, 1e-12);
        Assert.Equal(absolute, accuracy.Absolute, 1e-12);
        Assert.Equal((meaning, false), (accuracy.Meaning, accuracy.Assumed));
    }

    [Theory]
    [InlineData("1")]
    [InlineData("1 percent")]
    [InlineData("0.5 t/h")]
    [InlineData("-1 %")]
    [InlineData("120 %")]
    [InlineData("1 % 99 %")]
    [InlineData("'1,5 %'")]
    [InlineData("1 % of range")]
    [InlineData("abs")]
    [InlineData("")]
    public void OtherForm_IsAProblem(string stated)
    {
        PlantFileProblem problem = Examples.OnlyProblem(Examples.With(Flow, $"flow: {{signal: F, unit: t/h, accuracy: {stated}}}"));
        Assert.Equal((9, "lines.one.feed.flow.accuracy"), (problem.Line, problem.Path));
    }

    [Theory]
    [InlineData("degC")]
    [InlineData("K")]
    public void ShareOfATemperature_IsAProblem(string unit)
    {
        PlantFileProblem problem = Examples.OnlyProblem(Examples.With(Flow, $"temperature: {{signal: T, unit: {unit}, accuracy: 1 %}}"));
        Assert.Contains("share of a temperature", problem.Found, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("flow", "t/h", 0.02, 0)]
    [InlineData("flow", "m3/h", 0.02, 0)]
    [InlineData("temperature", "degF", 0, 0.5)]
    [InlineData("laboratory", "g/kg", 0, 0.005)]
    public void AbsentAccuracy_IsAssumedMarkedAndNoted(string place, string unit, double ofReading, double absolute)
    {
        string text = Examples.With(Flow, $"{place}: {{signal: S, unit: {unit}}}");
        LiquorStream feed = Examples.Sound(text).Lines[0].Feed;
        Instrument instrument = feed.Flow ?? feed.Temperature ?? feed.Laboratory!;
        Assert.Equal(new Accuracy(ofReading, absolute, AccuracyMeaning.HalfWidth, Assumed: true), instrument.Accuracy);
        PlantFileNote note = Assert.Single(PlantFileReader.Read(text).Notes);
        Assert.Equal((9, $"lines.one.feed.{place}"), (note.Line, note.Path));
        Assert.Contains("is assumed", note.Text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("bar", 0.01, 0)]
    [InlineData("bar(g)", 0.01, 500)]
    [InlineData("mmHg vacuum", 0.01, 500)]
    public void AbsentAccuracyOfPressure_AddsZeroErrorWhereReadingMayBeZero(string unit, double ofReading, double absolute)
    {
        string text = Examples.With("      area: 610 m2\n    - name", $"      area: 610 m2\n      vapour: {{pressure: {{signal: P, unit: {unit}}}}}\n    - name");
        Accuracy accuracy = Examples.Sound(text).Lines[0].Effects[0].Vapour.Pressure!.Accuracy;
        Assert.Equal((ofReading, absolute, true), (accuracy.OfReading, accuracy.Absolute, accuracy.Assumed));
    }

    [Theory]
    [InlineData("0 abs")]
    [InlineData("0 %")]
    public void AccuracyOfZero_IsTakenButNoted(string stated)
    {
        string text = Examples.With(Flow, $"flow: {{signal: F, unit: t/h, accuracy: {stated}}}");
        Assert.Equal(0, Examples.Sound(text).Lines[0].Feed.Flow!.Accuracy.Standard(100));
        Assert.Contains("without any error", Assert.Single(PlantFileReader.Read(text).Notes).Text, StringComparison.Ordinal);
    }

    [Fact]
    public void ShareOnSolidsInPercent_IsNotedAsShareOfReading()
    {
        string text = Examples.With("accuracy: 0.3 abs", "accuracy: 0.3 %");
        Assert.Equal(0.003, Examples.Sound(text).Lines[0].Feed.Solids!.Accuracy.OfReading, 1e-12);
        Assert.Contains("share of the reading", Assert.Single(PlantFileReader.Read(text).Notes).Text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("1 % ± 1 %", 0.01, 0.01)]
    [InlineData("1 % +- 1 %", 0.01, 0.01)]
    [InlineData("1 % +/- 0.5 %", 0.01, 0.005)]
    [InlineData("1%±1%", 0.01, 0.01)]
    [InlineData("0 %", 0, 0)]
    [InlineData("10 g/kg ± 1 g/kg", 0.01, 0.001)]
    public void UncertainShare_IsHalfWidthOverRootThree(string stated, double value, double half)
    {
        UncertainShare loss = Examples.Sound(Examples.With("liquor: feed", $"liquor: feed\n      heat-loss: {stated}")).Lines[0].Effects[0].HeatLoss;
        Assert.Equal(value, loss.Value, 1e-12);
        Assert.Equal(half / double.Sqrt(3), loss.Standard, 1e-12);
    }

    [Theory]
    [InlineData("1")]
    [InlineData("-1 %")]
    [InlineData("101 %")]
    [InlineData("1 % ± -1 %")]
    [InlineData("1 % ± 1 % ± 1 %")]
    [InlineData("1 ± 1 %")]
    [InlineData("1 % ±")]
    public void OtherShare_IsAProblem(string stated) =>
        Assert.Equal("lines.one.effects[0].vent", Examples.OnlyProblem(Examples.With("liquor: feed", $"liquor: feed\n      vent: {stated}")).Path);
}
