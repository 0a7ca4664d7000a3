namespace EvapMonitor.Core.Conditioning;

/// <summary>How sound a signal was over a span.</summary>
/// <param name="Signal">Its name.</param>
/// <param name="GoodShare">Share of the time with a sound value, 0 to 1.</param>
/// <param name="Readings">Sound readings.</param>
/// <param name="Rejected">Readings left out, by <see cref="Rejection"/>.</param>
public sealed record SignalSummary(string Signal, double GoodShare, long Readings, IReadOnlyList<long> Rejected)
{
    /// <summary>Sums up conditioned windows.</summary>
    public static SignalSummary Of(ConditionedSignal signal)
    {
        var rejected = new long[signal.Rejected.GetLength(1)];
        for (int window = 0; window < signal.Grid.Count; window++)
        {
            for (int reason = 0; reason < rejected.Length; reason++) rejected[reason] += signal.Rejected[window, reason];
        }

        return new SignalSummary(signal.Instrument.Signal, signal.Grid.Count == 0 ? 0 : signal.GoodShare.Average(share => (double)share), signal.Samples.Sum(count => (long)count), rejected);
    }
}
