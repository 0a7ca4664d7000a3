using EvapMonitor.Core.Properties;

namespace EvapMonitor.Core.Tests.Properties;

public class LiquorSlopesTests
{
    public static TheoryData<string> Kinds => [.. Liquors.Kinds, "custom"];

    private static Liquor Of(string kind) => kind == "custom"
        ? CustomLiquor.Create("blend", new SolidsPolynomial([0, 0.0178, 0.000622]), new SolidsPolynomial([4190, -23.5]), null)
        : Liquors.Create(kind);

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Slopes_AreThoseOfTheProperties(string kind)
    {
        Liquor liquor = Of(kind);
        const double dx = 3e-5, dt = 0.02;
        foreach (double x in (double[])[0.03, 0.12, 0.33, 0.52])
        {
            foreach (double t in (double[])[310, 350, 390])
            {
                double bySolids = (liquor.Enthalpy(x + dx, t) - liquor.Enthalpy(x - dx, t)) / (2 * dx), byTemperature = (liquor.Enthalpy(x, t + dt) - liquor.Enthalpy(x, t - dt)) / (2 * dt);
                Assert.Equal(bySolids, liquor.EnthalpyBySolids(x, t), 1e-4 * double.Max(1e5, double.Abs(bySolids)));
                Assert.Equal(byTemperature, liquor.EnthalpyByTemperature(x, t), 1e-5 * byTemperature);
                var slopes = liquor.ElevationSlopes(x, t);
                double elevation(double solids, double temperature) => liquor.BoilingPointElevation(solids, temperature).Value;
                Assert.Equal((elevation(x + dx, t) - elevation(x - dx, t)) / (2 * dx), slopes.BySolids, 1e-4 * (1 + double.Abs(slopes.BySolids)));
                Assert.Equal((elevation(x, t + dt) - elevation(x, t - dt)) / (2 * dt), slopes.ByTemperature, 1e-6);
            }
        }
    }

    [Theory]
    [MemberData(nameof(Kinds))]
    public void Slopes_AtNoSolids_AreFinite(string kind)
    {
        Liquor liquor = Of(kind);
        Assert.True(double.IsFinite(liquor.EnthalpyBySolids(0, 350)));
        var slopes = liquor.ElevationSlopes(0, 350);
        Assert.True(double.IsFinite(slopes.BySolids) && double.IsFinite(slopes.ByTemperature) && double.IsFinite(slopes.StandardBySolids) && double.IsFinite(slopes.StandardByTemperature));
    }
}
