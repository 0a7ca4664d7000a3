using System.Collections.Concurrent;

namespace EvapMonitor.Service.Ingest;

/// <summary>A message or reading that was not used, kept as an example.</summary>
/// <param name="At">When it came.</param>
/// <param name="Where">Topic or signal.</param>
/// <param name="Reason">Why it was not used.</param>
public sealed record SourceSample(DateTimeOffset At, string Where, string Reason);

/// <summary>What is known of a source of readings in this run of the program. Counts only grow.</summary>
/// <param name="name">Its name.</param>
/// <param name="kind">mqtt, broker or http.</param>
/// <param name="address">Where it is; holds no secret.</param>
public sealed class SourceState(string name, string kind, string address)
{
    private const int MostSamples = 20;
    private readonly ConcurrentQueue<SourceSample> _samples = new();
    private long _accepted, _malformed, _outOfTime, _unknown, _instantUnknown, _shed, _refused, _reconnects;
    private long _lastMessage = long.MinValue, _connectedSince = long.MinValue;
    private volatile string? _lastError;

    /// <summary>Its name.</summary>
    public string Name { get; } = name;

    /// <summary>mqtt, broker or http.</summary>
    public string Kind { get; } = kind;

    /// <summary>Where it is.</summary>
    public string Address { get; } = address;

    /// <summary>Since when it is connected; null while it is not.</summary>
    public DateTimeOffset? ConnectedSince => Time(ref _connectedSince);

    /// <summary>When the last message came.</summary>
    public DateTimeOffset? LastMessage => Time(ref _lastMessage);

    /// <summary>Readings that are durable.</summary>
    public long Accepted => Interlocked.Read(ref _accepted);

    /// <summary>Messages that could not be read.</summary>
    public long Malformed => Interlocked.Read(ref _malformed);

    /// <summary>Readings too far ahead of the clock or before the plant's history.</summary>
    public long OutOfTime => Interlocked.Read(ref _outOfTime);

    /// <summary>Readings of signals that the plant does not name.</summary>
    public long Unknown => Interlocked.Read(ref _unknown);

    /// <summary>Retained messages without a time: when their value was true is not known.</summary>
    public long InstantUnknown => Interlocked.Read(ref _instantUnknown);

    /// <summary>Messages without a promise (QoS 0) that were dropped because the intake was full.</summary>
    public long Shed => Interlocked.Read(ref _shed);

    /// <summary>Times that the source was told to come again later.</summary>
    public long Refused => Interlocked.Read(ref _refused);

    /// <summary>Connections made after the first.</summary>
    public long Reconnects => Interlocked.Read(ref _reconnects);

    /// <summary>The last thing that went wrong with the connection; null when nothing did.</summary>
    public string? LastError => _lastError;

    /// <summary>The last messages and readings that were not used, oldest first.</summary>
    public IReadOnlyList<SourceSample> Samples => [.. _samples];

    internal void Connected(DateTimeOffset at, bool again)
    {
        Interlocked.Exchange(ref _connectedSince, at.UtcTicks);
        if (again) Interlocked.Increment(ref _reconnects);
    }

    internal void Disconnected(string? error)
    {
        Interlocked.Exchange(ref _connectedSince, long.MinValue);
        if (error is not null) _lastError = error;
    }

    internal void MessageCame(DateTimeOffset at) => Interlocked.Exchange(ref _lastMessage, at.UtcTicks);

    internal void CountAccepted(int readings) => Interlocked.Add(ref _accepted, readings);

    internal void CountUnknown() => Interlocked.Increment(ref _unknown);

    internal void CountShed() => Interlocked.Increment(ref _shed);

    internal void CountRefused() => Interlocked.Increment(ref _refused);

    internal void CountMalformed(DateTimeOffset at, string where, string reason) => Sample(ref _malformed, at, where, reason);

    internal void CountOutOfTime(DateTimeOffset at, string where, string reason) => Sample(ref _outOfTime, at, where, reason);

    internal void CountInstantUnknown(DateTimeOffset at, string where) =>
        Sample(ref _instantUnknown, at, where, "a retained message without a time: when its value was true is not known");

    private static DateTimeOffset? Time(ref long ticks) => Interlocked.Read(ref ticks) is > long.MinValue and var at ? new DateTimeOffset(at, TimeSpan.Zero) : null;

    private void Sample(ref long count, DateTimeOffset at, string where, string reason)
    {
        Interlocked.Increment(ref count);
        _samples.Enqueue(new SourceSample(at, where.Length > 200 ? where[..200] : where, reason));
        while (_samples.Count > MostSamples) _samples.TryDequeue(out _);
    }
}

/// <summary>The states of all sources.</summary>
public sealed class SourceStates
{
    private readonly ConcurrentDictionary<string, SourceState> _states = new(StringComparer.Ordinal);

    /// <summary>All, by name.</summary>
    public IReadOnlyList<SourceState> All => [.. _states.Values.OrderBy(state => state.Name, StringComparer.Ordinal)];

    /// <summary>The state of a source, made when first asked for.</summary>
    public SourceState Of(string name, string kind, string address) => _states.GetOrAdd(name, _ => new SourceState(name, kind, address));
}
