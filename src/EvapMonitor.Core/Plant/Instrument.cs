namespace EvapMonitor.Core.Plant;

/// <summary>How an accuracy was stated; decides the divisor that makes it a standard uncertainty (JCGM 100, 4.3).</summary>
public enum AccuracyMeaning
{
    /// <summary>Half-width of a rectangular distribution: divided by √3.</summary>
    HalfWidth,
    /// <summary>Half-width of a 95 % interval of a normal distribution: divided by 1.96.</summary>
    NinetyFivePercent,
    /// <summary>Already one standard uncertainty.</summary>
    Standard,
}

/// <summary>An instrument's accuracy: constant until its next recalibration, so that no averaging shrinks it.</summary>
/// <param name="OfReading">Share of the reading, 0 to 1.</param>
/// <param name="Absolute">SI units of the quantity (a share of the range is stored here), 0 or more.</param>
/// <param name="Meaning">How the figure is meant.</param>
/// <param name="Assumed">True when the plant file says nothing and the default of the dimension stands in.</param>
public sealed record Accuracy(double OfReading, double Absolute, AccuracyMeaning Meaning, bool Assumed = false)
{
    private static readonly double RootOfThree = double.Sqrt(3);

    /// <summary>Standard uncertainty at a reading, SI units.</summary>
    /// <param name="reading">The reading in SI units as the instrument sees it: gauge pressures as gauge, temperatures in °C for a share of the reading.</param>
    public double Standard(double reading)
    {
        double stated = (OfReading * double.Abs(reading)) + Absolute;
        return Meaning switch
        {
            AccuracyMeaning.HalfWidth => stated / RootOfThree,
            AccuracyMeaning.NinetyFivePercent => stated / 1.96,
            _ => stated,
        };
    }
}

/// <summary>How a signal moves between two readings.</summary>
public enum Interpolation
{
    /// <summary>A value holds until the next reading.</summary>
    Step,
    /// <summary>A straight line joins two readings.</summary>
    Linear,
}

/// <summary>One signal of the plant and what is known of the instrument behind it.</summary>
public sealed record Instrument
{
    /// <summary>The signal's name in the historian or on the broker.</summary>
    public required string Signal { get; init; }

    /// <summary>The unit in which the signal arrives.</summary>
    public required UnitOfMeasure Unit { get; init; }

    /// <summary>The accuracy; where the plant file gives none, the default of the dimension, marked as assumed.</summary>
    public required Accuracy Accuracy { get; init; }

    /// <summary>Lowest and highest sound reading in SI units as the instrument sees it (gauge stays gauge); null is unlimited.</summary>
    public (double Low, double High)? Range { get; init; }

    /// <summary>How the signal moves between readings. Default <see cref="Interpolation.Step"/>.</summary>
    public Interpolation Interpolation { get; init; } = Interpolation.Step;

    /// <summary>How long a value is carried forward. Default 15 min; at most 6 h.</summary>
    public TimeSpan StaleAfter { get; init; } = TimeSpan.FromMinutes(15);

    /// <summary>How long a signal may stand still while its neighbours move. Default 2 h; at most 6 h.</summary>
    public TimeSpan FrozenAfter { get; init; } = TimeSpan.FromHours(2);

    /// <summary>The smallest change that counts as one, SI units; 0 means any change.</summary>
    public double Resolution { get; init; }
}

/// <summary>A quantity that is either a constant of the plant or measured; exactly one of the two is set.</summary>
/// <param name="Fixed">The constant, SI units.</param>
/// <param name="Measured">The instrument.</param>
public sealed record FixedOrMeasured(double? Fixed, Instrument? Measured);

/// <summary>A share that nobody measures exactly, such as heat loss: a value with its uncertainty.</summary>
/// <param name="Value">The share, 0 to 1.</param>
/// <param name="Standard">Its standard uncertainty, 0 or more.</param>
public sealed record UncertainShare(double Value, double Standard);
