using System.Net;
using EvapMonitor.Service.Ingest;

namespace EvapMonitor.Service;

/// <summary>What the service is told at its start, from the command line or the environment (EVAPMONITOR_DATA, EVAPMONITOR_CONNECTION, EVAPMONITOR_LISTEN).</summary>
public sealed record ServiceOptions
{
    /// <summary>Path of the plant file; null takes the revision last accepted.</summary>
    public string? Plant { get; init; }

    /// <summary>Folder for the private database and uploads.</summary>
    public required string Data { get; init; }

    /// <summary>Connection string of a PostgreSQL server; null starts a private one in <see cref="Data"/>.</summary>
    public string? Connection { get; init; }

    /// <summary>Address to listen on: http, a loopback address, a port (0 takes a free one). Default http://127.0.0.1:8642.</summary>
    public string Listen { get; init; } = DefaultListen;

    /// <summary>
    /// True inside a container (EVAPMONITOR_NETWORK=container): the service listens in the container's own network, where the host's loopback arrives as a private
    /// address. The container's port must then be published on the host's loopback only.
    /// </summary>
    public bool InContainer { get; init; }

    /// <summary>How readings come in.</summary>
    public IngestSettings Ingest { get; init; } = new();

    /// <summary>The address when none is given.</summary>
    public const string DefaultListen = "http://127.0.0.1:8642";

    /// <summary>The folder when none is given: a system folder for root, else the user's.</summary>
    public static string DefaultData => Environment.IsPrivilegedProcess && !OperatingSystem.IsWindows()
        ? "/var/lib/evapmonitor"
        : Path.Combine(Environment.GetFolderPath(Environment.SpecialFolder.LocalApplicationData, Environment.SpecialFolderOption.Create), "evapmonitor");

    /// <summary>Everything that is wrong with the options, each in one line; empty when all is well.</summary>
    public IReadOnlyList<string> Problems()
    {
        var problems = new List<string>();
        if (string.IsNullOrWhiteSpace(Data)) problems.Add("data: empty; allowed: the path of a folder.");
        if (!Uri.TryCreate(Listen, UriKind.Absolute, out Uri? address) || address.Scheme != Uri.UriSchemeHttp || address.PathAndQuery != "/")
            problems.Add($"listen: found \"{Listen}\"; allowed: an address such as {DefaultListen}.");
        else if (InContainer && !IsContainer)
            problems.Add("network: found \"container\", but this is no container; allowed: leave EVAPMONITOR_NETWORK out.");
        else if (!InContainer && !IsLoopback(address.Host))
            problems.Add($"listen: found \"{Listen}\"; allowed: loopback addresses only (127.0.0.1, [::1], localhost), because there is no access control yet.");
        if (Connection is not null && WhyNoConnection(Connection) is { } wrong) problems.Add($"connection: {wrong}");
        if (Plant is not null && !File.Exists(Plant)) problems.Add($"plant: found \"{Plant}\"; there is no such file.");
        if (!string.IsNullOrWhiteSpace(Data))
        {
            Ingest.Plan(Data, out IReadOnlyList<string> more);
            problems.AddRange(more);
        }

        return problems;
    }

    private static bool IsContainer =>
        File.Exists("/.dockerenv") || File.Exists("/run/.containerenv") || Environment.GetEnvironmentVariable("DOTNET_RUNNING_IN_CONTAINER") == "true";

    private static bool IsLoopback(string host) =>
        host.Equals("localhost", StringComparison.OrdinalIgnoreCase) || (IPAddress.TryParse(host.Trim('[', ']'), out IPAddress? address) && IPAddress.IsLoopback(address));

    /// <summary>Never repeats the connection string itself: it may hold a password.</summary>
    private static string? WhyNoConnection(string connection)
    {
        try
        {
            var parts = new Npgsql.NpgsqlConnectionStringBuilder(connection);
            return string.IsNullOrEmpty(parts.Host) ? "no Host; allowed: a PostgreSQL connection string such as Host=…;Database=…;Username=…" : null;
        }
        catch (Exception error) when (error is ArgumentException or FormatException)
        {
            return "not a PostgreSQL connection string; allowed: Host=…;Database=…;Username=…";
        }
    }
}
