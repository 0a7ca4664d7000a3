using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Http.HttpResults;

namespace EvapMonitor.Service.Api;

/// <summary>Signals with their last readings.</summary>
internal static class SignalHandlers
{
    public static async Task<Ok<SignalsWire>> List(ReadingStore readings, ImportStore imports, PlantHolder plant, CancellationToken stop)
    {
        PlantInForce inForce = plant.Current;
        var latest = await readings.LatestAsync(inForce.Signals.Values, stop);
        var units = inForce.Site.Lines.SelectMany(line => new Core.Balances.LineInstruments(line).All)
            .Concat(inForce.Site.Atmosphere.Measured is { } air ? [air] : [])
            .DistinctBy(instrument => instrument.Signal).ToDictionary(instrument => instrument.Signal, instrument => instrument.Unit.Written);
        var signals = new List<SignalWire>();
        foreach ((string name, SignalPlace place) in inForce.Signals)
        {
            string line = inForce.Lines.First(one => one.LineId == place.Users[0]).Line.Name;
            bool any = latest.TryGetValue(place.SignalId, out var last);
            signals.Add(new SignalWire(name, line, units[name], any ? new DateTimeOffset(last.At, TimeSpan.Zero) : null, last.Value, any ? Words.Of((Quality)last.Quality) : null));
        }

        var unknown = (await imports.ListAsync(stop))
            .SelectMany(import => import.UnknownSignals.Select(signal => (signal, import.EndedAt)))
            .Where(seen => !inForce.Signals.ContainsKey(seen.signal.Name))
            .GroupBy(seen => seen.signal.Name)
            .Select(seen => new UnknownSignalWire(seen.Key, seen.Sum(one => one.signal.Count), seen.Max(one => one.EndedAt) is { } at ? new DateTimeOffset(at, TimeSpan.Zero) : null))
            .OrderByDescending(signal => signal.Count).Take(1000);
        return TypedResults.Ok(new SignalsWire(signals, [.. unknown]));
    }
}
