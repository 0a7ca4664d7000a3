using EvapMonitor.Core;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;
using Npgsql;

namespace EvapMonitor.Service.Evaluation;

/// <summary>What open pages are told when results have changed.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="From">First window that may have changed.</param>
/// <param name="To">End of the last.</param>
public sealed record WindowsChanged(string Line, DateTimeOffset From, DateTimeOffset To);

/// <summary>Turns stored readings into stored results: takes the oldest waiting day of each line in turn, evaluates it, writes it.</summary>
public sealed class EvaluationWorker(
    DayStore days, ReadingStore readings, ResultStore results, CleaningStore cleanings, PlantHolder plant, EvaluationSignal signal, LiveEvents events, TimeProvider clock,
    ILogger<EvaluationWorker> log)
    : BackgroundService
{
    private static readonly TimeSpan Pause = TimeSpan.FromSeconds(1);

    /// <summary>How long a day must have been left alone before it is taken.</summary>
    private static readonly TimeSpan Rest = TimeSpan.FromSeconds(1);

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        while (!stoppingToken.IsCancellationRequested)
        {
            try
            {
                PlantInForce inForce = plant.Current;
                bool any = false;
                foreach (LinePlace line in inForce.Lines) any |= await EvaluateNextAsync(inForce, line, stoppingToken);
                if (!any) await signal.WaitAsync(Pause, stoppingToken);
            }
            catch (NpgsqlException error)
            {
                log.DatabaseAway(error, "evaluation");
                await Task.Delay(Pause, clock, stoppingToken).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
            }
            catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
            {
                return;
            }
        }
    }

    private async Task<bool> EvaluateNextAsync(PlantInForce inForce, LinePlace line, CancellationToken stop)
    {
        DateTimeOffset now = clock.GetUtcNow();
        if (await days.NextAsync(line.LineId, now, Rest, stop) is not { } day) return false;
        long began = clock.GetTimestamp();
        long from = Instant.ToMilliseconds(day.Day.ToDateTime(TimeOnly.MinValue, DateTimeKind.Utc));
        LineWindow[] windows;
        try
        {
            windows = await EvaluateDayAsync(inForce, line, from, now, stop);
        }
        catch (Exception error) when (error is not (NpgsqlException or OperationCanceledException))
        {
            // Unforeseen: one day must not stop the days after it. It has no results until it changes.
            log.DayBroke(error, line.Line.Name, day.Day);
            windows = [];
        }

        await results.WriteDayAsync(line, day, inForce.RevisionId, windows, stop);
        log.DayEvaluated(line.Line.Name, day.Day, windows.Length, clock.GetElapsedTime(began).TotalMilliseconds);
        events.Publish("windows", new WindowsChanged(line.Line.Name, DateTimeOffset.FromUnixTimeMilliseconds(from), DateTimeOffset.FromUnixTimeMilliseconds(from + Milliseconds.Day)));
        return true;
    }

    private async Task<LineWindow[]> EvaluateDayAsync(PlantInForce inForce, LinePlace line, long from, DateTimeOffset now, CancellationToken stop)
    {
        Site site = inForce.Site;
        var evaluation = new LineEvaluation(site, line.Line);
        // Only windows that have closed: a second past their end.
        long step = (long)site.Window.TotalMilliseconds, closed = now.ToUnixTimeMilliseconds() - 1000;
        long to = long.Min(from + Milliseconds.Day, closed - Milliseconds.Modulo(closed, step));
        if (to <= from) return [];
        var wanted = evaluation.Signals.ToDictionary(name => name, name => inForce.Signals[name]);
        DateTimeOffset start = DateTimeOffset.FromUnixTimeMilliseconds(from), end = DateTimeOffset.FromUnixTimeMilliseconds(to);
        Dictionary<string, ReadingSeries> series = readings.Read(wanted, start - evaluation.LeadIn, end);
        var names = line.EffectIds.Zip(line.Line.Effects, (id, effect) => (id, effect.Name)).ToDictionary(pair => pair.id, pair => pair.Name);
        ILookup<string, (long, long)> logged = (await cleanings.ListAsync(line.LineId, null, stop))
            .Where(cleaning => names.ContainsKey(cleaning.EffectId))
            .ToLookup(cleaning => names[cleaning.EffectId], cleaning => (cleaning.Start.ToUnixTimeMilliseconds(), cleaning.End?.ToUnixTimeMilliseconds() ?? long.MaxValue));
        return evaluation.Evaluate(series, from, to, logged);
    }
}
