using System.Globalization;
using EvapMonitor.Service.Ingest.Mqtt;
using EvapMonitor.Service.Ingest.Spool;

namespace EvapMonitor.Service.Ingest;

/// <summary>What the environment says of the ways in. Each has a default; what is wrong is told with all else at the start.</summary>
public sealed record IngestSettings
{
    /// <summary>Path of the file that names MQTT brokers (EVAPMONITOR_SOURCES); null takes sources.json in the data folder when it is there.</summary>
    public string? Sources { get; init; }

    /// <summary>
    /// The own broker (EVAPMONITOR_MQTT): a port on loopback, 0 for a free one, "off" for none; null takes 1883 when no broker is named, else none.
    /// </summary>
    public string? OwnBroker { get; init; }

    /// <summary>Most MiB that wait in the spool (EVAPMONITOR_SPOOL_MIB). Default 2048.</summary>
    public string? SpoolMebibytes { get; init; }

    /// <summary>MiB that stay free on the spool's disk (EVAPMONITOR_SPOOL_RESERVE_MIB). Default 512.</summary>
    public string? ReserveMebibytes { get; init; }

    /// <summary>The settings that the environment gives.</summary>
    public static IngestSettings FromEnvironment() => new()
    {
        Sources = Environment.GetEnvironmentVariable("EVAPMONITOR_SOURCES"),
        OwnBroker = Environment.GetEnvironmentVariable("EVAPMONITOR_MQTT"),
        SpoolMebibytes = Environment.GetEnvironmentVariable("EVAPMONITOR_SPOOL_MIB"),
        ReserveMebibytes = Environment.GetEnvironmentVariable("EVAPMONITOR_SPOOL_RESERVE_MIB"),
    };

    /// <summary>Works the settings out.</summary>
    /// <param name="data">The data folder.</param>
    /// <param name="problems">Everything that is wrong, each in one line.</param>
    public IngestPlan Plan(string data, out IReadOnlyList<string> problems)
    {
        var all = new List<string>();
        string path = Sources ?? Path.Combine(data, "sources.json");
        IReadOnlyList<BrokerSettings> brokers = [];
        if (File.Exists(path))
        {
            brokers = SourceFile.Read(path, out IReadOnlyList<string> wrong);
            all.AddRange(wrong);
        }
        else if (Sources is not null)
        {
            all.Add($"EVAPMONITOR_SOURCES: found \"{Sources}\"; there is no such file.");
        }

        int? port = OwnBroker switch
        {
            null => brokers.Count == 0 ? Mqtt.OwnBroker.DefaultPort : null,
            "off" => null,
            _ => (int?)Whole("EVAPMONITOR_MQTT", OwnBroker, 0, 65535, 0, all, " or off"),
        };
        var spool = new SpoolSettings(Path.Combine(data, "spool"));
        spool = spool with
        {
            Quota = Whole("EVAPMONITOR_SPOOL_MIB", SpoolMebibytes, 1, 1 << 20, spool.Quota >> 20, all) << 20,
            Reserve = Whole("EVAPMONITOR_SPOOL_RESERVE_MIB", ReserveMebibytes, 0, 1 << 20, spool.Reserve >> 20, all) << 20,
        };
        problems = all;
        return new IngestPlan(spool, brokers, port);
    }

    private static long Whole(string name, string? text, long least, long most, long absent, List<string> problems, string orElse = "")
    {
        if (text is null) return absent;
        if (long.TryParse(text, NumberStyles.None, CultureInfo.InvariantCulture, out long number) && number >= least && number <= most) return number;
        problems.Add(Invariant($"{name}: found \"{text}\"; allowed: a whole number from {least} to {most}{orElse}."));
        return absent;
    }
}

/// <summary>The ways in as they will be.</summary>
/// <param name="Spool">The spool.</param>
/// <param name="Brokers">Brokers to take readings from.</param>
/// <param name="OwnBrokerPort">Port of the own broker, 0 for a free one; null for none.</param>
public sealed record IngestPlan(SpoolSettings Spool, IReadOnlyList<BrokerSettings> Brokers, int? OwnBrokerPort);
