using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Store;
using Npgsql;

namespace EvapMonitor.Service.Evaluation;

/// <summary>
/// Turns stored readings into stored results. Live, late, imported, recomputed: all of it comes as marked days. As many are under evaluation as the machine has
/// cores: one of each line, lines with today's day first, and where cores are left, more of a line. A line is evaluated by the one process that holds its lease.
/// </summary>
public sealed class EvaluationWorker(
    DayStore days, LineTurns turns, LeaseStore leases, PlantStore plants, PlantHolder plant, EvaluationSignal signal, TimeProvider clock, ILogger<EvaluationWorker> log)
    : BackgroundService
{
    private static readonly TimeSpan Pause = TimeSpan.FromMilliseconds(500);
    private static readonly TimeSpan Rest = TimeSpan.FromSeconds(1);
    private static readonly TimeSpan RenewEvery = TimeSpan.FromSeconds(5);
    private static readonly TimeSpan WhenUnreadable = TimeSpan.FromMinutes(1);

    /// <summary>A window closes this long after its end.</summary>
    private static readonly TimeSpan Closing = TimeSpan.FromSeconds(1);

    private readonly DaysSetAside _aside = new(clock);
    private readonly Dictionary<(int Line, int Seat), Task<LineTurn>> _running = [];
    private readonly Dictionary<int, long> _servedAt = [];
    private readonly HashSet<int> _resting = [], _full = [];
    private Dictionary<int, long> _fences = [];
    private long _renewed;
    private bool _away;

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        Task bell = Task.CompletedTask;
        while (!stoppingToken.IsCancellationRequested)
        {
            try
            {
                if (bell.IsCompleted)
                {
                    bell = signal.WaitAsync(Pause, stoppingToken);
                    _resting.Clear();
                    _full.Clear();
                }

                await RenewAsync(stoppingToken);
                await GiveTurnsAsync(stoppingToken);
                if (_running.Count == 0) _away = false;
                await Task.WhenAny([bell, .. _running.Values]);
                foreach (Task<LineTurn> ended in _running.Values.Where(turn => turn.IsCompleted).ToList()) Judge(await ended);
            }
            catch (NpgsqlException error)
            {
                await AwayAsync(error, stoppingToken);
            }
            catch (UnreadableRevisionException error)
            {
                // A later program accepted it. Nothing is computed under a revision that no longer holds.
                log.RevisionUnreadable(error);
                await Task.Delay(WhenUnreadable, clock, stoppingToken).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
            }
            catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
            {
                break;
            }
        }

        await ((Task)Task.WhenAll(_running.Values)).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        await bell.ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        await ReleaseAsync();
    }

    private async Task RenewAsync(CancellationToken stop)
    {
        if (_renewed != 0 && clock.GetElapsedTime(_renewed) < RenewEvery) return;
        // Another process may have accepted a revision.
        if (await plants.NewestAsync(stop) != plant.Timeline.Newest && await plants.LoadAsync(plant.Timeline, stop) is { } timeline) plant.Timeline = timeline;
        Dictionary<int, long> held = await leases.HoldAsync(plant.Timeline.LineIds, stop);
        foreach ((int line, long fence) in held)
        {
            if (_fences.GetValueOrDefault(line) != fence) turns.Forget(line);
        }

        (_fences, _renewed) = (held, clock.GetTimestamp());
    }

    /// <summary>Gives free cores to lines that have a day to evaluate: those with today's first, then whoever has waited longest.</summary>
    private async Task GiveTurnsAsync(CancellationToken stop)
    {
        int free = Environment.ProcessorCount - _running.Count;
        int[] open = [.. _fences.Keys.Where(line => !_resting.Contains(line) && !(_running.ContainsKey((line, 0)) && _full.Contains(line)))];
        if (free <= 0 || open.Length == 0) return;
        DateTimeOffset closed = Closed();
        IReadOnlyList<(int Line, bool Today)> waiting = await days.WaitingLinesAsync(open, closed, Rest, stop);
        // A line that is not served yet goes before a second seat of one that is.
        var next = waiting.OrderBy(one => _running.ContainsKey((one.Line, 0))).ThenByDescending(one => one.Today).ThenBy(one => _servedAt.GetValueOrDefault(one.Line));
        foreach ((int line, _) in next.Take(free))
        {
            int seat = Enumerable.Range(0, Environment.ProcessorCount).First(one => !_running.ContainsKey((line, one)));
            (long fence, IReadOnlyCollection<DateOnly> aside) = (_fences[line], _aside.Of(line));
            _servedAt[line] = clock.GetTimestamp();
            _running[(line, seat)] = Task.Run(() => turns.NextAsync(line, seat, fence, closed, Rest, aside, stop), CancellationToken.None);
        }
    }

    private void Judge(LineTurn turn)
    {
        _running.Remove((turn.LineId, turn.Seat));
        // A line with nothing to do, or in trouble, is asked again after the pause; one whose other days are all taken, too.
        if (turn.End == TurnEnd.Nothing && turn.Seat > 0) _full.Add(turn.LineId);
        else if (turn.End != TurnEnd.Done) _resting.Add(turn.LineId);
        switch (turn.End)
        {
            case TurnEnd.Done:
                _aside.Remove(turn.LineId, turn.Day!.Value);
                _away = false;
                break;
            case TurnEnd.LeaseLost:
                log.LeaseLost(NameOf(turn.LineId));
                _fences.Remove(turn.LineId);
                break;
            case TurnEnd.Broke when turn.Day is { } day:
                log.DayBroke(turn.Error!, NameOf(turn.LineId), day, _aside.Add(turn.LineId, day).TotalSeconds);
                break;
            case TurnEnd.Broke or TurnEnd.Away:
                if (!_away) log.DatabaseAway(turn.Error!, "evaluation");
                _away = true;
                break;
            default:
                break;
        }
    }

    private async Task AwayAsync(NpgsqlException error, CancellationToken stop)
    {
        // Once for each absence: it may last for hours.
        if (!_away) log.DatabaseAway(error, "evaluation");
        _away = true;
        await Task.Delay(RenewEvery, clock, stop).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
    }

    private DateTimeOffset Closed()
    {
        long at = (clock.GetUtcNow() - Closing).ToUnixTimeMilliseconds();
        return DateTimeOffset.FromUnixTimeMilliseconds(at - Milliseconds.Modulo(at, (long)plant.Timeline.At(DateTimeOffset.FromUnixTimeMilliseconds(at)).Site.Window.TotalMilliseconds));
    }

    private string NameOf(int line) => plant.Timeline.Eras.SelectMany(era => era.Lines).Last(place => place.LineId == line).Line.Name;

    private async Task ReleaseAsync()
    {
        try
        {
            await leases.ReleaseAsync();
        }
        catch (NpgsqlException error)
        {
            log.DatabaseAway(error, "giving back the lines");
        }
    }
}
