using System.Net.ServerSentEvents;
using System.Runtime.CompilerServices;
using System.Text.Json;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Ingest.Files;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.AspNetCore.Mvc;
using Microsoft.Extensions.Options;

namespace EvapMonitor.Service.Api;

/// <summary>The stream of server-sent events for open pages.</summary>
internal static class EventHandlers
{
    private static readonly TimeSpan SiteEvery = TimeSpan.FromSeconds(15);

    public static Results<ServerSentEventsResult<string>, ProblemHttpResult> Stream(
        LiveEvents events, SiteStates states, PlantHolder plant, TimeProvider clock, IOptions<Microsoft.AspNetCore.Http.Json.JsonOptions> json, IHostApplicationLifetime host,
        [FromHeader(Name = "Last-Event-ID")] string? lastEventId, [FromQuery(Name = "last_event_id")] string? lastEventIdAsked, CancellationToken stop)
    {
        LiveEvents.Listening? listening = events.Listen(lastEventId ?? lastEventIdAsked);
        if (listening is null) return TypedResults.Problem($"{LiveEvents.MostListeners} pages listen already.", statusCode: StatusCodes.Status503ServiceUnavailable);
        return TypedResults.ServerSentEvents(Items(listening, states, plant, clock, json.Value.SerializerOptions, host.ApplicationStopping, stop));
    }

    private static async IAsyncEnumerable<SseItem<string>> Items(
        LiveEvents.Listening listening, SiteStates states, PlantHolder plant, TimeProvider clock, JsonSerializerOptions json, CancellationToken stopping, [EnumeratorCancellation] CancellationToken stop)
    {
        using LiveEvents.Listening hold = listening;
        using var end = CancellationTokenSource.CreateLinkedTokenSource(stop, stopping);
        if (listening.MustReset) yield return new SseItem<string>("{}", "reset");
        while (!end.IsCancellationRequested)
        {
            string? site = await SiteAsync(states, json, end.Token);
            if (site is null) yield break;
            yield return new SseItem<string>(site, "site");
            using var period = new CancellationTokenSource(SiteEvery, clock);
            using var wait = CancellationTokenSource.CreateLinkedTokenSource(end.Token, period.Token);
            while (await NextAsync(listening, wait.Token) is { } happened)
            {
                yield return new SseItem<string>(JsonSerializer.Serialize(WireOf(happened.Body, plant), json), happened.Kind)
                {
                    EventId = happened.Id,
                };
            }
        }
    }

    private static async Task<string?> SiteAsync(SiteStates states, JsonSerializerOptions json, CancellationToken stop)
    {
        try
        {
            return JsonSerializer.Serialize(await states.SiteAsync(stop), json);
        }
        catch (Exception error) when (error is OperationCanceledException or Npgsql.NpgsqlException)
        {
            return null;
        }
    }

    private static async Task<LiveEvent?> NextAsync(LiveEvents.Listening listening, CancellationToken stop)
    {
        try
        {
            return await listening.Reader.ReadAsync(stop);
        }
        catch (OperationCanceledException)
        {
            return null;
        }
    }

    private static object WireOf(object body, PlantHolder plant) => body switch
    {
        ImportPace pace => ImportHandlers.WireOf(pace),
        RecomputationPace pace => RecomputationHandlers.WireOf(pace, plant.Timeline),
        WindowsChanged changed => new WindowsChangedWire(changed.Line, changed.From, changed.To),
        _ => body,
    };
}
