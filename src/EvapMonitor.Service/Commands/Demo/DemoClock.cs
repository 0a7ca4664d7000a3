namespace EvapMonitor.Service.Commands.Demo;

/// <summary>
/// The demo's present: the clock's own, or some days behind it and faster until it has caught up, for readings from the future are refused.
/// </summary>
internal sealed class DemoClock
{
    /// <summary>How long catching up takes.</summary>
    public static readonly TimeSpan CatchUp = TimeSpan.FromHours(1);

    private readonly TimeProvider _clock;
    private readonly double _pace;
    private readonly long _began;

    /// <summary>A present.</summary>
    /// <param name="clock">The clock.</param>
    /// <param name="pace">How many times as fast, 1 or more.</param>
    /// <param name="newest">Up to when there are readings already; the present does not begin before.</param>
    public DemoClock(TimeProvider clock, double pace, DateTimeOffset? newest)
    {
        (_clock, _pace, _began) = (clock, pace, clock.GetTimestamp());
        DateTimeOffset now = clock.GetUtcNow();
        Begin = now - ((pace - 1) * CatchUp);
        if (newest is { } known && known > Begin) Begin = known;
        if (Begin > now) Begin = now;
        Begin = new DateTimeOffset(Begin.Ticks - (Begin.Ticks % (2 * TimeSpan.TicksPerMinute)), TimeSpan.Zero);
    }

    /// <summary>The present at the start: history is imported up to it, and what comes later is published. A whole even minute.</summary>
    public DateTimeOffset Begin { get; }

    /// <summary>The present.</summary>
    public DateTimeOffset Now
    {
        get
        {
            DateTimeOffset now = _clock.GetUtcNow(), simulated = Begin + (_pace * _clock.GetElapsedTime(_began));
            return _pace > 1 && simulated < now ? simulated : now;
        }
    }

    /// <summary>True while it is behind the clock.</summary>
    public bool IsBehind(DateTimeOffset instant) => _clock.GetUtcNow() - instant > TimeSpan.FromMinutes(10);
}
