using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;

namespace EvapMonitor.Core.Fouling;

/// <summary>A cleaning of an effect as people wrote it down, or their word that there was none.</summary>
/// <param name="Start">Start, ms since 1970-01-01T00:00:00Z.</param>
/// <param name="End">End; <see cref="long.MaxValue"/> while it goes on.</param>
/// <param name="Word">The plant's word for it.</param>
/// <param name="Body">The body that was cleaned; null: the one that served the effect.</param>
/// <param name="Rejected">True: what was recognised in this time was no cleaning.</param>
/// <param name="Id">The entry's identifier.</param>
public sealed record EffectCleaning(long Start, long End, string Word, string? Body, bool Rejected, Guid? Id);

/// <summary>What is known of an effect over time.</summary>
/// <param name="Effect">The effect.</param>
/// <param name="Hours">Its hours, by quantity, in any order.</param>
/// <param name="Stretches">What it did, ascending.</param>
/// <param name="Cleanings">What people wrote down.</param>
/// <param name="Recalibrations">When instruments behind its coefficient were set right, or its surface became another, ms.</param>
public sealed record EffectRecord(
    Effect Effect, IReadOnlyList<EffectHour> Hours, IReadOnlyList<EffectStretch> Stretches, IReadOnlyList<EffectCleaning> Cleanings, IReadOnlyList<long> Recalibrations);

/// <summary>A heating surface with its history: an effect's own, a body's, or that of bodies in parallel.</summary>
/// <param name="Name">Name of the effect, or of its bodies joined by +.</param>
/// <param name="Effect">The effect in which it served last.</param>
/// <param name="ServedUntil">End of what is known of its service, ms.</param>
/// <param name="History">Its history.</param>
public sealed record Surface(string Name, string Effect, long ServedUntil, SurfaceHistory History);

/// <summary>Takes the records of a line's effects apart by surface: a body carries its history from one effect to the next.</summary>
public static class LineSurfaces
{
    /// <summary>The surfaces of a line, by name of effect in plant-file order and then of body.</summary>
    /// <param name="effects">What is known of its effects, in plant-file order.</param>
    public static IReadOnlyList<Surface> Of(IReadOnlyList<EffectRecord> effects)
    {
        Served[] served = [.. effects.SelectMany(effect => effect.Stretches.Where(stretch => stretch.Bodies is not null)
            .Select(stretch => new Served(stretch, effect, stretch.SurfaceIn(effect.Effect.Name)!)))];
        Dictionary<string, Dictionary<long, Dictionary<HourQuantity, EffectHour>>> hours = effects.ToDictionary(
            effect => effect.Effect.Name, effect => effect.Hours.GroupBy(hour => hour.Hour).ToDictionary(hour => hour.Key, hour => hour.ToDictionary(one => one.Quantity)));
        return [.. served.Select(one => one.Surface).Distinct().Select(name => Of(name, [.. served.Where(one => one.Surface == name).OrderBy(one => one.Stretch.Start)], effects, hours))];
    }

    private static Surface Of(
        string name, IReadOnlyList<Served> served, IReadOnlyList<EffectRecord> effects, Dictionary<string, Dictionary<long, Dictionary<HourQuantity, EffectHour>>> hours)
    {
        EffectRecord last = served[^1].Effect;
        var producing = new List<SurfaceHour>();
        var water = new List<SurfaceHour>();
        foreach (IGrouping<long, Served> hour in served.GroupBy(one => one.Stretch.Start - Milliseconds.Modulo(one.Stretch.Start, Milliseconds.Hour)))
        {
            // An hour that two effects, surfaces or products share tells of none of them.
            if (hour.Select(one => one.Effect.Effect.Name).Distinct().Count() > 1) continue;
            EffectRecord effect = hour.First().Effect;
            if (!hours[effect.Effect.Name].TryGetValue(hour.Key, out Dictionary<HourQuantity, EffectHour>? quantities)) continue;
            if (Only(hour, effect, RunningState.Producing, RunningState.Unknown) is { } product && HourOf(hour.Key, effect, product, quantities, HourQuantity.Coefficient) is { } one) producing.Add(one);
            if (Only(hour, effect, RunningState.WaterRun) is { } wet && HourOf(hour.Key, effect, wet, quantities, HourQuantity.WaterRunCoefficient) is { } test) water.Add(test);
        }

        var history = SurfaceHistory.Of(
            new SurfaceSettings(last.Effect.CleanCoefficient), producing, water, [.. Spans(served, effects)], [.. Events(name, served, effects)]);
        return new Surface(name, last.Effect.Name, served.Max(one => one.Stretch.End), history);
    }

    /// <summary>The product of an hour in which the effect ran in some states on one surface with one product alone; null otherwise.</summary>
    private static string? Only(IGrouping<long, Served> hour, EffectRecord effect, params ReadOnlySpan<RunningState> states)
    {
        string? product = null;
        foreach (EffectStretch stretch in effect.Stretches.Skip(FirstFrom(effect.Stretches, hour.Key)).TakeWhile(stretch => stretch.Start < hour.Key + Milliseconds.Hour))
        {
            if (!states.Contains(stretch.State)) continue;
            if (stretch.SurfaceIn(effect.Effect.Name) != hour.First().Surface || (product is not null && product != (stretch.Product ?? ""))) return null;
            product = stretch.Product ?? "";
        }

        return product;
    }

    /// <summary>Stretches do not cross an hour, so that those of an hour begin in it.</summary>
    private static int FirstFrom(IReadOnlyList<EffectStretch> stretches, long hour)
    {
        (int low, int high) = (0, stretches.Count);
        while (low < high)
        {
            int middle = (low + high) / 2;
            if (stretches[middle].Start < hour) low = middle + 1;
            else high = middle;
        }

        return low;
    }

    private static SurfaceHour? HourOf(long hour, EffectRecord effect, string product, Dictionary<HourQuantity, EffectHour> quantities, HourQuantity coefficient)
    {
        double Mean(HourQuantity quantity) => quantities.TryGetValue(quantity, out EffectHour? found) ? found.Mean.Value : double.NaN;
        if (!quantities.TryGetValue(coefficient, out EffectHour? its) || !(its.Mean.Value > 0)) return null;
        return new SurfaceHour(
            hour, effect.Effect.Name, product, its.Count, its.Mean, Mean(HourQuantity.DrivingForce), Mean(HourQuantity.BoilingTemperature), Mean(HourQuantity.Solids),
            Mean(HourQuantity.HeatFlux), Mean(HourQuantity.FeedFlow));
    }

    private static IEnumerable<SurfaceSpan> Spans(IReadOnlyList<Served> served, IReadOnlyList<EffectRecord> effects)
    {
        foreach (Served one in served)
        {
            (long start, long end) = (one.Stretch.Start, one.Stretch.End);
            SpanKind? kind = one.Stretch.State switch
            {
                RunningState.Idle or RunningState.Filling => SpanKind.Standing,
                RunningState.WaterRun => SpanKind.WaterRun,
                // What is logged is told by the log; what nobody logged, by the signal of the cleaning.
                RunningState.Cleaning => one.Effect.Cleanings.Any(cleaning => !cleaning.Rejected && cleaning.Start < end && cleaning.End > start) ? SpanKind.Standing : SpanKind.Cleaning,
                _ => null,
            };
            if (kind is { } known) yield return new SurfaceSpan(start, end, known);
        }

        foreach ((long start, long end) in Elsewhere(served, effects)) yield return new SurfaceSpan(start, end, SpanKind.OutOfService);
    }

    /// <summary>Between two services of a surface, and after the last, while its effects ran with others.</summary>
    private static IEnumerable<(long Start, long End)> Elsewhere(IReadOnlyList<Served> served, IReadOnlyList<EffectRecord> effects)
    {
        EffectRecord[] its = [.. effects.Where(effect => served.Any(one => one.Effect == effect))];
        long known = its.Max(effect => effect.Stretches[^1].End), end = served[0].Stretch.Start;
        foreach (Served one in served)
        {
            if (one.Stretch.Start > end && WithOthers(end, one.Stretch.Start)) yield return (end, one.Stretch.Start);
            end = long.Max(end, one.Stretch.End);
        }

        if (known > end && WithOthers(end, known)) yield return (end, known);
        bool WithOthers(long from, long to) => its.Any(effect => effect.Stretches.Skip(FirstFrom(effect.Stretches, from - Milliseconds.Hour)).TakeWhile(stretch => stretch.Start < to)
            .Any(stretch => stretch.End > from && stretch.Bodies is not null));
    }

    private static IEnumerable<SurfaceEvent> Events(string name, IReadOnlyList<Served> served, IReadOnlyList<EffectRecord> effects)
    {
        foreach (EffectRecord effect in effects)
        {
            foreach (EffectCleaning cleaning in effect.Cleanings.Where(cleaning => IsOf(cleaning, effect, name)))
                yield return new SurfaceEvent(cleaning.Start, cleaning.End, cleaning.Rejected ? SurfaceEventKind.RejectedCleaning : SurfaceEventKind.Cleaning, cleaning.Word, cleaning.Id);
        }

        foreach (long at in served.Select(one => one.Effect).Distinct().SelectMany(effect => effect.Recalibrations).Distinct().Order())
            yield return new SurfaceEvent(at, at, SurfaceEventKind.Recalibration, "", null);
    }

    /// <summary>A cleaning is that of the body it names, else of the surface that served the effect just before it; without any before, the first after.</summary>
    private static bool IsOf(EffectCleaning cleaning, EffectRecord effect, string name)
    {
        if (cleaning.Body is { } body) return name.Split('+').Contains(body);
        EffectStretch? before = null, after = null;
        foreach (EffectStretch stretch in effect.Stretches.Where(stretch => stretch.Bodies is not null))
        {
            if (stretch.Start < cleaning.Start) before = stretch;
            else
            {
                after = stretch;
                break;
            }
        }

        return (before ?? after) is { } serves && serves.SurfaceIn(effect.Effect.Name) == name
            // A rise that was no cleaning may be that of either surface.
            || (cleaning.Rejected && after?.SurfaceIn(effect.Effect.Name) == name);
    }

    /// <summary>A stretch with the surface that served.</summary>
    private sealed record Served(EffectStretch Stretch, EffectRecord Effect, string Surface);
}
