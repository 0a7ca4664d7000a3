using EvapMonitor.Core.Readings;

namespace EvapMonitor.Service.Ingest;

/// <summary>A reading as a source gave it, before anything is looked up.</summary>
/// <param name="Signal">Name of the signal, at most <see cref="LongestName"/> letters.</param>
/// <param name="Reading">Instant, value in the plant's unit and quality.</param>
public readonly record struct IncomingReading(string Signal, Reading Reading)
{
    /// <summary>Longest name of a signal, letters.</summary>
    public const int LongestName = 500;
}

/// <summary>Readings of one source that are kept or refused together: a message, a request.</summary>
/// <param name="Source">Name of the source.</param>
/// <param name="Readings">The readings.</param>
public sealed record IncomingBatch(string Source, IReadOnlyList<IncomingReading> Readings);
