using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Coefficients;

/// <summary>What the other instruments wanted to add to the readings of each over one hour of steady production.</summary>
/// <param name="Hour">Start of the hour, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="Signals">The signals.</param>
/// <param name="Count">By signal: windows that entered.</param>
/// <param name="Difference">By signal: their mean in its SI unit; NaN without any.</param>
public sealed record CorrectionHour(long Hour, IReadOnlyList<string> Signals, IReadOnlyList<int> Count, IReadOnlyList<double> Difference)
{
    /// <summary>Sums up the windows of a line by the hour: steady ones in production, and of them the readings that something checks.</summary>
    /// <param name="windows">Windows in ascending order; whole hours.</param>
    public static IEnumerable<CorrectionHour> Summarise(IEnumerable<LineWindow> windows)
    {
        foreach (IGrouping<long, LineWindow> hour in windows.Where(window => window.State == RunningState.Producing && window.Steady != false && window.Balance is not null)
            .GroupBy(window => window.At - Milliseconds.Modulo(window.At, Milliseconds.Hour)))
        {
            // Signals stand in the order in which they first appear, so that the same windows give the same hour.
            var sums = new OrderedDictionary<string, (int Count, double Sum)>();
            foreach (BalanceWindow balance in hour.Select(window => window.Balance!))
            {
                for (int place = 0; place < balance.Layout.Signals.Count; place++)
                {
                    if (Of(balance, place) is not { } difference) continue;
                    (int count, double sum) = sums.GetValueOrDefault(balance.Layout.Signals[place]);
                    sums[balance.Layout.Signals[place]] = (count + 1, sum + difference);
                }
            }

            if (sums.Count > 0) yield return new CorrectionHour(hour.Key, [.. sums.Keys], [.. sums.Values.Select(one => one.Count)], [.. sums.Values.Select(one => one.Sum / one.Count)]);
        }
    }

    /// <summary>What the others alone would add to a reading: one that counts pulls the balance towards itself, which is taken out. Null when nothing checks it.</summary>
    public static double? Of(BalanceWindow balance, int place)
    {
        double wanted = balance.Wanted[place], correction = balance.Correction[place], test = balance.Test[place];
        if (!double.IsFinite(wanted)) return null;
        if (balance.LeftOut.Contains(place)) return wanted;
        if (!double.IsFinite(test)) return null;
        return correction == 0 ? 0 : wanted * (test / correction) * (test / correction);
    }
}
