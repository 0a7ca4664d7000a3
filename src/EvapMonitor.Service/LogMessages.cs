namespace EvapMonitor.Service;

/// <summary>Every log message of the service, once, with its number.</summary>
internal static partial class LogMessages
{
    [LoggerMessage(100, LogLevel.Information, "Serving {Site}, plant revision {Revision}, at {Address}")]
    public static partial void Serving(this ILogger log, string site, int revision, string address);

    [LoggerMessage(101, LogLevel.Information, "Stopping")]
    public static partial void Stopping(this ILogger log);

    [LoggerMessage(102, LogLevel.Information, "Database schema brought up to date: {Scripts}")]
    public static partial void SchemaUpgraded(this ILogger log, string scripts);

    [LoggerMessage(200, LogLevel.Warning, "The database cannot be reached; {Work} goes on when it is back")]
    public static partial void DatabaseAway(this ILogger log, Exception error, string work);

    [LoggerMessage(201, LogLevel.Warning, "The private database server had stopped and was started again")]
    public static partial void DatabaseRestarted(this ILogger log);

    [LoggerMessage(300, LogLevel.Information, "Import of {Name} ({Bytes} bytes) started after line {Line}")]
    public static partial void ImportStarted(this ILogger log, string name, long bytes, long line);

    [LoggerMessage(301, LogLevel.Information, "Import of {Name} ended: {Accepted} stored, {Repeated} repeated, {Rejected} rejected, {Seconds:0.0} s")]
    public static partial void ImportEnded(this ILogger log, string name, long accepted, long repeated, long rejected, double seconds);

    [LoggerMessage(302, LogLevel.Warning, "Import of {Name} failed: {Reason}")]
    public static partial void ImportFailed(this ILogger log, string name, string reason);

    [LoggerMessage(303, LogLevel.Error, "Import of {Name} broke off")]
    public static partial void ImportBroke(this ILogger log, Exception error, string name);

    [LoggerMessage(400, LogLevel.Debug, "{Line} {Day} evaluated: {Windows} windows in {Milliseconds:0} ms")]
    public static partial void DayEvaluated(this ILogger log, string line, DateOnly day, int windows, double milliseconds);

    [LoggerMessage(401, LogLevel.Warning, "Line {Line} is evaluated by another process now")]
    public static partial void LeaseLost(this ILogger log, string line);

    [LoggerMessage(402, LogLevel.Error, "The evaluation of line {Line} failed; it is tried again")]
    public static partial void EvaluationFailed(this ILogger log, Exception error, string line);

    [LoggerMessage(401, LogLevel.Error, "{Line} {Day} could not be evaluated; it has no results until its readings change")]
    public static partial void DayBroke(this ILogger log, Exception error, string line, DateOnly day);
}
