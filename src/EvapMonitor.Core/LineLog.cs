namespace EvapMonitor.Core;

/// <summary>What people have logged that moves results.</summary>
/// <param name="Cleanings">Cleanings by effect name: start and end, ms since 1970-01-01T00:00:00Z; the end is <see cref="long.MaxValue"/> while one goes on.</param>
/// <param name="Exclusions">When instruments are not to be believed, by signal, in the same way. Their readings count as absent.</param>
public sealed record LineLog(ILookup<string, (long Start, long End)> Cleanings, ILookup<string, (long Start, long End)> Exclusions)
{
    /// <summary>Intervals of nobody.</summary>
    public static ILookup<string, (long Start, long End)> None { get; } = Array.Empty<string>().ToLookup(name => name, _ => (0L, 0L));

    /// <summary>A log without entries.</summary>
    public static LineLog Empty { get; } = new(None, None);
}
