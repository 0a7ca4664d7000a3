using System.Net.Sockets;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Tests.Support;

/// <summary>What a test needs from the machine. Missing: a skip on a laptop, a failure where CI=true.</summary>
public static class Prerequisites
{
    public const string NoPostgreSql = "Neither a Docker engine nor PostgreSQL's binaries are on this machine.";
    public const string NoBinaries = "PostgreSQL's binaries are not on this machine.";
    public const string NoBrowser = "Chromium (CHROMIUM, /usr/bin/chromium) or the built dashboard (wwwroot) is missing.";

    private static readonly bool InCi = Environment.GetEnvironmentVariable("CI") == "true";
    private static readonly Lazy<bool> Engine = new(EngineAnswers);

    public static bool DockerAnswers => Engine.Value;

    public static bool HasPostgreSql => InCi || DockerAnswers || PrivateServer.FindBinaries() is not null;

    public static bool HasBinaries => InCi || PrivateServer.FindBinaries() is not null;

    public static bool HasBrowser => InCi || (HasPostgreSql && File.Exists(ChromiumPath) && File.Exists(Path.Combine(AppContext.BaseDirectory, "wwwroot", "index.html")));

    public static string ChromiumPath => Environment.GetEnvironmentVariable("CHROMIUM") ?? "/usr/bin/chromium";

    /// <summary>Asks the engine's socket only, so that a machine without Docker loses no time.</summary>
    private static bool EngineAnswers()
    {
        string host = Environment.GetEnvironmentVariable("DOCKER_HOST") ?? "unix:///var/run/docker.sock";
        try
        {
            var address = new Uri(host);
            bool local = address.Scheme == "unix";
            using var socket = new Socket(local ? AddressFamily.Unix : AddressFamily.InterNetwork, SocketType.Stream, local ? ProtocolType.Unspecified : ProtocolType.Tcp);
            if (local) socket.Connect(new UnixDomainSocketEndPoint(address.AbsolutePath));
            else if (!socket.ConnectAsync(address.Host, address.Port).Wait(TimeSpan.FromSeconds(2))) return false;
            return true;
        }
        catch (Exception error) when (error is SocketException or UriFormatException or AggregateException)
        {
            return false;
        }
    }
}
