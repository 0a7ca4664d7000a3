using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Tests.Balances;

namespace EvapMonitor.Core.Tests.Fouling;

public class TwoStagesTests
{
    [Fact]
    public void OneRegressorAndOneInstrument_IsTheRatioOfProducts()
    {
        // With one of each the estimate is Σzy/Σzx (Wald's and Durbin's form). By hand: Σzy = −2·−5 + −1·1 + 0·0 + 1·1 + 2·4 = 18, Σzx = 2·3 + 1·1 + 0 + 1·2 + 2·3 = 15.
        double[] z = [-2, -1, 0, 1, 2], x = [-3, -1, -1, 2, 3], y = [-5, 1, 0, 1, 4];
        TwoStages found = TwoStages.Solve([x], y, z)!;
        Assert.Equal(18.0 / 15, found.Slopes[0], 12);
        // Residuals with x itself: y − 1.2 x.
        Assert.Equal([-1.4, 2.2, 1.2, -1.4, 0.4], found.Residuals.Select(one => double.Round(one, 12)));
        // Each row a cluster: x̂ = 1.5 z, Σx̂² = 22.5; of each row 1 − z²/10 is left: scores 4.2/0.6, −3.3/0.9, 0, −2.1/0.9, 1.2/0.6.
        double squares = 49 + (121 / 9.0) + (49 / 9.0) + 4;
        Assert.Equal(0.8 * squares / (22.5 * 22.5), found.Covariance([0, 1, 2, 3, 4], 5)[0][0], 12);
        // First stage: slope 1.5, residuals 0, 0.5, −1, 0.5, 0; scores −0.5/0.9 and 0.5/0.9 over Σz² = 10.
        Assert.Equal(1.5 * 1.5 / (0.8 * 0.5 / 0.81 / 100), found.FirstStage([0, 1, 2, 3, 4], 5), 9);
    }

    [Fact]
    public void AnotherRegressor_IsItsOwnInstrument()
    {
        // Exactly identified: b solves Zᵀ(y − X b) = 0 with Z = [w, z], X = [w, x]: two equations, solved by Cramer's rule.
        var noise = new Gaussian(3);
        double[] w = new double[50], z = new double[50], x = new double[50], y = new double[50];
        for (int i = 0; i < 50; i++)
        {
            (w[i], z[i]) = (noise.Next(), noise.Next());
            double shared = noise.Next();
            x[i] = z[i] + (0.3 * w[i]) + shared;
            y[i] = (0.5 * w[i]) + (0.2 * x[i]) + shared + (0.1 * noise.Next());
        }

        double Dot(double[] a, double[] b) => a.Zip(b, (one, other) => one * other).Sum();
        double determinant = (Dot(w, w) * Dot(z, x)) - (Dot(w, x) * Dot(z, w));
        double first = ((Dot(w, y) * Dot(z, x)) - (Dot(w, x) * Dot(z, y))) / determinant, second = ((Dot(w, w) * Dot(z, y)) - (Dot(z, w) * Dot(w, y))) / determinant;
        TwoStages found = TwoStages.Solve([w, x], y, z)!;
        Assert.Equal(first, found.Slopes[0], 10);
        Assert.Equal(second, found.Slopes[1], 10);
        // Least squares would take the shared noise for a slope.
        Assert.True(TwoStages.Solve([w, x], y, null)!.Slopes[1] > 0.5);
    }
}
