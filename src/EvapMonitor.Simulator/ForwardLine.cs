using EvapMonitor.Core.Properties;
using MathNet.Numerics.LinearAlgebra;

namespace EvapMonitor.Simulator;

/// <summary>An effect of a simulated line.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Area">Heating surface, m².</param>
/// <param name="Clean">Coefficient with clean surfaces, W/(m²·K).</param>
/// <param name="Bleed">Vapour drawn off for other users, kg/s.</param>
public sealed record SimulatedEffect(string Name, double Area, double Clean, double Bleed);

/// <summary>What a line is run at.</summary>
/// <param name="SteamPressure">Chest pressure of the first effect, Pa.</param>
/// <param name="LastPressure">Vapour pressure of the last effect, Pa.</param>
/// <param name="FeedSolids">Mass fraction.</param>
/// <param name="FeedTemperature">K.</param>
/// <param name="ProductSolids">Mass fraction; the feed flow is found so that it is reached.</param>
public sealed record OperatingConditions(double SteamPressure, double LastPressure, double FeedSolids, double FeedTemperature, double ProductSolids);

/// <summary>One effect at the operating point, SI units.</summary>
public sealed record EffectPoint(double VapourPressure, double Boiling, double Heating, double Duty, double Vapour, double LiquorOut, double SolidsOut, double Condensate);

/// <summary>A line at its operating point, SI units.</summary>
public sealed record LinePoint(double Steam, double Feed, IReadOnlyList<EffectPoint> Effects);

/// <summary>
/// A forward-feed line with known coefficients, solved for its operating point: mass, solids and heat of every effect, and Q = U·A·(Ts − Tb).
/// Losses and vents are nil, so that the coefficient put in is exactly the one that the readings hold.
/// </summary>
public sealed class ForwardLine(Liquor liquor, IReadOnlyList<SimulatedEffect> effects)
{
    private double[]? _start;

    /// <summary>The effects.</summary>
    public IReadOnlyList<SimulatedEffect> Effects => effects;

    /// <summary>Solves the line for given coefficients, W/(m²·K), by Newton's method.</summary>
    /// <exception cref="InvalidOperationException">There is no operating point near the start.</exception>
    public LinePoint Solve(OperatingConditions conditions, IReadOnlyList<double> coefficients)
    {
        double[] x = _start ?? Start(conditions, coefficients);
        for (int step = 0; step < 60; step++)
        {
            double[] residual = Residuals(x, conditions, coefficients, out LinePoint point);
            if (residual.All(one => double.Abs(one) < 1e-10))
            {
                _start = x;
                return point;
            }

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

    /// <summary>Unknowns: saturation temperature in each vapour space but the last (K), steam flow, feed flow (kg/s).</summary>
    private double[] Start(OperatingConditions conditions, IReadOnlyList<double> coefficients)
    {
        double hot = Steam.SaturationTemperature(conditions.SteamPressure), cold = Steam.SaturationTemperature(conditions.LastPressure);
        double resistances = effects.Select((effect, i) => 1 / (effect.Area * coefficients[i])).Sum();
        var x = new double[effects.Count + 1];
        double at = hot;
        for (int i = 0; i < effects.Count - 1; i++) x[i] = at -= (hot - cold) / (effects[i].Area * coefficients[i]) / resistances;
        double duty = (hot - cold - 5) / resistances;
        x[^2] = duty / 2.25e6;
        x[^1] = effects.Count * x[^2] / (1 - (conditions.FeedSolids / conditions.ProductSolids));
        return x;
    }

    private double[] Residuals(double[] x, OperatingConditions conditions, IReadOnlyList<double> coefficients, out LinePoint point)
    {
        int n = effects.Count;
        var residual = new double[n + 1];
        var points = new EffectPoint[n];
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
            points[i] = new EffectPoint(pressure, boiling, heating, duty, vapour, liquorIn - vapour, solids, heatingFlow);
            solidsIn = solids;
            liquorIn -= vapour;
            enthalpyIn = liquor.Enthalpy(solidsIn, boiling);
            (chest, heatingFlow, heatingEnthalpy) = (pressure, vapour - effects[i].Bleed, vapourEnthalpy);
        }

        residual[n] = (solidsIn / conditions.ProductSolids) - 1;
        point = new LinePoint(x[n - 1], x[n], points);
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
