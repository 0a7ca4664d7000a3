using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Wording;

namespace EvapMonitor.Service.Api;

/// <summary>The corrections of a signal as a series for a chart, thinned so that the extremes and the gaps stay.</summary>
internal static class CorrectionSeries
{
    public static CorrectionsWire Of(string signal, Line line, IReadOnlyList<WantedCorrection> all, DateTimeOffset from, int points, TimeSpan window, long version)
    {
        var units = new BalanceUnits(line);
        long step = (long)window.TotalMilliseconds;
        List<WantedCorrection> kept = Thin(WithGaps(all, step), points);
        long zero = kept.Count > 0 ? kept[0].At : from.ToUnixTimeMilliseconds();
        return new CorrectionsWire(
            signal, line.Name, units.Difference(signal, 0)?.Unit ?? "", (int)(step / 1000), DateTimeOffset.FromUnixTimeMilliseconds(zero),
            [.. kept.Select(one => (one.At - zero) / 1000)],
            [.. kept.Select(one => double.IsFinite(one.Wanted) ? units.Difference(signal, one.Wanted)?.Value : null)],
            [.. kept.Select(one => double.IsFinite(one.InStandards) ? one.InStandards : (double?)null)],
            [.. kept.Select(one => one.LeftOut ? "left out" : one.Checked || double.IsNaN(one.InStandards) ? "" : "not checked")], version);
    }

    /// <summary>Where windows are missing altogether, one absent point breaks the line.</summary>
    private static List<WantedCorrection> WithGaps(IReadOnlyList<WantedCorrection> all, long step)
    {
        var result = new List<WantedCorrection>(all.Count);
        foreach (WantedCorrection one in all)
        {
            if (result.Count > 0 && one.At - result[^1].At > step) result.Add(new WantedCorrection(result[^1].At + step, double.NaN, double.NaN, false, false));
            result.Add(one);
        }

        return result;
    }

    private static List<WantedCorrection> Thin(List<WantedCorrection> all, int wanted)
    {
        if (all.Count <= wanted) return all;
        int stretches = int.Max(1, wanted / 3);
        var result = new List<WantedCorrection>(wanted + 3);
        for (int stretch = 0; stretch < stretches; stretch++)
        {
            int first = (int)((long)all.Count * stretch / stretches), end = (int)((long)all.Count * (stretch + 1) / stretches);
            int low = -1, high = -1, gap = -1;
            for (int i = first; i < end; i++)
            {
                if (double.IsNaN(all[i].Wanted))
                {
                    gap = gap < 0 ? i : gap;
                    continue;
                }

                if (low < 0 || all[i].Wanted < all[low].Wanted) low = i;
                if (high < 0 || all[i].Wanted > all[high].Wanted) high = i;
            }

            foreach (int i in new[] { low, high, gap }.Where(i => i >= 0).Distinct().Order()) result.Add(all[i]);
        }

        return result;
    }
}
