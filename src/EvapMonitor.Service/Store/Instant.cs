namespace EvapMonitor.Service.Store;

/// <summary>Instants between the database (UTC, microseconds) and the inner loops (ms since 1970).</summary>
public static class Instant
{
    /// <summary>UTC time of an instant.</summary>
    public static DateTime FromMilliseconds(long at) => DateTime.UnixEpoch.AddMilliseconds(at);

    /// <summary>True for two times that the store cannot tell apart, or two that are absent.</summary>
    public static bool AreSame(DateTimeOffset? one, DateTimeOffset? other) =>
        one is { } a && other is { } b ? (a - b).Duration() < TimeSpan.FromMilliseconds(1) : one is null && other is null;

    /// <summary>An instant of a UTC time; parts of a millisecond are cut off.</summary>
    public static long ToMilliseconds(DateTime utc) => (utc.Ticks - DateTime.UnixEpoch.Ticks) / TimeSpan.TicksPerMillisecond;
}
