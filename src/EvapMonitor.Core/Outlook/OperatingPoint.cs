using EvapMonitor.Core.Balances;

namespace EvapMonitor.Core.Outlook;

/// <summary>What a rating leaves: an operating point, or why there is none. Exactly one of the two is set.</summary>
/// <param name="Point">The operating point.</param>
/// <param name="Reason">Why there is none, in words for people.</param>
public sealed record RatingResult(OperatingPoint? Point, string? Reason);

/// <summary>A line at its operating point, SI units.</summary>
public sealed class OperatingPoint
{
    private readonly LineVariables _variables;
    private readonly double[] _state;

    internal OperatingPoint(LineVariables variables, double[] state, LineGraph graph, int steps, IReadOnlyList<string> remarks)
    {
        (_variables, _state, Steps, Remarks) = (variables, state, steps, remarks);
        double steam = graph.HasSteam ? Feed(VariableKind.SteamFlow) : 0;
        FreshSteam = steam + graph.Line.Recompressors.Sum(machine => variables[VariableKind.MotiveFlow, machine.Name] is >= 0 and var i ? state[i] : 0);
        Effects = [.. graph.Line.Effects.Select((effect, i) => new EffectPoint(
            effect.Name, graph.Bodies[i].Sum(body => body.Area), this[VariableKind.Coefficient, effect.Name], this[VariableKind.Duty, effect.Name],
            this[VariableKind.HeatingTemperature, effect.Name], this[VariableKind.BoilingTemperature, effect.Name],
            this[VariableKind.ChestPressure, effect.Name], this[VariableKind.VapourPressure, effect.Name], this[VariableKind.VapourFlow, effect.Name],
            this[VariableKind.LeavingFlow, effect.Name], this[VariableKind.LeavingSolids, effect.Name], this[VariableKind.CondensateFlow, effect.Name]))];

        double Feed(VariableKind kind) => this[kind];
    }

    /// <summary>A variable of the line.</summary>
    /// <exception cref="ArgumentException">The line has none such.</exception>
    public double this[VariableKind kind, string place = ""] =>
        _variables[kind, place] is >= 0 and var i ? _state[i] : throw new ArgumentException($"The line has no {new VariableKey(kind, place)}.");

    /// <summary>All variables, in the order of the line's equations.</summary>
    public IReadOnlyList<double> State => _state;

    /// <summary>Feed, kg/s.</summary>
    public double FeedFlow => this[VariableKind.FeedFlow];

    /// <summary>Product, kg/s.</summary>
    public double ProductFlow => this[VariableKind.ProductFlow];

    /// <summary>Water evaporated, kg/s.</summary>
    public double Evaporation => this[VariableKind.Evaporation];

    /// <summary>Steam from the main to chests and to nozzles, kg/s.</summary>
    public double FreshSteam { get; }

    /// <summary>Water evaporated by steam, kg/kg; infinite for a line that takes none.</summary>
    public double SteamEconomy => Evaporation / FreshSteam;

    /// <summary>The effects in plant-file order.</summary>
    public IReadOnlyList<EffectPoint> Effects { get; }

    /// <summary>Newton steps taken.</summary>
    public int Steps { get; }

    /// <summary>What to bear in mind, such as a machine beyond its curve; mostly empty.</summary>
    public IReadOnlyList<string> Remarks { get; }
}

/// <summary>One effect at the operating point.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Area">Heating surface in service, m².</param>
/// <param name="Coefficient">W/(m²·K).</param>
/// <param name="Duty">W.</param>
/// <param name="HeatingTemperature">K.</param>
/// <param name="BoilingTemperature">K.</param>
/// <param name="ChestPressure">Pa.</param>
/// <param name="VapourPressure">Pa.</param>
/// <param name="Vapour">kg/s.</param>
/// <param name="LeavingFlow">Liquor that leaves, kg/s.</param>
/// <param name="LeavingSolids">Its solids, mass fraction.</param>
/// <param name="Condensate">Of its own chest, kg/s.</param>
public sealed record EffectPoint(
    string Name, double Area, double Coefficient, double Duty, double HeatingTemperature, double BoilingTemperature, double ChestPressure, double VapourPressure,
    double Vapour, double LeavingFlow, double LeavingSolids, double Condensate);
