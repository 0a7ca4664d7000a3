using EvapMonitor.Core.Conditioning;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Ingest;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Wording;
using Microsoft.AspNetCore.Http.HttpResults;

namespace EvapMonitor.Service.Api;

/// <summary>Signals with their last readings, and where readings come from.</summary>
internal static class SignalHandlers
{
    private const int MostUnknown = 1000, MostRefused = 100;

    public static async Task<Ok<SignalsWire>> List(
        ReadingStore readings, SignalStates states, BalanceStates balances, ImportStore imports, UnknownSignals unknown, PlantHolder plant, TimeProvider clock, CancellationToken stop)
    {
        PlantInForce inForce = plant.Current;
        var latest = await readings.LatestAsync(inForce.Signals.Values, stop);
        IReadOnlyDictionary<string, SignalSummary> summaries = await states.LastDayAsync(inForce, stop);
        var units = inForce.Site.Lines.SelectMany(line => new Core.Balances.LineInstruments(line).All)
            .Concat(inForce.Site.Atmosphere.Measured is { } air ? [air] : [])
            .DistinctBy(instrument => instrument.Signal).ToDictionary(instrument => instrument.Signal, instrument => instrument.Unit.Written);
        var fits = new Dictionary<int, LineFit>();
        foreach (LinePlace one in inForce.Lines) fits[one.LineId] = await balances.OfAsync(inForce, one, stop);
        var signals = new List<SignalWire>();
        foreach ((string name, SignalPlace place) in inForce.Signals)
        {
            string line = inForce.Lines.First(one => one.LineId == place.Users[0]).Line.Name;
            bool any = latest.TryGetValue(place.SignalId, out var last);
            SignalSummary? summary = summaries.GetValueOrDefault(name);
            long Left(Rejection reason) => summary?.Rejected[(int)reason] ?? 0;
            var rejected = new RejectedWire(Left(Rejection.BadQuality), Left(Rejection.NotANumber), Left(Rejection.OutOfRange), Left(Rejection.Frozen));
            bool came = summary is not null && (summary.Readings > 0 || summary.Rejected.Any(count => count > 0));
            signals.Add(new SignalWire(
                name, line, units[name], any ? new DateTimeOffset(last.At, TimeSpan.Zero) : null, last.Value, any ? Words.Of((Quality)last.Quality) : null,
                came ? summary!.GoodShare : null, rejected, summary?.Readings ?? 0, fits[place.Users[0]].Fits.GetValueOrDefault(name),
                fits[place.Users[0]].Changes.GetValueOrDefault(name)));
        }

        return TypedResults.Ok(new SignalsWire(clock.GetUtcNow(), signals, Unknown(await imports.ListAsync(stop), unknown, inForce)));
    }

    public static async Task<Ok<SourcesWire>> Sources(SourceStates sources, Intake intake, RefusedStore refused, CancellationToken stop) =>
        TypedResults.Ok(new SourcesWire(
            [.. sources.All.Select(source => new SourceWire(
                source.Name, source.Kind, source.Address, source.ConnectedSince, source.LastMessage, source.Accepted, source.Malformed, source.OutOfTime, source.Unknown,
                source.InstantUnknown, source.Shed, source.Refused, source.Reconnects, source.LastError,
                [.. source.Samples.Select(sample => new SampleWire(sample.At, sample.Where, sample.Reason))]))],
            new SpoolWire(intake.SpooledBytes),
            await RefusedAsync(refused, stop)));

    /// <summary>What the database refused; null while it does not answer, when the sources matter most.</summary>
    private static async Task<IReadOnlyList<RefusedWire>?> RefusedAsync(RefusedStore refused, CancellationToken stop)
    {
        try
        {
            return [.. (await refused.ListAsync(MostRefused, stop)).Select(reading => new RefusedWire(
                Utc(reading.RefusedAt), reading.Signal, Utc(reading.At), reading.Value, Words.Of((Quality)reading.Quality), reading.Source, reading.Reason))];
        }
        catch (Npgsql.NpgsqlException)
        {
            return null;
        }
    }

    private static UnknownSignalWire[] Unknown(IReadOnlyList<ImportFile> imports, UnknownSignals live, PlantInForce plant)
    {
        var files = imports.SelectMany(import => import.UnknownSignals.Select(signal => new UnknownSignalWire(signal.Name, signal.Count, import.EndedAt is { } at ? Utc(at) : null, import.Name)));
        var seen = live.All.Select(signal => new UnknownSignalWire(signal.Name, signal.Count, signal.LastSeen, signal.Source));
        return [.. files.Concat(seen)
            .Where(signal => !plant.Signals.ContainsKey(signal.Name))
            .GroupBy(signal => signal.Name)
            .Select(same => same.MaxBy(one => one.LastSeen)! with { Count = same.Sum(one => one.Count) })
            .OrderByDescending(signal => signal.Count).ThenBy(signal => signal.Name, StringComparer.Ordinal).Take(MostUnknown)];
    }

    private static DateTimeOffset Utc(DateTime time) => new(DateTime.SpecifyKind(time, DateTimeKind.Utc));
}
