using EvapMonitor.Core.Fouling;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;
using Npgsql;

namespace EvapMonitor.Service.Evaluation;

/// <summary>What open pages are told when campaigns, cleanings or clean expectations of a line have changed.</summary>
/// <param name="Line">Name of the line.</param>
public sealed record SurfacesChanged(string Line);

/// <summary>
/// Holds the hours of each line against what its surfaces would be if clean: campaigns, cleanings, resistance. Windows never wait for it. Each time the whole of a
/// line's history is computed, so that live, late and recomputed results cannot differ; a line that takes long is computed less often.
/// </summary>
public sealed class SurfaceWorker(
    SurfaceInputs inputs, SurfaceStore store, LeaseStore leases, PlantHolder plant, LiveEvents events, TimeProvider clock, ILogger<SurfaceWorker> log) : BackgroundService
{
    private static readonly TimeSpan Pause = TimeSpan.FromSeconds(2);

    /// <summary>A line is left alone for this many times as long as it took, so that this takes a twentieth of a core at most.</summary>
    private const int RestTimes = 20;

    /// <summary>Days that wait hold the surfaces up for this long at most.</summary>
    private static readonly TimeSpan LongestWait = TimeSpan.FromMinutes(1);

    private readonly Dictionary<int, long> _restUntil = [], _computed = [];
    private readonly Dictionary<int, Dictionary<(int Effect, long Day), int>> _written = [];

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        while (!stoppingToken.IsCancellationRequested)
        {
            try
            {
                PlantInForce inForce = plant.Current;
                foreach (LinePlace line in inForce.Lines) await UpdateAsync(inForce, line, stoppingToken);
            }
            catch (NpgsqlException)
            {
                // The evaluation beside this says that the database is away.
            }
            catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
            {
                break;
            }

            await Task.Delay(Pause, clock, stoppingToken).ConfigureAwait(ConfigureAwaitOptions.SuppressThrowing);
        }
    }

    private async Task UpdateAsync(PlantInForce inForce, LinePlace line, CancellationToken stop)
    {
        long began = clock.GetTimestamp();
        if (_restUntil.GetValueOrDefault(line.LineId) > began) return;
        if (!await leases.IsOursAsync(line.LineId, stop))
        {
            // Another process writes the line now: what stands there is not what was written here.
            _written.Remove(line.LineId);
            return;
        }

        // Which plant revision it was computed under enters too: design values and names are of the plant in force.
        string version = $"{inForce.RevisionId} {await inputs.VersionAsync(line.LineId, stop)}";
        if (await store.InputAsync(line.LineId, stop) is { } computed)
        {
            if (computed == version) return;
            // A long backlog must not keep the surfaces from being shown, a short one is waited for.
            bool behind = await inputs.IsBehindAsync(line.LineId, DateOnly.FromDateTime(clock.GetUtcNow().UtcDateTime), stop);
            if (behind && clock.GetElapsedTime(_computed.GetValueOrDefault(line.LineId, long.MinValue / 4)) < LongestWait) return;
        }

        try
        {
            (string read, IReadOnlyList<EffectRecord> effects) = await inputs.ReadAsync(plant.Timeline, inForce, line, stop);
            IReadOnlyList<Surface> surfaces = await Task.Run(() => LineSurfaces.Of(effects), stop);
            await WriteAsync(line, $"{inForce.RevisionId} {read}", surfaces, effects, stop);
            events.Publish("surfaces", new SurfacesChanged(line.Line.Name));
            log.SurfacesComputed(line.Line.Name, clock.GetElapsedTime(began).TotalMilliseconds);
        }
        catch (Exception error) when (error is not OperationCanceledException && (error is not NpgsqlException of || DatabaseErrors.IsOfTheData(of)))
        {
            // One line that fails must not stop the others.
            log.SurfacesFailed(error, line.Line.Name);
            _restUntil[line.LineId] = clock.GetTimestamp() + (60 * clock.TimestampFrequency);
            return;
        }

        _computed[line.LineId] = clock.GetTimestamp();
        _restUntil[line.LineId] = clock.GetTimestamp() + (RestTimes * (clock.GetTimestamp() - began));
    }

    private async Task WriteAsync(LinePlace line, string version, IReadOnlyList<Surface> surfaces, IReadOnlyList<EffectRecord> effects, CancellationToken stop)
    {
        var ids = line.Line.Effects.Zip(line.EffectIds).ToDictionary(pair => pair.First.Name, pair => pair.Second);
        Dictionary<(int Effect, long Day), IReadOnlyList<StoredCleanHour>> days = HoursByDay(surfaces, effects, ids);
        Dictionary<(int, long), int> now = days.ToDictionary(day => day.Key, day => HashOf(day.Value));
        bool known = _written.TryGetValue(line.LineId, out Dictionary<(int Effect, long Day), int>? before);
        Dictionary<(int Effect, long Day), IReadOnlyList<StoredCleanHour>> changed = !known ? days
            : days.Where(day => !before!.TryGetValue(day.Key, out int hash) || hash != now[day.Key]).ToDictionary();
        if (known)
        {
            foreach ((int Effect, long Day) gone in before!.Keys.Where(day => !days.ContainsKey(day))) changed[gone] = [];
        }

        _written.Remove(line.LineId);
        await store.WriteAsync(line, version, surfaces, changed, !known, stop);
        _written[line.LineId] = now;
    }

    private static Dictionary<(int Effect, long Day), IReadOnlyList<StoredCleanHour>> HoursByDay(
        IReadOnlyList<Surface> surfaces, IReadOnlyList<EffectRecord> effects, Dictionary<string, int> ids)
    {
        // A surface's hour is that of the effect in which it served then.
        var servedIn = new Dictionary<(string Surface, long Hour), string>();
        foreach (EffectRecord effect in effects)
        {
            foreach (EffectStretch stretch in effect.Stretches.Where(stretch => stretch.Bodies is not null))
                servedIn[(stretch.SurfaceIn(effect.Effect.Name)!, stretch.Start - Milliseconds.Modulo(stretch.Start, Milliseconds.Hour))] = effect.Effect.Name;
        }

        return surfaces.SelectMany(surface => surface.History.Hours.Select(hour => (Effect: ids[servedIn[(surface.Name, hour.Hour)]], Hour: new StoredCleanHour(surface.Name, hour))))
            .GroupBy(one => (one.Effect, Milliseconds.DayOf(one.Hour.Clean.Hour)))
            .ToDictionary(day => day.Key, day => (IReadOnlyList<StoredCleanHour>)[.. day.Select(one => one.Hour).OrderBy(hour => hour.Clean.Hour)]);
    }

    private static int HashOf(IReadOnlyList<StoredCleanHour> hours)
    {
        var hash = new HashCode();
        foreach (StoredCleanHour hour in hours) hash.Add(hour);
        return hash.ToHashCode();
    }
}
