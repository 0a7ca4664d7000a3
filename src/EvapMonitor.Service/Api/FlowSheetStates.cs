using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Wording;
using Microsoft.AspNetCore.Http.HttpResults;

namespace EvapMonitor.Service.Api;

/// <summary>The flow sheet of a line with its readings and results as they are now.</summary>
public sealed class FlowSheetStates(ReadingStore readings, SiteStates lines, BalanceStates balances, TimeProvider clock)
{
    /// <summary>Answers the route.</summary>
    internal static async Task<Results<Ok<FlowSheetWire>, ProblemHttpResult>> Handle(string line, FlowSheetStates states, PlantHolder plant, CancellationToken stop)
    {
        // One plant for the whole answer: another may come into force meanwhile.
        PlantInForce inForce = plant.Current;
        return inForce.Find(line) is { } place ? TypedResults.Ok(await states.OfAsync(inForce, place, stop)) : Problems.NoLine(inForce, line);
    }

    /// <summary>The sheet of a line.</summary>
    public async Task<FlowSheetWire> OfAsync(PlantInForce inForce, LinePlace line, CancellationToken stop)
    {
        LineWire state = await lines.LineAsync(inForce, line, stop);
        DateTimeOffset now = clock.GetUtcNow();
        var latest = await readings.LatestAsync(inForce.Signals.Values.Where(signal => signal.Users.Contains(line.LineId)), stop);
        var sheet = new FlowSheet(line.Line);
        LineFit fit = await balances.OfAsync(inForce, line, stop);
        var units = new BalanceUnits(line.Line);
        MeasuredNowWire Measured(InstrumentHere here)
        {
            (DateTime At, double? Value, short Quality)? last =
                inForce.Signals.TryGetValue(here.Instrument.Signal, out SignalPlace? place) && latest.TryGetValue(place.SignalId, out var found) ? found : null;
            DateTimeOffset? at = last is { } one ? new DateTimeOffset(one.At, TimeSpan.Zero) : null;
            string word = last is null ? "none" : now - at > here.ValidFor ? "stale" : last.Value.Value is null ? "bad" : Words.Of((Quality)last.Value.Quality);
            return new MeasuredNowWire(here.What, here.Instrument.Signal, last?.Value, here.Instrument.Unit.Written, at, word);
        }

        return new FlowSheetWire(
            line.Line.Name, now, state.State, state.AsOf, state.LatestReadingAt, state.Readings,
            [.. sheet.Places.Select(place => new PlaceWire(
                place.Id, place.Kind, place.Name, [.. place.Instruments.Select(Measured)], place.Effect < 0 ? null : state.Effects[place.Effect],
                place.Effect < 0 ? [] : Bodies(line.Line, line.Line.Effects[place.Effect], Measured)))],
            [.. sheet.Ways.Select(way => new WayWire(way.From, way.To, way.Kind, way.Share?.Value, way.Share?.Standard, way.Flow is { } flow ? Measured(flow) : null, ByBalance(way, fit, units, inForce.Site.Window)))]);
    }

    private static BalanceFlowWire? ByBalance(SheetWay way, LineFit fit, BalanceUnits units, TimeSpan window)
    {
        if (fit.Last is not { } last || way.Variable is not { } variable) return null;
        int k = last.Balance.Layout.Variables.ToList().IndexOf(variable);
        if (k < 0 || !double.IsFinite(last.Balance.Reconciled[k])) return null;
        UnitOfMeasure unit = units.Shown(last.Balance.Layout, k);
        bool? agrees = way.Flow is { } flow && fit.Fits.TryGetValue(flow.Instrument.Signal, out FitWire? its) && its.State != "no reading" ? its.State is "fits" or "not checked" : null;
        return new BalanceFlowWire(
            double.Round(unit.FromSi(last.Balance.Reconciled[k]), 9), double.Round(last.Balance.Standard[k] / unit.Factor, 9), unit.Written,
            DateTimeOffset.FromUnixTimeMilliseconds(last.At) + window, agrees);
    }

    /// <summary>The bodies that an effect lists, and those that may take its place.</summary>
    private static IReadOnlyList<BodyNowWire> Bodies(Line line, Effect effect, Func<InstrumentHere, MeasuredNowWire> measured) =>
        [.. line.Bodies.Where(body => effect.Bodies.Contains(body.Name) || body.Serves.ContainsKey(effect.Name)).Select(body => new BodyNowWire(
            body.Name, body.Area,
            body.Serves.TryGetValue(effect.Name, out ActiveSignal? signal)
                ? measured(new("position", signal.Instrument, signal.Instrument.StaleAfter)) is { State: "good" or "uncertain", Value: { } value } ? signal.IsActive(value) : null
                : true))];
}
