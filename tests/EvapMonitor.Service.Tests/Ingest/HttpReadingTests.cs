using System.IO.Compression;
using System.Net;
using System.Net.Http.Headers;
using System.Text;
using System.Text.Json;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Ingest;

public class HttpReadingTests(PostgresServer server)
{
    private static readonly DateTimeOffset Start = TimeProvider.System.GetUtcNow().AddMinutes(-30);

    [IngestFact]
    public async Task Batches_PlainAndGzip_AreAnsweredWithCounts_AndRepeatsChangeNothing()
    {
        await using IngestService service = await IngestService.StartAsync(await server.CreateDatabaseAsync());
        string batch = Body([.. Enumerable.Range(0, 1000).Select(i => Item("F.1", i, i)), Item("X.9", 0, 1), Item("F.1", 7_200_000, 1)]);
        foreach (bool gzip in new[] { false, true, true })
        {
            (HttpStatusCode status, string text) = await PostAsync(service, batch, gzip);
            Assert.Equal(HttpStatusCode.Accepted, status);
            Assert.Equal("""{"accepted":1000,"out_of_time":1,"unknown":1}""", text);
        }

        await service.StoredAsync(1000);
        await Poll.UntilAsync("the repeats counted", () => service.Drain.Repeated == 2000);
        Assert.Equal(Enumerable.Range(0, 1000).Select(i => (double)i), await service.ValuesAsync("F.1"));
    }

    [IngestFact]
    public async Task OtherValueForAnInstant_TheFirstStands_AndIsCounted()
    {
        await using IngestService service = await IngestService.StartAsync(await server.CreateDatabaseAsync());
        await PostAsync(service, Body(Item("F.1", 0, 1)));
        await PostAsync(service, Body(Item("F.1", 0, 2)));
        await Poll.UntilAsync("the difference counted", () => service.Drain.Differing == 1);
        Assert.Equal([1], await service.ValuesAsync("F.1"));
    }

    [IngestFact]
    public async Task WrongItems_AreNamedByIndex_AndNothingIsStored()
    {
        await using IngestService service = await IngestService.StartAsync(await server.CreateDatabaseAsync());
        (HttpStatusCode status, string text) = await PostAsync(service, Body(
            Item("F.1", 0, 1), """{"signal":"F.1","at":"2026-03-01T14:05:00","value":1}""", """{"signal":"F.1","at":"2026-03-01T14:05:00Z"}""",
            """{"at":"2026-03-01T14:05:00Z","value":1}""", "7", """{"signal":"F.1","at":"2026-03-01T14:05:00Z","value":1,"unit":"bar"}"""));
        Assert.Equal(HttpStatusCode.BadRequest, status);
        string detail = JsonDocument.Parse(text).RootElement.GetProperty("detail").GetString()!;
        foreach (string part in new[] { "readings[1]: time", "readings[2]: there is no value", "readings[3]: signal is missing", "readings[4]: 7 is not an object", "readings[5]: 'unit' is not known" })
            Assert.Contains(part, detail, StringComparison.Ordinal);
        await PostAsync(service, Body(Item("F.1", 5, 5)));
        await service.StoredAsync(1);
    }

    [IngestTheory]
    [InlineData("", HttpStatusCode.BadRequest)]
    [InlineData("[]", HttpStatusCode.BadRequest)]
    [InlineData("{\"readings\":[]}", HttpStatusCode.BadRequest)]
    [InlineData("{\"readings\":[],\"more\":1}", HttpStatusCode.BadRequest)]
    [InlineData("{\"readings\":[{\"signal\":\"\\ud800\",\"at\":\"2026-03-01T14:05:00Z\",\"value\":1}]}", HttpStatusCode.BadRequest)]
    [InlineData("{\"readings\":[{\"\\ud800\":1}]}", HttpStatusCode.BadRequest)]
    public async Task OtherBodies_AreRefusedAsAWhole(string body, HttpStatusCode expected)
    {
        await using IngestService service = await IngestService.StartAsync(await server.CreateDatabaseAsync());
        Assert.Equal(expected, (await PostAsync(service, body)).Status);
    }

    [IngestFact]
    public async Task TooMuch_IsRefused_AlsoWhenFoldedSmall()
    {
        await using IngestService service = await IngestService.StartAsync(await server.CreateDatabaseAsync());
        Assert.Equal(HttpStatusCode.RequestEntityTooLarge, (await PostAsync(service, new string(' ', 20 << 20), gzip: true)).Status);
        Assert.Equal(HttpStatusCode.BadRequest, (await PostAsync(service, Body([.. Enumerable.Repeat(Item("F.1", 0, 1), 50_001)]), gzip: true)).Status);
        using var text = new StringContent("{}", Encoding.UTF8, "text/plain");
        using HttpResponseMessage answer = await service.Http.PostAsync("/api/v1/readings", text, TestContext.Current.CancellationToken);
        Assert.Equal(HttpStatusCode.UnsupportedMediaType, answer.StatusCode);
        using var noZip = new ByteArrayContent("{\"readings\":[]}"u8.ToArray());
        noZip.Headers.ContentType = new MediaTypeHeaderValue("application/json");
        noZip.Headers.ContentEncoding.Add("gzip");
        using HttpResponseMessage second = await service.Http.PostAsync("/api/v1/readings", noZip, TestContext.Current.CancellationToken);
        Assert.Equal(HttpStatusCode.BadRequest, second.StatusCode);
    }

    [IngestFact]
    public async Task SpoolFull_IsAnswered503_WithRetryAfter()
    {
        await using OwnPostgres postgres = await OwnPostgres.StartAsync();
        await using IngestService service = await IngestService.StartAsync(postgres.Connection, spoolMebibytes: "1");
        await postgres.StopAsync();
        int accepted = 0;
        HttpStatusCode status = HttpStatusCode.Accepted;
        string text = "";
        for (int i = 0; i < 20 && status == HttpStatusCode.Accepted; i++)
        {
            (status, text) = await PostAsync(service, Body([.. Enumerable.Range(i * 20_000, 20_000).Select(n => Item("F.1", n, n))]), gzip: true);
            if (status == HttpStatusCode.Accepted) accepted += 20_000;
        }

        Assert.Equal(HttpStatusCode.ServiceUnavailable, status);
        Assert.Contains("The spool is full", text, StringComparison.Ordinal);
        using var content = new StringContent(Body(Item("F.1", 1, 1)), Encoding.UTF8, "application/json");
        using HttpResponseMessage refused = await service.Http.PostAsync("/api/v1/readings", content, TestContext.Current.CancellationToken);
        Assert.Equal(TimeSpan.FromSeconds(5), refused.Headers.RetryAfter?.Delta);
        await postgres.StartAgainAsync();
        await service.StoredAsync(accepted, 60);
    }

    private static string Body(params string[] items) => $"{{\"readings\":[{string.Join(',', items)}]}}";

    private static string Item(string signal, int milliseconds, double value) =>
        FormattableString.Invariant($"{{\"signal\":\"{signal}\",\"at\":\"{Start.AddMilliseconds(milliseconds):yyyy-MM-ddTHH:mm:ss.fffZ}\",\"value\":{value},\"quality\":\"good\"}}");

    private static async Task<(HttpStatusCode Status, string Text)> PostAsync(IngestService service, string body, bool gzip = false)
    {
        byte[] bytes = Encoding.UTF8.GetBytes(body);
        if (gzip)
        {
            using var folded = new MemoryStream();
            await using (var zip = new GZipStream(folded, CompressionLevel.Fastest)) await zip.WriteAsync(bytes);
            bytes = folded.ToArray();
        }

        using var content = new ByteArrayContent(bytes);
        content.Headers.ContentType = new MediaTypeHeaderValue("application/json");
        if (gzip) content.Headers.ContentEncoding.Add("gzip");
        using HttpResponseMessage answer = await service.Http.PostAsync("/api/v1/readings", content, TestContext.Current.CancellationToken);
        return (answer.StatusCode, await answer.Content.ReadAsStringAsync(TestContext.Current.CancellationToken));
    }
}
