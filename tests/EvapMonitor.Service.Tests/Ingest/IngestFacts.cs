using System.Runtime.CompilerServices;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Ingest;

/// <summary>What the tests of the ways in need from the machine. Missing: a skip on a laptop, a failure where CI=true.</summary>
public static class IngestNeeds
{
    public const string Missing = "PostgreSQL's binaries or mosquitto (/usr/sbin/mosquitto) are not on this machine.";

    public static bool AreThere => Environment.GetEnvironmentVariable("CI") == "true" || (Mosquitto.IsThere && Prerequisites.HasBinaries);
}

/// <summary>A test with a real database and a real broker.</summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class IngestFactAttribute : FactAttribute
{
    public IngestFactAttribute([CallerFilePath] string? file = null, [CallerLineNumber] int line = -1)
        : base(file, line) => (Skip, SkipType, SkipUnless) = (IngestNeeds.Missing, typeof(IngestNeeds), nameof(IngestNeeds.AreThere));
}

/// <summary>Tests with a real database and a real broker, one for each row of data.</summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class IngestTheoryAttribute : TheoryAttribute
{
    public IngestTheoryAttribute([CallerFilePath] string? file = null, [CallerLineNumber] int line = -1)
        : base(file, line) => (Skip, SkipType, SkipUnless) = (IngestNeeds.Missing, typeof(IngestNeeds), nameof(IngestNeeds.AreThere));
}
