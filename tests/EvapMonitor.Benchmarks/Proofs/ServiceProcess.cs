using System.Diagnostics;
using System.Globalization;

namespace EvapMonitor.Benchmarks.Proofs;

/// <summary>The service as a process of its own, as a user would run it, with a private database.</summary>
internal sealed class ServiceProcess : IDisposable
{
    private readonly Process _process;
    private readonly string _data;
    private readonly TaskCompletionSource<string> _address = new();

    private ServiceProcess(Process process, string data)
    {
        (_process, _data) = (process, data);
        process.OutputDataReceived += (_, line) =>
        {
            int at = line.Data?.LastIndexOf("http://", StringComparison.Ordinal) ?? -1;
            if (at >= 0) _address.TrySetResult(line.Data![at..].Trim());
            // What the service complains of belongs beside a figure.
            if (line.Data is { } said && (said.Contains(" WRN ", StringComparison.Ordinal) || said.Contains(" ERR ", StringComparison.Ordinal))) Console.Error.WriteLine(said);
            if (line.Data is null) _address.TrySetException(new InvalidOperationException("The service ended before it served."));
        };
        process.BeginOutputReadLine();
    }

    /// <summary>Starts it.</summary>
    /// <param name="plant">Path of the plant file.</param>
    /// <param name="data">The data folder.</param>
    /// <param name="connection">A database of somebody else's; null for a private one.</param>
    /// <param name="cores">How many cores it may think that there are; null: those that there are.</param>
    public static ServiceProcess Start(string plant, string data, string? connection = null, int? cores = null)
    {
        string program = Path.Combine(AppContext.BaseDirectory, "evapmonitor.dll");
        var start = new ProcessStartInfo("dotnet", [program, "run", plant, "--data", data, "--listen", "http://127.0.0.1:0"]) { RedirectStandardOutput = true };
        start.Environment["EVAPMONITOR_MQTT"] = "off";
        start.Environment.Remove("EVAPMONITOR_CONNECTION");
        if (connection is not null) start.Environment["EVAPMONITOR_CONNECTION"] = connection;
        if (cores is { } most) start.Environment["DOTNET_PROCESSOR_COUNT"] = most.ToString(CultureInfo.InvariantCulture);
        return new ServiceProcess(Process.Start(start)!, data);
    }

    public Task<string> AddressAsync() => _address.Task.WaitAsync(TimeSpan.FromSeconds(60));

    /// <summary>Connection string of the private server: its socket folder stands in the server's own note.</summary>
    public async Task<string> ConnectionAsync()
    {
        string note = Directory.GetFiles(Path.Combine(_data, "postgresql"), "postmaster.pid", SearchOption.AllDirectories).Single();
        string socket = (await File.ReadAllLinesAsync(note))[4];
        return $"Host={socket};Username=evapmonitor;Database=postgres;Timeout=10;Command Timeout=600";
    }

    /// <summary>Peak resident memory, kB.</summary>
    public long PeakMemory() => Status("VmHWM:");

    /// <summary>Resident memory, kB.</summary>
    public long Memory() => Status("VmRSS:");

    /// <summary>As kill -9 does.</summary>
    public async Task KillAsync()
    {
        _process.Kill();
        await _process.WaitForExitAsync();
    }

    public void Dispose()
    {
        if (!_process.HasExited)
        {
            using Process asked = Process.Start("kill", ["-TERM", _process.Id.ToString(CultureInfo.InvariantCulture)])!;
            if (!_process.WaitForExit(30_000)) _process.Kill();
        }

        _process.Dispose();
    }

    private long Status(string name) =>
        File.ReadLines($"/proc/{_process.Id}/status").Where(line => line.StartsWith(name, StringComparison.Ordinal))
            .Select(line => long.Parse(line.Split(' ', StringSplitOptions.RemoveEmptyEntries)[1], CultureInfo.InvariantCulture)).Single();
}
