using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>How a clean coefficient follows its conditions, as far as the hours before an instant show it.</summary>
internal sealed partial class ConditionSlopes
{
    /// <summary>Days within which hours must differ before a slope is believed.</summary>
    public const int FewestDays = 10;

    /// <summary>Hours that must be there before a slope is believed.</summary>
    public const int FewestHours = 100;

    /// <summary>First-stage F under which an instrument is weak (Staiger and Stock 1997).</summary>
    public const double WeakInstrument = 10;

    /// <summary>
    /// What slopes are like before anything is learnt, as a standard deviation about 0: solids (per ln), boiling temperature (per K), flux (per ln). Half of what is
    /// usual at the most, so that the width covers it: a coefficient that falls with the solids, rises by one or two per cent per kelvin, and by flux to a power up to 0.7.
    /// </summary>
    private static readonly double[] Usual = [0.5, 0.01, 0.3];

    /// <summary>A condition that moves less than this within days (standard deviation) teaches nothing.</summary>
    private static readonly double[] LeastMovement = [0.005, 0.1, 0.005];

    private static readonly double[] Lower = [double.NegativeInfinity, 0, 0], Upper = [0, double.PositiveInfinity, 0.7];

    private ConditionSlopes(HourNoise noise, int hours, int days)
    {
        Noise = noise;
        Hours = hours;
        Days = days;
        for (int t = 0; t < SurfaceTable.Terms; t++) Covariance[t, t] = Usual[t] * Usual[t];
    }

    /// <summary>b1, b2, b3.</summary>
    public double[] Slopes { get; } = new double[SurfaceTable.Terms];

    /// <summary>Their covariance; for a slope that was not learnt the square of what is usual.</summary>
    public double[,] Covariance { get; } = new double[SurfaceTable.Terms, SurfaceTable.Terms];

    /// <summary>True for slopes that the hours told, be it that they are 0.</summary>
    public bool[] Learnt { get; } = new bool[SurfaceTable.Terms];

    /// <summary>Why a slope was not learnt, or held at a bound; empty otherwise.</summary>
    public string[] Remarks { get; } = ["", "", ""];

    /// <summary>Lowest conditions of the hours learnt from; NaN without.</summary>
    public double[] Lowest { get; } = [double.NaN, double.NaN, double.NaN];

    /// <summary>Highest conditions.</summary>
    public double[] Highest { get; } = [double.NaN, double.NaN, double.NaN];

    /// <summary>Scatter of hours.</summary>
    public HourNoise Noise { get; private set; }

    /// <summary>Hours learnt from.</summary>
    public int Hours { get; }

    /// <summary>Days learnt from.</summary>
    public int Days { get; }

    /// <summary>True when there were days and hours enough.</summary>
    public bool Enough => Days >= FewestDays && Hours >= FewestHours;

    /// <summary>Before anything is known.</summary>
    public static ConditionSlopes Nothing { get; } = new(HourNoise.Assumed, 0, 0);

    /// <summary>Learns from the hours of one use before a limit.</summary>
    public static ConditionSlopes Learn(SurfaceTable table, SurfaceUse use, int from, int limit, int[] segment, bool[] settled, double[] share)
    {
        bool[] active = Present(table, use, from, limit);
        WithinDays days = WithinDays.Collect(table, use, from, limit, segment, settled, share, active);
        var learnt = new ConditionSlopes(HourNoise.Assumed, days.Rows, days.Days);
        for (int t = 0; t < SurfaceTable.Terms; t++) learnt.Remarks[t] = active[t] ? "" : "not measured";
        if (!learnt.Enough)
        {
            if (days.Estimate([false, false, false], learnt.Slopes) is { } level) learnt.Noise = level.Noise;
            return learnt;
        }

        learnt.Range(table, use, from, limit, settled);
        for (int t = 0; t < SurfaceTable.Terms; t++)
        {
            if (!active[t] || days.Movement(t) >= LeastMovement[t]) continue;
            active[t] = false;
            learnt.Remarks[t] = "hardly moved";
        }

        learnt.Choose(days, active);
        learnt.Noise = NoiseLearning.Of(table, use, from, limit, segment, settled, learnt.Slopes, learnt.Noise);
        return learnt;
    }

    private void Range(SurfaceTable table, SurfaceUse use, int from, int limit, bool[] settled)
    {
        for (int t = 0; t < SurfaceTable.Terms; t++)
        {
            double[] all = new double[limit - from];
            int count = 0;
            for (int i = from; i < limit; i++)
            {
                if (settled[i] && table.Use[i] == use && double.IsFinite(table.Condition[t][i])) all[count++] = table.Condition[t][i];
            }

            if (count == 0) continue;
            // One hour in 200 at either end is no experience.
            Lowest[t] = Middle.Place(all.AsSpan(0, count), count / 200);
            Highest[t] = Middle.Place(all.AsSpan(0, count), count - 1 - (count / 200));
        }
    }

    private static bool[] Present(SurfaceTable table, SurfaceUse use, int from, int limit)
    {
        int all = 0, feed = 0;
        int[] known = new int[SurfaceTable.Terms];
        for (int i = from; i < limit; i++)
        {
            if (table.Use[i] != use) continue;
            all++;
            if (double.IsFinite(table.LogFeed[i])) feed++;
            for (int t = 0; t < SurfaceTable.Terms; t++)
            {
                if (double.IsFinite(table.Condition[t][i])) known[t]++;
            }
        }

        // A term that is missing in many hours would cost the others those hours.
        bool[] present = [.. known.Select(count => count > 0 && count >= 0.8 * all)];
        present[2] &= feed >= 0.8 * all;
        return present;
    }
}
