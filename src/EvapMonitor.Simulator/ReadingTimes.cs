using EvapMonitor.Core.Plant;

namespace EvapMonitor.Simulator;

/// <summary>When the instruments of the demo are read.</summary>
public static class ReadingTimes
{
    /// <summary>Instruments in a history: every two minutes.</summary>
    public const long Historian = 2 * TimeSpan.MillisecondsPerMinute;

    /// <summary>Instruments while the demo runs at the clock's pace. Each instant of <see cref="Historian"/> is one of these, with the same reading.</summary>
    public const long Live = TimeSpan.MillisecondsPerMinute / 2;

    /// <summary>Positions and products: every ten minutes.</summary>
    public const long Switch = 10 * TimeSpan.MillisecondsPerMinute;

    /// <summary>The laboratory: three samples a day.</summary>
    private const long Laboratory = 8 * TimeSpan.MillisecondsPerHour, LaboratoryFirst = 5 * TimeSpan.MillisecondsPerHour;

    /// <summary>How long after its sample a laboratory value is known.</summary>
    public static readonly TimeSpan LaboratoryDelay = TimeSpan.FromMinutes(150);

    /// <summary>True for what comes from the laboratory.</summary>
    public static bool IsLaboratory(InstrumentAtPlace at) => at is { Effect: null, Place: "feed.laboratory" or "product.laboratory" };

    /// <summary>Instants in [from, to) at which a reading becomes known, and the instant of the reading itself (before it for the laboratory), ms since 1970.</summary>
    /// <param name="at">The instrument.</param>
    /// <param name="from">ms since 1970-01-01T00:00:00Z.</param>
    /// <param name="to">As above.</param>
    /// <param name="period"><see cref="Historian"/> or <see cref="Live"/>.</param>
    public static IEnumerable<long> Of(InstrumentAtPlace at, long from, long to, long period)
    {
        ArgumentNullException.ThrowIfNull(at);
        (long every, long phase, long delay) = IsLaboratory(at) ? (Laboratory, LaboratoryFirst, (long)LaboratoryDelay.TotalMilliseconds)
            : (at.Instrument.Unit.Dimension == Dimension.Number ? Switch : period, 0L, 0L);
        long first = from - delay - phase;
        first = phase + (first + every - 1) / every * every;
        for (long instant = first; instant + delay < to; instant += every) yield return instant;
    }
}
