using EvapMonitor.Core;
using EvapMonitor.Core.Plant;

namespace EvapMonitor.Service.Store;

/// <summary>Where a signal's readings are kept and which lines use them.</summary>
/// <param name="SignalId">Key in the store.</param>
/// <param name="HomeLineId">The line under which its readings are stored: the first that uses it.</param>
/// <param name="Users">Keys of the lines whose results rest on it.</param>
public sealed record SignalPlace(int SignalId, int HomeLineId, IReadOnlyList<int> Users);

/// <summary>A line of the plant in force with its keys in the store.</summary>
/// <param name="LineId">Key of the line.</param>
/// <param name="Line">The line.</param>
/// <param name="EffectIds">Keys of its effects in plant-file order.</param>
public sealed record LinePlace(int LineId, Line Line, IReadOnlyList<int> EffectIds)
{
    /// <summary>The effect with a name and its key; null when there is none.</summary>
    public (Effect Effect, int EffectId)? Find(string effect)
    {
        for (int i = 0; i < Line.Effects.Count; i++)
        {
            if (Line.Effects[i].Name == effect) return (Line.Effects[i], EffectIds[i]);
        }

        return null;
    }

    /// <summary>The effect with a key; null when there is none.</summary>
    public Effect? Find(int effectId)
    {
        for (int i = 0; i < EffectIds.Count; i++)
        {
            if (EffectIds[i] == effectId) return Line.Effects[i];
        }

        return null;
    }
}

/// <summary>The plant revision in force, with the keys that the store gave to its lines, effects and signals.</summary>
/// <param name="RevisionId">The revision.</param>
/// <param name="AcceptedAt">When it was accepted.</param>
/// <param name="InForceFrom">From when it holds.</param>
/// <param name="Author">Who gave it.</param>
/// <param name="Text">The plant file.</param>
/// <param name="Site">The plant.</param>
/// <param name="Lines">The lines in plant-file order.</param>
/// <param name="Signals">The signals by name.</param>
public sealed record PlantInForce(
    int RevisionId,
    DateTimeOffset AcceptedAt,
    DateTimeOffset InForceFrom,
    string Author,
    string Text,
    Site Site,
    IReadOnlyList<LinePlace> Lines,
    IReadOnlyDictionary<string, SignalPlace> Signals)
{
    /// <summary>How long after its instant a reading may still move a result, over all lines.</summary>
    public TimeSpan Reach { get; } = Lines.Select(place => new LineEvaluation(Site, place.Line).Reach).DefaultIfEmpty().Max();

    /// <summary>The line with a name; null when there is none.</summary>
    public LinePlace? Find(string line) => Lines.FirstOrDefault(place => place.Line.Name == line);

    /// <summary>The signals that a site's lines need, each with the names of the lines that use it, in plant-file order.</summary>
    public static IEnumerable<(string Signal, IReadOnlyList<string> Lines)> SignalsOf(Site site) =>
        site.Lines
            .SelectMany(line => new LineEvaluation(site, line).Signals.Select(signal => (signal, line.Name)))
            .GroupBy(use => use.signal)
            .Select(uses => (uses.Key, (IReadOnlyList<string>)[.. uses.Select(use => use.Name)]));
}
