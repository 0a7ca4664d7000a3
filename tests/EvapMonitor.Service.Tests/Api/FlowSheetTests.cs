using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using EvapMonitor.Core.Plant;
using EvapMonitor.Service.Api;
using EvapMonitor.Service.Tests.PlantFile;
using EvapMonitor.Service.Tests.Support;

namespace EvapMonitor.Service.Tests.Api;

/// <summary>Places and ways of lines of every kind.</summary>
public sealed class FlowSheetTests
{
    private static readonly JsonSerializerOptions Indented = new() { WriteIndented = true, NewLine = "\n", Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    public static TheoryData<string> Plants => [.. Texts.Keys];

    /// <summary>One effect, nine effects with a bit of everything, and the examples of the documentation.</summary>
    private static IReadOnlyDictionary<string, string> Texts { get; } = new SortedDictionary<string, string>(
        Examples.Files.ToDictionary(file => Path.GetFileNameWithoutExtension(file), File.ReadAllText), StringComparer.Ordinal)
    {
        ["one-effect"] = SmallPlant.Text,
        ["nine-effects"] = Examples.Own("nine-effects.yaml"),
    };

    [Theory]
    [MemberData(nameof(Plants))]
    public void EveryWay_JoinsTwoPlaces_AndEveryPlaceHasAWay(string plant)
    {
        foreach (Line line in Examples.Sound(Texts[plant]).Lines)
        {
            var sheet = new FlowSheet(line);
            Assert.Equal(sheet.Places.Count, sheet.Places.Select(place => place.Id).Distinct().Count());
            var ids = sheet.Places.Select(place => place.Id).ToHashSet();
            Assert.All(sheet.Ways, way => Assert.True(ids.Contains(way.From) && ids.Contains(way.To), $"{way.From} to {way.To}"));
            Assert.All(sheet.Places, place => Assert.Contains(sheet.Ways, way => way.From == place.Id || way.To == place.Id));
            foreach (SheetPlace effect in sheet.Places.Where(place => place.Kind == "effect"))
            {
                Assert.Contains(sheet.Ways, way => way.To == effect.Id && way.Kind is "steam" or "vapour");
                Assert.Contains(sheet.Ways, way => way.From == effect.Id && way.Kind == "vapour");
                Assert.Contains(sheet.Ways, way => way.To == effect.Id && way.Kind == "liquor");
                Assert.Contains(sheet.Ways, way => way.From == effect.Id && way.Kind == "liquor");
                Assert.Single(sheet.Ways, way => way.From == effect.Id && way.Kind == "condensate");
            }
        }
    }

    [Fact]
    public void ParallelFeed_CarriesItsShare()
    {
        FlowSheet sheet = Of("own-liquor");
        Assert.Equal([("effect/A", 0.6), ("effect/B", -1)], sheet.Ways.Where(way => way.From == "feed").Select(way => (way.To, way.Share?.Value ?? -1)));
        Assert.All(sheet.Ways.Where(way => way.From == "feed"), way => Assert.Null(way.Flow));
    }

    [Fact]
    public void Jet_DrawsVapourAndMotiveSteam_AndHeatsItsChest()
    {
        FlowSheet sheet = Of("thermal-recompression");
        Assert.Equal(
            [("recompressor/J1", "effect/F1", "vapour"), ("effect/F1", "recompressor/J1", "vapour"), ("motive/J1", "recompressor/J1", "motive")],
            sheet.Ways.Where(way => way.From.EndsWith("/J1", StringComparison.Ordinal) || way.To.EndsWith("/J1", StringComparison.Ordinal)).Select(way => (way.From, way.To, way.Kind)));
        Assert.Equal("D.FJ", sheet.Ways.Single(way => way.Kind == "motive").Flow!.Instrument.Signal);
        Assert.Equal("D.F8", sheet.Ways.Single(way => way.Kind == "steam").Flow!.Instrument.Signal);
    }

    [Fact]
    public void FlashedCondensate_GoesFromVesselToVessel()
    {
        FlowSheet sheet = Of("bleeds-and-flash");
        Assert.Equal(
            [("effect/E1", "condensate"), ("effect/E2", "flash/E3"), ("effect/E3", "flash/E4"), ("effect/E4", "flash/E5"), ("effect/E5", "condensate"), ("flash/E3", "flash/E4"), ("flash/E4", "flash/E5"), ("flash/E5", "condensate")],
            sheet.Ways.Where(way => way.Kind == "condensate").Select(way => (way.From, way.To)).Order());
        Assert.Equal("S.F24", sheet.Ways.Single(way => way.To == "user/pans").Flow!.Instrument.Signal);
    }

    /// <summary>The dashboard draws these in its own tests. EVAPMONITOR_UPDATE=1 writes them anew.</summary>
    [Fact]
    public async Task SheetsOfTheDashboardsTests_AreTheseOnes()
    {
        var all = new JsonObject();
        foreach ((string name, string text) in Texts) all.Add(name, JsonOf(new FlowSheet(Examples.Sound(text).Lines[0])));
        string file = Path.Combine(Repository.Root, "src", "EvapMonitor.Dashboard", "tests", "sheet", "plants.json"), now = all.ToJsonString(Indented) + "\n";
        if (Environment.GetEnvironmentVariable("EVAPMONITOR_UPDATE") == "1") await File.WriteAllTextAsync(file, now, TestContext.Current.CancellationToken);
        Assert.Equal(await File.ReadAllTextAsync(file, TestContext.Current.CancellationToken), now);
    }

    private static FlowSheet Of(string plant) => new(Examples.Sound(Texts[plant]).Lines[0]);

    private static JsonObject JsonOf(FlowSheet sheet) => new()
    {
        ["places"] = new JsonArray([.. sheet.Places.Select(place => new JsonObject
        {
            ["id"] = place.Id, ["kind"] = place.Kind, ["name"] = place.Name, ["measured"] = new JsonArray([.. place.Instruments.Select(JsonOf)]), ["effect"] = null, ["bodies"] = new JsonArray(),
        })]),
        ["ways"] = new JsonArray([.. sheet.Ways.Select(way => new JsonObject
        {
            ["from"] = way.From, ["to"] = way.To, ["kind"] = way.Kind, ["share"] = way.Share?.Value, ["share_u"] = way.Share?.Standard, ["flow"] = way.Flow is { } flow ? JsonOf(flow) : null,
            ["balance"] = way.Variable is null ? null : new JsonObject { ["value"] = 123.4, ["standard"] = 1.2, ["unit"] = "t/h", ["as_of"] = "2026-11-30T13:30:00Z", ["agrees"] = way.Flow is null ? null : JsonValue.Create(true) },
        })]),
    };

    private static JsonObject JsonOf(InstrumentHere here) => new()
    {
        ["what"] = here.What, ["signal"] = here.Instrument.Signal, ["value"] = 123.4, ["unit"] = here.Instrument.Unit.Written, ["at"] = "2026-11-30T13:31:57Z", ["state"] = "good",
    };
}
