using System.Net.Http.Json;
using EvapMonitor.Simulator;

namespace EvapMonitor.Service.Commands.Demo;

/// <summary>Writes the demo's cleanings into the log through the service's own interface, as the plant's people would: what they forgot stays out.</summary>
internal static class DemoCleanings
{
    /// <summary>Logs what ended in a stretch of time. What is logged already stays as it is.</summary>
    public static async Task LogAsync(HttpClient http, DateTimeOffset start, DateTimeOffset after, DateTimeOffset upTo, CancellationToken stop)
    {
        foreach (DemoLine line in DemoPlant.Lines)
        {
            foreach ((LogEntry entry, DateTimeOffset from, DateTimeOffset to) in Entries(line, start, after, upTo))
            {
                using var request = new HttpRequestMessage(HttpMethod.Post, "/api/v1/cleanings")
                {
                    Content = JsonContent.Create(new { line = line.Name, effect = entry.Effect, start = from, end = to, kind = entry.Kind, note = entry.Note }),
                };
                request.Headers.Add("Idempotency-Key", Invariant($"demo-{line.Name}-{entry.Effect}-{from.ToUnixTimeSeconds()}"));
                using HttpResponseMessage answer = await http.SendAsync(request, stop);
                // A person may have logged it before.
                if (answer.StatusCode != System.Net.HttpStatusCode.Conflict) answer.EnsureSuccessStatusCode();
            }
        }
    }

    /// <summary>The entries of a line that ended in (after, upTo].</summary>
    internal static IEnumerable<(LogEntry Entry, DateTimeOffset From, DateTimeOffset To)> Entries(DemoLine line, DateTimeOffset start, DateTimeOffset after, DateTimeOffset upTo)
    {
        for (DateTimeOffset season = start; season < upTo; season = season.AddDays(StoryTime.Season))
        {
            foreach (LogEntry entry in line.Log.OrderBy(entry => entry.When.From))
            {
                DateTimeOffset from = season + Minutes(entry.When.From), to = season + Minutes(entry.When.To);
                if (to > after && to <= upTo) yield return (entry, from, to);
            }
        }
    }

    /// <summary>Nobody writes down seconds.</summary>
    private static TimeSpan Minutes(double days) => TimeSpan.FromMinutes(double.Round(days * 1440));
}
