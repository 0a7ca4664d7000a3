using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.AspNetCore.Http.Metadata;
using Microsoft.AspNetCore.Routing.Template;

namespace EvapMonitor.Service.Api;

/// <summary>
/// Answers what no route of the API took. The router hands everything here, a known address with a wrong method or kind of content too, so the three are told apart.
/// </summary>
internal static class UnknownAddress
{
    public static ProblemHttpResult Tell(HttpContext context, EndpointDataSource endpoints)
    {
        HttpRequest request = context.Request;
        var known = endpoints.Endpoints.OfType<RouteEndpoint>().Where(route => MethodsOf(route).Count > 0 && IsFor(route, request.Path)).ToList();
        if (known.Count == 0) return NotFound();
        if (known.FirstOrDefault(route => MethodsOf(route).Contains(request.Method)) is not { } meant)
        {
            string allowed = string.Join(", ", known.SelectMany(MethodsOf).Distinct().Order());
            context.Response.Headers.Allow = allowed;
            return TypedResults.Problem($"{request.Method} is not for this address; allowed: {allowed}.", statusCode: StatusCodes.Status405MethodNotAllowed, title: "Wrong method");
        }

        // The right method and yet not taken: the content is of another kind, or a part of the address is.
        return meant.Metadata.GetMetadata<IAcceptsMetadata>() is { } accepts
            ? TypedResults.Problem(
                $"Content-Type is '{request.ContentType}'; allowed: {string.Join(", ", accepts.ContentTypes)}.", statusCode: StatusCodes.Status415UnsupportedMediaType, title: "Unsupported content")
            : NotFound();
    }

    private static ProblemHttpResult NotFound() => Problems.NotFound("There is no such address; /openapi/v1.json describes those there are.");

    private static IReadOnlyList<string> MethodsOf(RouteEndpoint route) => route.Metadata.GetMetadata<IHttpMethodMetadata>()?.HttpMethods ?? [];

    private static bool IsFor(RouteEndpoint route, PathString path) =>
        route.RoutePattern.RawText is { } text && text.StartsWith("/api/", StringComparison.Ordinal) && new TemplateMatcher(TemplateParser.Parse(text), []).TryMatch(path, []);
}
