using EvapMonitor.Core.Properties;
using MathNet.Numerics.LinearAlgebra;

namespace EvapMonitor.Core.Tests.Outlook;

/// <summary>An effect of a forward line.</summary>
internal sealed record ForwardEffect(double Area, double Bleed);

/// <summary>What a forward line is run at, SI units.</summary>
internal sealed record ForwardConditions(double SteamPressure, double LastPressure, double FeedSolids, double FeedTemperature, double ProductSolids);

/// <summary>One effect at the operating point, SI units.</summary>
internal sealed record ForwardEffectPoint(double VapourPressure, double Boiling, double Heating, double Duty, double Vapour, double LiquorOut, double SolidsOut, double Condensate);

/// <summary>A forward line at its operating point, SI units.</summary>
internal sealed record ForwardPoint(double Steam, double Feed, IReadOnlyList<ForwardEffectPoint> Effects);

/// <summary>
/// A second way to the operating point of a forward-feed line, from effect to effect along the steam with only the vapour temperatures, steam and feed unknown.
/// It shares no code with the line equations. Losses and vents are nil.
/// </summary>
internal sealed class SequentialForwardLine(Liquor liquor, IReadOnlyList<ForwardEffect> effects)
{
    /// <summary>Solves the line for given coefficients, W/(m²·K), by Newton's method.</summary>
    /// <param name="conditions">What the line is run at.</param>
    /// <param name="coefficients">Of each effect.</param>
    /// <param name="start">Unknowns near the solution: saturation temperature in each vapour space but the last (K), steam flow, feed flow (kg/s).</param>
    /// <exception cref="InvalidOperationException">There is no operating point near the start.</exception>
    public ForwardPoint Solve(ForwardConditions conditions, IReadOnlyList<double> coefficients, double[] start)
    {
        double[] x = start;
        for (int step = 0; step < 60; step++)
        {
            double[] residual = Residuals(x, conditions, coefficients, out ForwardPoint point);
            if (residual.All(one => double.Abs(one) < 1e-10)) return point;

            var jacobian = Matrix<double>.Build.Dense(x.Length, x.Length);
            for (int k = 0; k < x.Length; k++)
            {
                double[] moved = [.. x];
                double size = 1e-6 * double.Max(1, double.Abs(x[k]));
                moved[k] += size;
                double[] changed = Residuals(moved, conditions, coefficients, out _);
                for (int i = 0; i < x.Length; i++) jacobian[i, k] = (changed[i] - residual[i]) / size;
            }

            Vector<double> correction = jacobian.Solve(Vector<double>.Build.Dense(residual));
            double scale = double.Min(1, 0.5 / correction.Zip(Vector<double>.Build.Dense(x), (c, v) => double.Abs(c / v)).Max());
            x = [.. x.Select((value, i) => value - (scale * correction[i]))];
        }

        throw new InvalidOperationException("No operating point was found: the conditions do not fit the line.");
    }

    private double[] Residuals(double[] x, ForwardConditions conditions, IReadOnlyList<double> coefficients, out ForwardPoint point)
    {
        int n = effects.Count;
        var residual = new double[n + 1];
        var points = new ForwardEffectPoint[n];
        double chest = conditions.SteamPressure, heatingFlow = x[n - 1], heatingEnthalpy = Steam.SaturatedVapourEnthalpy(chest);
        double liquorIn = x[n], solidsIn = conditions.FeedSolids, enthalpyIn = liquor.Enthalpy(solidsIn, conditions.FeedTemperature);
        for (int i = 0; i < n; i++)
        {
            double pressure = i == n - 1 ? conditions.LastPressure : Steam.SaturationPressure(x[i]);
            double saturation = i == n - 1 ? Steam.SaturationTemperature(pressure) : x[i];
            double heating = Steam.SaturationTemperature(chest);
            double duty = heatingFlow * (heatingEnthalpy - Steam.SaturatedLiquidEnthalpy(chest));
            (double vapour, double boiling, double solids, double vapourEnthalpy) = Boil(liquorIn, solidsIn, enthalpyIn, duty, pressure, saturation);
            residual[i] = (duty / (coefficients[i] * effects[i].Area * (heating - boiling))) - 1;
            points[i] = new ForwardEffectPoint(pressure, boiling, heating, duty, vapour, liquorIn - vapour, solids, heatingFlow);
            solidsIn = solids;
            liquorIn -= vapour;
            enthalpyIn = liquor.Enthalpy(solidsIn, boiling);
            (chest, heatingFlow, heatingEnthalpy) = (pressure, vapour - effects[i].Bleed, vapourEnthalpy);
        }

        residual[n] = (solidsIn / conditions.ProductSolids) - 1;
        point = new ForwardPoint(x[n - 1], x[n], points);
        return residual;
    }

    /// <summary>The vapour that a duty makes: solids out and elevation depend on it, so it is found by repetition.</summary>
    private (double Vapour, double Boiling, double Solids, double VapourEnthalpy) Boil(
        double flow, double solids, double enthalpy, double duty, double pressure, double saturation)
    {
        double vapour = duty / 2.3e6;
        for (int step = 0; ; step++)
        {
            double leaving = double.Min(0.95, flow * solids / double.Max(flow - vapour, 0.05 * flow));
            double boiling = saturation + liquor.BoilingPointElevation(leaving, saturation).Value;
            double vapourEnthalpy = Steam.VapourEnthalpy(pressure, boiling), liquorEnthalpy = liquor.Enthalpy(leaving, boiling);
            double next = (duty + (flow * (enthalpy - liquorEnthalpy))) / (vapourEnthalpy - liquorEnthalpy);
            if (double.Abs(next - vapour) < 1e-13 * flow || step == 100) return (next, boiling, leaving, vapourEnthalpy);
            vapour = next;
        }
    }
}
