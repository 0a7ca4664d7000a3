using System.Net;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Api;

public sealed class FlowSheetRouteTests(ApiService api, PostgresServer server) : IClassFixture<ApiService>
{
    [PostgreSqlFact]
    public async Task Sheet_CarriesTheSameResultsAsTheEffects()
    {
        FlowSheetWire sheet = await api.Service.GetAsync<FlowSheetWire>("/api/v1/lines/north/flow-sheet");
        Assert.Equal(("north", "producing", "live", ApiService.End), (sheet.Line, sheet.State, sheet.Readings, sheet.AsOf));
        PlaceWire[] effects = [.. sheet.Places.Where(place => place.Kind == "effect")];
        Assert.Equal(["N1", "N2", "N3", "N4"], effects.Select(place => place.Name));
        EffectWire fourth = await api.Service.GetAsync<EffectWire>("/api/v1/lines/north/effects/N4");
        Assert.Equal(fourth.Now, effects[3].Effect!.Now);
        EffectNowWire now = fourth.Now!;
        Assert.Equal(now.DrivingForceK!.Value, now.HeatingTemperatureC!.Value - now.BoilingTemperatureC!.Value, 1e-9);
        // What the dashboard draws as scale: heat flux times fouling resistance, in kelvins.
        Assert.Equal(now.HeatFluxKwM2!.Value * 1000 * now.FoulingResistanceM2kW!.Value, now.DrivingForceK.Value * (1 - now.Cleanliness!.Value), 0.02);
    }

    [PostgreSqlFact]
    public async Task Reading_StandsAtItsPlaceInThePlantsUnit()
    {
        FlowSheetWire sheet = await api.Service.GetAsync<FlowSheetWire>("/api/v1/lines/north/flow-sheet");
        SignalWire signal = (await api.Service.GetAsync<SignalsWire>("/api/v1/signals")).Signals.Single(one => one.Name == "N.FT-10");
        MeasuredNowWire flow = sheet.Places.Single(place => place.Id == "feed").Measured.Single(one => one.What == "flow");
        Assert.Equal(("N.FT-10", signal.LatestValue, "t/h", signal.LatestAt, "good"), (flow.Signal, flow.Value, flow.Unit, flow.At, flow.State));
        Assert.Equal(flow, sheet.Ways.Single(way => way.From == "feed").Flow);
    }

    [PostgreSqlFact]
    public async Task Reading_OlderThanItMayStand_IsStale_AndOneThatNeverCameIsNone()
    {
        await using RunningService service = await RunningService.StartAsync(server, SmallPlant.Text, SmallPlant.Now);
        await service.ImportAsync("time,signal,value,quality\n2026-04-20T11:40:00Z,FT-1,31.5,good\n2026-04-20T11:55:00Z,PT-2,1.9,uncertain\n2026-04-20T11:55:00Z,PT-1,,bad\n");
        FlowSheetWire sheet = await service.GetAsync<FlowSheetWire>("/api/v1/lines/one/flow-sheet");
        Dictionary<string, (double?, string)> found = sheet.Places.SelectMany(place => place.Measured).ToDictionary(one => one.Signal, one => (one.Value, one.State));
        Assert.Equal((31.5, "stale"), found["FT-1"]);
        Assert.Equal((1.9, "uncertain"), found["PT-2"]);
        Assert.Equal((null, "bad"), found["PT-1"]);
        Assert.Equal((null, "none"), found["TT-1"]);
        Assert.Null(sheet.Places.Single(place => place.Kind == "effect").Effect!.Now?.CoefficientWM2k);
    }

    [PostgreSqlFact]
    public async Task Spare_ServesWhereItsValveIsOpen()
    {
        await using RunningService service = await RunningService.StartAsync(server, PlantFile.Examples.Text("mixed-seven-effects.yaml"), SmallPlant.Now);
        await service.ImportAsync("time,signal,value\n2026-04-20T11:00:00Z,M.V82,100\n2026-04-20T11:00:00Z,M.V83,0\n2026-04-20T11:00:00Z,M.V2,0\n");
        FlowSheetWire sheet = await service.GetAsync<FlowSheetWire>("/api/v1/lines/mill/flow-sheet");
        IReadOnlyList<BodyNowWire> Bodies(string effect) => sheet.Places.Single(place => place.Id == $"effect/{effect}").Bodies;
        Assert.Equal([("B2", false), ("B8", true)], Bodies("N2").Select(body => (body.Name, body.Serving ?? throw new InvalidOperationException(body.Name))));
        // The valve of B3 has never told.
        Assert.Equal([("B3", null), ("B8", (bool?)false)], Bodies("N3").Select(body => (body.Name, body.Serving)));
        Assert.True(Assert.Single(Bodies("N1")).Serving);
    }

    [PostgreSqlFact]
    public async Task UnknownLine_IsNotFound() =>
        Assert.Equal("There is no line 'south'; the plant file has north.", await api.ProblemAsync(HttpStatusCode.NotFound, "/api/v1/lines/south/flow-sheet"));
}
