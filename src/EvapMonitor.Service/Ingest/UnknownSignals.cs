using System.Collections.Concurrent;

namespace EvapMonitor.Service.Ingest;

/// <summary>A signal that came in and that the plant does not name.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Count">How many readings came in this run of the program.</param>
/// <param name="LastSeen">When the last one came.</param>
/// <param name="Source">Where the last one came from.</param>
public sealed record SeenSignal(string Name, long Count, DateTimeOffset LastSeen, string Source);

/// <summary>Counts readings of signals that the plant does not name, for at most <see cref="MostNames"/> names; of further names only the number of readings.</summary>
public sealed class UnknownSignals
{
    /// <summary>Most names that are kept apart.</summary>
    public const int MostNames = 10_000;

    private readonly ConcurrentDictionary<string, SeenSignal> _seen = new(StringComparer.Ordinal);
    private int _names;
    private long _others;

    /// <summary>The signals, most frequent first.</summary>
    public IReadOnlyList<SeenSignal> All => [.. _seen.Values.OrderByDescending(signal => signal.Count).ThenBy(signal => signal.Name, StringComparer.Ordinal)];

    /// <summary>Readings of signals beyond the names kept.</summary>
    public long Others => Interlocked.Read(ref _others);

    /// <summary>Counts a reading.</summary>
    public void Count(string name, string source, DateTimeOffset at)
    {
        if (!_seen.ContainsKey(name) && Interlocked.Increment(ref _names) > MostNames)
        {
            Interlocked.Decrement(ref _names);
            Interlocked.Increment(ref _others);
            return;
        }

        _seen.AddOrUpdate(name, _ => new SeenSignal(name, 1, at, source), (_, seen) => new SeenSignal(name, seen.Count + 1, at, source));
    }
}
