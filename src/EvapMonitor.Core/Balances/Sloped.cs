namespace EvapMonitor.Core.Balances;

/// <summary>A property with its slopes.</summary>
/// <param name="Value">The property, SI units.</param>
/// <param name="First">Partial derivative by its first argument.</param>
/// <param name="Second">Partial derivative by its second argument; 0 when it has one alone.</param>
public readonly record struct Sloped(double Value, double First, double Second = 0);
