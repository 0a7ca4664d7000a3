namespace EvapMonitor.Core.Tests.Balances;

/// <summary>Normally distributed numbers that are the same in every run (Box and Muller 1958).</summary>
internal sealed class Gaussian(int state)
{
    private readonly Random _random = new(state);

    public double Next() => double.Sqrt(-2 * double.Log(1 - _random.NextDouble())) * double.Cos(double.Tau * _random.NextDouble());
}
