using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;
using Microsoft.AspNetCore.Http.HttpResults;

namespace EvapMonitor.Service.Api;

/// <summary>Campaigns of an effect.</summary>
internal static class CampaignHandlers
{
    public static async Task<Results<Ok<CampaignsWire>, ProblemHttpResult>> Campaigns(
        string line, string effect, SurfaceStates surfaces, PlantHolder plant, CancellationToken stop)
    {
        PlantInForce inForce = plant.Current;
        if (inForce.Find(line) is not { } place) return Problems.NoLine(inForce, line);
        if (place.Find(effect) is null) return Problems.NoEffect(place.Line, effect);
        return TypedResults.Ok(CampaignStates.Of(line, effect, SurfacesOfEffect.Of(await surfaces.OfAsync(place.LineId, stop), effect)));
    }
}
