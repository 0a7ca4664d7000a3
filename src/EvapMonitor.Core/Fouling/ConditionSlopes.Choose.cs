using MathNet.Numerics.Distributions;

namespace EvapMonitor.Core.Fouling;

/// <content>Which terms the hours tell of.</content>
internal sealed partial class ConditionSlopes
{
    /// <summary>Takes terms out, one at a time, until all that are left are told by the hours and possible.</summary>
    private void Choose(WithinDays days, bool[] active)
    {
        double critical = StudentT.InvCDF(0, 1, Days - 1, 0.975);
        while (true)
        {
            if (days.Estimate(active, Slopes) is not { } found)
            {
                int last = Array.FindLastIndex(active, one => one);
                if (last < 0) return;
                Leave(active, last, "not told from the other conditions");
                continue;
            }

            int worst = -1;
            double ratio = 1;
            for (int t = 0; t < SurfaceTable.Terms; t++)
            {
                double standard = double.Sqrt(found.Covariance[t, t]);
                if (!active[t] || standard / Usual[t] <= ratio) continue;
                ratio = standard / Usual[t];
                worst = t;
            }

            if (active[2] && found.FirstStage < WeakInstrument) Leave(active, 2, "the feed flow says too little of the flux");
            else if (worst >= 0) Leave(active, worst, "too little movement to tell");
            else if (active[2] && double.Abs(found.Slopes[2]) <= critical * double.Sqrt(found.Covariance[2, 2])) Hold(active, 2, 0, found, "not told from 0");
            else if (Beyond(active, found) is (>= 0, var bound) beyond) Hold(active, beyond.Term, bound, found, "held at its bound");
            else
            {
                Keep(active, found);
                return;
            }
        }
    }

    private static (int Term, double Bound) Beyond(bool[] active, SlopeEstimate found)
    {
        (int Term, double Bound) worst = (-1, 0);
        double most = 0;
        for (int t = 0; t < SurfaceTable.Terms; t++)
        {
            if (!active[t]) continue;
            double bound = double.Clamp(found.Slopes[t], Lower[t], Upper[t]), by = double.Abs(found.Slopes[t] - bound) / double.Sqrt(found.Covariance[t, t]);
            if (!(by > most)) continue;
            most = by;
            worst = (t, bound);
        }

        return worst;
    }

    private void Leave(bool[] active, int term, string why)
    {
        active[term] = false;
        Remarks[term] = why;
    }

    /// <summary>A slope put at a value: its uncertainty is that of the estimate, and the estimate's distance from 0 where 0 was chosen for want of evidence.</summary>
    private void Hold(bool[] active, int term, double value, SlopeEstimate found, string why)
    {
        active[term] = false;
        Remarks[term] = why;
        Learnt[term] = true;
        Slopes[term] = value;
        double distance = value == 0 && double.Clamp(found.Slopes[term], Lower[term], Upper[term]) == found.Slopes[term] ? found.Slopes[term] : 0;
        Covariance[term, term] = found.Covariance[term, term] + (distance * distance);
    }

    private void Keep(bool[] active, SlopeEstimate found)
    {
        Noise = found.Noise;
        for (int i = 0; i < SurfaceTable.Terms; i++)
        {
            if (!active[i]) continue;
            Learnt[i] = true;
            Slopes[i] = found.Slopes[i];
            for (int j = 0; j < SurfaceTable.Terms; j++)
            {
                if (active[j]) Covariance[i, j] = found.Covariance[i, j];
            }
        }
    }
}
