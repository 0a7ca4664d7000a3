using System.Diagnostics;
using System.Net.Http.Headers;
using System.Net.Http.Json;
using EvapMonitor.Service.Api.Wire;

namespace EvapMonitor.Service.Tests.Support;

/// <summary>The program as a process of its own, so that it can be killed.</summary>
internal sealed class ChildService : IAsyncDisposable
{
    private readonly Process _process;
    private readonly TaskCompletionSource<string> _address = new(TaskCreationOptions.RunContinuationsAsynchronously);
    private readonly List<string> _said = [];

    private ChildService(ProcessStartInfo start)
    {
        _process = new Process { StartInfo = start, EnableRaisingEvents = true };
        _process.OutputDataReceived += (_, line) => Hear(line.Data);
        _process.ErrorDataReceived += (_, line) => Hear(line.Data);
        _process.Exited += (_, _) => _address.TrySetException(new InvalidOperationException($"The program ended with {_process.ExitCode}."));
        _process.Start();
        _process.BeginOutputReadLine();
        _process.BeginErrorReadLine();
    }

    public HttpClient Http { get; private set; } = new();

    public string Said
    {
        get
        {
            lock (_said) return string.Join('\n', _said);
        }
    }

    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    /// <summary>Starts `evapmonitor run` and waits until it serves.</summary>
    public static async Task<ChildService> RunAsync(string plant, string data, string? connection = null, string? killAt = null)
    {
        ProcessStartInfo start = StartOf(["run", plant, "--data", data, "--listen", "http://127.0.0.1:0"]);
        start.Environment.Remove("EVAPMONITOR_CONNECTION");
        start.Environment["EVAPMONITOR_MQTT"] = "off";
        start.Environment["EVAPMONITOR_SPOOL_RESERVE_MIB"] = "0";
        if (connection is not null) start.Environment["EVAPMONITOR_CONNECTION"] = connection;
        if (killAt is not null) start.Environment["EVAPMONITOR_KILL_AT"] = killAt;
        var child = new ChildService(start);
        try
        {
            string address = await child._address.Task.WaitAsync(TimeSpan.FromSeconds(60), Stop);
            child.Http = new HttpClient { BaseAddress = new Uri(address) };
            return child;
        }
        catch (Exception error)
        {
            string said = child.Said;
            await child.DisposeAsync();
            throw new InvalidOperationException(said, error);
        }
    }

    /// <summary>Runs a command to its end; gives its exit code, stdout and stderr.</summary>
    public static async Task<(int Exit, string Out, string Error)> CommandAsync(params string[] arguments)
    {
        using Process process = Process.Start(StartOf(arguments))!;
        Task<string> output = process.StandardOutput.ReadToEndAsync(Stop), error = process.StandardError.ReadToEndAsync(Stop);
        await process.WaitForExitAsync(Stop).WaitAsync(TimeSpan.FromSeconds(90), Stop);
        return (process.ExitCode, await output, await error);
    }

    public async Task UploadAsync(byte[] file)
    {
        using var body = new ByteArrayContent(file);
        body.Headers.ContentType = new MediaTypeHeaderValue("text/csv");
        using HttpResponseMessage answer = await Http.PostAsync("/api/v1/imports?name=history.csv", body, Stop);
        answer.EnsureSuccessStatusCode();
    }

    public Task<ImportWire> EndOfImportAsync() => Poll.UntilAsync("the end of the import", async () =>
        (await Http.GetFromJsonAsync<ImportsWire>("/api/v1/imports", RunningService.Json, Stop))!.Imports is [{ State: not ("waiting" or "running") } ended, ..] ? ended : null, 60);

    /// <summary>Waits until the process has ended by itself.</summary>
    public Task DeathAsync() => _process.WaitForExitAsync(Stop).WaitAsync(TimeSpan.FromSeconds(60), Stop);

    /// <summary>As kill -9 does.</summary>
    public async Task KillAsync()
    {
        if (!_process.HasExited) _process.Kill();
        await DeathAsync();
    }

    /// <summary>As a polite kill does; gives the exit code.</summary>
    public async Task<int> TerminateAsync()
    {
        using Process kill = Process.Start("kill", ["-TERM", _process.Id.ToString()]);
        await DeathAsync();
        return _process.ExitCode;
    }

    public async ValueTask DisposeAsync()
    {
        Http.Dispose();
        if (!_process.HasExited) _process.Kill();
        await _process.WaitForExitAsync(CancellationToken.None);
        _process.Dispose();
    }

    private static ProcessStartInfo StartOf(IReadOnlyList<string> arguments) =>
        new("dotnet", [Path.Combine(AppContext.BaseDirectory, "evapmonitor.dll"), .. arguments]) { RedirectStandardOutput = true, RedirectStandardError = true };

    private void Hear(string? line)
    {
        if (line is null) return;
        lock (_said) _said.Add(line);
        int at = line.IndexOf("http://127.0.0.1:", StringComparison.Ordinal);
        if (line.Contains("Serving", StringComparison.Ordinal) && at >= 0) _address.TrySetResult(line[at..].Trim().Trim('"'));
    }
}
