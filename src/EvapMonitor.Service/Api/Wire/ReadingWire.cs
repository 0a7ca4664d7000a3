namespace EvapMonitor.Service.Api.Wire;

/// <summary>A batch of readings.</summary>
/// <param name="Readings">The readings, at most 50,000.</param>
public sealed record NewReadingsWire(IReadOnlyList<NewReadingWire> Readings);

/// <summary>A reading that comes in.</summary>
/// <param name="Signal">Name of the signal, 1 to 500 letters.</param>
/// <param name="At">The instant, RFC 3339 with an offset; parts of a millisecond are cut off.</param>
/// <param name="Value">The value in the unit of the plant file; null or absent only when the quality is bad.</param>
/// <param name="Quality">good, uncertain, bad or an OPC UA status code; absent is good.</param>
public sealed record NewReadingWire(string Signal, DateTimeOffset At, double? Value = null, string? Quality = null);

/// <summary>What became of a batch.</summary>
/// <param name="Accepted">Readings that are on disk now.</param>
/// <param name="OutOfTime">Readings left out: more than 10 min ahead of the service's clock or before the plant's history-from.</param>
/// <param name="Unknown">Readings left out: their signal is not in the plant file.</param>
public sealed record ReadingsTakenWire(int Accepted, int OutOfTime, int Unknown);
