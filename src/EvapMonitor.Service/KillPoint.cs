namespace EvapMonitor.Service;

/// <summary>
/// Named places at which a test can have the process die as if by kill -9, to see that nothing acknowledged is lost. Without the environment variable
/// EVAPMONITOR_KILL_AT ("name" or "name:n" for the n-th pass) a place does nothing.
/// </summary>
internal static class KillPoint
{
    private static readonly string? Wanted = Environment.GetEnvironmentVariable("EVAPMONITOR_KILL_AT");
    private static int _passes;

    public static void Pass(string name)
    {
        if (Wanted is null) return;
        string[] parts = Wanted.Split(':');
        if (parts[0] != name || Interlocked.Increment(ref _passes) < (parts.Length > 1 ? int.Parse(parts[1], System.Globalization.CultureInfo.InvariantCulture) : 1)) return;
        using System.Diagnostics.Process self = System.Diagnostics.Process.GetCurrentProcess();
        self.Kill();
        new ManualResetEvent(false).WaitOne();
    }
}
