using EvapMonitor.Service.Security;

namespace EvapMonitor.Service.Api;

/// <summary>All routes of the REST interface at a glance; the handlers stand in the files beside this one.</summary>
internal static class Routes
{
    public static void MapEvapMonitor(this WebApplication app)
    {
        RouteGroupBuilder api = app.MapGroup("/api/v1");

        api.MapGet("/site", SiteHandlers.Site).Named("getSite", "The site and the state of its data", Policies.Read);
        api.MapGet("/lines", SiteHandlers.Lines).Named("getLines", "All lines with their effects", Policies.Read);
        api.MapGet("/lines/{line}", SiteHandlers.Line).Named("getLine", "One line with its effects", Policies.Read);
        api.MapGet("/lines/{line}/effects/{effect}", SiteHandlers.Effect).Named("getEffect", "One effect as it is now", Policies.Read);
        api.MapGet("/lines/{line}/effects/{effect}/trend", TrendHandlers.Trend).Named("getTrend", "A series of one quantity, as JSON columns or CSV", Policies.Read);
        api.MapGet("/cleaning-due", SiteHandlers.CleaningDue).Named("getCleaningDue", "Effects with their due state, due ones first", Policies.Read);

        api.MapGet("/cleanings", CleaningHandlers.List).Named("getCleanings", "Logged cleanings, newest first", Policies.Read);
        api.MapPost("/cleanings", CleaningHandlers.Log).Named("logCleaning", "Log a cleaning; the same Idempotency-Key never logs twice", Policies.Write);
        api.MapDelete("/cleanings/{id:guid}", CleaningHandlers.Withdraw).Named("withdrawCleaning", "Withdraw a logged cleaning", Policies.Write);

        api.MapGet("/signals", SignalHandlers.List).Named("getSignals", "Signals with their last readings", Policies.Read);
        api.MapPost("/readings", ReadingHandlers.Add).Named("addReadings", "Readings in batches, plain or gzip; answered once they are durable", Policies.Write)
            .AddOpenApiOperationTransformer(OpenApiText.DescribeReadings).ProducesProblem(StatusCodes.Status503ServiceUnavailable);
        api.MapGet("/imports", ImportHandlers.List).Named("getImports", "Imports, newest first", Policies.Read);
        api.MapGet("/imports/{id}", ImportHandlers.Find).Named("getImport", "One import", Policies.Read);
        api.MapPost("/imports", ImportHandlers.Upload).Named("uploadHistory", "Upload a CSV of history, plain or gzip", Policies.Write);
        api.MapPost("/imports/{id}/cancel", ImportHandlers.Cancel).Named("cancelImport", "Stop an import; what is stored stays", Policies.Write);
        api.MapGet("/plant", SiteHandlers.Plant).Named("getPlant", "The plant file in force", Policies.Read);
        api.MapGet("/events", EventHandlers.Stream).Named("getEvents", "Server-sent events: windows, import, cleanings, site", Policies.Read);

        app.MapGet("/health/live", HealthHandlers.Live).RequireAuthorization(Policies.Read).ExcludeFromDescription();
        app.MapGet("/health/ready", HealthHandlers.Ready).RequireAuthorization(Policies.Read).ExcludeFromDescription();
        app.MapOpenApi("/openapi/{documentName}.json").RequireAuthorization(Policies.Read);
    }

    private static RouteHandlerBuilder Named(this RouteHandlerBuilder route, string name, string summary, string policy) =>
        route.WithName(name).WithSummary(summary).RequireAuthorization(policy).ProducesProblem(StatusCodes.Status400BadRequest);
}
