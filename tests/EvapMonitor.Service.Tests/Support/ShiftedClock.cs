using System.Diagnostics;

namespace EvapMonitor.Service.Tests.Support;

/// <summary>A clock that begins at a given instant and runs on at the usual pace, so that the service's present is the test's own.</summary>
internal sealed class ShiftedClock(DateTimeOffset start) : TimeProvider
{
    private readonly long _began = Stopwatch.GetTimestamp();

    public override DateTimeOffset GetUtcNow() => start + Stopwatch.GetElapsedTime(_began);
}
