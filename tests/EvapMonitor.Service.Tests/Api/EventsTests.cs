using System.Net.ServerSentEvents;
using System.Text;
using System.Text.Json;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Api;

public sealed class EventsTests(PostgresServer server)
{
    private static CancellationToken Stop => TestContext.Current.CancellationToken;

    [PostgreSqlFact]
    public async Task OpenPage_HearsOfImportWindowsAndCleanings()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        using HttpResponseMessage answer = await service.Http.GetAsync("/api/v1/events", HttpCompletionOption.ResponseHeadersRead, Stop);
        Assert.Equal("text/event-stream", answer.Content.Headers.ContentType?.MediaType);
        using var limit = CancellationTokenSource.CreateLinkedTokenSource(Stop);
        limit.CancelAfter(TimeSpan.FromSeconds(30));
        await using Stream stream = await answer.Content.ReadAsStreamAsync(Stop);
        await using IAsyncEnumerator<SseItem<string>> events = SseParser.Create(stream).EnumerateAsync(limit.Token).GetAsyncEnumerator(limit.Token);

        JsonElement site = await NextAsync(events, "site", _ => true);
        Assert.Equal(("Lyngdal", "none"), (site.GetProperty("name").GetString(), site.GetProperty("readings").GetString()));
        string id = (await service.UploadAsync(Encoding.UTF8.GetBytes("time,FT-1\n2026-04-02T08:00:00Z,1\n"))).Id;
        JsonElement import = await NextAsync(events, "import", body => body.GetProperty("state").GetString() == "done");
        Assert.Equal((id, 1), (import.GetProperty("id").GetString(), import.GetProperty("accepted").GetInt32()));
        JsonElement windows = await NextAsync(events, "windows", _ => true);
        Assert.Equal(("one", "2026-04-02T08:00:00Z", "2026-04-02T08:15:00Z"),
            (windows.GetProperty("line").GetString(), windows.GetProperty("from").GetString(), windows.GetProperty("to").GetString()));

        using var log = new HttpRequestMessage(HttpMethod.Post, "/api/v1/cleanings")
        {
            Content = new StringContent("""{"line":"one","effect":"E1","start":"2026-04-10T06:00:00Z","end":"2026-04-10T08:00:00Z","kind":"rinse"}""", Encoding.UTF8, "application/json"),
        };
        log.Headers.Add("Idempotency-Key", "k1");
        using (HttpResponseMessage logged = await service.Http.SendAsync(log, Stop)) logged.EnsureSuccessStatusCode();
        Assert.Equal("E1", (await NextAsync(events, "cleanings", _ => true)).GetProperty("effect").GetString());
    }

    [PostgreSqlFact]
    public async Task TooManyPages_AreTurnedAway()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        var events = (Service.Live.LiveEvents)service.Services.GetService(typeof(Service.Live.LiveEvents))!;
        var pages = Enumerable.Range(0, Service.Live.LiveEvents.MostListeners).Select(_ => events.Listen()!).ToList();
        using (HttpResponseMessage answer = await service.Http.GetAsync("/api/v1/events", HttpCompletionOption.ResponseHeadersRead, Stop))
            Assert.Equal(System.Net.HttpStatusCode.ServiceUnavailable, answer.StatusCode);
        pages.ForEach(page => page.Dispose());
        Assert.NotNull(events.Listen());
    }

    private static async Task<JsonElement> NextAsync(IAsyncEnumerator<SseItem<string>> events, string kind, Func<JsonElement, bool> wanted)
    {
        while (await events.MoveNextAsync())
        {
            if (events.Current.EventType != kind) continue;
            JsonElement body = JsonDocument.Parse(events.Current.Data).RootElement;
            if (wanted(body)) return body;
        }

        throw new InvalidOperationException($"The stream ended without {kind}.");
    }
}
