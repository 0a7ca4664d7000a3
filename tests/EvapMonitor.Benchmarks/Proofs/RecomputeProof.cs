using System.Diagnostics;
using System.Diagnostics.Metrics;
using System.Globalization;
using EvapMonitor.Service;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Ingest;
using Serilog.Events;

namespace EvapMonitor.Benchmarks.Proofs;

/// <summary>
/// Days of the three demo lines recomputed from their stored readings: how long that takes at each station, with all cores and with one, and whether a run that is
/// killed twice on its way leaves the same bits. Argument: days (default 60).
/// </summary>
internal static class RecomputeProof
{
    private const int UsualDays = 60, Rounds = 2;

    public static async Task<int> RunAsync(string[] arguments)
    {
        int days = arguments.Length > 0 ? int.Parse(arguments[0], CultureInfo.InvariantCulture) : UsualDays;
        var proof = new Proof("recompute", "Days recomputed from stored readings, killed on the way");
        await using RecomputeStand stand = await RecomputeStand.MakeAsync();
        long began = Stopwatch.GetTimestamp();
        (ServiceProcess service, HttpClient http) = await stand.ServeAsync();
        long readings = await stand.FillAsync(http, days);
        await stand.EvaluatedAsync();
        double filled = Stopwatch.GetElapsedTime(began).TotalSeconds;
        var first = await stand.BitsAsync(1);
        http.Dispose();
        service.Dispose();

        (AcceptedRevisionWire accepted, double alone, Dictionary<string, double> stations, var surfaces) = await UndisturbedAsync(stand);
        int total = accepted.Recomputation!.DaysTotal, revision = accepted.Revision.Revision;
        var undisturbed = await stand.BitsAsync(revision);
        await stand.ClearAsync(revision);

        (double killed, int left1, int left2, var surfacesAfterwards) = await KilledTwiceAsync(stand, total);
        var afterwards = await stand.BitsAsync(revision);
        var (all, one, north) = (double.MaxValue, double.MaxValue, double.MaxValue);
        for (int round = 0; round < Rounds; round++)
        {
            // In turns: what else the machine does meanwhile falls on both.
            all = double.Min(all, await AgainAsync(stand, null));
            one = double.Min(one, await AgainAsync(stand, 1));
            north = double.Min(north, await AgainAsync(stand, null, "north"));
        }

        double northDays = total / 3.0;

        proof.Say($"{days} days of the demo's three lines: {readings:N0} readings of {await stand.CountAsync("SELECT count(*) FROM signal"):N0} signals, {total} days of lines. Made, imported and first evaluated in {filled:0} s.");
        proof.Say("");
        proof.Say("| run | s | days of lines per minute |");
        proof.Say("|---|---|---|");
        proof.Say($"| lines beside each other on {Environment.ProcessorCount} cores, the faster of {Rounds} | {all:0.0} | {60 * total / all:0} |");
        proof.Say($"| one line after the other on one core, the faster of {Rounds}, in turns with the former | {one:0.0} | {60 * total / one:0} |");
        proof.Say($"| line north alone (four effects, 34 signals, 288 windows a day) on {Environment.ProcessorCount} cores, the faster of {Rounds} | {north:0.0} | {60 * northDays / north:0}; a year of it would take {365 * north / northDays:0} s |");
        proof.Say($"| a new plant revision, undisturbed, in the process of this proof | {alone:0.0} | {60 * total / alone:0} |");
        proof.Say($"| asked for, killed (SIGKILL) with {left1} and {left2} days left, started again each time, leases of the dead waited for (15 s) | {killed:0.0} | {60 * total / killed:0} |");
        proof.Say("");
        double sum = stations.Values.Sum();
        proof.Say("| station, undisturbed run, all lines added up | s | share | ms per day of a line |");
        proof.Say("|---|---|---|---|");
        foreach ((string station, double seconds) in stations) proof.Say($"| {station} | {seconds:0.0} | {100 * seconds / sum:0} % | {1000 * seconds / total:0} |");
        proof.Say("");
        proof.Say("Results, every row as text, hashed in the order of the key. Before the killed run the rows of the revision were deleted, so all were written by it.");
        proof.Say("");
        proof.Say("| table | rows | SHA-256 undisturbed | after two kills |");
        proof.Say("|---|---|---|---|");
        bool same = true;
        foreach ((string table, (long rows, string hash)) in undisturbed)
        {
            bool alike = afterwards[table] == (rows, hash) && rows > 0;
            same &= alike && first[table].Rows == rows;
            proof.Say($"| {table} | {rows:N0} | {hash[..16]} | {(alike ? "the same" : "DIFFERENT: " + afterwards[table].Hash[..int.Min(16, afterwards[table].Hash.Length)])} |");
        }

        foreach ((string table, (long rows, string hash)) in surfaces)
        {
            bool alike = surfacesAfterwards[table] == (rows, hash) && rows > 0;
            same &= alike;
            proof.Say($"| {table} | {rows:N0} | {hash[..16]} | {(alike ? "the same" : "DIFFERENT")} |");
        }

        proof.Say("");
        proof.Say(same ? "All bits are the same." : "Not all bits are the same.");
        proof.Write();
        return same ? 0 : 1;
    }

    /// <summary>Within this process, so that the meter can be listened to.</summary>
    private static async Task<(AcceptedRevisionWire Accepted, double Seconds, Dictionary<string, double> Stations, IReadOnlyDictionary<string, (long Rows, string Hash)> Surfaces)> UndisturbedAsync(RecomputeStand stand)
    {
        var stations = new Dictionary<string, double> { ["read"] = 0, ["compute"] = 0, ["write"] = 0 };
        using var listener = new MeterListener();
        listener.InstrumentPublished = (instrument, own) =>
        {
            if (instrument.Meter.Name == EvaluationTimes.MeterName) own.EnableMeasurementEvents(instrument);
        };
        listener.SetMeasurementEventCallback<double>((_, seconds, tags, _) =>
        {
            lock (stations) stations[(string)tags[0].Value!] += seconds;
        });
        listener.Start();
        var options = new ServiceOptions
        {
            Plant = stand.Plant, Data = stand.Data, Connection = stand.Connection, Listen = "http://127.0.0.1:0", Ingest = new IngestSettings { OwnBroker = "off" },
        };
        await using ServiceHost host = await ServiceHost.StartAsync(options, CancellationToken.None, logLevel: LogEventLevel.Warning);
        using var http = new HttpClient { BaseAddress = new Uri(host.Address) };
        long began = Stopwatch.GetTimestamp();
        AcceptedRevisionWire accepted = await RecomputeStand.NewRevisionAsync(http);
        await stand.LeftAsync(accepted.Recomputation!.Id, 0);
        double seconds = Stopwatch.GetElapsedTime(began).TotalSeconds;
        return (accepted, seconds, stations, await stand.SurfaceBitsAsync());
    }

    private static async Task<(double Seconds, int FirstLeft, int SecondLeft, IReadOnlyDictionary<string, (long Rows, string Hash)> Surfaces)> KilledTwiceAsync(RecomputeStand stand, int total)
    {
        (ServiceProcess service, HttpClient http) = await stand.ServeAsync();
        long began = Stopwatch.GetTimestamp();
        RecomputationWire one = await RecomputeStand.RecomputeAsync(http);
        var left = new List<int>();
        foreach (int share in new[] { 2, 1 })
        {
            await stand.LeftAsync(one.Id, share * total / 3);
            await service.KillAsync();
            service.Dispose();
            http.Dispose();
            left.Add((int)await stand.CountAsync($"SELECT count(*) FROM recomputation_day WHERE recomputation_id = {one.Id}"));
            (service, http) = await stand.ServeAsync();
        }

        await stand.LeftAsync(one.Id, 0);
        double seconds = Stopwatch.GetElapsedTime(began).TotalSeconds;
        IReadOnlyDictionary<string, (long Rows, string Hash)> surfaces = await stand.SurfaceBitsAsync();
        http.Dispose();
        service.Dispose();
        return (seconds, left[0], left[1], surfaces);
    }

    private static async Task<double> AgainAsync(RecomputeStand stand, int? cores, string? line = null)
    {
        (ServiceProcess service, HttpClient http) = await stand.ServeAsync(cores);
        long began = Stopwatch.GetTimestamp();
        await stand.LeftAsync((await RecomputeStand.RecomputeAsync(http, line)).Id, 0);
        double seconds = Stopwatch.GetElapsedTime(began).TotalSeconds;
        http.Dispose();
        service.Dispose();
        return seconds;
    }
}
