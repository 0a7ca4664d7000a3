using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Outlook;

/// <summary>
/// The line equations solved forward: coefficients, surfaces, steam, condenser, feed and product in; flows, temperatures, evaporation and steam economy out.
/// Where there is no operating point the result says why; nothing throws on conditions that do not fit.
/// </summary>
public sealed class Rating
{
    private readonly LineGraph _graph;
    private readonly LineProperties _properties;
    private readonly LineVariables _variables;

    /// <summary>Prepares the rating of a line. Not for use by two threads at a time.</summary>
    /// <param name="graph">The line, with the bodies that are in service.</param>
    /// <param name="properties">Properties of water and of the liquor.</param>
    public Rating(LineGraph graph, LineProperties properties)
    {
        ArgumentNullException.ThrowIfNull(graph);
        ArgumentNullException.ThrowIfNull(properties);
        (_graph, _properties) = (graph, properties);
        _variables = new LineVariables(graph);
    }

    /// <summary>Finds the operating point.</summary>
    /// <param name="conditions">What is given.</param>
    /// <param name="near">An operating point of the same line to start from, where one is at hand; null: a start is made.</param>
    public RatingResult Solve(RatingConditions conditions, OperatingPoint? near = null)
    {
        ArgumentNullException.ThrowIfNull(conditions);
        var givens = new RatingGivens(_graph, _variables, conditions, withMakeUp: true);
        RatingResult result = Solve(conditions, givens, near);
        // A compressor that delivers more than enough needs no steam to help it: the rest of the vapour goes to the condenser.
        return result.Point is null && givens.HasMakeUp ? Solve(conditions, new RatingGivens(_graph, _variables, conditions, withMakeUp: false), near) : result;
    }

    private RatingResult Solve(RatingConditions conditions, RatingGivens givens, OperatingPoint? near)
    {
        if (givens.Problem is not null) return new(null, givens.Problem);
        if (TooCold(conditions) is { } cold) return new(null, cold);
        var start = new RatingStart(_graph, _variables, _properties, conditions, givens);
        double[] made = start.State();
        double flow = start.TypicalFlow;
        if (!(flow > 0) || !double.IsFinite(flow)) return new(null, "no operating point: no heat flows through the line");
        var equations = new LineEquations(_graph, _properties, flow, withMachineCurves: true);
        var newton = new LineNewton(equations, [.. Enumerable.Range(0, _variables.Count).Where(i => !givens.Values.ContainsKey(i))], flow);
        string? flaw = null;
        int steps = 0;
        foreach (double[] from in (double[][])(near is null ? [made] : [Near(near, givens), made]))
        {
            double[]? solution = newton.Solve(from);
            steps += newton.Steps;
            if (solution is null) continue;
            flaw = RatingSense.Flaw(_graph, _variables, solution);
            if (flaw is null) return new(new OperatingPoint(_variables, solution, _graph, steps, RatingSense.Remarks(_graph, _variables, solution)), null);
        }

        return new(null, flaw is not null
            ? "no operating point: " + flaw
            : $"no operating point was found: the conditions do not fit the line ({newton.Worst(made).Key} stays open)");
    }

    private static double[] Near(OperatingPoint near, RatingGivens givens)
    {
        double[] state = [.. near.State];
        foreach ((int index, double value) in givens.Values) state[index] = value;
        return state;
    }

    /// <summary>Steam that is not hotter than the last vapour cannot drive anything.</summary>
    private string? TooCold(RatingConditions conditions)
    {
        if (conditions.SteamPressure is not { } steam || !_graph.BySteamAlone.Contains(true) || steam > conditions.LastVapourPressure) return null;
        double hot = _properties.SaturationTemperature(steam).Value - 273.15, cold = _properties.SaturationTemperature(conditions.LastVapourPressure).Value - 273.15;
        return FormattableString.Invariant($"no operating point: steam condensing at {hot:0.#} °C is not hotter than the last vapour at {cold:0.#} °C");
    }
}
