namespace EvapMonitor.Core.Balances;

/// <summary>How a state of a line is moved by an iteration: bounded where a variable would leave its sense, pressures by ratio.</summary>
internal sealed class StateSteps(IReadOnlyList<VariableKey> keys, double[] scale)
{
    /// <summary>The share of a step that keeps every variable where it makes sense.</summary>
    /// <param name="x">The state.</param>
    /// <param name="moved">The whole step by variable, in the variables' own units.</param>
    public double Allowed(double[] x, ReadOnlySpan<double> moved)
    {
        double share = 1;
        for (int i = 0; i < x.Length; i++) share = double.Min(share, Allowed(i, x[i], moved[i]));
        return share;
    }

    /// <summary>The share of a step of one variable that keeps it where it makes sense.</summary>
    public double Allowed(int i, double x, double moved)
    {
        double most = keys[i].Kind switch
        {
            VariableKind.VapourPressure or VariableKind.ChestPressure or VariableKind.SteamPressure or VariableKind.DischargePressure => 0.7 * x,
            VariableKind.LeavingSolids or VariableKind.ProductSolids => moved > 0 ? 0.7 * (0.99 - x) : 0.7 * double.Max(x, 0.01),
            VariableKind.BoilingTemperature or VariableKind.HeatingTemperature => 30,
            VariableKind.LeavingFlow => moved < 0 ? 0.8 * double.Max(x, 0.01 * scale[i]) : double.PositiveInfinity,
            _ => double.PositiveInfinity,
        };
        return double.Abs(moved) > most ? most / double.Abs(moved) : 1;
    }

    /// <summary>Moves a state. Saturation temperatures are nearly straight in the ratio of pressures, and a pressure stays above nothing.</summary>
    public void Move(ReadOnlySpan<double> x, ReadOnlySpan<double> moved, double share, Span<double> into)
    {
        for (int i = 0; i < x.Length; i++)
        {
            double step = share * moved[i];
            into[i] = keys[i].Kind is VariableKind.VapourPressure or VariableKind.ChestPressure or VariableKind.SteamPressure or VariableKind.DischargePressure && step != 0
                ? x[i] * double.Exp(step / x[i])
                : x[i] + step;
        }
    }
}
