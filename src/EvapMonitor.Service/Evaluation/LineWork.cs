using EvapMonitor.Core;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Conditioning;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Evaluation;

/// <summary>Evaluates the days of one line under one plant revision. For today it keeps what it knows of the last hours, so that a closing window costs one window.</summary>
internal sealed class LineWork(PlantInForce plant, LinePlace line, ReadingStore store)
{
    private readonly LineEvaluation _evaluation = new(plant.Site, line.Line);
    private LineMemory? _live;

    /// <summary>The plant this work is for.</summary>
    public PlantInForce Plant => plant;

    /// <summary>Evaluates what has changed of a day, by whole hours, up to the last closed window.</summary>
    /// <param name="taken">The day and since when it changed.</param>
    /// <param name="closed">End of the last closed window, ms.</param>
    /// <param name="log">What people have logged.</param>
    public DayResult Evaluate(TakenDay taken, long closed, LineLog log)
    {
        long day = Instant.ToMilliseconds(taken.Day.ToDateTime(TimeOnly.MinValue, DateTimeKind.Utc)), end = day + Milliseconds.Day;
        long changed = long.Max(day, Instant.ToMilliseconds(taken.From));
        long from = changed - Milliseconds.Modulo(changed, Milliseconds.Hour), to = long.Min(end, closed);
        bool live = to < end;
        LineMemory memory = live ? LiveMemory(day, changed) : _evaluation.NewMemory();
        long began = EvaluationTimes.Begin();
        Dictionary<string, ReadingSeries> readings = Read(memory, from, to);
        began = EvaluationTimes.Count("read", began);
        LineWindow[] windows = _evaluation.Evaluate(memory, readings, from, to, log);
        EvaluationTimes.Count("compute", began);
        long last = readings.Values.Select(series => series.Count == 0 ? long.MinValue : series.At[^1]).DefaultIfEmpty(long.MinValue).Max();
        bool held = live && last > long.MinValue && last + (long)_evaluation.LongestStale.TotalMilliseconds > to;
        return new DayResult(line, taken.Day, Utc(from), windows, held ? Utc(to) : null, plant.Site.Window);
    }

    private LineMemory LiveMemory(long day, long changed)
    {
        // A change at the day's very start may stem from readings before it, of which nothing is said here.
        if (_live is null || changed == day) _live = _evaluation.NewMemory();
        _live.Forget(changed);
        return _live;
    }

    private Dictionary<string, ReadingSeries> Read(LineMemory memory, long from, long to)
    {
        var wanted = _evaluation.Signals.ToDictionary(name => name, name => plant.Signals[name]);
        long start = memory.MissingFrom(from, to) - (long)_evaluation.LongestStale.TotalMilliseconds;
        Dictionary<string, ReadingSeries> readings = store.Read(wanted, Utc(start), Utc(to));
        var laboratory = _evaluation.LaboratorySignals.ToDictionary(name => name, name => plant.Signals[name]);
        if (laboratory.Count == 0) return readings;
        foreach ((string name, ReadingSeries series) in store.Read(laboratory, Utc(from - (long)_evaluation.LeadIn.TotalMilliseconds), Utc(to))) readings[name] = series;
        return readings;
    }

    private static DateTimeOffset Utc(long at) => DateTimeOffset.FromUnixTimeMilliseconds(at);
}
