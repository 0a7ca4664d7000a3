using EvapMonitor.Core.Coefficients;

namespace EvapMonitor.Core.Fouling;

public sealed partial record CleanReference
{
    /// <summary>What a clean surface would do at some conditions.</summary>
    /// <param name="at">The conditions. Outside the learnt range they are held at its border, and the width grows with the distance.</param>
    /// <returns>Natural logarithm of the coefficient in W/(m²·K), its standard uncertainty, and whether a condition was held; NaN when there is no expectation.</returns>
    public (double LogCoefficient, double Standard, bool Clamped) Expect(SurfaceConditions at)
    {
        if (Basis == ReferenceBasis.None) return (double.NaN, double.NaN, false);
        double log = Level;
        double[] distance = new double[SurfaceTable.Terms], beyond = new double[SurfaceTable.Terms];
        bool clamped = false;
        double variance = LevelUncertainty * LevelUncertainty;
        for (int t = 0; t < SurfaceTable.Terms; t++)
        {
            if (double.IsNaN(At[t])) continue;
            if (double.IsNaN(at[t]))
            {
                // Not known now: it is taken as it was, and may be anywhere in the range.
                double width = (Highest[t] - Lowest[t]) / 4;
                if (!Learnt[t] || !(width > 0)) continue;
                variance += width * width * ((Slopes[t] * Slopes[t]) + SlopeCovariance[4 * t]);
                clamped = true;
                continue;
            }

            double held = Held(at[t], t);
            distance[t] = held - At[t];
            beyond[t] = at[t] - held;
            log += Slopes[t] * distance[t];
            clamped |= IsOutside(at[t], t);
        }

        return (log, double.Sqrt(variance + Variance(distance, beyond)), clamped);
    }

    /// <summary>Holds a coefficient against the expectation.</summary>
    /// <param name="coefficient">Apparent coefficient, W/(m²·K).</param>
    /// <param name="at">The conditions under which it was found.</param>
    public CleanComparisonResult Compare(Measured coefficient, SurfaceConditions at)
    {
        (double log, double standard, bool clamped) = Expect(at);
        if (!double.IsFinite(log) || !(coefficient.Value > 0)) return CleanComparisonResult.Absent;
        double u = coefficient.Value, clean = double.Exp(log), random = double.Max(double.IsFinite(coefficient.Random) ? coefficient.Random / u : 0, HourScatter);
        double resistance = (1 / u) - (1 / clean), whole = resistance + double.Exp(-Level);
        double own = random / u, conditions = double.Sqrt(double.Max((standard * standard) - (LevelUncertainty * LevelUncertainty), 0)) / clean;
        return new CleanComparisonResult(
            new Measured(clean, 0, clean * standard),
            new Measured(u / clean, 0, u / clean * double.Sqrt((random * random) + (standard * standard))),
            new Measured(resistance, 0, double.Sqrt((own * own) + (standard / clean * (standard / clean)))),
            whole > 0 ? new Measured(1 / whole, 0, double.Sqrt((own * own) + (conditions * conditions)) / (whole * whole)) : Measured.Absent,
            clamped);
    }

    /// <summary>Variance of what the slopes say of a step from one set of conditions to another.</summary>
    internal double StepVariance(SurfaceConditions from, SurfaceConditions to)
    {
        double[] distance = new double[SurfaceTable.Terms], beyond = new double[SurfaceTable.Terms];
        for (int t = 0; t < SurfaceTable.Terms; t++)
        {
            if (double.IsNaN(from[t]) || double.IsNaN(to[t])) continue;
            double start = Held(from[t], t), end = Held(to[t], t);
            distance[t] = end - start;
            beyond[t] = to[t] - end - (from[t] - start);
        }

        return Variance(distance, beyond);
    }

    /// <summary>A condition, held at the border of the learnt range where there is a slope for it.</summary>
    internal double Held(double value, int term) =>
        Learnt[term] && Lowest[term] <= Highest[term] ? double.Clamp(value, Lowest[term], Highest[term]) : value;

    private bool IsOutside(double value, int term) => value < Lowest[term] || value > Highest[term];

    private double Variance(double[] distance, double[] beyond)
    {
        double sum = 0;
        for (int i = 0; i < SurfaceTable.Terms; i++)
        {
            for (int j = 0; j < SurfaceTable.Terms; j++) sum += distance[i] * distance[j] * SlopeCovariance[(SurfaceTable.Terms * i) + j];
            sum += beyond[i] * beyond[i] * ((Slopes[i] * Slopes[i]) + SlopeCovariance[4 * i]);
        }

        return double.Max(sum, 0);
    }
}

/// <summary>A coefficient held against a clean expectation; uncertainties as with <see cref="CleanHour"/>.</summary>
/// <param name="CleanCoefficient">What a clean surface would do, W/(m²·K).</param>
/// <param name="Cleanliness">U/U_clean.</param>
/// <param name="Resistance">1/U − 1/U_clean, m²·K/W; never clipped.</param>
/// <param name="AtReference">Coefficient with this resistance at the reference conditions, W/(m²·K).</param>
/// <param name="Clamped">True when a condition was outside the learnt range.</param>
public readonly record struct CleanComparisonResult(Measured CleanCoefficient, Measured Cleanliness, Measured Resistance, Measured AtReference, bool Clamped)
{
    /// <summary>Without an expectation.</summary>
    public static CleanComparisonResult Absent { get; } = new(Measured.Absent, Measured.Absent, Measured.Absent, Measured.Absent, false);
}
