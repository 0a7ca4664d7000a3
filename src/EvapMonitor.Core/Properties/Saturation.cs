using System.Runtime.CompilerServices;

namespace EvapMonitor.Core.Properties;

/// <summary>
/// The saturation line, IAPWS-IF97 region 4: R7-97(2012), section 8, equations 29 to 31, coefficients of table 34.
/// Arguments are taken as they come; <see cref="Steam"/> guards the range.
/// </summary>
internal static class Saturation
{
    private const double N1 = 0.11670521452767e4;
    private const double N2 = -0.72421316703206e6;
    private const double N3 = -0.17073846940092e2;
    private const double N4 = 0.12020824702470e5;
    private const double N5 = -0.32325550322333e7;
    private const double N6 = 0.14915108613530e2;
    private const double N7 = -0.48232657361591e4;
    private const double N8 = 0.40511340542057e6;
    private const double N9 = -0.23855557567849;
    private const double N10 = 0.65017534844798e3;

    /// <summary>Saturation temperature, K, of a pressure in Pa: equation 31.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static double Temperature(double pressure)
    {
        var betaSquared = double.Sqrt(pressure * 1e-6);
        var beta = double.Sqrt(betaSquared);
        var e = betaSquared + double.MultiplyAddEstimate(N3, beta, N6);
        var f = double.MultiplyAddEstimate(N1, betaSquared, double.MultiplyAddEstimate(N4, beta, N7));
        var g = double.MultiplyAddEstimate(N2, betaSquared, double.MultiplyAddEstimate(N5, beta, N8));
        var d = -2 * g / (f + double.Sqrt(double.MultiplyAddEstimate(f, f, -4 * e * g)));
        // (n10 + D)² - 4 (n9 + n10 D) of the release, multiplied out
        var apart = d - N10;
        return 0.5 * (N10 + d - double.Sqrt(double.MultiplyAddEstimate(apart, apart, -4 * N9)));
    }

    /// <summary>Saturation pressure, Pa, of a temperature in K: equation 30.</summary>
    public static double Pressure(double temperature)
    {
        var theta = temperature + N9 / (temperature - N10);
        var a = double.MultiplyAddEstimate(theta + N1, theta, N2);
        var b = double.MultiplyAddEstimate(double.MultiplyAddEstimate(N3, theta, N4), theta, N5);
        var c = double.MultiplyAddEstimate(double.MultiplyAddEstimate(N6, theta, N7), theta, N8);
        var beta = 2 * c / (double.Sqrt(double.MultiplyAddEstimate(b, b, -4 * a * c)) - b);
        var betaSquared = beta * beta;
        return betaSquared * betaSquared * 1e6;
    }

    /// <summary>Slope of the saturation temperature, K/Pa, at a pressure in Pa: equation 29 differentiated.</summary>
    public static double TemperatureSlope(double pressure)
    {
        var beta = double.Sqrt(double.Sqrt(pressure * 1e-6));
        var temperature = Temperature(pressure);
        var theta = temperature + N9 / (temperature - N10);
        var byBeta = 2 * beta * (theta * (theta + N1) + N2) + theta * (N3 * theta + N4) + N5;
        var byTheta = beta * (beta * (2 * theta + N1) + 2 * N3 * theta + N4) + 2 * N6 * theta + N7;
        var thetaByTemperature = 1 - N9 / ((temperature - N10) * (temperature - N10));
        return -byBeta / byTheta / thetaByTemperature * beta / (4 * pressure);
    }
}
