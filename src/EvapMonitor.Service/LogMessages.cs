namespace EvapMonitor.Service;

/// <summary>Every log message of the service, once, with its number.</summary>
internal static partial class LogMessages
{
    [LoggerMessage(100, LogLevel.Information, "Serving {Site}, plant revision {Revision}, at {Address}")]
    public static partial void Serving(this ILogger log, string site, int revision, string address);

    [LoggerMessage(103, LogLevel.Information, "The plant file given is revision {Given}, accepted before; in force now is revision {InForce}")]
    public static partial void EarlierPlantGiven(this ILogger log, int given, int inForce);

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

    [LoggerMessage(402, LogLevel.Error, "{Line} {Day} could not be evaluated; it is tried again in {Seconds} s")]
    public static partial void DayBroke(this ILogger log, Exception error, string line, DateOnly day, double seconds);

    [LoggerMessage(405, LogLevel.Error, "A plant revision that another program accepted cannot be read by this one; nothing is evaluated until it can")]
    public static partial void RevisionUnreadable(this ILogger log, Exception error);

    [LoggerMessage(403, LogLevel.Information, "Recomputation {Id} is done: {Cause}, {Days} days")]
    public static partial void RecomputationDone(this ILogger log, int id, string cause, int days);

    [LoggerMessage(404, LogLevel.Information, "Windows of superseded results of {Days} days were deleted; their hours stay")]
    public static partial void SupersededDeleted(this ILogger log, int days);

    [LoggerMessage(500, LogLevel.Error, "The spool could not be read and was set aside as {Path}; readings that waited in it are missing")]
    public static partial void SpoolSetAside(this ILogger log, string path);

    [LoggerMessage(501, LogLevel.Error, "{Count} batches of the spool are damaged and were set aside; their readings are missing")]
    public static partial void SpoolRowsDamaged(this ILogger log, int count);

    [LoggerMessage(502, LogLevel.Error, "The spool cannot be written; readings are refused until it can")]
    public static partial void SpoolFailed(this ILogger log, Exception error);

    [LoggerMessage(503, LogLevel.Error, "{Why} Readings are refused until there is room")]
    public static partial void SpoolFull(this ILogger log, string why);

    [LoggerMessage(504, LogLevel.Information, "The spool takes readings again")]
    public static partial void SpoolTakesAgain(this ILogger log);

    [LoggerMessage(505, LogLevel.Information, "The database takes readings again after {Seconds:0} s; {MiB} MiB wait in the spool")]
    public static partial void DrainTakesAgain(this ILogger log, double seconds, long mib);

    [LoggerMessage(506, LogLevel.Error, "The database refused a reading of {Signal} from {Source}: {Reason}")]
    public static partial void ReadingRefused(this ILogger log, string signal, string source, string reason);

    [LoggerMessage(507, LogLevel.Error, "Readings cannot be stored; they wait in the spool")]
    public static partial void DrainFailed(this ILogger log, Exception error);

    [LoggerMessage(600, LogLevel.Information, "Connected to MQTT broker {Name} at {Address}")]
    public static partial void BrokerConnected(this ILogger log, string name, string address);

    [LoggerMessage(601, LogLevel.Warning, "MQTT broker {Name} at {Address} is not connected: {Reason}; next attempt in {Seconds:0.0} s")]
    public static partial void BrokerLost(this ILogger log, string name, string address, string reason, double seconds);

    [LoggerMessage(602, LogLevel.Warning, "The own MQTT broker does not listen on port {Port}: {Reason} The service goes on without it")]
    public static partial void OwnBrokerAway(this ILogger log, int port, string reason);

    [LoggerMessage(603, LogLevel.Information, "The own MQTT broker listens at 127.0.0.1:{Port}")]
    public static partial void OwnBrokerListens(this ILogger log, int port);

    [LoggerMessage(604, LogLevel.Warning, "The own MQTT broker dropped a message for {Client}, which reads too slowly")]
    public static partial void OwnBrokerDropped(this ILogger log, string client);

    [LoggerMessage(700, LogLevel.Debug, "Line {Line}: surfaces computed in {Milliseconds:0} ms")]
    public static partial void SurfacesComputed(this ILogger log, string line, double milliseconds);

    [LoggerMessage(701, LogLevel.Error, "Line {Line}: its surfaces could not be computed; they are tried again in a minute")]
    public static partial void SurfacesFailed(this ILogger log, Exception error, string line);
}
