using EvapMonitor.Service.Ingest.Mqtt;
using EvapMonitor.Service.Live;
using EvapMonitor.Service.Store;

namespace EvapMonitor.Service.Ingest;

/// <summary>Which parts the ways in are made of. They start in this order and stop in the reverse: sources first, so that what they gave is kept.</summary>
internal static class IngestParts
{
    public static IServiceCollection AddIngest(this IServiceCollection services, IngestPlan plan)
    {
        services.AddSingleton<Notices>().AddSingleton<SourceStates>().AddSingleton<UnknownSignals>().AddSingleton<Admission>().AddSingleton<RefusedStore>();
        services.AddSingleton(plan.Spool).AddSingleton<Intake>().AddSingleton<ReadingInserts>();
        services.AddSingleton<Drain>().AddHostedService(provider => provider.GetRequiredService<Drain>());
        if (plan.OwnBrokerPort is { } port)
        {
            services.AddSingleton(provider => ActivatorUtilities.CreateInstance<OwnBroker>(provider, port))
                .AddHostedService(provider => provider.GetRequiredService<OwnBroker>());
        }

        if (plan.Brokers.Count > 0) services.AddSingleton(plan.Brokers).AddHostedService<BrokerSources>();
        return services;
    }
}
