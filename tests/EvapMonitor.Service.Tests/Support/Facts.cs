using System.Runtime.CompilerServices;

namespace EvapMonitor.Service.Tests.Support;

/// <summary>A test on a real PostgreSQL.</summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class PostgreSqlFactAttribute : FactAttribute
{
    public PostgreSqlFactAttribute([CallerFilePath] string? file = null, [CallerLineNumber] int line = -1)
        : base(file, line) => (Skip, SkipType, SkipUnless) = (Prerequisites.NoPostgreSql, typeof(Prerequisites), nameof(Prerequisites.HasPostgreSql));
}

/// <summary>Tests on a real PostgreSQL, one for each row of data.</summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class PostgreSqlTheoryAttribute : TheoryAttribute
{
    public PostgreSqlTheoryAttribute([CallerFilePath] string? file = null, [CallerLineNumber] int line = -1)
        : base(file, line) => (Skip, SkipType, SkipUnless) = (Prerequisites.NoPostgreSql, typeof(Prerequisites), nameof(Prerequisites.HasPostgreSql));
}

/// <summary>A test on the program's private server.</summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class PrivateServerFactAttribute : FactAttribute
{
    public PrivateServerFactAttribute([CallerFilePath] string? file = null, [CallerLineNumber] int line = -1)
        : base(file, line) => (Skip, SkipType, SkipUnless) = (Prerequisites.NoBinaries, typeof(Prerequisites), nameof(Prerequisites.HasBinaries));
}

/// <summary>A test in a real browser.</summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class BrowserFactAttribute : FactAttribute
{
    public BrowserFactAttribute([CallerFilePath] string? file = null, [CallerLineNumber] int line = -1)
        : base(file, line) => (Skip, SkipType, SkipUnless) = (Prerequisites.NoBrowser, typeof(Prerequisites), nameof(Prerequisites.HasBrowser));
}

/// <summary>Tests in a real browser, one for each row of data.</summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class BrowserTheoryAttribute : TheoryAttribute
{
    public BrowserTheoryAttribute([CallerFilePath] string? file = null, [CallerLineNumber] int line = -1)
        : base(file, line) => (Skip, SkipType, SkipUnless) = (Prerequisites.NoBrowser, typeof(Prerequisites), nameof(Prerequisites.HasBrowser));
}
