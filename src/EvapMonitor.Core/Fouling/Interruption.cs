using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>A time in which a surface did not produce, and what is known of it beforehand.</summary>
internal sealed record Interruption
{
    /// <summary>Two interruptions with fewer hours of production between them are one: the hours between are starting up.</summary>
    public const int FewestHoursBetween = 3;

    public required long Start { get; init; }

    /// <summary><see cref="long.MaxValue"/> while it goes on.</summary>
    public required long End { get; init; }

    /// <summary>Start of what was logged or signalled as a cleaning in it.</summary>
    public long CleaningStart { get; init; } = long.MaxValue;

    public long CleaningEnd { get; init; } = long.MinValue;

    public bool Logged { get; init; }

    public bool Signalled { get; init; }

    public bool Rejected { get; init; }

    public IReadOnlyList<string> Words { get; init; } = [];

    public IReadOnlyList<Guid> Ids { get; init; } = [];

    public bool IsCleaning => Logged || Signalled;

    public CleaningSource Source => Logged ? CleaningSource.Logged : Signalled ? CleaningSource.Signal : CleaningSource.Recognised;

    /// <summary>Finds the interruptions, in order of time and apart from each other.</summary>
    public static IReadOnlyList<Interruption> Find(SurfaceTable table, SurfaceSettings settings, IReadOnlyList<SurfaceSpan> spans, IReadOnlyList<SurfaceEvent> events)
    {
        List<Interruption> standing = [.. Standing(table, settings, spans)];
        IEnumerable<Interruption> logged = events.Where(one => one.Kind == SurfaceEventKind.Cleaning)
            .Select(one => Of(one, standing)).OfType<Interruption>();
        var found = new List<Interruption>();
        foreach (Interruption next in standing.Concat(logged).OrderBy(one => one.Start).ThenBy(one => one.End).ThenBy(one => one.Ids.Count > 0 ? one.Ids[0] : Guid.Empty))
        {
            if (found.Count > 0 && HoursBetween(table, found[^1].End, next.Start) < FewestHoursBetween) found[^1] = found[^1].With(next);
            else found.Add(next);
        }

        return [.. found.Select(one => one with { Rejected = events.Any(word => word.Kind == SurfaceEventKind.RejectedCleaning && word.Start < one.End && word.End > one.Start) })];
    }

    /// <summary>Logged cleanings that go on although the surface has not stopped: they are shown, and end nothing yet.</summary>
    public static IEnumerable<SurfaceEvent> NotBegun(SurfaceTable table, SurfaceSettings settings, IReadOnlyList<SurfaceSpan> spans, IReadOnlyList<SurfaceEvent> events)
    {
        List<Interruption> standing = [.. Standing(table, settings, spans)];
        return events.Where(one => one.Kind == SurfaceEventKind.Cleaning && Of(one, standing) is null);
    }

    private static Interruption? Of(SurfaceEvent logged, IReadOnlyList<Interruption> standing)
    {
        long end = long.Max(logged.End, logged.Start);
        if (logged.End == long.MaxValue)
        {
            // Left open: it ended with the first time out of production after it began.
            if (standing.FirstOrDefault(one => one.End > logged.Start) is not { } stood) return null;
            end = stood.End;
        }

        return new Interruption
        {
            Start = logged.Start, End = end, CleaningStart = logged.Start, CleaningEnd = end, Logged = true,
            Words = logged.Word.Length > 0 ? [logged.Word] : [], Ids = logged.Id is { } id ? [id] : [],
        };
    }

    private static IEnumerable<Interruption> Standing(SurfaceTable table, SurfaceSettings settings, IReadOnlyList<SurfaceSpan> spans)
    {
        long minimum = long.Max((long)settings.MinimumStandstill.TotalMilliseconds, 1), silence = (long)(SurfaceTable.LongestSilence * Milliseconds.Hour);
        IEnumerable<Interruption> given = spans.Where(span => span.End > span.Start).Select(span => span.Kind == SpanKind.Cleaning
            ? new Interruption { Start = span.Start, End = span.End, CleaningStart = span.Start, CleaningEnd = span.End, Signalled = true }
            : new Interruption { Start = span.Start, End = span.End });
        // Nothing was heard for so long that a cleaning may have passed unseen.
        IEnumerable<Interruption> silences = Enumerable.Range(1, int.Max(table.Count - 1, 0))
            .Where(i => table.At[i] - table.At[i - 1] - Milliseconds.Hour >= silence)
            .Select(i => new Interruption { Start = table.At[i - 1] + Milliseconds.Hour, End = table.At[i] });
        long last = table.Count > 0 ? table.At[^1] + Milliseconds.Hour : long.MinValue;
        Interruption? open = null;
        foreach (Interruption next in given.Concat(silences).OrderBy(one => one.Start).ThenBy(one => one.End))
        {
            if (open is null) open = next;
            else if (next.Start <= open.End) open = open.With(next);
            else
            {
                if (open.IsCleaning || open.End - open.Start >= minimum) yield return open;
                open = next;
            }
        }

        if (open is null) yield break;
        // The last one goes on where no hour has followed it.
        if (open.IsCleaning || open.End - open.Start >= minimum) yield return open.End >= last ? open with { End = long.MaxValue } : open;
    }

    private static int HoursBetween(SurfaceTable table, long from, long to) =>
        from >= to ? 0 : int.Max(table.FirstFrom(to - Milliseconds.Hour + 1) - table.FirstFrom(from), 0);

    private Interruption With(Interruption next) => this with
    {
        End = long.Max(End, next.End),
        CleaningStart = long.Min(CleaningStart, next.CleaningStart),
        CleaningEnd = long.Max(CleaningEnd, next.CleaningEnd),
        Logged = Logged || next.Logged,
        Signalled = Signalled || next.Signalled,
        Words = [.. Words.Concat(next.Words).Distinct(StringComparer.Ordinal)],
        Ids = [.. Ids.Concat(next.Ids).Distinct()],
    };
}
