using System.Collections.Concurrent;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;
using Npgsql;

namespace EvapMonitor.Service.Evaluation;

/// <summary>Wakes the watch over recomputations when one has begun or ended.</summary>
public sealed class RecomputationSignal : WakeUp;

/// <summary>Where a recomputation is and how fast it goes.</summary>
/// <param name="One">The recomputation.</param>
/// <param name="DaysPerMinute">Days of lines computed per minute, over the last minute; null when unknown or when it does not run.</param>
/// <param name="SecondsLeft">Time left at that rate; null when unknown.</param>
public sealed record RecomputationPace(Recomputation One, double? DaysPerMinute, double? SecondsLeft);

/// <summary>
/// Watches recomputations: tells open pages how far they are, at most once a second, and ends those that are done. The work itself is the evaluation's, which knows
/// of no recomputation.
/// </summary>
public sealed class RecomputationWatch(RecomputationStore store, RecomputationSignal signal, LiveEvents events, TimeProvider clock, ILogger<RecomputationWatch> log) : BackgroundService
{
    private static readonly TimeSpan Often = TimeSpan.FromSeconds(1), Seldom = TimeSpan.FromSeconds(15), Lately = TimeSpan.FromMinutes(1);

    private readonly ConcurrentDictionary<int, Queue<(long At, int Left)>> _lately = new();
    private Dictionary<int, (string State, int Left)>? _told;

    /// <summary>A recomputation with its pace.</summary>
    public RecomputationPace PaceOf(Recomputation one)
    {
        ArgumentNullException.ThrowIfNull(one);
        if (one.State != Recomputation.Running || !_lately.TryGetValue(one.Id, out Queue<(long At, int Left)>? lately)) return new RecomputationPace(one, null, null);
        (long At, int Left)[] seen;
        lock (lately) seen = [.. lately];
        if (seen.Length < 2 || seen[0].Left <= seen[^1].Left) return new RecomputationPace(one, null, null);
        double perSecond = (seen[0].Left - seen[^1].Left) / clock.GetElapsedTime(seen[0].At, seen[^1].At).TotalSeconds;
        return new RecomputationPace(one, 60 * perSecond, one.DaysLeft / perSecond);
    }

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        bool away = false;
        TimeSpan pause = Often;
        while (!stoppingToken.IsCancellationRequested)
        {
            try
            {
                pause = await LookAsync(stoppingToken) ? Often : Seldom;
                away = false;
                // No faster than once a second, however often it is woken.
                await Task.Delay(Often, stoppingToken);
                if (pause > Often) await signal.WaitAsync(pause, stoppingToken);
            }
            catch (NpgsqlException error)
            {
                if (!away) log.DatabaseAway(error, "watching recomputations");
                away = true;
                await Task.Delay(Seldom, stoppingToken).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
            }
            catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
            {
                return;
            }
        }
    }

    /// <summary>Looks how far they are.</summary>
    /// <returns>True while one runs.</returns>
    private async Task<bool> LookAsync(CancellationToken stop)
    {
        await store.EndAsync(stop);
        IReadOnlyList<Recomputation> all = await store.ListAsync(stop);
        foreach (Recomputation one in all)
        {
            if (one.State == Recomputation.Running) Note(one);
            else _lately.TryRemove(one.Id, out _);
            // What had ended before this program began is no news.
            if (_told is null ? one.State != Recomputation.Running : _told.GetValueOrDefault(one.Id) == (one.State, one.DaysLeft)) continue;
            events.Publish("recomputation", PaceOf(one));
            if (one.State == Recomputation.Done) log.RecomputationDone(one.Id, one.Cause.ToString(), one.DaysTotal);
        }

        _told = all.ToDictionary(one => one.Id, one => (one.State, one.DaysLeft));
        return all.Any(one => one.State == Recomputation.Running);
    }

    private void Note(Recomputation one)
    {
        Queue<(long At, int Left)> lately = _lately.GetOrAdd(one.Id, _ => new());
        lock (lately)
        {
            lately.Enqueue((clock.GetTimestamp(), one.DaysLeft));
            while (lately.Count > 2 && clock.GetElapsedTime(lately.Peek().At) > Lately) lately.Dequeue();
        }
    }
}
