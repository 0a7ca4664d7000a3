using EvapMonitor.Core.Balances;

namespace EvapMonitor.Core.Tests.Published;

/// <summary>
/// Ten steam and water flows of a power plant with three balances, inputs as in VDI 2048 part 1 (half-widths of 95 %, value ± 1.96 σ), without their
/// correlations. Expected figures: the closed form v = −V Aᵀ(A V Aᵀ)⁻¹A x, computed apart from this code.
/// </summary>
public class SteamFlowBalanceTests
{
    private static readonly (double Value, double HalfWidth)[] Flows =
    [
        (46.241, 0.800), (45.668, 0.790), (44.575, 0.535), (44.319, 0.532), (0.525, 0.105), (69.978, 0.854), (10.364, 0.168), (3.744, 0.058), (4.391, 0.058), (18.498, 0.205),
    ];

    private static readonly double[][] Balances = [[1, 1, -1, -1, 0.4, 0, 0, 0, 0, 0], [0, 0, 1, 1, -1, -1, -1, -1, -1, 0], [0, 0, 0, 0, 0, 0, 1, 1, 1, -1]];

    [Fact]
    public void Corrections_TestsAndSum_AreThoseOfTheClosedForm()
    {
        Redundancy found = Solve();
        Assert.Equal(3, found.Degrees);
        Assert.Equal(24.48, found.SumOfSquares, 0.005);
        double[] reconciled = [.. Flows.Select((flow, i) => flow.Value + (flow.HalfWidth / 1.96 * found.Correction(i)))];
        double[] expected = [44.960, 44.418, 44.924, 44.664, 0.525, 70.549, 10.376, 3.745, 4.392, 18.513];
        for (int i = 0; i < expected.Length; i++) Assert.Equal(expected[i], reconciled[i], 0.0006);
        double[] tests = [.. Flows.Select((_, i) => double.Abs(found.Correction(i)) / found.Spread(i))];
        Assert.Equal(4.945, tests[0], 0.0006);
        Assert.Equal(4.945, tests[1], 0.0006);
        Assert.Equal(2.443, tests[2], 0.0006);
        Assert.Equal(2.443, tests[3], 0.0006);
        Assert.Equal(1.646, tests[5], 0.0006);
    }

    [Fact]
    public void FlowsThatEnterTheBalancesAlike_CannotBeToldApart()
    {
        Redundancy found = Solve();
        Assert.Equal(1, found.Correlation(0, 1), 1e-9);
        Assert.Equal(1, found.Correlation(2, 3), 1e-9);
        Assert.True(double.Abs(found.Correlation(0, 2)) < 0.99);
    }

    private static Redundancy Solve()
    {
        var system = new Elimination(0, Flows.Length);
        system.Clear(Balances.Length, []);
        for (int row = 0; row < Balances.Length; row++)
        {
            for (int i = 0; i < Flows.Length; i++)
            {
                system.Row(row)[i] = Balances[row][i] * Flows[i].HalfWidth / 1.96;
                system.Row(row)[system.Right] -= Balances[row][i] * Flows[i].Value;
            }
        }

        var redundancy = new Redundancy(system, 0, Flows.Length);
        redundancy.Project([]);
        redundancy.Weigh();
        return redundancy;
    }
}
