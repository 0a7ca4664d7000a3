using EvapMonitor.Service.Security;

namespace EvapMonitor.Service.Api;

/// <summary>All routes of the REST interface at a glance; the handlers stand in the files beside this one.</summary>
internal static class Routes
{
    private static readonly string[] Head = [HttpMethods.Head], GetAndHead = [HttpMethods.Get, HttpMethods.Head];

    public static void MapEvapMonitor(this WebApplication app)
    {
        RouteGroupBuilder api = app.MapGroup("/api/v1");

        api.Get("/site", SiteHandlers.Site, "getSite", "The site and the state of its data");
        api.Get("/lines", SiteHandlers.Lines, "getLines", "All lines with their effects");
        api.Get("/lines/{line}", SiteHandlers.Line, "getLine", "One line with its effects");
        api.Get("/lines/{line}/flow-sheet", FlowSheetStates.Handle, "getFlowSheet", "A line as places and ways, with its readings and results now");
        api.Get("/lines/{line}/balance", BalanceHandlers.Balance, "getBalance", "The reconciled balance of a line in its last window or another, as JSON or CSV");
        api.Get("/lines/{line}/effects/{effect}", SiteHandlers.Effect, "getEffect", "One effect as it is now");
        api.Get("/lines/{line}/effects/{effect}/trend", TrendHandlers.Trend, "getTrend", "A series of one quantity, as JSON columns or CSV");
        api.Get("/lines/{line}/effects/{effect}/campaigns", CampaignHandlers.Campaigns, "getCampaigns", "Campaigns of an effect, stops, tests on water, what it would do if clean");
        api.Get("/cleaning-due", SiteHandlers.CleaningDue, "getCleaningDue", "Effects with their due state, due ones first");

        api.Get("/cleanings", CleaningHandlers.List, "getCleanings", "Cleanings, logged, signalled or recognised, with what they brought; newest first");
        api.MapPost("/cleanings", CleaningHandlers.Log).Named("logCleaning", "Log a cleaning; the same Idempotency-Key never logs twice", Policies.Write);
        api.MapPut("/cleanings/{id:guid}", CleaningHandlers.Correct).Named("correctCleaning", "Put a corrected entry in the place of a logged one", Policies.Write);
        api.MapDelete("/cleanings/{id:guid}", CleaningHandlers.Withdraw).Named("withdrawCleaning", "Withdraw a logged cleaning", Policies.Write);

        api.Get("/instrument-log", InstrumentLogHandlers.List, "getInstrumentLog", "What was logged of instruments: excluded for a time, recalibrated; newest first");
        api.MapPost("/instrument-log", InstrumentLogHandlers.Log).Named("logInstrument", "Log that an instrument is not to be believed, or was set right", Policies.Write);
        api.MapDelete("/instrument-log/{id:guid}", InstrumentLogHandlers.Withdraw).Named("withdrawInstrumentEvent", "Withdraw an entry of the log of instruments", Policies.Write);

        api.Get("/signals", SignalHandlers.List, "getSignals", "Signals with their last readings");
        api.Get("/signals/{signal}/corrections", BalanceHandlers.Corrections, "getCorrections", "What the balance wanted to add to the readings of a signal, over time");
        api.MapPost("/readings", ReadingHandlers.Add).Named("addReadings", "Readings in batches, plain or gzip; answered once they are durable", Policies.Write)
            .AddOpenApiOperationTransformer(OpenApiText.DescribeReadings).ProducesProblem(StatusCodes.Status503ServiceUnavailable);
        api.Get("/sources", SignalHandlers.Sources, "getSources", "Where readings come from, what waits, what the database would not take");
        api.Get("/imports", ImportHandlers.List, "getImports", "Imports, newest first");
        api.Get("/imports/{id}", ImportHandlers.Find, "getImport", "One import");
        api.MapPost("/imports", ImportHandlers.Upload).Named("uploadHistory", "Upload a CSV of history, plain or gzip", Policies.Write);
        api.MapPost("/imports/{id}/cancel", ImportHandlers.Cancel).Named("cancelImport", "Stop an import; what is stored stays", Policies.Write);
        api.Get("/plant", SiteHandlers.Plant, "getPlant", "The plant file in force");
        api.Get("/plant/revisions", RevisionHandlers.List, "getRevisions", "All accepted plant revisions, newest first");
        api.Get("/plant/revisions/{id:int}", RevisionHandlers.Find, "getRevision", "One plant revision with its text");
        api.Get("/plant/revisions/{id:int}/differences", RevisionHandlers.Differences, "getDifferences", "How a plant revision differs from another, line by line");
        api.MapPost("/plant/revisions", RevisionHandlers.Accept).Named("acceptRevision", "A plant file from an instant on; the same file again changes nothing", Policies.Configure)
            .AddOpenApiOperationTransformer(OpenApiText.DescribePlantFile).ProducesProblem(StatusCodes.Status422UnprocessableEntity);
        api.Get("/recomputations", RecomputationHandlers.List, "getRecomputations", "Days computed anew and why, newest first");
        api.Get("/recomputations/{id:int}", RecomputationHandlers.Find, "getRecomputation", "One recomputation");
        api.MapPost("/recomputations", RecomputationHandlers.Begin).Named("recompute", "Compute days anew from their stored readings", Policies.Write);
        api.MapPost("/recomputations/{id:int}/cancel", RecomputationHandlers.Cancel).Named("cancelRecomputation", "Stop a recomputation; the days left keep their results", Policies.Write);
        api.MapPost("/recomputations/{id:int}/resume", RecomputationHandlers.Resume).Named("resumeRecomputation", "Go on with a stopped recomputation", Policies.Write);
        api.Get("/events", EventHandlers.Stream, "getEvents", "Server-sent events: windows, import, cleanings, instruments, surfaces, recomputation, plant, site");

        app.MapMethods("/health/live", GetAndHead, HealthHandlers.Live).RequireAuthorization(Policies.Read).ExcludeFromDescription();
        app.MapMethods("/health/ready", GetAndHead, HealthHandlers.Ready).RequireAuthorization(Policies.Read).ExcludeFromDescription();
        app.MapOpenApi("/openapi/{documentName}.json").RequireAuthorization(Policies.Read);
    }

    /// <summary>A route to read from; HEAD answers as GET does, without the body.</summary>
    private static void Get(this RouteGroupBuilder api, string path, Delegate handler, string name, string summary)
    {
        api.MapGet(path, handler).Named(name, summary, Policies.Read);
        if (handler.Method.Name != nameof(EventHandlers.Stream)) api.MapMethods(path, Head, handler).RequireAuthorization(Policies.Read).ExcludeFromDescription();
    }

    private static RouteHandlerBuilder Named(this RouteHandlerBuilder route, string name, string summary, string policy) =>
        route.WithName(name).WithSummary(summary).RequireAuthorization(policy).ProducesProblem(StatusCodes.Status400BadRequest);
}
