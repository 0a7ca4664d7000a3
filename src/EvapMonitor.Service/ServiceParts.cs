using System.Text.Json;
using System.Text.Json.Serialization;
using EvapMonitor.Service.Api;
using EvapMonitor.Service.Evaluation;
using EvapMonitor.Service.Ingest.Files;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Security;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Authentication;
using Microsoft.AspNetCore.DataProtection;

namespace EvapMonitor.Service;

/// <summary>Which parts the service is made of.</summary>
internal static class ServiceParts
{
    /// <summary>Largest body of a request but for uploads of history, bytes.</summary>
    public const int LargestBody = 1 << 20;

    public static IServiceCollection AddStore(this IServiceCollection services) => services
        .AddSingleton<PlantHolder>().AddSingleton<PlantStore>().AddSingleton<ReadingStore>().AddSingleton<DayStore>().AddSingleton<LeaseStore>().AddSingleton<ResultStore>()
        .AddSingleton<TrendStore>().AddSingleton<BalanceStore>().AddSingleton<CleaningStore>().AddSingleton<InstrumentLogStore>().AddSingleton<ImportStore>()
        .AddSingleton<SurfaceInputs>().AddSingleton<SurfaceStore>().AddSingleton<RecomputationStore>().AddSingleton<SupersededWindows>();

    public static IServiceCollection AddEvaluation(this IServiceCollection services) => services
        .AddSingleton<LiveEvents>().AddSingleton<EvaluationSignal>().AddSingleton<LineLogs>()
        .AddSingleton<ImportWorker>().AddHostedService(provider => provider.GetRequiredService<ImportWorker>())
        .AddSingleton<DaysInHand>().AddSingleton<LineTurns>().AddHostedService<EvaluationWorker>()
        .AddSingleton<RecomputationSignal>().AddSingleton<RecomputationWatch>().AddHostedService(provider => provider.GetRequiredService<RecomputationWatch>())
        .AddHostedService<SupersededWindowsDeletion>().AddHostedService<SurfaceWorker>();

    public static IServiceCollection AddApi(this IServiceCollection services)
    {
        services.AddSingleton<EffectStates>().AddSingleton<SiteStates>().AddSingleton<FlowSheetStates>().AddSingleton<SignalStates>().AddSingleton<BalanceStates>().AddSingleton<SurfaceStates>().AddSingleton<Trends>();
        services.AddProblemDetails(problems => problems.CustomizeProblemDetails = context =>
        {
            if (context.ProblemDetails.Status == StatusCodes.Status413PayloadTooLarge) context.ProblemDetails.Detail ??= $"The body is larger than is allowed here, {LargestBody >> 20} MiB.";
        }).AddExceptionHandler<Refusals>();
        services.Configure<RouteHandlerOptions>(routes => routes.ThrowOnBadRequest = true);
        services.ConfigureHttpJsonOptions(json =>
        {
            json.SerializerOptions.PropertyNamingPolicy = JsonNamingPolicy.SnakeCaseLower;
            json.SerializerOptions.Converters.Add(new Rfc3339Converter());
            json.SerializerOptions.MaxDepth = 16;
            json.SerializerOptions.NumberHandling = JsonNumberHandling.Strict;
            json.SerializerOptions.UnmappedMemberHandling = JsonUnmappedMemberHandling.Disallow;
        });
        services.AddOpenApi("v1", OpenApiText.Describe);
        // Nothing is signed or kept in cookies, so no keys are to be written to anybody's home.
        services.AddDataProtection().UseEphemeralDataProtectionProvider();
        services.AddAuthentication(LoopbackAuthentication.SchemeName)
            .AddScheme<AuthenticationSchemeOptions, LoopbackAuthentication>(LoopbackAuthentication.SchemeName, null);
        var authorization = services.AddAuthorizationBuilder();
        foreach (string policy in Policies.All) authorization.AddPolicy(policy, one => one.RequireAuthenticatedUser());
        return services;
    }
}
