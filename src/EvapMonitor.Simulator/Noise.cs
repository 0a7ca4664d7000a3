namespace EvapMonitor.Simulator;

/// <summary>Normally distributed noise that is the same on every machine and in every version of the runtime.</summary>
public sealed class Noise(ulong seed)
{
    private ulong _state = seed;

    /// <summary>The next value of mean 0 and standard deviation 1 (Box and Muller 1958).</summary>
    public double Next() => double.Sqrt(-2 * double.Log(1 - Uniform())) * double.Cos(double.Tau * Uniform());

    /// <summary>The next value evenly spread over [0, 1).</summary>
    public double Uniform()
    {
        // SplitMix64 (Steele, Lea and Flood 2014).
        ulong z = _state += 0x9E3779B97F4A7C15;
        z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9;
        z = (z ^ (z >> 27)) * 0x94D049BB133111EB;
        return ((z ^ (z >> 31)) >> 11) * (1.0 / (1UL << 53));
    }

    /// <summary>Noise that belongs to an instant: the same whatever was asked before, of mean 0 and standard deviation 1.</summary>
    /// <param name="key">Tells one source of noise from another.</param>
    /// <param name="tick">The instant, in any whole unit.</param>
    public static double At(ulong key, long tick) => new Noise(key ^ ((ulong)tick * 0xD1342543DE82EF95)).Next();

    /// <summary>A slow wandering of mean 0: smooth between independent values of standard deviation 1, one per period.</summary>
    /// <param name="key">Tells one source from another.</param>
    /// <param name="day">The instant, days.</param>
    /// <param name="period">Days from one independent value to the next.</param>
    public static double Wander(ulong key, double day, double period)
    {
        double at = day / period, floor = double.Floor(at), share = at - floor;
        double before = At(key, (long)floor), after = At(key, (long)floor + 1);
        return before + ((after - before) * share * share * (3 - (2 * share)));
    }

    /// <summary>A key for a name (FNV-1a, 64 bit).</summary>
    public static ulong KeyOf(string name)
    {
        ArgumentNullException.ThrowIfNull(name);
        ulong hash = 0xCBF29CE484222325;
        foreach (char letter in name) hash = (hash ^ letter) * 0x100000001B3;
        return hash;
    }
}
