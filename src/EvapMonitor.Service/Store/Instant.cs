namespace EvapMonitor.Service.Store;

/// <summary>Instants between the database (UTC, microseconds) and the inner loops (ms since 1970).</summary>
public static class Instant
{
    /// <summary>UTC time of an instant.</summary>
    public static DateTime FromMilliseconds(long at) => DateTime.UnixEpoch.AddMilliseconds(at);

    /// <summary>An instant of a UTC time; parts of a millisecond are cut off.</summary>
    public static long ToMilliseconds(DateTime utc) => (utc.Ticks - DateTime.UnixEpoch.Ticks) / TimeSpan.TicksPerMillisecond;
}
