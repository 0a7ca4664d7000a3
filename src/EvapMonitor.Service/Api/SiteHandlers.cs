using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Wording;
using Microsoft.AspNetCore.Http.HttpResults;

namespace EvapMonitor.Service.Api;

/// <summary>The site, its lines and effects as they are now.</summary>
internal static class SiteHandlers
{
    public static async Task<Ok<SiteWire>> Site(SiteStates states, CancellationToken stop) => TypedResults.Ok(await states.SiteAsync(stop));

    public static async Task<Ok<LinesWire>> Lines(SiteStates states, PlantHolder plant, CancellationToken stop)
    {
        var lines = new List<LineWire>();
        foreach (LinePlace line in plant.Current.Lines) lines.Add(await states.LineAsync(plant.Current, line, stop));
        return TypedResults.Ok(new LinesWire(lines));
    }

    public static async Task<Results<Ok<LineWire>, ProblemHttpResult>> Line(string line, SiteStates states, PlantHolder plant, CancellationToken stop) =>
        plant.Current.Find(line) is { } place ? TypedResults.Ok(await states.LineAsync(plant.Current, place, stop)) : Problems.NoLine(plant.Current, line);

    public static async Task<Results<Ok<EffectWire>, ProblemHttpResult>> Effect(string line, string effect, EffectStates states, PlantHolder plant, CancellationToken stop)
    {
        if (plant.Current.Find(line) is not { } place) return Problems.NoLine(plant.Current, line);
        return place.Find(effect) is var (found, id) ? TypedResults.Ok(await states.OfAsync(place, found, id, stop)) : Problems.NoEffect(place.Line, effect);
    }

    public static async Task<Ok<CleaningDueWire>> CleaningDue(EffectStates states, PlantHolder plant, TimeProvider clock, CancellationToken stop)
    {
        var effects = new List<EffectDueWire>();
        foreach (LinePlace line in plant.Current.Lines)
        {
            for (int i = 0; i < line.EffectIds.Count; i++)
            {
                Effect effect = line.Line.Effects[i];
                effects.Add(new EffectDueWire(line.Line.Name, effect.Name, (await states.OfAsync(line, effect, line.EffectIds[i], stop)).Due));
            }
        }

        return TypedResults.Ok(new CleaningDueWire(clock.GetUtcNow(), [.. effects.OrderBy(effect => effect.Due.State != "due").ThenBy(effect => effect.Due.Since)]));
    }

    public static Ok<PlantWire> Plant(PlantHolder plant)
    {
        PlantInForce now = plant.Current;
        return TypedResults.Ok(new PlantWire(now.RevisionId, now.AcceptedAt, now.InForceFrom, now.Author, now.Text));
    }
}

/// <summary>Puts together what is known of the site and its lines.</summary>
public sealed class SiteStates(ReadingStore readings, TrendStore trends, ImportStore imports, DayStore days, EffectStates effects, BalanceStates balances, PlantHolder plant, Live.Notices notices,
    TimeProvider clock)
{
    /// <summary>A youngest reading under this age is live.</summary>
    public static readonly TimeSpan LiveUnder = TimeSpan.FromMinutes(15);

    private SiteWire? _lastKnown;

    /// <summary>The site; while the database does not answer, what was last known of it, with a notice that says so.</summary>
    /// <exception cref="Npgsql.NpgsqlException">The database does not answer and nothing is known yet.</exception>
    public async Task<SiteWire> SiteAsync(CancellationToken stop)
    {
        try
        {
            return _lastKnown = await AskAsync(stop);
        }
        catch (Npgsql.NpgsqlException) when (_lastKnown is not null)
        {
            SiteWire known = _lastKnown;
            IEnumerable<NoticeWire> standing = Standing();
            if (!standing.Any(notice => notice.Key == Ingest.ReadingInserts.AwayNotice))
                standing = standing.Append(new NoticeWire(Ingest.ReadingInserts.AwayNotice, known.Now, "The database does not answer. Readings that come are kept in the spool; what is shown is from before."));
            return known with { Now = clock.GetUtcNow(), Readings = Freshness(known.LatestReadingAt), Notices = [.. standing] };
        }
    }

    private async Task<SiteWire> AskAsync(CancellationToken stop)
    {
        PlantInForce now = plant.Current;
        DateTimeOffset? latest = await LatestAsync(now.Signals.Values, stop);
        int running = (await imports.ListAsync(stop)).Count(import => import.State is ImportState.Running or ImportState.Waiting);
        return new SiteWire(
            now.Site.Name, now.Site.TimeZone, clock.GetUtcNow(), latest, Freshness(latest), now.RevisionId, (int)now.Site.Window.TotalSeconds, running,
            await days.WaitingAsync(clock.GetUtcNow() - (2 * now.Site.Window), stop),
            [.. Standing(), .. await balances.NoticesAsync(now, stop)]);
    }

    private IEnumerable<NoticeWire> Standing() => notices.Standing.Select(notice => new NoticeWire(notice.Key, notice.Since, notice.Sentence));

    /// <summary>A line.</summary>
    public async Task<LineWire> LineAsync(PlantInForce inForce, LinePlace line, CancellationToken stop)
    {
        DateTimeOffset? latest = await LatestAsync(inForce.Signals.Values.Where(signal => signal.Users.Contains(line.LineId)), stop);
        (DateTimeOffset At, RunningState State, double? Evaporation)? now = await trends.LineNowAsync(line.LineId, stop);
        var all = new List<EffectWire>();
        for (int i = 0; i < line.EffectIds.Count; i++) all.Add(await effects.OfAsync(line, line.Line.Effects[i], line.EffectIds[i], stop));
        return new LineWire(
            line.Line.Name, line.Line.Liquor.Always?.Name, Words.Of(now?.State ?? RunningState.Unknown), now?.At + inForce.Site.Window, latest, Freshness(latest), now?.Evaporation,
            line.Line.RequiredEvaporation, all);
    }

    private async Task<DateTimeOffset?> LatestAsync(IEnumerable<SignalPlace> signals, CancellationToken stop)
    {
        var last = await readings.LatestAsync(signals, stop);
        return last.Count == 0 ? null : new DateTimeOffset(last.Values.Max(reading => reading.At), TimeSpan.Zero);
    }

    private string Freshness(DateTimeOffset? latest) => latest is null ? "none" : clock.GetUtcNow() - latest < LiveUnder ? "live" : "stale";
}
