namespace EvapMonitor.Service.Tests.Support;

/// <summary>The working copy that the tests were built from.</summary>
internal static class Repository
{
    public static string Root { get; } = Find(AppContext.BaseDirectory);

    private static string Find(string folder) =>
        File.Exists(Path.Combine(folder, "EvapMonitor.sln")) ? folder : Find(Path.GetDirectoryName(folder) ?? throw new DirectoryNotFoundException("EvapMonitor.sln is in no folder above the tests."));
}
