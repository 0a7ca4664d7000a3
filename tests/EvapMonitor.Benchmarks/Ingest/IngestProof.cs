using System.Diagnostics;
using System.Globalization;
using EvapMonitor.Benchmarks.Proofs;
using Npgsql;

namespace EvapMonitor.Benchmarks.Ingest;

/// <summary>
/// Readings through mosquitto at QoS 1 into the database: how many a second when the broker has a backlog, beside the MQTT library alone; how long each takes
/// at five thousand a second; memory. Arguments: seconds at five thousand a second (default 60), messages in the backlog (default 300,000).
/// </summary>
internal static class IngestProof
{
    private const int PerSecond = 5_000;

    public static async Task<int> RunAsync(string[] arguments)
    {
        int seconds = arguments.Length > 0 ? int.Parse(arguments[0], CultureInfo.InvariantCulture) : 60;
        long backlog = arguments.Length > 1 ? long.Parse(arguments[1], CultureInfo.InvariantCulture) : 300_000;
        var proof = new Proof("ingest", "Readings over MQTT");
        await using Stand stand = await Stand.MakeAsync();
        // The sessions are made first, so that the broker keeps for both what is published while they are away.
        await LibraryAlone.RunAsync(stand.Broker.Port, 0);
        long start = TimeProvider.System.GetUtcNow().AddDays(-2).ToUnixTimeMilliseconds();
        (ServiceProcess service, _) = await stand.ServeAsync();
        using (service)
        {
            await WarmAsync(stand, start - 86_400_000);
        }

        long before = await stand.CountAsync();
        // What warmed the service lies at the library's session too.
        long warm = before;
        await PublishAsync(stand, start, backlog);
        double library = await LibraryAlone.RunAsync(stand.Broker.Port, warm + backlog);
        long began = 0;
        double rate, stored;
        (service, _) = await stand.ServeAsync();
        using (service)
        {
            while (await stand.CountAsync() == before) await Task.Delay(5);
            began = Stopwatch.GetTimestamp();
            long first = await stand.CountAsync();
            while (await stand.CountAsync() < before + backlog) await Task.Delay(250);
            rate = (before + backlog - first) / Stopwatch.GetElapsedTime(began).TotalSeconds;
            stored = await stand.CountAsync();
        }

        double again = double.NaN;
        await PublishAsync(stand, start - 2 * 86_400_000L, backlog);
        again = await LibraryAlone.RunAsync(stand.Broker.Port, backlog);
        double fair = (library + again) / 2;
        proof.Say($"One mosquitto, one subscription, QoS 1, a JSON object a reading, {LoadPlant.Signals} signals. The broker holds {backlog:N0} messages, then the receiver comes.");
        proof.Say("");
        proof.Say("| what | readings/s | to the library |");
        proof.Say("|---|---|---|");
        proof.Say($"| the MQTT library alone: receives and acknowledges (before, after) | {library:N0}, {again:N0} | 1.00 |");
        proof.Say($"| the service: spools, acknowledges, stores in PostgreSQL | {rate:N0} | {rate / fair:0.00} |");
        proof.Say("");
        proof.Say($"In the table {stored:N0} of {before + backlog:N0}.");
        proof.Say("");
        (service, _) = await stand.ServeAsync();
        using (service)
        {
            // The second backlog is taken first.
            while (await stand.CountAsync() < before + (2 * backlog)) await Task.Delay(100);
            await SteadyAsync(proof, stand, service, seconds);
        }

        proof.Write();
        return 0;
    }

    private static async Task WarmAsync(Stand stand, long start)
    {
        // Until the subscription stands nothing arrives.
        using var publisher = new FastPublisher(stand.Broker.Port, "warm");
        for (long n = 0; await stand.CountAsync() == 0; n++)
        {
            publisher.Send(LoadPlant.Topic(n), LoadPlant.Payload(start, n));
            await Task.Delay(20);
        }

        await publisher.SettleAsync();
        long last;
        do
        {
            last = await stand.CountAsync();
            await Task.Delay(1_000);
        }
        while (await stand.CountAsync() != last);
    }

    private static async Task PublishAsync(Stand stand, long start, long messages)
    {
        using var publisher = new FastPublisher(stand.Broker.Port, "backlog");
        for (long n = 0; n < messages; n++) publisher.Send(LoadPlant.Topic(n), LoadPlant.Payload(start, n));
        await publisher.SettleAsync();
    }

    private static async Task SteadyAsync(Proof proof, Stand stand, ServiceProcess service, int seconds)
    {
        long total = (long)seconds * PerSecond, start = TimeProvider.System.GetUtcNow().ToUnixTimeMilliseconds();
        long[] published = new long[total];
        double[] took = new double[total];
        long memoryAtStart = 0, began = Stopwatch.GetTimestamp();
        Task publishing = Task.Factory.StartNew(() =>
        {
            using var publisher = new FastPublisher(stand.Broker.Port, "steady");
            using var never = new ManualResetEvent(false);
            for (long n = 0; n < total; n++)
            {
                // Ahead of the pace: wait for the clock, a millisecond's worth at a time.
                if (n % 5 == 0) while (Stopwatch.GetElapsedTime(began).TotalSeconds * PerSecond < n) never.WaitOne(1);
                published[n] = Stopwatch.GetTimestamp();
                publisher.Send(LoadPlant.Topic(n), LoadPlant.Payload(start, n));
            }

            publisher.SettleAsync().GetAwaiter().GetResult();
        }, TaskCreationOptions.LongRunning);

        // One publisher, stored in order: when the last signal's newest instant is there, all before it are.
        await using NpgsqlConnection connection = await stand.Database.OpenConnectionAsync();
        await using var newest = new NpgsqlCommand(
            Invariant($"SELECT at FROM reading WHERE (line_id, signal_id) = (SELECT home_line_id, signal_id FROM signal WHERE name = '{LoadPlant.Topic(LoadPlant.Signals - 1)}') ORDER BY at DESC LIMIT 1"), connection);
        await newest.PrepareAsync();
        long done = 0;
        while (done < total)
        {
            long at = new DateTimeOffset((DateTime)(await newest.ExecuteScalarAsync())!).ToUnixTimeMilliseconds(), now = Stopwatch.GetTimestamp();
            long through = long.Min(total, ((at - start) / 20 * LoadPlant.Signals) + LoadPlant.Signals);
            for (; done < through; done++) took[done] = Stopwatch.GetElapsedTime(published[done], now).TotalMilliseconds;
            if (memoryAtStart == 0 && done > total / 10) memoryAtStart = service.Memory();
            if (Stopwatch.GetElapsedTime(began).TotalSeconds > (2 * seconds) + 60) throw new TimeoutException(Invariant($"{done} of {total} stored"));
            await Task.Delay(4);
        }

        await publishing;
        // The first second is the warming up.
        double[] sorted = [.. took.Skip(PerSecond)];
        Array.Sort(sorted);
        proof.Say($"{PerSecond:N0} readings a second for {seconds} s, from publishing to stored (looked at every 5 ms or so):");
        proof.Say("");
        proof.Say("| p50 ms | p90 ms | p99 ms | longest ms | memory after a tenth, MB | at the end, MB | peak, MB |");
        proof.Say("|---|---|---|---|---|---|---|");
        proof.Say($"| {At(sorted, 0.5):0} | {At(sorted, 0.9):0} | {At(sorted, 0.99):0} | {sorted[^1]:0} | {memoryAtStart / 1024} | {service.Memory() / 1024} | {service.PeakMemory() / 1024} |");
    }

    private static double At(double[] sorted, double share) => sorted[(int)(share * (sorted.Length - 1))];
}
