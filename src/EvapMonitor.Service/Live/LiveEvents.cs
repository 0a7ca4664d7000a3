using System.Threading.Channels;

namespace EvapMonitor.Service.Live;

/// <summary>Something that open pages want to know at once.</summary>
/// <param name="Number">Grows by one with each event of this run.</param>
/// <param name="Id">Run and number: what a page sends when it comes back.</param>
/// <param name="Kind">windows, import, cleanings, instruments, recomputation, plant.</param>
/// <param name="Body">What is sent, an object that the API turns into JSON.</param>
public sealed record LiveEvent(long Number, string Id, string Kind, object Body);

/// <summary>
/// Hands events to the open pages. A page that does not keep up loses the oldest, and one that comes back gets what it missed as long as that is still known;
/// either is told to fetch anew otherwise.
/// </summary>
public sealed class LiveEvents
{
    /// <summary>Most pages listening at a time.</summary>
    public const int MostListeners = 200;

    /// <summary>Most past events that are kept for those who come back.</summary>
    public const int MostKept = 512;

    private readonly Lock _gate = new();
    private readonly List<Channel<LiveEvent>> _listeners = [];
    private readonly Queue<LiveEvent> _kept = new();
    private readonly string _run = Guid.NewGuid().ToString("N")[..8];
    private long _last;

    /// <summary>Tells all open pages.</summary>
    public void Publish(string kind, object body)
    {
        lock (_gate)
        {
            var happened = new LiveEvent(++_last, $"{_run}-{_last}", kind, body);
            _kept.Enqueue(happened);
            if (_kept.Count > MostKept) _kept.Dequeue();
            foreach (Channel<LiveEvent> listener in _listeners) listener.Writer.TryWrite(happened);
        }
    }

    /// <summary>Begins to listen; null when too many do already. Dispose to stop.</summary>
    /// <param name="lastId">The id of the last event that the page has seen; null for a new page.</param>
    public Listening? Listen(string? lastId = null)
    {
        lock (_gate)
        {
            if (_listeners.Count >= MostListeners) return null;
            var channel = Channel.CreateBounded<LiveEvent>(new BoundedChannelOptions(MostKept) { FullMode = BoundedChannelFullMode.DropOldest, SingleReader = true });
            long? seen = NumberOf(lastId);
            // Known is what came after the one before the oldest kept.
            bool known = seen is { } number && number <= _last && number >= _last - _kept.Count;
            if (known)
            {
                foreach (LiveEvent missed in _kept.Where(kept => kept.Number > seen)) channel.Writer.TryWrite(missed);
            }

            _listeners.Add(channel);
            return new Listening(this, channel, mustReset: !string.IsNullOrEmpty(lastId) && !known);
        }
    }

    private long? NumberOf(string? id) =>
        id is not null && id.StartsWith(_run + "-", StringComparison.Ordinal) && long.TryParse(id.AsSpan(_run.Length + 1), System.Globalization.CultureInfo.InvariantCulture, out long number) ? number : null;

    /// <summary>One open page.</summary>
    public sealed class Listening : IDisposable
    {
        private readonly LiveEvents _events;
        private readonly Channel<LiveEvent> _channel;

        internal Listening(LiveEvents events, Channel<LiveEvent> channel, bool mustReset) => (_events, _channel, MustReset) = (events, channel, mustReset);

        /// <summary>The events as they come, missed ones first.</summary>
        public ChannelReader<LiveEvent> Reader => _channel.Reader;

        /// <summary>True when what the page missed is no longer known: it must fetch everything anew.</summary>
        public bool MustReset { get; }

        /// <inheritdoc/>
        public void Dispose()
        {
            lock (_events._gate) _events._listeners.Remove(_channel);
        }
    }
}
