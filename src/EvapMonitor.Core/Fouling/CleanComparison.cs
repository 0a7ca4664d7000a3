using EvapMonitor.Core.Coefficients;

namespace EvapMonitor.Core.Fouling;

/// <summary>What the coefficient would be with clean surfaces, and where that figure comes from.</summary>
/// <param name="Coefficient">W/(m²·K).</param>
/// <param name="Source">In plain words, such as "design value".</param>
public sealed record CleanExpectation(double Coefficient, string Source)
{
    /// <summary>The design value of an effect; null when its plant file gives none.</summary>
    public static CleanExpectation? Design(Plant.Effect effect) =>
        effect.CleanCoefficient is { } clean ? new CleanExpectation(clean, "design value") : null;
}

/// <summary>Compares a coefficient with the clean one.</summary>
public static class CleanComparison
{
    /// <summary>Cleanliness U/U_clean. It carries the uncertainty of U alone: that of the clean value is stated with the clean value.</summary>
    public static Measured Cleanliness(Measured coefficient, CleanExpectation? clean) =>
        clean is null || !coefficient.IsPresent
            ? Measured.Absent
            : new Measured(coefficient.Value / clean.Coefficient, coefficient.Systematic / clean.Coefficient, coefficient.Random / clean.Coefficient);

    /// <summary>Fouling resistance 1/U − 1/U_clean, m²·K/W. May be negative; it is never clipped.</summary>
    public static Measured Resistance(Measured coefficient, CleanExpectation? clean)
    {
        if (clean is null || !coefficient.IsPresent) return Measured.Absent;
        double slope = 1 / (coefficient.Value * coefficient.Value);
        return new Measured((1 / coefficient.Value) - (1 / clean.Coefficient), coefficient.Systematic * slope, coefficient.Random * slope);
    }

    /// <summary>The resistance at which the first of the coefficient and cleanliness limits is reached, m²·K/W; null without such a limit or clean value.</summary>
    public static double? LimitResistance(Plant.DueLimits? limits, CleanExpectation? clean)
    {
        if (limits is null || clean is null) return null;
        double floor = double.Max(limits.CoefficientBelow ?? 0, (limits.CleanlinessBelow ?? 0) * clean.Coefficient);
        return floor > 0 ? (1 / floor) - (1 / clean.Coefficient) : null;
    }
}
