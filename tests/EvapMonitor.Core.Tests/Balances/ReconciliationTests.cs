using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Tests.Balances;

/// <summary>Lines whose operating point is known from the rating, seen through instruments.</summary>
public class ReconciliationTests
{
    public static TheoryData<string> Cases => [.. TestLines.All.Select(one => one.Name)];

    [Theory]
    [MemberData(nameof(Cases))]
    public void ExactReadings_GiveTheStateThatMadeThem(string name)
    {
        InstrumentedLine line = InstrumentedLine.Of(TestLines.Named(name));
        Assert.True(line.Solve(line.Exact()), $"no balance after {line.Balance.Steps} steps");
        foreach (EffectPoint effect in line.Point.Effects)
        {
            Assert.True(line.IsObservable(VariableKind.Duty, effect.Name), effect.Name);
            Near(line.Point[VariableKind.Duty, effect.Name], line[VariableKind.Duty, effect.Name]);
            Near(effect.HeatingTemperature, line[VariableKind.HeatingTemperature, effect.Name]);
            Near(effect.BoilingTemperature, line[VariableKind.BoilingTemperature, effect.Name]);
        }

        Assert.True(line.Balance.Corrections.SumOfSquares < 1e-9, $"sum of squares {line.Balance.Corrections.SumOfSquares}");
    }

    [Fact]
    public void HeaterWithoutAWordAboutItsSolids_HeatsWhatHasThoseOfTheFeed()
    {
        InstrumentedLine line = InstrumentedLine.Of(TestLines.Named("cascade"), name => name is not ("H1-solids" or "H2-solids"));
        Assert.True(line.Solve(line.Exact()));
        Assert.Equal(0.14, line[VariableKind.HeaterSolids, "H1"], 1e-9);
        Near(line.Point[VariableKind.HeaterDuty, "H1"], line[VariableKind.HeaterDuty, "H1"]);
        Assert.True(line.Balance.Corrections.SumOfSquares < 1e-9, $"sum of squares {line.Balance.Corrections.SumOfSquares}");
    }

    /// <summary>The counts of the method: four effects in forward feed with their pressures known.</summary>
    [Theory]
    [InlineData("feed feed-solids feed-temperature product-solids", 0)]
    [InlineData("feed feed-solids feed-temperature product-solids steam", 1)]
    [InlineData("feed feed-solids feed-temperature product-solids steam product", 2)]
    public void FourEffectsForward_HaveTheRedundancyThatCountingGives(string more, int redundancy)
    {
        string[] has = more.Split(' ');
        InstrumentedLine line = InstrumentedLine.Of(Plain(), name => has.Contains(name) || name.EndsWith("-vapour", StringComparison.Ordinal) || name == "steam-pressure");
        Assert.True(line.Solve(line.Exact()));
        Assert.Equal(redundancy, line.Balance.Corrections.Degrees);
        foreach (EffectPoint effect in line.Point.Effects) Near(line.Point[VariableKind.Duty, effect.Name], line[VariableKind.Duty, effect.Name]);
    }

    [Fact]
    public void WithoutProductSolids_NoDutyIsMadeUp()
    {
        InstrumentedLine line = InstrumentedLine.Of(Plain(), name => name is "feed" or "feed-solids" or "feed-temperature" or "steam-pressure" || name.EndsWith("-vapour", StringComparison.Ordinal));
        Assert.True(line.Solve(line.Exact()));
        Assert.All(line.Point.Effects, effect => Assert.False(line.IsObservable(VariableKind.Duty, effect.Name), effect.Name));
        Assert.All(line.Point.Effects, effect => Assert.True(line.IsObservable(VariableKind.HeatingTemperature, effect.Name), effect.Name));
    }

    /// <summary>Every reading drawn anew many times: the spread of the results is what the linear theory says (JCGM 101 against JCGM 100).</summary>
    [Fact]
    public void Uncertainty_IsThatOfManyDraws()
    {
        InstrumentedLine line = InstrumentedLine.Of(Plain(), name => !name.Contains("-chest", StringComparison.Ordinal) && !name.Contains("-liquor", StringComparison.Ordinal));
        double[] exact = line.Exact(), standard = line.Standards(), read = new double[exact.Length];
        Assert.True(line.Solve(exact));
        Dictionary<string, double> stated = line.Point.Effects.ToDictionary(effect => effect.Name, effect => line.Standard(VariableKind.Duty, effect.Name));
        var noise = new Gaussian(5);
        const int draws = 400;
        var squares = stated.Keys.ToDictionary(name => name, _ => 0.0);
        double checks = 0;
        for (int draw = 0; draw < draws; draw++)
        {
            for (int i = 0; i < read.Length; i++) read[i] = exact[i] + (standard[i] * noise.Next());
            // What nobody measures is off too.
            Assert.True(line.Solve(read, noise));
            checks += line.Balance.Corrections.SumOfSquares;
            foreach (string name in stated.Keys) squares[name] += double.Pow(line[VariableKind.Duty, name] - line.Point[VariableKind.Duty, name], 2);
        }

        // Chi-square has the mean of its degrees of freedom, known by 400 draws to √(2/(400·degrees)), 2.4 % at nine: more than three of those are allowed. The draws
        // know a spread to 1/√(2·400) = 3.5 %: four of those.
        Assert.Equal(1, checks / draws / line.Balance.Corrections.Degrees, 0.08);
        Assert.All(stated, pair => Assert.Equal(1, double.Sqrt(squares[pair.Key] / draws) / pair.Value, 0.14));
    }

    private static TestLines.Case Plain()
    {
        TestLines.Case forward = TestLines.Named("forward");
        return forward with { Graph = new(forward.Graph.Line with { Bleeds = [], Heaters = [], CondensateFlashes = [] }) };
    }

    private static void Near(double expected, double actual) => Assert.Equal(1, actual / expected, 1e-7);
}
