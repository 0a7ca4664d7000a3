using EvapMonitor.Core.Coefficients;
using EvapMonitor.Core.Fouling;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Store;
using EvapMonitor.Service.Wording;

namespace EvapMonitor.Service.Api;

/// <summary>Campaigns, stops, tests on water and clean expectations as they go out.</summary>
internal static class CampaignStates
{
    public static CampaignsWire Of(string line, string effect, SurfacesOfEffect its) => new(
        line, effect, its.Serving?.Name,
        [.. its.All.SelectMany(surface => surface.History.Campaigns.Select(one => WireOf(surface.Name, one))).OrderByDescending(one => one.Start)],
        [.. its.All.SelectMany(surface => surface.History.Stops.Select(one => new StopWire(surface.Name, Utc(one.Start), Open(one.End), one.Reason))).OrderByDescending(one => one.Start)],
        [.. its.All.SelectMany(surface => surface.History.WaterTests.Where(one => one.Effect == effect).Select(one => new WaterTestWire(
            surface.Name, Utc(one.Start), Utc(one.End), WireOf(one.Coefficient), WireOf(one.ResistanceSincePrevious)))).OrderByDescending(one => one.Start)],
        its.Serving is not { } serving ? [] : [.. serving.History.References
            .Where(one => one.Campaign == serving.History.Campaigns.Count - 1 && one.Effect == effect).Select(one => WireOf(serving.Name, one))],
        its.Version);

    public static CampaignWire WireOf(string surface, Campaign one) => new(
        surface, Utc(one.Start), one.End is { } end ? Open(end) : null, Words.Of(one.StartedBy), double.Round(one.Confidence, 6), one.Products, WireOf(one.InitialResistance), WireOf(one.FinalResistance),
        Number(one.RemovedShare), WireOf(one.GrowthRate), double.Round(one.ProductionHours, 2), double.Round(one.HoursSinceCleaned, 2));

    public static CleaningResultWire ResultOf(string surface, SurfaceCleaning one) => new(
        surface, Words.Of(one.Verdict), one.Reason, WireOf(one.Before), WireOf(one.Removed), WireOf(one.Left), Number(one.Removed.Value / one.Before.Value),
        one.Test is { } test ? Number(1 - test.Significance) : null);

    /// <summary>An instant; null for what has no end yet.</summary>
    public static DateTimeOffset? Open(long at) => at == long.MaxValue ? null : Utc(at);

    private static CleanReferenceWire WireOf(string surface, CleanReference one)
    {
        double level = double.Exp(one.Level);
        UncertainWire Slope(int term) => new(Number(one.Slopes[term]), Number(double.Sqrt(double.Max(0, one.SlopeCovariance[4 * term]))));
        return new CleanReferenceWire(
            surface, one.Product, Utc(one.From), one.Source, new(Number(level), Number(level * one.LevelUncertainty)), Slope(0), Slope(1), Slope(2),
            Number(double.Exp(one.At.LogSolids)), Number(one.At.BoilingTemperature - 273.15), Number(double.Exp(one.At.LogFlux) / 1000));
    }

    private static UncertainWire WireOf(Measured value) => new(Number(value.Value), Number(value.Standard));

    private static double? Number(double value) => double.IsFinite(value) ? double.Round(value, 12) : null;

    private static DateTimeOffset Utc(long at) => DateTimeOffset.FromUnixTimeMilliseconds(at);
}

/// <summary>The surfaces that have served an effect.</summary>
/// <param name="Version">Version of the line's surfaces.</param>
/// <param name="All">All of them.</param>
/// <param name="Serving">The one that serves it, or served it last; null when not known.</param>
internal sealed record SurfacesOfEffect(long Version, IReadOnlyList<Surface> All, Surface? Serving)
{
    public static SurfacesOfEffect Of(StoredSurfaces line, string effect)
    {
        // A surface's clean expectations name the effects in which it served.
        Surface[] its = [.. line.Surfaces.Where(surface => surface.Effect == effect || surface.History.References.Any(one => one.Effect == effect))];
        return new SurfacesOfEffect(line.Version, its, its.Where(surface => surface.Effect == effect).MaxBy(surface => surface.ServedUntil));
    }
}
