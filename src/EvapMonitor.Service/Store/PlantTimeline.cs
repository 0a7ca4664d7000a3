namespace EvapMonitor.Service.Store;

/// <summary>
/// Which plant revision is in force when: at an instant the one with the latest start at or before it, of those with the same start the one accepted last; before
/// the first start the first. A UTC day is computed under the revision in force at its midnight.
/// </summary>
public sealed class PlantTimeline
{
    private readonly PlantInForce[] _eras;

    /// <summary>Puts revisions in their order of time.</summary>
    /// <param name="eras">The revisions that are in force at some time.</param>
    /// <param name="homes">All signals that any accepted revision has named, with where their readings are kept: key and line.</param>
    /// <param name="newest">The revision accepted last, in force or not.</param>
    public PlantTimeline(IEnumerable<PlantInForce> eras, IEnumerable<(string Signal, int SignalId, int HomeLineId)> homes, int newest)
    {
        _eras = [.. InForce(eras, era => era.InForceFrom, era => era.RevisionId)];
        if (_eras.Length == 0) throw new ArgumentException("A plant without a revision has no time line.", nameof(eras));
        Newest = newest;
        Signals = homes.ToDictionary(
            home => home.Signal,
            home => new SignalPlace(home.SignalId, home.HomeLineId, [.. _eras.SelectMany(era => era.Signals.TryGetValue(home.Signal, out SignalPlace? place) ? place.Users : []).Distinct()]));
        LineIds = [.. _eras.SelectMany(era => era.Lines.Select(line => line.LineId)).Distinct()];
        Reach = _eras.Max(era => era.Reach);
        HistoryFrom = _eras.Min(era => era.Site.HistoryFrom);
    }

    /// <summary>The revisions that are in force at some time, in order of time.</summary>
    public IReadOnlyList<PlantInForce> Eras => _eras;

    /// <summary>The revision accepted last.</summary>
    public int Newest { get; }

    /// <summary>
    /// The signals that any accepted revision has named, each with the lines whose results rest on it at some time. What only replaced revisions named is still
    /// stored: a later one may name it again.
    /// </summary>
    public IReadOnlyDictionary<string, SignalPlace> Signals { get; }

    /// <summary>Keys of the lines that any revision in force at some time has.</summary>
    public IReadOnlyList<int> LineIds { get; }

    /// <summary>How long after its instant a reading may still move a result, over all revisions.</summary>
    public TimeSpan Reach { get; }

    /// <summary>From when readings are taken: the earliest of all revisions.</summary>
    public DateTimeOffset HistoryFrom { get; }

    /// <summary>The revision in force at an instant.</summary>
    public PlantInForce At(DateTimeOffset instant)
    {
        int era = _eras.Length - 1;
        while (era > 0 && _eras[era].InForceFrom > instant) era--;
        return _eras[era];
    }

    /// <summary>The revision under which a UTC day is computed.</summary>
    public PlantInForce On(DateOnly day) => At(Midnight(day));

    /// <summary>Of revisions, accepted in the order of their numbers, those that are in force at some time, in order of time.</summary>
    public static IEnumerable<T> InForce<T>(IEnumerable<T> revisions, Func<T, DateTimeOffset> start, Func<T, int> number) =>
        revisions.GroupBy(start).Select(same => same.MaxBy(number)!).OrderBy(start);

    /// <summary>Start of a UTC day.</summary>
    public static DateTimeOffset Midnight(DateOnly day) => new(day.ToDateTime(TimeOnly.MinValue), TimeSpan.Zero);

    /// <summary>The first UTC day that begins at or after an instant: the first that a revision with this start has.</summary>
    public static DateOnly FirstDay(DateTimeOffset start) => DateOnly.FromDateTime(start.UtcDateTime.AddTicks(TimeSpan.TicksPerDay - 1));

    /// <summary>True when an instant is the start of a UTC day: only there may a revision begin, because the day is the unit of evaluation.</summary>
    public static bool IsMidnight(DateTimeOffset instant) => instant.UtcDateTime.TimeOfDay == TimeSpan.Zero;
}
