namespace EvapMonitor.Core.Properties;

/// <summary>Linear interpolation in a table, continued by its first and last line.</summary>
internal static class StraightLines
{
    /// <summary>The index of the line, from its left point, on which <paramref name="at"/> is looked up.</summary>
    public static int Line(ReadOnlySpan<double> rising, double at)
    {
        var line = 0;
        while (line < rising.Length - 2 && at > rising[line + 1])
            line++;
        return line;
    }

    /// <summary>The value at a place. Both spans have the same length, at least two.</summary>
    public static double At(ReadOnlySpan<double> rising, ReadOnlySpan<double> values, double at)
    {
        var k = Line(rising, at);
        return values[k] + (values[k + 1] - values[k]) * (at - rising[k]) / (rising[k + 1] - rising[k]);
    }
}
