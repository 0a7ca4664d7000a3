using EvapMonitor.Core;
using EvapMonitor.Core.Conditioning;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Api;

/// <summary>
/// How sound the signals of each line were over the last 24 hours. Verdicts on readings are not stored, so they are worked out when somebody asks, and kept for a
/// minute.
/// </summary>
public sealed class SignalStates(ReadingStore readings, TimeProvider clock) : IDisposable
{
    private static readonly TimeSpan Kept = TimeSpan.FromMinutes(1);

    private readonly SemaphoreSlim _one = new(1, 1);
    private (PlantInForce Plant, long Window, Dictionary<string, SignalSummary> Summaries)? _kept;
    private long _keptAt;

    /// <summary>Summaries by signal; a signal of several lines is taken from its first.</summary>
    public async Task<IReadOnlyDictionary<string, SignalSummary>> LastDayAsync(PlantInForce plant, CancellationToken stop)
    {
        // One at a time: ten open pages must not cost ten times.
        await _one.WaitAsync(stop);
        try
        {
            if (_kept is { } kept && kept.Plant == plant && clock.GetElapsedTime(_keptAt) < Kept) return kept.Summaries;
            long step = (long)plant.Site.Window.TotalMilliseconds, now = clock.GetUtcNow().ToUnixTimeMilliseconds();
            long to = now - Milliseconds.Modulo(now, step), from = to - Milliseconds.Day;
            var summaries = new Dictionary<string, SignalSummary>();
            foreach (LinePlace line in plant.Lines)
            {
                foreach (SignalSummary summary in await Task.Run(() => Summarise(plant, line, from, to), stop)) summaries.TryAdd(summary.Signal, summary);
            }

            (_kept, _keptAt) = ((plant, to, summaries), clock.GetTimestamp());
            return summaries;
        }
        finally
        {
            _one.Release();
        }
    }

    /// <inheritdoc/>
    public void Dispose() => _one.Dispose();

    private IReadOnlyList<SignalSummary> Summarise(PlantInForce plant, LinePlace line, long from, long to)
    {
        var evaluation = new LineEvaluation(plant.Site, line.Line);
        DateTimeOffset start = DateTimeOffset.FromUnixTimeMilliseconds(from) - evaluation.LeadIn;
        Dictionary<string, ReadingSeries> series = readings.Read(evaluation.Signals.ToDictionary(name => name, name => plant.Signals[name]), start, DateTimeOffset.FromUnixTimeMilliseconds(to));
        return evaluation.Summarise(series, from, to);
    }
}
