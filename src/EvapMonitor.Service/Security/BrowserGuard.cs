using Microsoft.AspNetCore.Http.HttpResults;

namespace EvapMonitor.Service.Security;

/// <summary>
/// Keeps other web pages out: a page elsewhere can send requests to a service on loopback, by its address (a foreign Origin) or by a name of its own that it
/// points here (a foreign Host). Both are refused. Sets the content policy.
/// </summary>
internal sealed class BrowserGuard(RequestDelegate next)
{
    private static readonly string[] Names = ["localhost", "127.0.0.1", "[::1]"];

    public async Task InvokeAsync(HttpContext context)
    {
        IHeaderDictionary headers = context.Response.Headers;
        headers.ContentSecurityPolicy = "default-src 'self'; img-src 'self' data: blob:; object-src 'none'; base-uri 'none'; frame-ancestors 'none'; form-action 'self'";
        headers.XContentTypeOptions = "nosniff";
        headers["Referrer-Policy"] = "no-referrer";
        headers["Cross-Origin-Resource-Policy"] = "same-origin";
        if (!Names.Contains(context.Request.Host.Host, StringComparer.OrdinalIgnoreCase))
        {
            await RefuseAsync(context, $"The Host header names '{context.Request.Host.Host}'; allowed: {string.Join(", ", Names)}.");
            return;
        }

        string? origin = context.Request.Headers.Origin;
        if (!string.IsNullOrEmpty(origin) && !origin.Equals($"{context.Request.Scheme}://{context.Request.Host}", StringComparison.OrdinalIgnoreCase))
        {
            await RefuseAsync(context, "The request comes from another web page (Origin); only pages of this service may send requests.");
            return;
        }

        await next(context);
    }

    private static Task RefuseAsync(HttpContext context, string why)
    {
        ProblemHttpResult problem = TypedResults.Problem(why, statusCode: StatusCodes.Status403Forbidden, title: "Refused");
        return problem.ExecuteAsync(context);
    }
}
