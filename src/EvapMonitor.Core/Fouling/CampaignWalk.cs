using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>
/// Walks through the interruptions of a surface in order of time. At each one everything before it is known and nothing after it but the hours by which it is judged:
/// so no number of a day moves because of what came after its campaign.
/// </summary>
internal sealed partial class CampaignWalk
{
    private readonly SurfaceSettings _settings;
    private readonly SurfaceTable _table;
    private readonly IReadOnlyList<SurfaceHour> _hours;
    private readonly IReadOnlyList<Interruption> _interruptions;
    private readonly long[] _recalibrations;
    private readonly int[] _segment;
    private readonly bool[] _settled;
    private readonly List<OpenCampaign> _campaigns = [];
    private readonly List<SurfaceCleaning> _cleanings = [];
    private readonly List<SurfaceStop> _stops = [];

    public CampaignWalk(SurfaceSettings settings, IReadOnlyList<SurfaceHour> hours, IReadOnlyList<SurfaceSpan> spans, IReadOnlyList<SurfaceEvent> events)
    {
        _settings = settings;
        _hours = hours;
        _table = new SurfaceTable(hours, spans);
        _interruptions = Interruption.Find(_table, settings, spans, events);
        _recalibrations = Recalibrations(events);
        foreach (SurfaceEvent one in Interruption.NotBegun(_table, settings, spans, events))
            _cleanings.Add(Cleaning(new Interruption { Start = one.Start, End = long.MaxValue, CleaningStart = one.Start, CleaningEnd = long.MaxValue, Logged = true, Words = [one.Word], Ids = one.Id is { } id ? [id] : [] }, null, Recovery.NotComparable(""), CleaningVerdict.AwaitingHours, "it goes on, but the surface has not stopped"));
        _segment = new int[_table.Count];
        _settled = [.. _table.Whole];
        _share = new double[_table.Count];
        _sharedBy = new int[_table.Count];
        Array.Fill(_share, 1);
        Array.Fill(_sharedBy, -1);
        _results = new CleanHour[_table.Count];
        Divide();
    }

    /// <summary>When instruments were recalibrated: at the end, where it took time.</summary>
    public static long[] Recalibrations(IEnumerable<SurfaceEvent> events) =>
        [.. events.Where(one => one.Kind == SurfaceEventKind.Recalibration).Select(one => one.End == long.MaxValue ? one.Start : long.Max(one.Start, one.End)).Order()];

    /// <summary>Goes through all interruptions.</summary>
    public SurfaceHistory Run(IReadOnlyList<WaterTest> waterTests)
    {
        if (_table.Count > 0)
        {
            _campaigns.Add(new OpenCampaign(_table.At[0], 0, 0, CleaningSource.FirstData, 1));
            for (int k = 0; k < _interruptions.Count; k++) Judge(k);
            Extend(_table.Count);
        }

        return new SurfaceHistory(Summaries(), [.. _cleanings.OrderBy(cleaning => cleaning.Start)], _stops, _results, _references, waterTests);
    }

    private void Judge(int k)
    {
        Interruption interruption = _interruptions[k];
        bool final = k + 1 < _interruptions.Count;
        int first = _table.FirstFrom(interruption.End), until = final ? _table.FirstFrom(_interruptions[k + 1].Start - Milliseconds.Hour + 1) : _table.Count;
        Extend(first);
        int from = int.Max(_campaigns[^1].From, _table.FirstFrom(Baseline(interruption.Start)));
        Recovery Compare(Func<SurfaceUse, CleanReference> expectation) => Recovery.Compare(_table, _settled, interruption, from, until, final, expectation);
        Recovery recovery = Recalibrated(interruption) is { } when
            ? Recovery.NotComparable($"an instrument was recalibrated, or the surface changed, on {CleanLevels.Day(when)}")
            : Compare(use => Expectation(use, interruption));
        if (!interruption.IsCleaning && !IsRecognised(interruption, recovery))
        {
            string reason = interruption.Rejected ? "rejected as a cleaning" : recovery.Test is null ? recovery.Reason : "nothing recovered";
            _stops.Add(new SurfaceStop(interruption.Start, interruption.End, recovery.Test, reason));
            return;
        }

        End(interruption, first);
        bool goesOn = interruption.End == long.MaxValue;
        if (!goesOn)
        {
            Begin(interruption, recovery, first);
            Extend(until);
        }

        // The same comparison, against the level in which this cleaning has its share.
        Recovery told = goesOn || recovery.Test is null ? recovery : Compare(use => ReferenceOf(_campaigns.Count - 1, use, first));
        (CleaningVerdict verdict, string reasonGiven) = Verdict(interruption, recovery);
        _cleanings.Add(Cleaning(interruption, recovery.Test, told, verdict, reasonGiven));
        if (goesOn) return;
        _campaigns[^1].RemovedShare = _cleanings[^1].Removed.Value / _cleanings[^1].Before.Value;
        _campaigns[^1].DidNotClean = verdict == CleaningVerdict.DidNotClean;
    }

    private void End(Interruption interruption, int first)
    {
        // A log may say that a cleaning began before the first hour of all.
        _campaigns[^1].End = long.Max(_campaigns[^1].Start, interruption.IsCleaning ? interruption.CleaningStart : interruption.Start);
        // Before the first hour of all there was no campaign to end.
        if (first == 0) _campaigns.RemoveAt(0);
    }

    private void Begin(Interruption interruption, Recovery recovery, int first)
    {
        bool known = interruption.IsCleaning;
        long start = long.Max(known ? interruption.CleaningEnd : interruption.End, _campaigns.Count > 0 ? _campaigns[^1].End!.Value : long.MinValue);
        double origin = first < _table.Count ? _table.Served[first] - 0.5 : double.NaN;
        _campaigns.Add(new OpenCampaign(start, first, origin, interruption.Source, known ? 1 : 1 - recovery.Test!.Significance));
    }

    private long Baseline(long at) => _recalibrations.LastOrDefault(one => one <= at, long.MinValue);

    private long? Recalibrated(Interruption interruption)
    {
        // One during the first hours of production counts as well: those hours are left out of the comparison anyway.
        long until = interruption.End == long.MaxValue ? interruption.End : interruption.End + (LevelSample.StartUp * Milliseconds.Hour);
        foreach (long at in _recalibrations)
        {
            if (at > interruption.Start && at < until) return at;
        }

        return null;
    }

    /// <summary>Numbers the stretches of hours between interruptions and recalibrations, and marks the hours that do not tell of the surface.</summary>
    private void Divide()
    {
        foreach (Interruption interruption in _interruptions)
        {
            int inside = _table.FirstFrom(interruption.Start - Milliseconds.Hour + 1), first = _table.FirstFrom(interruption.End);
            for (int i = inside; i < int.Min(first + LevelSample.StartUp, _table.Count); i++) _settled[i] = false;
            if (first < _table.Count) _segment[first]++;
        }

        foreach (long at in _recalibrations)
        {
            int first = _table.FirstFrom(at);
            if (first < _table.Count) _segment[first]++;
        }

        for (int i = 1; i < _table.Count; i++) _segment[i] += _segment[i - 1];
    }
}
