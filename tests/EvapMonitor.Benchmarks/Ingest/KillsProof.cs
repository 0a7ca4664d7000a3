using System.Collections.Concurrent;
using System.Globalization;
using System.Net;
using System.Text;
using EvapMonitor.Benchmarks.Proofs;
using Npgsql;

namespace EvapMonitor.Benchmarks.Ingest;

/// <summary>
/// Kills the service at random instants under load, by MQTT through a broker and by HTTP, and compares what is stored with what the publishers were told was
/// taken. Arguments: kills (default 50), seed (default 7).
/// </summary>
internal static class KillsProof
{
    private const int PerSecond = 2_000, HttpBatch = 200;
    private const long HttpFrom = 1_000_000_000;

    public static async Task<int> RunAsync(string[] arguments)
    {
        int kills = arguments.Length > 0 ? int.Parse(arguments[0], CultureInfo.InvariantCulture) : 50;
        int seed = arguments.Length > 1 ? int.Parse(arguments[1], CultureInfo.InvariantCulture) : 7;
        var proof = new Proof("kills", "The service killed under load");
        var random = new Random(seed);
        await using Stand stand = await Stand.MakeAsync();
        long start = TimeProvider.System.GetUtcNow().AddHours(-20).ToUnixTimeMilliseconds();
        (ServiceProcess service, string address) = await stand.ServeAsync();
        using var publisher = new FastPublisher(stand.Broker.Port, "kills");
        // Until the subscription stands nothing is kept for the service.
        long n = 0;
        for (; await stand.CountAsync() == 0; n++)
        {
            publisher.Send(LoadPlant.Topic(n), LoadPlant.Payload(start, n));
            await Task.Delay(20);
        }

        long first = n;
        using var end = new CancellationTokenSource();
        string current = address;
        var posted = new ConcurrentBag<long>();
        Task<long> mqtt = Task.Factory.StartNew(() => Publish(publisher, start, first, end.Token), TaskCreationOptions.LongRunning);
        Task http = Task.Run(() => PostAsync(() => Volatile.Read(ref current), start, posted, end.Token));
        for (int i = 0; i < kills; i++)
        {
            await Task.Delay(random.Next(200, 2_500));
            await service.KillAsync();
            (service, address) = await stand.ServeAsync();
            Volatile.Write(ref current, address);
            await Console.Error.WriteAsync(Invariant($"\r{i + 1} kills, {publisher.Acknowledged} taken by the broker, {posted.Count * (long)HttpBatch} by HTTP "));
        }

        await Console.Error.WriteLineAsync();

        await Task.Delay(1_000);
        await end.CancelAsync();
        long sent = await mqtt;
        await http;
        await publisher.SettleAsync();
        long acknowledged = publisher.Acknowledged, expected = acknowledged - first + (posted.Count * (long)HttpBatch), stored;
        for (int quiet = 0, looks = 0; ; looks++)
        {
            stored = await CountAsync(stand, first);
            quiet = stored >= expected ? quiet + 1 : 0;
            if (quiet > 2 || looks > 300) break;
            await Console.Error.WriteAsync(Invariant($"\r{stored} of {expected} stored "));
            await Task.Delay(1_000);
        }

        (long missing, long foreign, long wrong) = await CompareAsync(stand, start, first, acknowledged, sent, posted);
        await service.KillAsync();
        service.Dispose();
        proof.Say($"{kills} kills (SIGKILL) at random, 0.2 to 2.5 s apart after each start, {PerSecond:N0} readings a second at QoS 1 through mosquitto and batches of {HttpBatch} by HTTP at the same time.");
        proof.Say("");
        proof.Say("| way | acknowledged | missing |");
        proof.Say("|---|---|---|");
        proof.Say($"| MQTT and HTTP together | {expected:N0} | {missing:N0} |");
        proof.Say("");
        proof.Say($"Stored {stored:N0}; of these never published {foreign:N0}, with another value than published {wrong:N0}. No reading can be there twice: the key of the table forbids it.");
        proof.Write(seed);
        return missing == 0 && foreign == 0 && wrong == 0 ? 0 : 1;
    }

    private static long Publish(FastPublisher publisher, long start, long n, CancellationToken end)
    {
        long began = System.Diagnostics.Stopwatch.GetTimestamp(), from = n;
        for (; !end.IsCancellationRequested; n++)
        {
            while (System.Diagnostics.Stopwatch.GetElapsedTime(began).TotalSeconds * PerSecond < n - from) end.WaitHandle.WaitOne(1);
            if (!publisher.Send(LoadPlant.Topic(n), LoadPlant.Payload(start, n))) break;
        }

        return n;
    }

    /// <summary>Posts batches, each again until it is taken; the end leaves the last as it is.</summary>
    private static async Task PostAsync(Func<string> address, long start, ConcurrentBag<long> posted, CancellationToken end)
    {
        using var http = new HttpClient { Timeout = TimeSpan.FromSeconds(10) };
        for (long batch = 0; !end.IsCancellationRequested; batch++)
        {
            string body = Body(start, batch);
            while (!end.IsCancellationRequested)
            {
                try
                {
                    using var content = new StringContent(body, Encoding.UTF8, "application/json");
                    using HttpResponseMessage answer = await http.PostAsync(new Uri(address() + "/api/v1/readings"), content, end);
                    if (answer.StatusCode == HttpStatusCode.Accepted)
                    {
                        posted.Add(batch);
                        break;
                    }
                }
                catch (Exception error) when (error is HttpRequestException or OperationCanceledException)
                {
                    // Killed just then.
                }

                await Task.Delay(50, CancellationToken.None);
            }

            await Task.Delay(50, CancellationToken.None);
        }
    }

    /// <summary>The batch's readings lie an hour before the others, their values far above them.</summary>
    private static string Body(long start, long batch)
    {
        var text = new StringBuilder("{\"readings\":[");
        for (long i = batch * HttpBatch; i < (batch + 1) * HttpBatch; i++)
        {
            if (i % HttpBatch > 0) text.Append(',');
            DateTimeOffset at = DateTimeOffset.FromUnixTimeMilliseconds(LoadPlant.At(start - (12 * 3_600_000L), i));
            text.Append(CultureInfo.InvariantCulture, $"{{\"signal\":\"{LoadPlant.Topic(i)}\",\"at\":\"{at:yyyy-MM-ddTHH:mm:ss.fffZ}\",\"value\":{HttpFrom + i}}}");
        }

        return text.Append("]}").ToString();
    }

    private static Task<long> CountAsync(Stand stand, long first) => stand.CountAsync(Invariant($"SELECT count(*) FROM reading WHERE value >= {first}"));

    private static async Task<(long Missing, long Foreign, long Wrong)> CompareAsync(Stand stand, long start, long first, long acknowledged, long sent, ConcurrentBag<long> posted)
    {
        var expected = new HashSet<long>();
        for (long n = first; n < acknowledged; n++) expected.Add(n);
        foreach (long batch in posted)
        {
            for (long i = 0; i < HttpBatch; i++) expected.Add(HttpFrom + (batch * HttpBatch) + i);
        }

        long foreign = 0, wrong = 0;
        await using NpgsqlCommand command = stand.Database.CreateCommand("SELECT name, at, value FROM reading JOIN signal USING (signal_id)");
        await using NpgsqlDataReader reader = await command.ExecuteReaderAsync();
        while (await reader.ReadAsync())
        {
            long value = (long)reader.GetDouble(2), n = value >= HttpFrom ? value - HttpFrom : value;
            long at = LoadPlant.At(value >= HttpFrom ? start - (12 * 3_600_000L) : start, n);
            if (value < HttpFrom && value >= sent) foreign++;
            if (reader.GetString(0) != LoadPlant.Topic(n) || new DateTimeOffset(reader.GetDateTime(1)).ToUnixTimeMilliseconds() != at) wrong++;
            expected.Remove(value);
        }

        return (expected.Count, foreign, wrong);
    }
}
