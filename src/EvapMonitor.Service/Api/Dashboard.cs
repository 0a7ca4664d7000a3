using EvapMonitor.Service.Security;
using Microsoft.AspNetCore.Http.HttpResults;
using Microsoft.AspNetCore.Routing.Template;
using Microsoft.Net.Http.Headers;

namespace EvapMonitor.Service.Api;

/// <summary>Serves the dashboard's files. Hashed files may be kept for a year; the page itself is always asked for.</summary>
internal static class Dashboard
{
    public static void UseDashboard(this WebApplication app)
    {
        if (!Directory.Exists(app.Environment.WebRootPath)) return;
        app.UseStaticFiles(new StaticFileOptions
        {
            OnPrepareResponse = file => file.Context.Response.Headers[HeaderNames.CacheControl] =
                file.Context.Request.Path.StartsWithSegments("/assets", StringComparison.Ordinal) ? "public, max-age=31536000, immutable" : "no-cache",
        });
    }

    /// <summary>Every path that is not the API's or a file is a page of the dashboard.</summary>
    public static void MapDashboard(this WebApplication app)
    {
        app.MapFallback("/api/{**rest}", (HttpContext context, EndpointDataSource endpoints) => NoSuchAddress(context, endpoints)).RequireAuthorization(Policies.Read);
        app.MapFallback((HttpContext context) =>
        {
            string page = Path.Combine(app.Environment.WebRootPath ?? "", "index.html");
            if (!File.Exists(page)) return (IResult)Problems.NotFound("The dashboard was not built into this program; ./evapmonitor builds it.");
            context.Response.Headers.CacheControl = "no-cache";
            return TypedResults.PhysicalFile(page, "text/html; charset=utf-8");
        }).RequireAuthorization(Policies.Read).WithMetadata(new HttpMethodMetadata([HttpMethods.Get, HttpMethods.Head]));
    }

    /// <summary>The fallback takes a known address with a wrong method too, so it has to tell the two apart.</summary>
    private static ProblemHttpResult NoSuchAddress(HttpContext context, EndpointDataSource endpoints)
    {
        string[] methods = [.. endpoints.Endpoints.OfType<RouteEndpoint>()
            .Where(route => route.Metadata.GetMetadata<HttpMethodMetadata>() is not null && IsFor(route, context.Request.Path))
            .SelectMany(route => route.Metadata.GetMetadata<HttpMethodMetadata>()!.HttpMethods).Distinct().Order()];
        // The right method and yet no route: a part of the address is not of its kind.
        if (methods.Length == 0 || methods.Contains(context.Request.Method)) return Problems.NotFound("There is no such address; /openapi/v1.json describes those there are.");
        context.Response.Headers.Allow = string.Join(", ", methods);
        return TypedResults.Problem(
            $"{context.Request.Method} is not for this address; allowed: {string.Join(", ", methods)}.", statusCode: StatusCodes.Status405MethodNotAllowed, title: "Wrong method");
    }

    private static bool IsFor(RouteEndpoint route, PathString path) =>
        path.StartsWithSegments("/api", StringComparison.Ordinal) && route.RoutePattern.RawText is { } text && text.StartsWith("/api", StringComparison.Ordinal)
        && new TemplateMatcher(TemplateParser.Parse(text), []).TryMatch(path, []);
}
