using EvapMonitor.Core.Outlook;

namespace EvapMonitor.Simulator;

/// <summary>The story of one line: what it runs at, what happens to it, and what its people write down. All days are days of the story.</summary>
public abstract class DemoLine
{
    /// <summary>Name of the line in the plant file.</summary>
    public abstract string Name { get; }

    /// <summary>The heating surfaces.</summary>
    public abstract IReadOnlyList<Surface> Surfaces { get; }

    /// <summary>The cleanings as they were.</summary>
    public abstract IReadOnlyList<SurfaceCleaning> Cleanings { get; }

    /// <summary>The cleanings as they were written down.</summary>
    public abstract IReadOnlyList<LogEntry> Log { get; }

    /// <summary>When the line stands.</summary>
    public abstract IReadOnlyList<Stretch> Stops { get; }

    /// <summary>Gas in chests.</summary>
    public virtual IReadOnlyList<GasInChest> Gas => [];

    /// <summary>Instruments at fault.</summary>
    public abstract IReadOnlyList<InstrumentFault> Faults { get; }

    /// <summary>The value of the signal that tells the product; 0 is water where there is such a signal.</summary>
    public virtual int ProductAt(StoryTime time) => 1;

    /// <summary>The bodies that serve each effect; null where every effect is its own body.</summary>
    public virtual IReadOnlyDictionary<string, IReadOnlyList<string>>? BodiesAt(StoryTime time) => null;

    /// <summary>What the line runs at.</summary>
    /// <param name="time">The instant.</param>
    /// <param name="coefficients">Coefficient of each surface in service, W/(m²·K).</param>
    public abstract RatingConditions ConditionsAt(StoryTime time, IReadOnlyDictionary<string, double> coefficients);

    /// <summary>What it runs at instead where the operating point at <see cref="ConditionsAt"/> is beyond what the plant can do; null where it is not.</summary>
    /// <param name="time">The instant.</param>
    /// <param name="conditions">The conditions.</param>
    /// <param name="point">The operating point at them; null where there is none.</param>
    public virtual RatingConditions? Limited(StoryTime time, RatingConditions conditions, OperatingPoint? point) => null;

    /// <summary>Slow wandering of a condition of this line, of standard deviation 1.</summary>
    protected double Wander(string what, StoryTime time, double days) => Noise.Wander(Noise.KeyOf(Name + what), time.Day, days);
}
