using System.Diagnostics;
using System.Globalization;
using System.Security.Cryptography;
using System.Text;

namespace EvapMonitor.Service.Store;

/// <summary>
/// A PostgreSQL server of the program's own, for a machine where none is configured: durable settings on, reachable only through a socket in a private folder.
/// It runs in a session of its own, so that a signal meant for this program does not take the database down first; a server that outlived a killed
/// program is adopted.
/// </summary>
public sealed class PrivateServer
{
    private static readonly TimeSpan CommandLimit = TimeSpan.FromSeconds(90);

    private readonly string _binaries;
    private readonly string _data;
    private readonly string _socket;
    private readonly string _log;
    private readonly string? _user;

    private PrivateServer(string binaries, string folder)
    {
        _binaries = binaries;
        string major = MajorVersion(binaries);
        _data = Path.Combine(folder, "postgresql", major);
        _log = Path.Combine(folder, "postgresql", "server.log");
        // A socket's path is limited to about 107 bytes, so it cannot live in the data folder.
        string mark = Convert.ToHexStringLower(SHA256.HashData(Encoding.UTF8.GetBytes(Path.GetFullPath(_data))))[..12];
        _socket = Path.Combine(Path.GetTempPath(), "evapmonitor-" + mark);
        _user = Environment.IsPrivilegedProcess ? "postgres" : null;
    }

    /// <summary>Connection string of the server.</summary>
    public string Connection => $"Host={_socket};Username=evapmonitor;Database=postgres;Timeout=5;Command Timeout=60;Maximum Pool Size=20";

    /// <summary>Finds the binaries of the newest PostgreSQL on this machine; null when there is none.</summary>
    public static string? FindBinaries()
    {
        IEnumerable<string> folders = Directory.Exists("/usr/lib/postgresql")
            ? Directory.GetDirectories("/usr/lib/postgresql")
                .OrderByDescending(folder => int.TryParse(Path.GetFileName(folder), CultureInfo.InvariantCulture, out int major) ? major : 0)
                .Select(folder => Path.Combine(folder, "bin"))
            : [];
        IEnumerable<string> path = (Environment.GetEnvironmentVariable("PATH") ?? "").Split(':', StringSplitOptions.RemoveEmptyEntries);
        return folders.Concat(path).FirstOrDefault(folder => File.Exists(Path.Combine(folder, "initdb")) && File.Exists(Path.Combine(folder, "pg_ctl")));
    }

    /// <summary>Starts the server of a data folder, making it at the first time.</summary>
    /// <exception cref="InvalidOperationException">PostgreSQL is missing or does not start; the message says what to do.</exception>
    public static async Task<PrivateServer> StartAsync(string folder, CancellationToken stop)
    {
        string binaries = FindBinaries() ?? throw new InvalidOperationException(
            "PostgreSQL is not on this machine: install it (Debian, Ubuntu: apt-get install postgresql) or set a connection string in EVAPMONITOR_CONNECTION.");
        var server = new PrivateServer(binaries, folder);
        await server.EnsureRunningAsync(stop);
        return server;
    }

    /// <summary>Starts the server unless it runs already.</summary>
    public async Task EnsureRunningAsync(CancellationToken stop)
    {
        PreparePrivateFolder(_socket);
        Directory.CreateDirectory(Path.GetDirectoryName(_data)!);
        await OwnAsync(Path.GetDirectoryName(_data)!, stop);
        await OwnAsync(_socket, stop);
        if (!File.Exists(Path.Combine(_data, "PG_VERSION")))
        {
            // Made beside and renamed, so that a killed initdb never leaves half a cluster under the real name.
            string fresh = _data + ".new";
            if (Directory.Exists(fresh)) Directory.Delete(fresh, recursive: true);
            await RunAsync("initdb", ["-D", fresh, "-U", "evapmonitor", "--auth=trust", "--no-locale", "-E", "UTF8", "--data-checksums"], stop);
            Directory.Move(fresh, _data);
        }

        if (await IsRunningAsync(stop)) return;
        // A crash can leave the lock for some seconds: try again for a while.
        for (int attempt = 1; ; attempt++)
        {
            try
            {
                await RunAsync("pg_ctl", ["start", "-D", _data, "-w", "-t", "60", "-s", "-l", _log, "-o", Settings()], stop);
                return;
            }
            catch (InvalidOperationException) when (attempt < 5)
            {
                await Task.Delay(TimeSpan.FromSeconds(attempt), stop);
                if (await IsRunningAsync(stop)) return;
            }
        }
    }

    /// <summary>Stops the server in an orderly way: open transactions are rolled back, everything committed is on disk.</summary>
    public async Task StopAsync()
    {
        await RunAsync("pg_ctl", ["stop", "-D", _data, "-m", "fast", "-w", "-t", "60", "-s"], CancellationToken.None);
        try
        {
            Directory.Delete(_socket);
        }
        catch (Exception error) when (error is IOException or UnauthorizedAccessException)
        {
            // Not empty or gone already: it costs nothing.
        }
    }

    private string Settings() =>
        $"-c listen_addresses='' -c unix_socket_directories='{_socket}' -c unix_socket_permissions=0700 -c fsync=on -c full_page_writes=on " +
        "-c synchronous_commit=on -c max_connections=50 -c shared_buffers=256MB -c max_wal_size=2GB -c checkpoint_timeout=10min -c log_min_messages=warning " +
        "-c timezone=UTC -c jit=off";

    private async Task<bool> IsRunningAsync(CancellationToken stop)
    {
        if (!File.Exists(Path.Combine(_data, "postmaster.pid"))) return false;
        try
        {
            await RunAsync("pg_ctl", ["status", "-D", _data, "-s"], stop);
            return true;
        }
        catch (InvalidOperationException)
        {
            return false;
        }
    }

    private static void PreparePrivateFolder(string folder)
    {
        const UnixFileMode mode = UnixFileMode.UserRead | UnixFileMode.UserWrite | UnixFileMode.UserExecute;
        if (OperatingSystem.IsWindows()) Directory.CreateDirectory(folder);
        else
        {
            Directory.CreateDirectory(folder, mode);
            // Somebody else could have made it first with open doors.
            if (new DirectoryInfo(folder).LinkTarget is not null) throw new InvalidOperationException($"{folder} is a link; it must be a private folder.");
            File.SetUnixFileMode(folder, mode);
        }
    }

    private async Task OwnAsync(string folder, CancellationToken stop)
    {
        if (_user is not null) await ExecuteAsync("chown", ["-R", _user, folder], null, stop);
    }

    private Task RunAsync(string program, IReadOnlyList<string> arguments, CancellationToken stop) =>
        ExecuteAsync(Path.Combine(_binaries, program), arguments, _user, stop);

    private static async Task ExecuteAsync(string file, IReadOnlyList<string> arguments, string? user, CancellationToken stop)
    {
        var start = new ProcessStartInfo(file, arguments)
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
            RedirectStandardInput = true,
            WorkingDirectory = "/",
        };
        if (user is not null) start.UserName = user;
        // PostgreSQL takes its defaults from these; a stray one would point it elsewhere.
        foreach (string name in start.Environment.Keys.Where(key => key.StartsWith("PG", StringComparison.Ordinal)).ToList()) start.Environment.Remove(name);
        using Process process = Process.Start(start) ?? throw new InvalidOperationException($"{file} could not be started.");
        process.StandardInput.Close();
        using var limit = CancellationTokenSource.CreateLinkedTokenSource(stop);
        limit.CancelAfter(CommandLimit);
        Task<string> error = process.StandardError.ReadToEndAsync(limit.Token);
        _ = process.StandardOutput.ReadToEndAsync(limit.Token);
        try
        {
            await process.WaitForExitAsync(limit.Token);
        }
        catch (OperationCanceledException) when (!stop.IsCancellationRequested)
        {
            process.Kill(entireProcessTree: true);
            throw new InvalidOperationException($"{Path.GetFileName(file)} did not end within {CommandLimit.TotalSeconds:0} s.");
        }

        if (process.ExitCode == 0) return;
        string said = (await error).Trim();
        string hint = user is not null && said.Contains("Permission denied", StringComparison.Ordinal)
            ? $" (PostgreSQL runs as the user {user}, who must be able to pass through the folders above; choose another data folder, such as /var/lib/evapmonitor)"
            : "";
        throw new InvalidOperationException($"{Path.GetFileName(file)} failed: {said}{hint}");
    }

    private static string MajorVersion(string binaries)
    {
        using Process process = Process.Start(new ProcessStartInfo(Path.Combine(binaries, "postgres"), ["--version"]) { RedirectStandardOutput = true })!;
        string text = process.StandardOutput.ReadToEnd();
        process.WaitForExit();
        // "postgres (PostgreSQL) 15.18 (Debian …)"
        string version = text.Split(' ', StringSplitOptions.RemoveEmptyEntries).First(word => char.IsDigit(word[0]));
        return version.Split('.')[0];
    }
}
