using EvapMonitor.Service.Security;
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
        app.MapFallback("/api/{**rest}", UnknownAddress.Tell).RequireAuthorization(Policies.Read).ExcludeFromDescription();
        app.MapFallback((HttpContext context) =>
        {
            string page = Path.Combine(app.Environment.WebRootPath ?? "", "index.html");
            if (!File.Exists(page)) return (IResult)Problems.NotFound("The dashboard was not built into this program; ./evapmonitor builds it.");
            context.Response.Headers.CacheControl = "no-cache";
            return TypedResults.PhysicalFile(page, "text/html; charset=utf-8");
        }).RequireAuthorization(Policies.Read).WithMetadata(new HttpMethodMetadata([HttpMethods.Get, HttpMethods.Head])).ExcludeFromDescription();
    }
}
