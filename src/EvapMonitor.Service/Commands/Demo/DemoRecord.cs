using System.Globalization;

namespace EvapMonitor.Service.Commands.Demo;

/// <summary>A stretch of time.</summary>
internal readonly record struct TimeSpanOfHistory(DateTimeOffset From, DateTimeOffset To);

/// <summary>
/// What the demo has in its data folder: when its story began and which stretches of it have been stored, so that another start goes on with the same past and
/// fills what is missing. A stretch that is noted late is made again, which changes nothing.
/// </summary>
internal sealed class DemoRecord
{
    private readonly string _path;
    private readonly Lock _gate = new();
    private List<TimeSpanOfHistory> _done;

    private DemoRecord(string path, DateTimeOffset start, List<TimeSpanOfHistory> done) => (_path, Start, _done) = (path, start, done);

    /// <summary>The first instant of the story.</summary>
    public DateTimeOffset Start { get; }

    /// <summary>End of the newest stretch that is stored; null when there is none.</summary>
    public DateTimeOffset? Newest
    {
        get
        {
            lock (_gate) return _done.Count == 0 ? null : _done[^1].To;
        }
    }

    /// <summary>Reads the record of a folder, or begins one.</summary>
    /// <param name="folder">The data folder.</param>
    /// <param name="start">The first instant, for a new one.</param>
    /// <exception cref="StartException">The record is there but cannot be read.</exception>
    public static DemoRecord Open(string folder, DateTimeOffset start)
    {
        string path = Path.Combine(folder, "demo-history.txt");
        if (!File.Exists(path))
        {
            var fresh = new DemoRecord(path, start, []);
            fresh.Save();
            return fresh;
        }

        string[] lines = File.ReadAllLines(path);
        var done = new List<TimeSpanOfHistory>();
        if (lines.Length == 0 || !TryTime(lines[0], out DateTimeOffset begun)) throw Unreadable(path);
        foreach (string line in lines.Skip(1))
        {
            string[] parts = line.Split(' ');
            if (parts.Length != 2 || !TryTime(parts[0], out DateTimeOffset from) || !TryTime(parts[1], out DateTimeOffset to) || from >= to) throw Unreadable(path);
            done.Add(new(from, to));
        }

        return new DemoRecord(path, begun, done);
    }

    /// <summary>The stretches up to an instant that are not stored, in order of time.</summary>
    public IReadOnlyList<TimeSpanOfHistory> Missing(DateTimeOffset end)
    {
        lock (_gate)
        {
            var missing = new List<TimeSpanOfHistory>();
            DateTimeOffset at = Start;
            foreach ((DateTimeOffset from, DateTimeOffset to) in _done)
            {
                if (at < from && at < end) missing.Add(new(at, from < end ? from : end));
                at = to;
            }

            if (at < end) missing.Add(new(at, end));
            return missing;
        }
    }

    /// <summary>Notes that a stretch is stored.</summary>
    public void Done(TimeSpanOfHistory span)
    {
        lock (_gate)
        {
            var joined = new List<TimeSpanOfHistory>();
            foreach (TimeSpanOfHistory one in _done.Append(span).OrderBy(one => one.From))
            {
                if (joined.Count > 0 && one.From <= joined[^1].To) joined[^1] = joined[^1] with { To = one.To > joined[^1].To ? one.To : joined[^1].To };
                else joined.Add(one);
            }

            _done = joined;
            Save();
        }
    }

    private static StartException Unreadable(string path) => new([$"{path} cannot be read; remove the demo's data folder to begin anew."]);

    private static bool TryTime(string text, out DateTimeOffset time) =>
        DateTimeOffset.TryParse(text, CultureInfo.InvariantCulture, DateTimeStyles.AssumeUniversal | DateTimeStyles.AdjustToUniversal, out time);

    private static string Text(DateTimeOffset time) => time.UtcDateTime.ToString("yyyy-MM-ddTHH:mm:ssZ", CultureInfo.InvariantCulture);

    private void Save()
    {
        File.WriteAllLines(_path + ".new", [Text(Start), .. _done.Select(span => $"{Text(span.From)} {Text(span.To)}")]);
        File.Move(_path + ".new", _path, overwrite: true);
    }
}
