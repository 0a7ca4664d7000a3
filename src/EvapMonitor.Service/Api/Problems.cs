using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Http.HttpResults;

namespace EvapMonitor.Service.Api;

/// <summary>Problem details (RFC 9457) that say what, where and what is allowed.</summary>
internal static class Problems
{
    public static ProblemHttpResult NoLine(PlantInForce plant, string line) =>
        NotFound($"There is no line '{line}'; the plant file has {string.Join(", ", plant.Lines.Select(place => place.Line.Name))}.");

    public static ProblemHttpResult NoEffect(Line line, string effect) =>
        NotFound($"Line {line.Name} has no effect '{effect}'; it has {string.Join(", ", line.Effects.Select(one => one.Name))}.");

    public static ProblemHttpResult NotFound(string detail) => TypedResults.Problem(detail, statusCode: StatusCodes.Status404NotFound, title: "Not found");

    public static ProblemHttpResult Wrong(string detail) => TypedResults.Problem(detail, statusCode: StatusCodes.Status400BadRequest, title: "Wrong request");

    public static ProblemHttpResult KeyTaken() => TypedResults.Problem(
        "This Idempotency-Key came before with another content; a new request needs a new key.", statusCode: StatusCodes.Status422UnprocessableEntity, title: "Key taken");

    public static ProblemHttpResult Conflict(string detail) => TypedResults.Problem(detail, statusCode: StatusCodes.Status409Conflict, title: "Conflict");
}
