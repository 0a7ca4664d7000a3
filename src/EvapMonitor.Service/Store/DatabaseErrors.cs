using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>Tells errors that lie in the data from those that may pass.</summary>
internal static class DatabaseErrors
{
    /// <summary>
    /// True when the same data will fail the same way for ever: a data exception (SQLSTATE class 22), a broken constraint (class 23), or a value that the driver
    /// cannot send. Everything else (no connection, no room, shutting down, a missing table) may be mended without the data.
    /// </summary>
    public static bool IsOfTheData(Exception error) => error switch
    {
        PostgresException told => told.SqlState.StartsWith("22", StringComparison.Ordinal) || told.SqlState.StartsWith("23", StringComparison.Ordinal),
        ArgumentException or InvalidCastException or OverflowException => true,
        _ => false,
    };
}
