using EvapMonitor.Core.Plant;

namespace EvapMonitor.Core.Balances;

/// <summary>Which bodies serve an effect, by the signals of a window.</summary>
internal sealed class AreaInService
{
    private readonly double _own;
    private readonly (string Name, double Area, int Signal, ActiveSignal? Active)[] _bodies;

    /// <summary>Gathers the bodies of an effect.</summary>
    /// <param name="line">The line.</param>
    /// <param name="effect">The effect.</param>
    /// <param name="place">The place of an instrument.</param>
    public AreaInService(Line line, Effect effect, Func<Instrument?, int> place)
    {
        _own = effect.Bodies.Count == 0 ? effect.Area : 0;
        _bodies = [.. line.Bodies.Where(body => effect.Bodies.Contains(body.Name) || body.Serves.ContainsKey(effect.Name))
            .Select(body => body.Serves.TryGetValue(effect.Name, out ActiveSignal? active) ? (body.Name, body.Area, place(active.Instrument), active) : (body.Name, body.Area, -1, null))];
    }

    /// <summary>Places of the signals that tell it.</summary>
    public IEnumerable<int> Signals => _bodies.Where(body => body.Active is not null).Select(body => body.Signal);

    /// <summary>Surface in service, m²; 0 when no body serves; NaN when a signal that tells it is absent.</summary>
    public double At(LineInputs inputs)
    {
        double area = 0;
        foreach ((_, double surface, int signal, ActiveSignal? active) in _bodies)
        {
            double value = inputs.At(signal);
            if (active is not null && double.IsNaN(value)) return double.NaN;
            if (active is null || active.IsActive(value)) area += surface;
        }

        // A body that serves an effect of one surface takes the place of that surface.
        return area > 0 ? area : _own;
    }

    /// <summary>Names of the bodies in service, joined by +; empty for the effect's own surface; null when a signal that tells it is absent, or none serves.</summary>
    public string? NamesAt(LineInputs inputs)
    {
        string names = "";
        foreach ((string name, _, int signal, ActiveSignal? active) in _bodies)
        {
            double value = inputs.At(signal);
            if (active is not null && double.IsNaN(value)) return null;
            if (active is null || active.IsActive(value)) names = names.Length == 0 ? name : names + "+" + name;
        }

        return names.Length > 0 || _own > 0 ? names : null;
    }
}
