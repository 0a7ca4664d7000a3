using System.Diagnostics;
using System.Globalization;
using System.Text.Json;
using EvapMonitor.Benchmarks.Proofs;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Benchmarks.Ingest;

/// <summary>
/// The database stopped for minutes, killed again and again, and out of disk, all under load: what the service says, what it refuses, how long the backlog
/// takes, and whether anything acknowledged is missing. Arguments: seconds stopped (default 300), kills (default 10), seed (default 5). Filling the
/// disk needs the right to mount a file system in memory.
/// </summary>
internal static class DatabaseProof
{
    public static async Task<int> RunAsync(string[] arguments)
    {
        int seconds = arguments.Length > 0 ? int.Parse(arguments[0], CultureInfo.InvariantCulture) : 300;
        int kills = arguments.Length > 1 ? int.Parse(arguments[1], CultureInfo.InvariantCulture) : 10;
        int seed = arguments.Length > 2 ? int.Parse(arguments[2], CultureInfo.InvariantCulture) : 5;
        var proof = new Proof("database", "The database stopped, killed and out of disk under load");
        proof.Say($"{AcknowledgedLoad.PerSecond:N0} readings a second at QoS 1 through mosquitto and batches of {AcknowledgedLoad.HttpBatch} by HTTP all the time.");
        proof.Say("");
        proof.Say("| what happened to the database | acknowledged meanwhile | HTTP batches told to come again | waited in the spool at most, MiB | seconds from its return until all was stored | acknowledged in all | missing |");
        proof.Say("|---|---|---|---|---|---|---|");
        var said = new List<string>();
        long missing = await WithAsync(proof, said, Invariant($"stopped for {seconds} s"), null, (stand, watch) => StopAsync(stand, watch, seconds));
        missing += await WithAsync(proof, said, Invariant($"killed {kills} times (SIGKILL), 1 to 8 s apart"), null, (stand, _) => KillAsync(stand, kills, new Random(seed)));
        missing += await WithAsync(proof, said, "its disk full (a file system of 100 MB in memory), made larger after a minute", "100m", FillAsync);
        proof.Say("");
        proof.Say("What the page said meanwhile:");
        proof.Say("");
        foreach (string words in said) proof.Say($"- {words}");
        proof.Write(seed);
        return missing == 0 ? 0 : 1;
    }

    private static async Task<long> WithAsync(Proof proof, List<string> said, string what, string? disk, Func<Stand, Watch, Task> harm)
    {
        await using Stand stand = await Stand.MakeAsync(disk);
        (ServiceProcess service, string address) = await stand.ServeAsync();
        using (service)
        using (AcknowledgedLoad load = await AcknowledgedLoad.StartAsync(stand, address))
        {
            await Task.Delay(5_000);
            using var watch = new Watch(address, load);
            // A page that was open before.
            await watch.ForAsync(TimeSpan.FromSeconds(2));
            await harm(stand, watch);
            long returned = Stopwatch.GetTimestamp(), meanwhile = load.Acknowledged - watch.AtFirst;
            await watch.WaitCalmAsync(TimeSpan.FromMinutes(5));
            TimeSpan drained = Stopwatch.GetElapsedTime(returned);
            await load.EndAsync();
            await load.StoredAsync(TimeSpan.FromMinutes(2));
            (long missing, long foreign, long wrong) = await load.CompareAsync();
            proof.Say($"| {what} | {meanwhile:N0} | {load.Refused} | {watch.MostMiB:0.0} | {drained.TotalSeconds:0.0} | {load.Acknowledged:N0} | {missing + foreign + wrong:N0} |");
            said.AddRange(watch.Said.Select(words => (disk is null ? what.Split(' ')[0] : "disk full") + ": " + words));
            return missing + foreign + wrong;
        }
    }

    private static async Task StopAsync(Stand stand, Watch watch, int seconds)
    {
        await stand.Server.StopAsync();
        await watch.ForAsync(TimeSpan.FromSeconds(seconds));
        await stand.Server.EnsureRunningAsync(CancellationToken.None);
    }

    private static async Task KillAsync(Stand stand, int kills, Random random)
    {
        for (int i = 0; i < kills; i++)
        {
            await Task.Delay(random.Next(1_000, 8_000));
            stand.KillDatabase();
            await stand.BringBackAsync();
        }
    }

    private static async Task FillAsync(Stand stand, Watch watch)
    {
        await watch.UntilSaidAsync(TimeSpan.FromMinutes(5));
        await watch.ForAsync(TimeSpan.FromSeconds(60));
        stand.EnlargeDisk("3g");
        // Out of room for its log it may have ended itself.
        await stand.BringBackAsync();
    }

    /// <summary>Looks at the page's own source meanwhile: what it says, how much waits.</summary>
    private sealed class Watch(string address, AcknowledgedLoad load) : IDisposable
    {
        private readonly HttpClient _http = new() { BaseAddress = new Uri(address), Timeout = TimeSpan.FromSeconds(10) };

        public long AtFirst { get; } = load.Acknowledged;

        public double MostMiB { get; private set; }

        public SortedSet<string> Said { get; } = new(StringComparer.Ordinal);

        public async Task ForAsync(TimeSpan span)
        {
            for (long began = Stopwatch.GetTimestamp(); Stopwatch.GetElapsedTime(began) < span; await Task.Delay(1_000)) await LookAsync();
        }

        public async Task UntilSaidAsync(TimeSpan limit)
        {
            for (long began = Stopwatch.GetTimestamp(); Said.Count == 0; await Task.Delay(500))
            {
                await LookAsync();
                if (Stopwatch.GetElapsedTime(began) > limit) throw new TimeoutException("Nothing was said.");
            }
        }

        /// <summary>Until less than a second's load waits.</summary>
        public async Task WaitCalmAsync(TimeSpan limit)
        {
            for (long began = Stopwatch.GetTimestamp(); await LookAsync() > 0.5; await Task.Delay(200))
            {
                if (Stopwatch.GetElapsedTime(began) > limit) throw new TimeoutException("The backlog does not drain.");
            }
        }

        public void Dispose() => _http.Dispose();

        private async Task<double> LookAsync()
        {
            JsonElement sources = JsonDocument.Parse(await _http.GetStringAsync(new Uri("/api/v1/sources", UriKind.Relative))).RootElement;
            double waits = sources.GetProperty("spool").GetProperty("bytes").GetInt64() / 1048576.0;
            MostMiB = double.Max(MostMiB, waits);
            try
            {
                JsonElement site = JsonDocument.Parse(await _http.GetStringAsync(new Uri("/api/v1/site", UriKind.Relative))).RootElement;
                // Figures in the sentence change each second: one of each kind is enough.
                foreach (JsonElement notice in site.GetProperty("notices").EnumerateArray())
                {
                    string words = notice.GetProperty("sentence").GetString()!;
                    Said.RemoveWhere(other => other[..int.Min(40, other.Length)] == words[..int.Min(40, words.Length)]);
                    Said.Add(words);
                }
            }
            catch (HttpRequestException)
            {
                Said.Add("(the page's question was not answered in between)");
            }

            return waits;
        }
    }
}
