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
}
