using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>Windows in a row in which an effect did the same, with the same product on the same surface.</summary>
/// <param name="Start">Start of the first, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="End">End of the last.</param>
/// <param name="State">What it did.</param>
/// <param name="Product">What boiled; null when not known.</param>
/// <param name="Bodies">Bodies in service, joined by +; empty for the effect's own surface; null when not known.</param>
public sealed record EffectStretch(long Start, long End, RunningState State, string? Product, string? Bodies)
{
    /// <summary>Name of the surface that served: the bodies, or the effect's own; null when not known.</summary>
    /// <param name="effect">Name of the effect.</param>
    public string? SurfaceIn(string effect) => Bodies is "" ? effect : Bodies;

    /// <summary>The stretches of an effect's windows. None crosses an hour.</summary>
    /// <param name="windows">Windows in ascending order.</param>
    /// <param name="step">Length of a window, ms.</param>
    public static IEnumerable<EffectStretch> Of(IEnumerable<EffectWindow> windows, long step)
    {
        EffectStretch? now = null;
        foreach (EffectWindow window in windows)
        {
            var next = new EffectStretch(window.At, window.At + step, window.State, window.Product, window.Bodies);
            if (now is not null && now.End == next.Start && Milliseconds.Modulo(next.Start, Milliseconds.Hour) != 0 && (now with { Start = next.Start, End = next.End }) == next)
            {
                now = now with { End = next.End };
                continue;
            }

            if (now is not null) yield return now;
            now = next;
        }

        if (now is not null) yield return now;
    }
}
