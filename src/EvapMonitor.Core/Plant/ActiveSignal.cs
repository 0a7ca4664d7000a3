namespace EvapMonitor.Core.Plant;

/// <summary>How a signal is compared with a threshold.</summary>
public enum Comparison
{
    /// <summary>Greater than the threshold.</summary>
    Above,
    /// <summary>Greater than the threshold or equal to it.</summary>
    AtLeast,
    /// <summary>Less than the threshold.</summary>
    Below,
    /// <summary>Less than the threshold or equal to it.</summary>
    AtMost,
    /// <summary>Equal to the threshold.</summary>
    Equal,
}

/// <summary>A signal that tells whether something is going on, such as a cleaning.</summary>
/// <param name="Instrument">The signal, a bare number.</param>
/// <param name="Comparison">How it is compared.</param>
/// <param name="Threshold">With what.</param>
public sealed record ActiveSignal(Instrument Instrument, Comparison Comparison, double Threshold)
{
    /// <summary>True when a value says that it is going on; false for what is not a number.</summary>
    /// <param name="value">The value of the signal as it arrives.</param>
    public bool IsActive(double value) => Comparison switch
    {
        Comparison.Above => value > Threshold,
        Comparison.AtLeast => value >= Threshold,
        Comparison.Below => value < Threshold,
        Comparison.AtMost => value <= Threshold,
        _ => value == Threshold,
    };
}
