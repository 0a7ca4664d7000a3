using System.Diagnostics;
using System.Net;
using System.Net.Sockets;

namespace EvapMonitor.Benchmarks.Ingest;

/// <summary>A mosquitto on a free port that keeps everything it is given.</summary>
internal sealed class BrokerProcess : IAsyncDisposable
{
    private readonly Process _process;

    private BrokerProcess(Process process, int port) => (_process, Port) = (process, port);

    public int Port { get; }

    public static async Task<BrokerProcess> StartAsync(string folder)
    {
        int port = FreePort();
        string settings = Path.Combine(folder, "mosquitto.conf");
        await File.WriteAllTextAsync(settings, Invariant($"listener {port} 127.0.0.1\nallow_anonymous true\nmax_queued_messages 0\nmax_inflight_messages 500\npersistence false\nlog_type none\n"));
        Process process = Process.Start(new ProcessStartInfo("/usr/sbin/mosquitto", ["-c", settings]))!;
        for (int i = 0; i < 200; i++)
        {
            using var probe = new TcpClient();
            try
            {
                await probe.ConnectAsync(IPAddress.Loopback, port);
                return new BrokerProcess(process, port);
            }
            catch (SocketException)
            {
                await Task.Delay(20);
            }
        }

        throw new InvalidOperationException("mosquitto does not answer.");
    }

    public async ValueTask DisposeAsync()
    {
        if (!_process.HasExited) _process.Kill();
        await _process.WaitForExitAsync();
        _process.Dispose();
    }

    private static int FreePort()
    {
        using var listener = new TcpListener(IPAddress.Loopback, 0);
        listener.Start();
        return ((IPEndPoint)listener.LocalEndpoint).Port;
    }
}
