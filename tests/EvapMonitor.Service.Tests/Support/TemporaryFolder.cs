namespace EvapMonitor.Service.Tests.Support;

/// <summary>Folders for tests under the system's temporary folder.</summary>
internal static class TemporaryFolder
{
    /// <summary>Makes one that a database server under another account can pass through.</summary>
    public static string Create()
    {
        string folder = Directory.CreateTempSubdirectory("evapmonitor-test-").FullName;
        if (!OperatingSystem.IsWindows())
            File.SetUnixFileMode(folder, UnixFileMode.UserRead | UnixFileMode.UserWrite | UnixFileMode.UserExecute | UnixFileMode.GroupExecute | UnixFileMode.OtherExecute);
        return folder;
    }
}
