using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Ingest.Mqtt;
using EvapMonitor.Simulator;

namespace EvapMonitor.Service.Commands.Demo;

/// <summary>Publishes the demo's readings as they become known, a gateway for each line, and has cleanings logged as they end.</summary>
internal sealed class DemoLive(BrokerSettings broker, HttpClient http, DemoRecord record, DemoClock clock, IReadOnlyList<LineReadings> lines, Action<string> tell)
{
    private static readonly TimeSpan Pause = TimeSpan.FromSeconds(1), Longest = TimeSpan.FromMinutes(20), NoteEvery = TimeSpan.FromMinutes(5);

    /// <summary>Publishes from the clock's beginning on, until it is stopped.</summary>
    public async Task RunAsync(CancellationToken stop)
    {
        ReadingPublisher[] gateways = [.. lines.Select((_, i) => new ReadingPublisher(
            broker with { ClientId = "fennholm-" + DemoPlant.Lines[i].Name, SessionExpiry = TimeSpan.Zero }, "fennholm/" + DemoPlant.Lines[i].Name))];
        DateTimeOffset published = clock.Begin, noted = published;
        string? trouble = null;
        try
        {
            while (true)
            {
                if (Next(published) is not { } next)
                {
                    await Task.Delay(Pause, stop);
                    continue;
                }

                foreach (LineReadings line in lines) line.Simulation.RunTo(next);
                string? failure = await TryAsync(gateways, published, next, stop);
                if (failure is not null && failure != trouble) tell($"Readings cannot be published: {failure}. They are kept and tried again.");
                if ((trouble = failure) is not null)
                {
                    await Task.Delay(5 * Pause, stop);
                    continue;
                }

                published = next;
                if (published - noted < NoteEvery) continue;
                record.Done(new(noted, published));
                noted = published;
            }
        }
        finally
        {
            if (published > noted) record.Done(new(noted, published));
            foreach (ReadingPublisher gateway in gateways) await gateway.DisposeAsync();
        }
    }

    /// <summary>Publishes and logs what became known in a stretch; gives why that failed, or null. Done again it changes nothing.</summary>
    private async Task<string?> TryAsync(ReadingPublisher[] gateways, DateTimeOffset from, DateTimeOffset to, CancellationToken stop)
    {
        string?[] failures = await Task.WhenAll(gateways.Select((gateway, i) => gateway.PublishAsync(Known(lines[i], from, to), stop)));
        if (Array.Find(failures, failure => failure is not null) is { } failure) return $"{broker.Address}: {failure}";
        try
        {
            await DemoCleanings.LogAsync(http, record.Start, from, to, stop);
            return null;
        }
        catch (HttpRequestException error)
        {
            return error.Message;
        }
    }

    /// <summary>Up to when readings are to be published next; null when it is too early.</summary>
    private DateTimeOffset? Next(DateTimeOffset published)
    {
        var next = DateTimeOffset.FromUnixTimeSeconds(clock.Now.ToUnixTimeSeconds());
        if (next - published > Longest) next = published + Longest;
        return next > published ? next : null;
    }

    /// <summary>Behind the clock readings come as a historian keeps them; at the clock's pace more often.</summary>
    private long PeriodAt(DateTimeOffset instant) => clock.IsBehind(instant) ? ReadingTimes.Historian : ReadingTimes.Live;

    private IEnumerable<IncomingReading> Known(LineReadings line, DateTimeOffset from, DateTimeOffset to)
    {
        var readings = new List<IncomingReading>();
        for (int i = 0; i < line.Simulation.Instruments.Count; i++)
        {
            foreach (long instant in ReadingTimes.Of(line.Simulation.Instruments[i], from.ToUnixTimeMilliseconds(), to.ToUnixTimeMilliseconds(), PeriodAt(from)))
            {
                if (line.At(i, instant) is { } reading) readings.Add(new(line.Simulation.Instruments[i].Instrument.Signal, reading));
            }
        }

        return readings.OrderBy(one => one.Reading.At);
    }
}
