namespace EvapMonitor.Core.Readings;

/// <summary>The middle of some numbers, found without sorting all of them.</summary>
internal static class Middle
{
    /// <summary>The median; NaN of nothing. Reorders the span.</summary>
    public static double Of(Span<double> values)
    {
        if (values.Length == 0) return double.NaN;
        int half = values.Length / 2;
        double upper = Place(values, half);
        if (values.Length % 2 == 1) return upper;
        double lower = double.NegativeInfinity;
        foreach (double one in values[..half]) lower = double.Max(lower, one);
        return (lower + upper) / 2;
    }

    /// <summary>The number with so many below it in order (Hoare 1961); what stands before it is not larger, what stands after not smaller.</summary>
    public static double Place(Span<double> values, int rank)
    {
        int from = 0, to = values.Length - 1;
        while (from < to)
        {
            double pivot = OfThree(values[from], values[from + ((to - from) / 2)], values[to]);
            int i = from, j = to;
            while (i <= j)
            {
                while (values[i] < pivot) i++;
                while (values[j] > pivot) j--;
                if (i > j) break;
                (values[i], values[j]) = (values[j], values[i]);
                i++;
                j--;
            }

            if (rank <= j) to = j;
            else if (rank >= i) from = i;
            else break;
        }

        return values[rank];
    }

    private static double OfThree(double a, double b, double c) => double.Max(double.Min(a, b), double.Min(double.Max(a, b), c));
}
