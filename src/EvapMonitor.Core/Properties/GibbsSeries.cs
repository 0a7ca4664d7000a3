namespace EvapMonitor.Core.Properties;

/// <summary>The dimensionless Gibbs energy γ(π, τ) of IAPWS-IF97 and the derivatives from which properties follow (R7-97(2012), tables 3 and 12).</summary>
/// <param name="Value">γ.</param>
/// <param name="ByPressure">∂γ/∂π.</param>
/// <param name="ByTemperature">∂γ/∂τ, τ the reciprocal reduced temperature.</param>
/// <param name="ByTemperatureTwice">∂²γ/∂τ².</param>
/// <param name="ByBoth">∂²γ/∂π∂τ.</param>
internal readonly record struct GibbsEnergy(double Value, double ByPressure, double ByTemperature, double ByTemperatureTwice, double ByBoth);

/// <summary>
/// Σ n·aᴵ·bᴶ and its derivatives, term by term from a table: the form in which the release prints its basic equations.
/// Enthalpies, of which a balance needs many, have a faster form of their own in <see cref="Region1"/> and <see cref="Region2"/>; tests hold both to the
/// same figures.
/// </summary>
internal static class GibbsSeries
{
    /// <summary>The sum and its derivatives by a and b. Both must be positive.</summary>
    public static GibbsEnergy Evaluate(double a, double b, ReadOnlySpan<int> powersOfA, ReadOnlySpan<int> powersOfB, ReadOnlySpan<double> coefficients)
    {
        // Highest exponents in tables 2 and 11: 32 for a, -41 and 58 for b.
        Span<double> ofA = stackalloc double[33], ofB = stackalloc double[59], ofReciprocalB = stackalloc double[42];
        Powers(a, ofA);
        Powers(b, ofB);
        Powers(1 / b, ofReciprocalB);
        double value = 0, byA = 0, byB = 0, byBTwice = 0, byBoth = 0;
        for (var k = 0; k < coefficients.Length; k++)
        {
            int i = powersOfA[k], j = powersOfB[k];
            var term = coefficients[k] * ofA[i] * (j < 0 ? ofReciprocalB[-j] : ofB[j]);
            var slope = j * term;
            value += term;
            byA += i * term;
            byB += slope;
            byBTwice += (j - 1) * slope;
            byBoth += i * slope;
        }
        return new GibbsEnergy(value, byA / a, byB / b, byBTwice / (b * b), byBoth / (a * b));
    }

    // By halves, so that the chain of multiplications is six deep, not sixty.
    private static void Powers(double factor, Span<double> powers)
    {
        powers[0] = 1;
        powers[1] = factor;
        for (var k = 2; k < powers.Length; k++)
            powers[k] = powers[k / 2] * powers[k - k / 2];
    }
}
