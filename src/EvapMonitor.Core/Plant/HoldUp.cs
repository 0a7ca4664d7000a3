namespace EvapMonitor.Core.Plant;

/// <summary>What a vessel holds, and what its level says of that.</summary>
public static class HoldUp
{
    /// <summary>Standard uncertainty of <see cref="MassPerLevel"/>, as a share: vessels are not quite upright and contents not always the same (stated here).</summary>
    public const double MassPerLevelStandard = 0.05;

    /// <summary>What a metre of level holds, kg/m: the hold-up over the range of the level; null when one of them is not given.</summary>
    /// <param name="holdUp">What the vessel holds over the range of its level, kg.</param>
    /// <param name="level">Its level.</param>
    public static double? MassPerLevel(double? holdUp, Instrument? level) =>
        holdUp is { } mass && level?.Range is { } range && range.High > range.Low && double.IsFinite(range.High - range.Low) ? mass / (range.High - range.Low) : null;
}
