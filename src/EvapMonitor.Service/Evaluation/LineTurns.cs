using System.Collections.Concurrent;
using EvapMonitor.Core;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;
using Npgsql;

namespace EvapMonitor.Service.Evaluation;

/// <summary>What open pages are told when results have changed.</summary>
/// <param name="Line">Name of the line.</param>
/// <param name="From">First window that may have changed.</param>
/// <param name="To">End of the last.</param>
public sealed record WindowsChanged(string Line, DateTimeOffset From, DateTimeOffset To);

/// <summary>How the turn of a line ended.</summary>
internal enum TurnEnd
{
    /// <summary>A day was evaluated.</summary>
    Done,
    /// <summary>No day waited.</summary>
    Nothing,
    /// <summary>Another process evaluates the line now.</summary>
    LeaseLost,
    /// <summary>The day could not be evaluated.</summary>
    Broke,
    /// <summary>The database does not answer; the day keeps its mark.</summary>
    Away,
}

/// <summary>A turn of a line.</summary>
/// <param name="LineId">The line.</param>
/// <param name="Seat">Which of its turns beside each other this was.</param>
/// <param name="End">How it ended.</param>
/// <param name="Day">The day; null when none was taken.</param>
/// <param name="Error">What went wrong.</param>
internal sealed record LineTurn(int LineId, int Seat, TurnEnd End, DateOnly? Day = null, Exception? Error = null);

/// <summary>
/// Evaluates one day of a line in each turn, under the plant revision in force on that day. Days rest on nothing of each other, so that turns run beside each
/// other, those of one line on different days. Today belongs to the first seat of a line, which keeps what it knows of the last hours.
/// </summary>
public sealed class LineTurns(
    DayStore days, DaysInHand inHand, ReadingStore readings, ResultStore results, LineLogs logs, PlantStore plants, PlantHolder plant, LiveEvents events, TimeProvider clock, ILogger<LineTurns> log)
{
    private readonly ConcurrentDictionary<(int Line, int Revision, int Seat), LineWork> _work = new();

    /// <summary>Forgets what is kept of a line: somebody else may have evaluated it meanwhile.</summary>
    public void Forget(int line)
    {
        foreach ((int Line, int Revision, int Seat) key in _work.Keys.Where(key => key.Line == line)) _work.TryRemove(key, out _);
    }

    /// <summary>Evaluates the next day of a line.</summary>
    /// <param name="line">The line.</param>
    /// <param name="seat">Which of its turns beside each other, from 0.</param>
    /// <param name="fence">Of its lease.</param>
    /// <param name="closed">End of the last closed window.</param>
    /// <param name="rest">How long a past day must have been left alone.</param>
    /// <param name="aside">Days that are not to be tried now.</param>
    /// <param name="stop">Cancels.</param>
    internal async Task<LineTurn> NextAsync(int line, int seat, long fence, DateTimeOffset closed, TimeSpan rest, IReadOnlyCollection<DateOnly> aside, CancellationToken stop)
    {
        TakenDay? taken = null;
        try
        {
            taken = await inHand.TakeAsync(line, others => days.TakeAsync(line, closed, rest, [.. aside, .. others, .. seat > 0 ? [Today(closed)] : Array.Empty<DateOnly>()], stop), stop);
            if (taken is null) return new LineTurn(line, seat, TurnEnd.Nothing);
            await EvaluateAsync(taken, seat, fence, closed, stop);
            return new LineTurn(line, seat, TurnEnd.Done, taken.Day);
        }
        catch (LeaseLostException)
        {
            return new LineTurn(line, seat, TurnEnd.LeaseLost);
        }
        catch (NpgsqlException error) when (taken is null || !DatabaseErrors.IsOfTheData(error))
        {
            return new LineTurn(line, seat, TurnEnd.Away, taken?.Day, error);
        }
        catch (Exception error) when (error is not OperationCanceledException || !stop.IsCancellationRequested)
        {
            foreach ((int Line, int Revision, int Seat) key in _work.Keys.Where(key => key.Line == line && key.Seat == seat)) _work.TryRemove(key, out _);
            return new LineTurn(line, seat, TurnEnd.Broke, taken?.Day, error);
        }
        finally
        {
            if (taken is not null) inHand.PutBack(line, taken.Day);
        }
    }

    /// <summary>The day of the last closed window.</summary>
    private static DateOnly Today(DateTimeOffset closed) => DateOnly.FromDateTime(closed.UtcDateTime.AddTicks(-1));

    private async Task EvaluateAsync(TakenDay taken, int seat, long fence, DateTimeOffset closed, CancellationToken stop)
    {
        // The one that marked the day may have accepted a revision, here or in another process.
        if (taken.Newest != plant.Timeline.Newest && await plants.LoadAsync(plant.Timeline, stop) is { } timeline) plant.Timeline = timeline;
        PlantInForce then = plant.Timeline.On(taken.Day);
        if (then.Lines.FirstOrDefault(place => place.LineId == taken.LineId) is not { } line)
        {
            await results.HideAsync(taken.LineId, taken.Day, fence, stop);
            return;
        }

        // Half a day of another revision or computation is never left standing beside the other half.
        bool whole = taken.Shown is { } shown && (shown != then.RevisionId || taken.Model != LineEvaluation.ModelNumber);
        if (whole) taken = taken with { From = taken.Day.ToDateTime(TimeOnly.MinValue, DateTimeKind.Utc) };
        if (!_work.TryGetValue((taken.LineId, then.RevisionId, seat), out LineWork? work) || work.Plant != then)
            work = _work[(taken.LineId, then.RevisionId, seat)] = new LineWork(then, line, readings);
        long began = clock.GetTimestamp();
        DayResult result = work.Evaluate(taken, closed.ToUnixTimeMilliseconds(), await logs.OfAsync(then, line, stop));
        long written = EvaluationTimes.Begin();
        await results.WriteAsync(result, then.RevisionId, fence, stop);
        EvaluationTimes.Count("write", written);
        log.DayEvaluated(line.Line.Name, taken.Day, result.Windows.Count, clock.GetElapsedTime(began).TotalMilliseconds);
        DateTimeOffset to = result.Windows.Count == 0 ? result.From : DateTimeOffset.FromUnixTimeMilliseconds(result.Windows[^1].At) + then.Site.Window;
        LinePlace shownAs = plant.Current.Lines.FirstOrDefault(place => place.LineId == taken.LineId) ?? line;
        events.Publish("windows", new WindowsChanged(shownAs.Line.Name, result.From, to));
    }
}
