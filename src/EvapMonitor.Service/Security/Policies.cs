namespace EvapMonitor.Service.Security;

/// <summary>What a route allows. Every route carries exactly one; a test holds it.</summary>
public static class Policies
{
    /// <summary>Look at results.</summary>
    public const string Read = "Read";

    /// <summary>Add data: readings, cleanings.</summary>
    public const string Write = "Write";

    /// <summary>Change what the program assumes.</summary>
    public const string Configure = "Configure";

    /// <summary>All of them.</summary>
    public static IReadOnlyList<string> All { get; } = [Read, Write, Configure];
}
