using EvapMonitor.Core;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Evaluation;

/// <summary>Gathers what people have logged of a line and its instruments.</summary>
public sealed class LineLogs(CleaningStore cleanings, InstrumentLogStore instruments)
{
    /// <summary>What stands in the log for a line.</summary>
    public async Task<LineLog> OfAsync(PlantInForce plant, LinePlace line, CancellationToken stop)
    {
        var effects = line.EffectIds.Zip(line.Line.Effects, (id, effect) => (id, effect.Name)).ToDictionary(pair => pair.id, pair => pair.Name);
        var signals = plant.Signals.Where(signal => signal.Value.Users.Contains(line.LineId)).ToDictionary(signal => signal.Value.SignalId, signal => signal.Key);
        IReadOnlyList<InstrumentEvent> logged = await instruments.ListAsync(signals.Values.Select(name => plant.Signals[name]), stop);
        return new LineLog(
            (await cleanings.ListAsync(line.LineId, null, stop)).Where(cleaning => !cleaning.Rejected && effects.ContainsKey(cleaning.EffectId) && IsInService(line, cleaning))
                .ToLookup(cleaning => effects[cleaning.EffectId], cleaning => Interval(cleaning.Start, cleaning.End)),
            logged.Where(one => one.Kind == InstrumentLogStore.Excluded).ToLookup(one => signals[one.SignalId], one => Interval(one.Start, one.End)));
    }

    /// <summary>The cleaning of a body that can be taken out while another serves does not take the effect out.</summary>
    private static bool IsInService(LinePlace line, LoggedCleaning cleaning) => cleaning.Body is null || line.Line.Bodies.All(body => body.Name != cleaning.Body || body.Serves.Count == 0);

    private static (long Start, long End) Interval(DateTimeOffset start, DateTimeOffset? end) => (start.ToUnixTimeMilliseconds(), end?.ToUnixTimeMilliseconds() ?? long.MaxValue);
}
