namespace EvapMonitor.Core.Readings;

/// <summary>Quality of a reading as its source states it.</summary>
public enum Quality : short
{
    /// <summary>Good.</summary>
    Good = 0,
    /// <summary>Usable, its random uncertainty tripled.</summary>
    Uncertain = 1,
    /// <summary>Never enters a mean. The value may be absent.</summary>
    Bad = 2,
}

/// <summary>One reading in the plant's own unit.</summary>
/// <param name="At">The instant, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="Value">The value in the signal's unit; NaN when the source gave none.</param>
/// <param name="Quality">Quality as the source states it.</param>
public readonly record struct Reading(long At, double Value, Quality Quality);
