using System.Collections.Concurrent;
using System.Globalization;
using EvapMonitor.Core.Balances;
using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Plant;
using EvapMonitor.Core.Readings;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Wording;

namespace EvapMonitor.Service.Api;

/// <summary>The last balance of a line and what it says of the instruments, since when.</summary>
/// <param name="Version">Version of the line's results.</param>
/// <param name="Last">The balance; null when the line has none.</param>
/// <param name="Suspects">Sets of instruments of which one is wrong, and those left out.</param>
/// <param name="Fits">By signal: how it fits.</param>
public sealed record LineFit(long Version, StoredBalance? Last, IReadOnlyList<SuspectsWire> Suspects, IReadOnlyDictionary<string, FitWire> Fits)
{
    /// <summary>By signal: how it has changed against the others; those that have not are absent.</summary>
    public IReadOnlyDictionary<string, ChangeWire> Changes { get; init; } = new Dictionary<string, ChangeWire>();
}

/// <summary>Puts together what is known of the balance of each line now. Kept until the line has new results or an instrument new entries.</summary>
public sealed class BalanceStates(BalanceStore balances, TrendStore trends, InstrumentLogStore log, TimeProvider clock)
{
    /// <summary>How far back the beginning of a suspicion is looked for.</summary>
    private static readonly TimeSpan LookBack = TimeSpan.FromDays(30);

    /// <summary>A suspicion that has lasted this long is worth a notice.</summary>
    private static readonly TimeSpan WorthANotice = TimeSpan.FromHours(1);

    /// <summary>Of a line that has had no balance for this long nothing is said.</summary>
    private static readonly TimeSpan Present = TimeSpan.FromHours(2);

    private readonly ConcurrentDictionary<int, (PlantInForce Plant, long Log, LineFit Fit)> _known = new();

    /// <summary>What is known of a line.</summary>
    public async Task<LineFit> OfAsync(PlantInForce plant, LinePlace line, CancellationToken stop)
    {
        long version = await trends.DataVersionAsync(line.LineId, stop), logged = await log.VersionAsync(stop);
        if (_known.TryGetValue(line.LineId, out var known) && known.Plant == plant && known.Log == logged && known.Fit.Version == version) return known.Fit;
        StoredBalance? last = await balances.LastAsync(line.LineId, DateTimeOffset.MaxValue, DateTimeOffset.MinValue, stop);
        LineFit fit = last is null
            ? new LineFit(version, null, [], new Dictionary<string, FitWire>())
            : Judge(plant, line, version, last, await SinceAsync(line.LineId, last, stop)) with { Changes = await ChangesAsync(plant, line, last, stop) };
        _known[line.LineId] = (plant, logged, fit);
        return fit;
    }

    /// <summary>What the operator should know of the instruments: who has been suspect or left out for over an hour.</summary>
    public async Task<IReadOnlyList<NoticeWire>> NoticesAsync(PlantInForce plant, CancellationToken stop)
    {
        var notices = new List<NoticeWire>();
        foreach (LinePlace line in plant.Lines)
        {
            LineFit fit = await OfAsync(plant, line, stop);
            if (fit.Last is null) continue;
            DateTimeOffset end = Utc(fit.Last.At) + plant.Site.Window;
            if (clock.GetUtcNow() - end > Present) continue;
            notices.AddRange(fit.Suspects.Where(suspect => end - suspect.Since >= WorthANotice)
                .Select(suspect => new NoticeWire($"instruments/{line.Line.Name}/{string.Join('+', suspect.Signals)}", suspect.Since, $"Line {line.Line.Name}: {suspect.Sentence}")));
        }

        return notices;
    }

    /// <summary>A balance as it goes out.</summary>
    internal static BalanceWire WireOf(PlantInForce plant, LinePlace line, LineFit fit)
    {
        StoredBalance stored = fit.Last!;
        BalanceWindow balance = stored.Balance;
        var units = new BalanceUnits(line.Line);
        return new BalanceWire(
            line.Line.Name, Utc(stored.At), Utc(stored.At) + plant.Site.Window, balance.ChiSquare, balance.Degrees, Number(balance.ChiSquareLimit),
            balance.Degrees == 0 ? null : balance.ChiSquare <= balance.ChiSquareLimit, BalanceWords.Check(balance),
            [.. Enumerable.Range(0, balance.Layout.Variables.Count).Select(k => VariableOf(balance, k, units))],
            [.. balance.Layout.Signals.Select(signal => new BalanceSignalWire(signal, fit.Fits[signal]))], fit.Suspects, fit.Version);
    }

    /// <summary>How the signals of a balance fit. Beginnings are those given, or the window's own.</summary>
    internal static LineFit Judge(PlantInForce plant, LinePlace line, long version, StoredBalance stored, IReadOnlyDictionary<string, (long Suspect, long LeftOut)> since)
    {
        BalanceWindow balance = stored.Balance;
        var units = new BalanceUnits(line.Line);
        DateTimeOffset end = Utc(stored.At) + plant.Site.Window;
        (long Suspect, long LeftOut) Since(int place) => since.GetValueOrDefault(balance.Layout.Signals[place], (stored.At, stored.At));
        var fits = new Dictionary<string, FitWire>();
        for (int place = 0; place < balance.Layout.Signals.Count; place++) fits[balance.Layout.Signals[place]] = FitOf(balance, place, units, Since(place), end);
        string[] Names(IEnumerable<int> places) => [.. places.Select(place => balance.Layout.Signals[place])];
        IEnumerable<SuspectsWire> leftOut = balance.LeftOut.Select(place =>
            new SuspectsWire(Names([place]), true, Utc(Since(place).LeftOut), BalanceWords.LeftOut(balance.Layout.Signals[place])));
        IEnumerable<SuspectsWire> suspects = balance.Suspects.Where(set => !set.Any(balance.LeftOut.Contains))
            .Select(set => new SuspectsWire(Names(set), false, Utc(set.Max(place => Since(place).Suspect)), BalanceWords.Set(Names(set))));
        return new LineFit(version, stored, [.. leftOut, .. suspects], fits);
    }

    /// <summary>How instruments have changed against the others, from the hours of the last weeks.</summary>
    private async Task<IReadOnlyDictionary<string, ChangeWire>> ChangesAsync(PlantInForce plant, LinePlace line, StoredBalance last, CancellationToken stop)
    {
        DateTimeOffset end = Utc(last.At) + plant.Site.Window, from = end - LookBack - TimeSpan.FromDays(CorrectionChange.Baseline);
        var hours = new Dictionary<string, List<(long, double)>>();
        foreach (CorrectionHour hour in await balances.HoursAsync(line.LineId, from, end, stop))
        {
            for (int i = 0; i < hour.Signals.Count; i++)
            {
                if (!hours.TryGetValue(hour.Signals[i], out List<(long, double)>? own)) hours[hour.Signals[i]] = own = [];
                own.Add((hour.Hour, hour.Difference[i]));
            }
        }

        string[] signals = [.. hours.Keys.Where(plant.Signals.ContainsKey)];
        ILookup<int, InstrumentEvent> logged = (await log.ListAsync(signals.Select(signal => plant.Signals[signal]), stop)).ToLookup(one => one.SignalId);
        var units = new BalanceUnits(line.Line);
        var changes = new Dictionary<string, ChangeWire>();
        foreach (string signal in signals)
        {
            long? recalibrated = logged[plant.Signals[signal].SignalId].FirstOrDefault(one => one.Kind == InstrumentLogStore.Recalibrated)?.Start.ToUnixTimeMilliseconds();
            if (CorrectionChange.Find(hours[signal], StandardOf(last.Balance, signal), recalibrated, signals.Length) is not { } change) continue;
            if (units.Difference(signal, change.Change) is not var (value, unit)) continue;
            changes[signal] = new ChangeWire(Utc(change.Since), value, unit, $"reads {Signed(double.Abs(value))[1..]} {unit} {(value < 0 ? "higher" : "lower")} against the others than before");
        }

        return changes;
    }

    /// <summary>Standard uncertainty of a reading, as a size; 0 when the last balance has none.</summary>
    private static double StandardOf(BalanceWindow balance, string signal)
    {
        int place = balance.Layout.Signals.ToList().IndexOf(signal);
        double standard = place < 0 ? 0 : double.Abs(balance.Wanted[place] / balance.Correction[place]);
        return double.IsFinite(standard) ? standard : 0;
    }

    private static FitWire FitOf(BalanceWindow balance, int place, BalanceUnits units, (long Suspect, long LeftOut) since, DateTimeOffset end)
    {
        double correction = balance.Correction[place], test = balance.Test[place], wanted = balance.Wanted[place];
        bool leftOut = balance.LeftOut.Contains(place);
        IReadOnlyList<int>? set = leftOut ? null : balance.Suspects.FirstOrDefault(one => one.Contains(place));
        if (double.IsNaN(correction)) return new FitWire(leftOut ? "left out" : "no reading", leftOut ? "left out of the balance" : "has no reading in this window", leftOut ? Utc(since.LeftOut) : null, null, null, null, [], end);
        if (!leftOut && double.IsNaN(test)) return new FitWire("not checked", "nothing checks it", null, null, null, null, [], end);
        // A reading that counts pulls the balance towards itself. What the others alone would say is this much further away.
        double whole = set is null ? 1 : test / correction * (test / correction);
        (double value, string unit) = units.Difference(balance.Layout.Signals[place], wanted * whole) ?? (double.NaN, "");
        string[] oneOf = set is { Count: > 1 } ? [.. set.Select(one => balance.Layout.Signals[one])] : [];
        string size = string.Create(CultureInfo.InvariantCulture, $"the others want {Signed(value)} {unit} ({double.Abs(correction * whole):0.0} standard uncertainties)");
        (string state, string words, long? from) = leftOut ? ("left out", $"left out of the balance: {size}", since.LeftOut)
            : set is null ? ("fits", "fits the others", (long?)null)
            : oneOf.Length == 0 ? ("does not fit", $"does not fit the others: {size}", since.Suspect)
            : ("does not fit", $"does not fit the others, or {string.Join(" or ", oneOf.Where(one => one != balance.Layout.Signals[place]))} does not: {size}", since.Suspect);
        return new FitWire(state, words, from is { } at ? Utc(at) : null, Number(value), unit, Number(correction * whole), oneOf, end);
    }

    /// <summary>Since when each signal that is suspect or left out now has been so without a break.</summary>
    internal async Task<IReadOnlyDictionary<string, (long Suspect, long LeftOut)>> SinceAsync(int lineId, StoredBalance last, CancellationToken stop)
    {
        IReadOnlyList<string> signals = last.Balance.Layout.Signals;
        var since = last.Balance.Suspects.SelectMany(set => set).Concat(last.Balance.LeftOut).Distinct().ToDictionary(place => signals[place], _ => (Suspect: last.At, LeftOut: last.At));
        HashSet<string> suspect = [.. since.Keys], leftOut = [.. last.Balance.LeftOut.Select(place => signals[place])];
        if (since.Count == 0) return since;
        await foreach (WindowVerdicts window in balances.VerdictsAsync(lineId, Utc(last.At), Utc(last.At) - LookBack, stop))
        {
            suspect.RemoveWhere(signal => !window.LeftOut.Contains(signal) && !window.Suspects.Any(set => set.Contains(signal)));
            leftOut.RemoveWhere(signal => !window.LeftOut.Contains(signal));
            if (suspect.Count == 0) break;
            foreach (string signal in suspect) since[signal] = (window.At, leftOut.Contains(signal) ? window.At : since[signal].LeftOut);
        }

        return since;
    }

    private static BalanceVariableWire VariableOf(BalanceWindow balance, int k, BalanceUnits units)
    {
        VariableKey variable = balance.Layout.Variables[k];
        UnitOfMeasure unit = units.Shown(balance.Layout, k);
        double? Shown(double si) => Number(unit.FromSi(si));
        int place = balance.InstrumentOf(k);
        string suspicion = BalanceWords.Suspicion(balance, k);
        return new BalanceVariableWire(
            BalanceRow.NameOf(variable), BalanceWords.Place(variable), BalanceWords.What(variable), unit.Written, Shown(balance.Measured[k]), Shown(balance.Reconciled[k]),
            Number(balance.Standard[k] / unit.Factor), Number((balance.Reconciled[k] - balance.Measured[k]) / unit.Factor), place < 0 ? null : Number(balance.Correction[place]),
            Words.Of(balance.Class[k]), [.. balance.Layout.Instruments[k].Select(one => balance.Layout.Signals[one])], suspicion.Length == 0 ? null : suspicion);
    }

    /// <summary>Two figures with their sign, the decimals as they need.</summary>
    private static string Signed(double value)
    {
        int decimals = value == 0 || !double.IsFinite(value) ? 0 : int.Clamp(1 - (int)double.Floor(double.Log10(double.Abs(value))), 0, 6);
        return (value < 0 ? "−" : "+") + double.Abs(value).ToString("F" + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);
    }

    private static double? Number(double value) => double.IsFinite(value) ? double.Round(value, 9) : null;

    private static DateTimeOffset Utc(long at) => DateTimeOffset.FromUnixTimeMilliseconds(at);
}
