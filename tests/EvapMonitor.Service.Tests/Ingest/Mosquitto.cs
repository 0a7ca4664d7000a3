using System.Diagnostics;
using System.Net;
using System.Net.Sockets;

namespace EvapMonitor.Service.Tests.Ingest;

/// <summary>A real broker outside the process, on a port of its own. Missing: a skip on a laptop, a failure where CI=true.</summary>
public sealed class Mosquitto : IAsyncDisposable
{
    public const string Missing = "The MQTT broker mosquitto is not on this machine (/usr/sbin/mosquitto).";

    private const string Program = "/usr/sbin/mosquitto";

    private readonly string _folder = Directory.CreateTempSubdirectory("evapmonitor-mosquitto-").FullName;
    private Process? _process;

    private Mosquitto(int port) => Port = port;

    public static bool IsThere => Environment.GetEnvironmentVariable("CI") == "true" || File.Exists(Program);

    public int Port { get; }

    /// <summary>Starts a broker.</summary>
    /// <param name="settings">Lines for its configuration, in which FOLDER stands for its folder.</param>
    /// <param name="files">Files for its folder.</param>
    public static async Task<Mosquitto> StartAsync(string settings = "allow_anonymous true", params (string Name, string Text)[] files)
    {
        var broker = new Mosquitto(FreePort());
        foreach ((string name, string text) in files) await File.WriteAllTextAsync(Path.Combine(broker._folder, name), text);
        await File.WriteAllTextAsync(
            Path.Combine(broker._folder, "mosquitto.conf"),
            $"""
             user root
             listener {broker.Port} 127.0.0.1
             persistence true
             persistence_location {broker._folder}/
             max_queued_messages 100000
             {settings.Replace("FOLDER", broker._folder, StringComparison.Ordinal)}

             """);
        await broker.StartAsync();
        return broker;
    }

    /// <summary>Starts it again on the same port with what it kept.</summary>
    public async Task StartAsync()
    {
        _process = Process.Start(new ProcessStartInfo(Program, ["-c", Path.Combine(_folder, "mosquitto.conf")]) { RedirectStandardError = true, RedirectStandardOutput = true })!;
        // An unread pipe would stop it once it is full.
        Task<string> said = _process.StandardError.ReadToEndAsync();
        _ = _process.StandardOutput.ReadToEndAsync();
        for (int i = 0; i < 200; i++)
        {
            Assert.False(_process.HasExited, _process.HasExited ? await said : "");
            using var probe = new TcpClient();
            try
            {
                await probe.ConnectAsync(IPAddress.Loopback, Port);
                return;
            }
            catch (SocketException)
            {
                await Task.Delay(20);
            }
        }

        Assert.Fail("mosquitto does not answer.");
    }

    /// <summary>Stops it in an orderly way: it writes down what its sessions wait for.</summary>
    public async Task StopAsync()
    {
        if (_process is not { HasExited: false } running) return;
        using Process signal = Process.Start("kill", ["-TERM", running.Id.ToString(System.Globalization.CultureInfo.InvariantCulture)]);
        using var limit = new CancellationTokenSource(TimeSpan.FromSeconds(10));
        await running.WaitForExitAsync(limit.Token);
        running.Dispose();
        _process = null;
    }

    public async ValueTask DisposeAsync()
    {
        await StopAsync();
        Directory.Delete(_folder, recursive: true);
    }

    private static int FreePort()
    {
        using var listener = new TcpListener(IPAddress.Loopback, 0);
        listener.Start();
        return ((IPEndPoint)listener.LocalEndpoint).Port;
    }
}
