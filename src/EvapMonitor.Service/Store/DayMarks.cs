using Dapper;
using EvapMonitor.Core.Readings;
using Npgsql;

namespace EvapMonitor.Service.Store;

/// <summary>
/// Collects the days that a batch touches and marks them: (line, day) with the first instant that changed. A reading late in a day also touches the next
/// day, whose first windows look back over the lead-in.
/// </summary>
internal sealed class DayMarks(TimeSpan leadIn)
{
    private readonly Dictionary<(int Line, long Day), long> _first = [];
    private readonly long _leadIn = (long)leadIn.TotalMilliseconds;

    public void Add(SignalPlace place, long at)
    {
        long day = Milliseconds.DayOf(at), next = day + Milliseconds.Day;
        foreach (int line in place.Users)
        {
            Mark(line, day, at);
            if (at >= next - _leadIn) Mark(line, next, next);
        }
    }

    public async Task WriteAsync(NpgsqlConnection connection, CancellationToken stop)
    {
        if (_first.Count == 0) return;
        // Always in the same order, so that two writers never wait for each other in a circle.
        var ordered = _first.OrderBy(mark => mark.Key.Line).ThenBy(mark => mark.Key.Day).ToList();
        await connection.ExecuteAsync(new CommandDefinition(
            """
            INSERT INTO line_day (line_id, day, data_version, changed_from, changed_at)
            SELECT l, d, 1, f, clock_timestamp() FROM unnest(@lines, @days, @first) AS m(l, d, f)
            ON CONFLICT (line_id, day) DO UPDATE SET data_version = line_day.data_version + 1,
                changed_from = least(coalesce(line_day.changed_from, excluded.changed_from), excluded.changed_from), changed_at = excluded.changed_at
            """,
            new
            {
                lines = ordered.Select(mark => mark.Key.Line).ToArray(),
                days = ordered.Select(mark => DateOnly.FromDateTime(Instant.FromMilliseconds(mark.Key.Day))).ToArray(),
                first = ordered.Select(mark => Instant.FromMilliseconds(mark.Value)).ToArray(),
            },
            cancellationToken: stop));
    }

    private void Mark(int line, long day, long at)
    {
        if (!_first.TryGetValue((line, day), out long first) || at < first) _first[(line, day)] = at;
    }
}
