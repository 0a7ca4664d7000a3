using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Ingest.Files;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Http.Features;
using Microsoft.AspNetCore.Http.HttpResults;

namespace EvapMonitor.Service.Api;

/// <summary>History in: uploads and their progress.</summary>
internal static class ImportHandlers
{
    public static async Task<Ok<ImportsWire>> List(ImportStore store, ImportWorker worker, CancellationToken stop) =>
        TypedResults.Ok(new ImportsWire([.. (await store.ListAsync(stop)).Select(import => WireOf(worker.PaceOf(import.Sha256) ?? new ImportPace(import, null, null)))]));

    public static async Task<Results<Ok<ImportWire>, ProblemHttpResult>> Find(string id, ImportStore store, ImportWorker worker, CancellationToken stop) =>
        await store.FindAsync(id, stop) is { } import
            ? TypedResults.Ok(WireOf(worker.PaceOf(id) ?? new ImportPace(import, null, null)))
            : Problems.NotFound($"There is no import '{id}'.");

    public static async Task<Results<Accepted<ImportWire>, ProblemHttpResult>> Upload(
        HttpRequest request, Uploads uploads, ImportStore store, ImportWorker worker, CancellationToken stop, string? name = null, bool replace = false)
    {
        if (request.ContentType?.Split(';')[0].Trim() is not ("text/csv" or "application/gzip" or "application/x-gzip" or "application/octet-stream"))
            return TypedResults.Problem($"Content-Type is '{request.ContentType}'; allowed: text/csv, application/gzip.", statusCode: StatusCodes.Status415UnsupportedMediaType, title: "Unsupported content");
        if (string.IsNullOrWhiteSpace(name) || name.Length > 200 || name.Any(char.IsControl)) return Problems.Wrong("The parameter name is missing or over 200 letters: the name of the file, for people.");
        if (request.HttpContext.Features.Get<IHttpMaxRequestBodySizeFeature>() is { IsReadOnly: false } limit) limit.MaxRequestBodySize = Uploads.Largest;
        if (request.ContentLength > Uploads.Largest) return TypedResults.Problem($"The file is larger than {Uploads.Largest >> 30} GiB.", statusCode: StatusCodes.Status413PayloadTooLarge);
        StoredUpload upload = await uploads.StoreAsync(request.Body, stop);
        if (upload.Bytes == 0)
        {
            File.Delete(upload.Path);
            return Problems.Wrong("The body is empty.");
        }

        (ImportFile import, bool taken) = await store.EnqueueAsync(upload.Sha256, Path.GetFileName(name), upload.Path, upload.Bytes, replace, stop);
        if (!taken && import.StoredAs != upload.Path) File.Delete(upload.Path);
        worker.Wake();
        return TypedResults.Accepted($"/api/v1/imports/{import.Sha256}", WireOf(new ImportPace(import, null, null)));
    }

    public static async Task<Results<Ok<ImportWire>, ProblemHttpResult>> Cancel(string id, ImportStore store, ImportWorker worker, CancellationToken stop)
    {
        if (await store.FindAsync(id, stop) is null) return Problems.NotFound($"There is no import '{id}'.");
        await worker.CancelAsync(id, stop);
        return TypedResults.Ok(WireOf(new ImportPace((await store.FindAsync(id, stop))!, null, null)));
    }

    /// <summary>An import as it goes out.</summary>
    public static ImportWire WireOf(ImportPace pace)
    {
        ImportFile import = pace.Import;
        return new ImportWire(
            import.Sha256, import.Name, import.State, import.BytesTotal, import.BytesRead, import.CommittedOffset, import.Accepted, import.Repeated, import.Differing, import.Rejected,
            import.NotInPlant, pace.RowsPerSecond, pace.SecondsLeft, Utc(import.StartedAt), Utc(import.EndedAt), import.Error,
            [.. import.Problems.Select(problem => new ProblemRowWire(problem.Line, problem.Reason))],
            [.. import.UnknownSignals.Take(100).Select(signal => new UnknownSignalWire(signal.Name, signal.Count, Utc(import.EndedAt)))]);
    }

    private static DateTimeOffset? Utc(DateTime? time) => time is { } at ? new DateTimeOffset(DateTime.SpecifyKind(at, DateTimeKind.Utc)) : null;
}
