using System.Globalization;

namespace EvapMonitor.Core.Tests.Published;

/// <summary>Comparison with figures as they are printed: the computed value, rounded to the digits printed, must be the figure printed.</summary>
internal static class Printed
{
    /// <summary>Significant digits, as tables of constants print them.</summary>
    public static void SameDigits(double printed, double computed, int digits)
    {
        var format = "E" + (digits - 1).ToString(CultureInfo.InvariantCulture);
        Assert.Equal(printed.ToString(format, CultureInfo.InvariantCulture), computed.ToString(format, CultureInfo.InvariantCulture));
    }

    /// <summary>Decimals, as tables of measurements print them.</summary>
    public static void SameDecimals(double printed, double computed, int decimals)
    {
        var format = "F" + decimals.ToString(CultureInfo.InvariantCulture);
        Assert.Equal(printed.ToString(format, CultureInfo.InvariantCulture), computed.ToString(format, CultureInfo.InvariantCulture));
    }
}
