using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Ingest;

/// <summary>
/// Decides at arrival which readings are kept: those of signals that any plant revision names, not more than <see cref="AheadLimit"/> ahead of this machine's clock and
/// not before the plant's history. The others are counted at their source. Later the arrival is no longer known, so this cannot wait.
/// </summary>
public sealed class Admission(PlantHolder plant, UnknownSignals unknown, TimeProvider clock)
{
    /// <summary>How far ahead of the clock a reading may be.</summary>
    public static readonly TimeSpan AheadLimit = TimeSpan.FromMinutes(10);

    /// <summary>The readings that are kept.</summary>
    /// <param name="source">Where they come from; counts the others.</param>
    /// <param name="readings">The readings.</param>
    /// <param name="outOfTime">How many are too far ahead or too old.</param>
    /// <param name="unnamed">How many are of signals that the plant does not name.</param>
    public IReadOnlyList<IncomingReading> Admit(SourceState source, IReadOnlyList<IncomingReading> readings, out int outOfTime, out int unnamed)
    {
        ArgumentNullException.ThrowIfNull(source);
        ArgumentNullException.ThrowIfNull(readings);
        (outOfTime, unnamed) = (0, 0);
        PlantTimeline named = plant.Timeline;
        DateTimeOffset arrival = clock.GetUtcNow();
        long latest = (arrival + AheadLimit).ToUnixTimeMilliseconds(), earliest = named.HistoryFrom.ToUnixTimeMilliseconds();
        List<IncomingReading>? kept = null;
        for (int i = 0; i < readings.Count; i++)
        {
            IncomingReading one = readings[i];
            bool isNamed = named.Signals.ContainsKey(one.Signal), inTime = one.Reading.At <= latest && one.Reading.At >= earliest;
            if (isNamed && inTime)
            {
                kept?.Add(one);
                continue;
            }

            // Most batches are kept whole: a list of their own is made only when something is left out.
            kept ??= [.. readings.Take(i)];
            if (!isNamed)
            {
                unnamed++;
                source.CountUnknown();
                unknown.Count(one.Signal, source.Name, arrival);
            }
            else
            {
                outOfTime++;
                source.CountOutOfTime(arrival, one.Signal, Invariant(
                    $"its time {Instant.FromMilliseconds(one.Reading.At):yyyy-MM-ddTHH:mm:ss.fffZ} is {(one.Reading.At > latest ? "more than 10 min ahead of this machine's clock" : "before the plant's history-from")}"));
            }
        }

        return kept ?? readings;
    }
}
