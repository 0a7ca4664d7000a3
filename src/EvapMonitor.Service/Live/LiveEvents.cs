using System.Threading.Channels;

namespace EvapMonitor.Service.Live;

/// <summary>Something that open pages want to know at once.</summary>
/// <param name="Id">Grows by one with each event of this run.</param>
/// <param name="Kind">windows, import, cleanings, site.</param>
/// <param name="Body">What is sent, an object that the API turns into JSON.</param>
public sealed record LiveEvent(long Id, string Kind, object Body);

/// <summary>Hands events to the open pages. A page that does not keep up loses the oldest: it refetches what it shows anyway.</summary>
public sealed class LiveEvents
{
    /// <summary>Most pages listening at a time.</summary>
    public const int MostListeners = 200;

    private readonly Lock _gate = new();
    private readonly List<Channel<LiveEvent>> _listeners = [];
    private long _last;

    /// <summary>Tells all open pages.</summary>
    public void Publish(string kind, object body)
    {
        lock (_gate)
        {
            var happened = new LiveEvent(++_last, kind, body);
            foreach (Channel<LiveEvent> listener in _listeners) listener.Writer.TryWrite(happened);
        }
    }

    /// <summary>Begins to listen; null when too many do already. Dispose to stop.</summary>
    public Listening? Listen()
    {
        lock (_gate)
        {
            if (_listeners.Count >= MostListeners) return null;
            var channel = Channel.CreateBounded<LiveEvent>(new BoundedChannelOptions(256) { FullMode = BoundedChannelFullMode.DropOldest, SingleReader = true });
            _listeners.Add(channel);
            return new Listening(this, channel);
        }
    }

    /// <summary>One open page.</summary>
    public sealed class Listening : IDisposable
    {
        private readonly LiveEvents _events;
        private readonly Channel<LiveEvent> _channel;

        internal Listening(LiveEvents events, Channel<LiveEvent> channel) => (_events, _channel) = (events, channel);

        /// <summary>The events as they come.</summary>
        public ChannelReader<LiveEvent> Reader => _channel.Reader;

        /// <inheritdoc/>
        public void Dispose()
        {
            lock (_events._gate) _events._listeners.Remove(_channel);
        }
    }
}
