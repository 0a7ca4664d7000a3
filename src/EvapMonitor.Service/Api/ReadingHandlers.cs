using System.Globalization;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Ingest;
using Microsoft.AspNetCore.Http.Features;
using Microsoft.AspNetCore.Http.HttpResults;

namespace EvapMonitor.Service.Api;

/// <summary>Readings in over HTTP.</summary>
internal static class ReadingHandlers
{
    private const int RetryAfterSeconds = 5;

    // Sending a batch again changes nothing: the first value of an instant stands.
    public static async Task<Results<Accepted<ReadingsTakenWire>, ProblemHttpResult>> Add(
        HttpRequest request, HttpResponse response, Intake intake, SourceStates sources, TimeProvider clock, CancellationToken stop)
    {
        if (request.ContentType?.Split(';')[0].Trim() is not "application/json")
            return TypedResults.Problem($"Content-Type is '{request.ContentType}'; allowed: application/json.", statusCode: StatusCodes.Status415UnsupportedMediaType, title: "Unsupported content");
        string encoding = request.Headers.ContentEncoding.ToString();
        if (encoding is not ("" or "gzip" or "identity"))
            return TypedResults.Problem($"Content-Encoding is '{encoding}'; allowed: gzip.", statusCode: StatusCodes.Status415UnsupportedMediaType, title: "Unsupported content");
        if (intake.Refusal is not null && request.ContentLength > 1 << 20) return Later(response, intake.Refusal);
        if (request.HttpContext.Features.Get<IHttpMaxRequestBodySizeFeature>() is { IsReadOnly: false } limit) limit.MaxRequestBodySize = ReadingBody.Largest;
        SourceState source = sources.Of("http", "http", "POST /api/v1/readings");
        source.MessageCame(clock.GetUtcNow());
        IReadOnlyList<IncomingReading> readings;
        try
        {
            if (await ReadingBody.UnfoldAsync(request.Body, encoding == "gzip", stop) is not { } json)
                return TypedResults.Problem($"The body is larger than {ReadingBody.Largest >> 20} MiB, unfolded.", statusCode: StatusCodes.Status413PayloadTooLarge, title: "Too large");
            readings = ReadingBody.Read(json, out string? wrong);
            if (wrong is not null)
            {
                source.CountMalformed(clock.GetUtcNow(), "/api/v1/readings", wrong);
                return Problems.Wrong(wrong);
            }
        }
        catch (InvalidDataException error)
        {
            return Problems.Wrong($"The body is not gzip: {error.Message}");
        }

        IntakeAnswer answer = await intake.KeepAsync(source, readings, alone: true);
        return answer.Refusal is { } refusal ? Later(response, refusal)
            : TypedResults.Accepted((string?)null, new ReadingsTakenWire(answer.Accepted, answer.OutOfTime, answer.Unknown));
    }

    private static ProblemHttpResult Later(HttpResponse response, string refusal)
    {
        response.Headers.RetryAfter = RetryAfterSeconds.ToString(CultureInfo.InvariantCulture);
        return TypedResults.Problem(refusal + " Nothing was stored; send it again later.", statusCode: StatusCodes.Status503ServiceUnavailable, title: "Come again later");
    }
}
