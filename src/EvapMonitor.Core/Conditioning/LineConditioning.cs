using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Conditioning;

/// <summary>
/// Conditions all signals of a line together, because some verdicts need the neighbours: a signal is frozen only while others move.
/// </summary>
public static class LineConditioning
{
    /// <summary>
    /// Standard uncertainty of an atmospheric pressure that is given as a constant, Pa: weather moves it by about ±1.5 kPa (common practice, without source).
    /// </summary>
    public const double WeatherStandard = 800;

    /// <summary>
    /// The longest that conditioning remembers: a reading has no influence later than this. It bounds stale-after, frozen-after and the hour of the scatter.
    /// </summary>
    public static TimeSpan Memory { get; } = TimeSpan.FromHours(6);

    /// <summary>Conditions the signals of a line.</summary>
    /// <param name="instruments">The instruments, one for each signal.</param>
    /// <param name="readings">Readings by signal; a signal without any may be absent.</param>
    /// <param name="atmosphere">Makes gauge pressures absolute.</param>
    /// <param name="grid">The windows.</param>
    /// <returns>The conditioned signals in the order of the instruments, and the atmosphere by window.</returns>
    public static (ConditionedSignal[] Signals, Atmosphere Atmosphere) Condition(
        IReadOnlyList<Instrument> instruments, IReadOnlyDictionary<string, ReadingSeries> readings, FixedOrMeasured atmosphere, WindowGrid grid)
    {
        ReadingSeries Series(Instrument instrument) => readings.TryGetValue(instrument.Signal, out ReadingSeries? found) ? found : new ReadingSeries();
        var movement = new Movement(instruments, Series, grid);
        Atmosphere air = Atmosphere.Of(atmosphere, grid, instrument => SignalConditioning.Condition(instrument, Series(instrument), grid, (_, _) => false));
        var conditioned = new ConditionedSignal[instruments.Count];
        for (int i = 0; i < conditioned.Length; i++)
        {
            int index = i;
            Instrument instrument = instruments[i];
            long limit = (long)instrument.FrozenAfter.TotalMilliseconds;
            bool canFreeze = instrument.Unit.Dimension != Dimension.Number;
            conditioned[i] = SignalConditioning.Condition(instrument, Series(instrument), grid,
                (at, since) => canFreeze && at - since >= limit && movement.OthersMoved(index, at - limit, at));
            air.MakeAbsolute(conditioned[i]);
        }

        return (conditioned, air);
    }
}
