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
    /// How far back conditioning looks for the scatter (one hour) and for stillness (frozen-after, which may not be longer than this).
    /// </summary>
    public static TimeSpan Memory { get; } = TimeSpan.FromHours(6);

    /// <summary>Conditions the signals of a line.</summary>
    /// <param name="instruments">The instruments, one for each signal; the memory was filled for the same ones.</param>
    /// <param name="memory">Partials of the windows and of <see cref="Memory"/> before them.</param>
    /// <param name="atmosphere">Makes gauge pressures absolute.</param>
    /// <param name="grid">The windows.</param>
    /// <returns>The conditioned signals in the order of the instruments, and the atmosphere by window.</returns>
    public static (ConditionedSignal[] Signals, Atmosphere Atmosphere) Condition(
        IReadOnlyList<Instrument> instruments, LineMemory memory, FixedOrMeasured atmosphere, WindowGrid grid)
    {
        var stillness = new Stillness(instruments, memory.Partials, grid.Step);
        ConditionedSignal[] signals = [.. instruments.Select((instrument, i) =>
            SignalConditioning.Condition(instrument, memory.Partials[i], memory.Grid, grid, window => stillness.IsFrozen(i, window)))];
        ConditionedSignal? measured = atmosphere.Measured is { } barometer ? signals[IndexOf(instruments, barometer.Signal)] : null;
        var air = Atmosphere.Of(atmosphere, measured, grid);
        foreach (ConditionedSignal signal in signals) air.MakeAbsolute(signal);
        return (signals, air);
    }

    private static int IndexOf(IReadOnlyList<Instrument> instruments, string signal)
    {
        for (int i = 0; i < instruments.Count; i++)
        {
            if (instruments[i].Signal == signal) return i;
        }

        throw new ArgumentException($"The atmosphere's signal {signal} is not among the instruments.", nameof(instruments));
    }
}
