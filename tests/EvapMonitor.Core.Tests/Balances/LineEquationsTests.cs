using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Outlook;

namespace EvapMonitor.Core.Tests.Balances;

public class LineEquationsTests
{
    public static TheoryData<string> Names => [.. TestLines.All.Select(one => one.Name)];

    [Theory]
    [MemberData(nameof(Names))]
    public void Derivatives_AtRandomStates_AreTheCentralDifferences(string name)
    {
        TestLines.Case line = TestLines.Named(name);
        double[] solution = [.. line.Solved().State];
        const double flow = 50;
        var equations = new LineEquations(line.Graph, TestLines.Juice(), flow, withMachineCurves: true);
        double[] scales = equations.Variables.Scales(flow);
        var random = new Random(4711);
        var rows = new ConstraintRows();
        var up = new ConstraintRows();
        var down = new ConstraintRows();
        for (int trial = 0; trial < 12; trial++)
        {
            double[] x = [.. solution.Select((value, i) => equations.Variables.Keys[i].Kind switch
            {
                VariableKind.BoilingTemperature or VariableKind.HeatingTemperature or VariableKind.FeedTemperature => value + (4 * random.NextDouble()),
                VariableKind.DischargeEnthalpy or VariableKind.MotiveEnthalpy => value * (1 + (0.02 * random.NextDouble())),
                VariableKind.SteamSuperheat or VariableKind.Subcooling or VariableKind.Accumulation or VariableKind.ElevationError => random.NextDouble(),
                _ => value * (0.9 + (0.2 * random.NextDouble())),
            })];
            equations.Evaluate(x, rows);
            var analytic = new double[rows.Count, x.Length];
            for (int row = 0; row < rows.Count; row++)
            {
                for (int e = 0; e < rows.Columns(row).Length; e++) analytic[row, rows.Columns(row)[e]] = rows.Slopes(row)[e];
            }

            for (int k = 0; k < x.Length; k++)
            {
                double kept = x[k], step = 1e-4 * scales[k];
                x[k] = kept + step;
                equations.Evaluate(x, up);
                x[k] = kept - step;
                equations.Evaluate(x, down);
                x[k] = kept;
                for (int row = 0; row < rows.Count; row++)
                {
                    double difference = (up.Residual(row) - down.Residual(row)) / (2 * step), size = rows.Scale(row) / scales[k];
                    Assert.True(
                        double.Abs(difference - analytic[row, k]) < 2e-6 * size + 2e-5 * double.Abs(difference),
                        $"{rows.Key(row)} by {equations.Variables.Keys[k]}: {analytic[row, k]} where the difference is {difference}");
                }
            }
        }
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void Solution_WholeLine_ClosesMassSolidsAndEnergy(string name)
    {
        TestLines.Case line = TestLines.Named(name);
        OperatingPoint point = line.Solved();
        LineBalance balance = LineBalance.Of(line.Graph, TestLines.Juice(), point);
        Assert.True(double.Abs(balance.Mass) < 1e-9 * point.FeedFlow, $"mass {balance.Mass}");
        Assert.True(double.Abs(balance.Solids) < 1e-9 * point.FeedFlow, $"solids {balance.Solids}");
        Assert.True(double.Abs(balance.Energy) < 1e-9 * balance.EnergyIn, $"energy {balance.Energy} of {balance.EnergyIn}");
        Assert.True(balance.EnergyIn > 0);
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void RenamedAndReordered_GivesTheSameFigures(string name)
    {
        TestLines.Case line = TestLines.Named(name);
        (TestLines.Case renamed, Func<string, string> newName) = Renaming.Of(line);
        OperatingPoint one = line.Solved(), other = renamed.Solved();
        Assert.Equal(one.FeedFlow, other.FeedFlow, 1e-8 * one.FeedFlow);
        foreach (EffectPoint effect in one.Effects)
        {
            EffectPoint same = other.Effects.Single(found => found.Name == newName(effect.Name));
            Assert.Equal(effect.Duty, same.Duty, 1e-8 * effect.Duty);
            Assert.Equal(effect.BoilingTemperature, same.BoilingTemperature, 1e-7);
            Assert.Equal(effect.LeavingSolids, same.LeavingSolids, 1e-9);
        }
    }
}
