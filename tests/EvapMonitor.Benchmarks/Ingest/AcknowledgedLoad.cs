using System.Collections.Concurrent;
using System.Diagnostics;
using System.Globalization;
using System.Net;
using System.Text;
using Npgsql;

namespace EvapMonitor.Benchmarks.Ingest;

/// <summary>
/// Load for the figures about what survives: readings by MQTT at QoS 1 through the broker and in batches by HTTP, each written down when it was acknowledged;
/// at the end what is stored is compared with that.
/// </summary>
internal sealed class AcknowledgedLoad : IDisposable
{
    public const int PerSecond = 2_000, HttpBatch = 200;
    private const long HttpFrom = 1_000_000_000;

    private readonly Stand _stand;
    private readonly long _start, _first;
    private readonly FastPublisher _publisher;
    private readonly CancellationTokenSource _end = new();
    private readonly ConcurrentBag<long> _posted = [];
    private readonly Task<long> _mqtt;
    private readonly Task _http;
    private string _address;
    private long _refused, _sent;

    private AcknowledgedLoad(Stand stand, FastPublisher publisher, long start, long first, string address)
    {
        (_stand, _publisher, _start, _first, _address) = (stand, publisher, start, first, address);
        _mqtt = Task.Factory.StartNew(() => Publish(first), TaskCreationOptions.LongRunning);
        _http = Task.Run(PostAsync);
    }

    /// <summary>Where the service listens; changes when it is started again.</summary>
    public string Address { set => Volatile.Write(ref _address, value); }

    /// <summary>Readings that were acknowledged so far.</summary>
    public long Acknowledged => _publisher.Acknowledged - _first + (_posted.Count * (long)HttpBatch);

    /// <summary>Times that an HTTP batch was answered with "come again later".</summary>
    public long Refused => Interlocked.Read(ref _refused);

    /// <summary>Waits until the service stores what the broker gives it, then loads it.</summary>
    public static async Task<AcknowledgedLoad> StartAsync(Stand stand, string address)
    {
        long start = TimeProvider.System.GetUtcNow().AddHours(-20).ToUnixTimeMilliseconds();
        var publisher = new FastPublisher(stand.Broker.Port, "load");
        // Until the subscription stands nothing is kept for the service.
        long n = 0;
        for (; await stand.CountAsync() == 0; n++)
        {
            publisher.Send(LoadPlant.Topic(n), LoadPlant.Payload(start, n));
            await Task.Delay(20);
        }

        return new AcknowledgedLoad(stand, publisher, start, n, address);
    }

    /// <summary>Ends the load and waits until the broker and the service have answered.</summary>
    public async Task EndAsync()
    {
        await _end.CancelAsync();
        _sent = await _mqtt;
        await _http;
        await _publisher.SettleAsync();
    }

    /// <summary>After the end: waits until all that was acknowledged is stored, or no longer than a limit; gives what is stored.</summary>
    public async Task<long> StoredAsync(TimeSpan limit)
    {
        long began = Stopwatch.GetTimestamp(), stored = 0;
        for (int quiet = 0; quiet < 3 && Stopwatch.GetElapsedTime(began) < limit;)
        {
            stored = await _stand.CountAsync(Invariant($"SELECT count(*) FROM reading WHERE value >= {_first}"));
            quiet = stored >= Acknowledged ? quiet + 1 : 0;
            await Console.Error.WriteAsync(Invariant($"\r{stored} of {Acknowledged} stored "));
            await Task.Delay(1_000);
        }

        await Console.Error.WriteLineAsync();
        return stored;
    }

    public void Dispose()
    {
        _publisher.Dispose();
        _end.Dispose();
    }

    private long Publish(long n)
    {
        long began = Stopwatch.GetTimestamp(), from = n;
        for (; !_end.IsCancellationRequested; n++)
        {
            while (Stopwatch.GetElapsedTime(began).TotalSeconds * PerSecond < n - from && !_end.IsCancellationRequested) _end.Token.WaitHandle.WaitOne(1);
            if (!_publisher.Send(LoadPlant.Topic(n), LoadPlant.Payload(_start, n))) break;
        }

        return n;
    }

    /// <summary>Posts batches, each again until it is taken; the end leaves the last as it is.</summary>
    private async Task PostAsync()
    {
        CancellationToken end = _end.Token;
        using var http = new HttpClient { Timeout = TimeSpan.FromSeconds(10) };
        for (long batch = 0; !end.IsCancellationRequested; batch++)
        {
            string body = Body(batch);
            while (!end.IsCancellationRequested)
            {
                try
                {
                    using var content = new StringContent(body, Encoding.UTF8, "application/json");
                    using HttpResponseMessage answer = await http.PostAsync(new Uri(Volatile.Read(ref _address) + "/api/v1/readings"), content, end);
                    if (answer.StatusCode == HttpStatusCode.ServiceUnavailable) Interlocked.Increment(ref _refused);
                    if (answer.StatusCode == HttpStatusCode.Accepted)
                    {
                        _posted.Add(batch);
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

    /// <summary>The batch's readings lie half a day before the others, their values far above them.</summary>
    private string Body(long batch)
    {
        var text = new StringBuilder("{\"readings\":[");
        for (long i = batch * HttpBatch; i < (batch + 1) * HttpBatch; i++)
        {
            if (i % HttpBatch > 0) text.Append(',');
            DateTimeOffset at = DateTimeOffset.FromUnixTimeMilliseconds(LoadPlant.At(_start - (12 * 3_600_000L), i));
            text.Append(CultureInfo.InvariantCulture, $"{{\"signal\":\"{LoadPlant.Topic(i)}\",\"at\":\"{at:yyyy-MM-ddTHH:mm:ss.fffZ}\",\"value\":{HttpFrom + i}}}");
        }

        return text.Append("]}").ToString();
    }

    /// <summary>After the end: acknowledged readings that are not stored, stored ones that were never sent, stored ones with another value than sent.</summary>
    public async Task<(long Missing, long Foreign, long Wrong)> CompareAsync()
    {
        var expected = new HashSet<long>();
        for (long n = _first; n < _publisher.Acknowledged; n++) expected.Add(n);
        foreach (long batch in _posted)
        {
            for (long i = 0; i < HttpBatch; i++) expected.Add(HttpFrom + (batch * HttpBatch) + i);
        }

        long foreign = 0, wrong = 0;
        _stand.Database.Clear();
        await using NpgsqlCommand command = _stand.Database.CreateCommand("SELECT name, at, value FROM reading JOIN signal USING (signal_id)");
        await using NpgsqlDataReader reader = await command.ExecuteReaderAsync();
        while (await reader.ReadAsync())
        {
            long value = (long)reader.GetDouble(2), n = value >= HttpFrom ? value - HttpFrom : value;
            long at = LoadPlant.At(value >= HttpFrom ? _start - (12 * 3_600_000L) : _start, n);
            if (value < HttpFrom && value >= _sent) foreign++;
            if (reader.GetString(0) != LoadPlant.Topic(n) || new DateTimeOffset(reader.GetDateTime(1)).ToUnixTimeMilliseconds() != at) wrong++;
            expected.Remove(value);
        }

        return (expected.Count, foreign, wrong);
    }
}
