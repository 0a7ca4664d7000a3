using System.Globalization;
using System.Text.RegularExpressions;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.PlantFile;
using EvapMonitor.Service.Tests.Support;
using Microsoft.Playwright;

namespace EvapMonitor.Service.Tests.Browser;

public sealed class LinePageTests(DashboardService dashboard, Chromium chromium) : IClassFixture<DashboardService>
{
    private const string Line = "/lines/north", Awaited = "Where the kelvins go";

    private RunningService Service => dashboard.Service;

    [BrowserFact]
    public async Task Table_SaysWhatTheInterfaceSays_InTheOrderOfTheSteam()
    {
        FlowSheetWire sheet = await Service.GetAsync<FlowSheetWire>("/api/v1/lines/north/flow-sheet");
        await using OpenPage open = await chromium.OpenAsync(Service.Address);
        await open.GoAsync(Line, Awaited);
        ILocator table = open.Page.Locator("table.descent-table");
        Assert.Equal(["N1", "N2", "N3", "N4"], await table.Locator("thead a").AllInnerTextsAsync());
        string[] heated = [.. sheet.Places.Where(place => place.Effect is not null).Select(place => place.Effect!.Now!.HeatingTemperatureC!.Value.ToString("0.0", CultureInfo.InvariantCulture))];
        string row = await table.Locator("tr", new() { HasText = "heated at" }).InnerTextAsync();
        Assert.Equal(heated, Regex.Matches(row, @"\d+\.\d").Select(match => match.Value));
        // The drawing above says the same.
        string drawing = string.Join(' ', await open.Page.Locator("figure.sheet svg text").AllTextContentsAsync());
        Assert.All(heated, value => Assert.Contains($"{value} °C", drawing));
        open.NothingWentWrong();
    }

    [BrowserFact]
    public async Task DrawingDescentAndTable_ShareTheirColumns()
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address, width: 1100);
        await open.GoAsync(Line, Awaited);
        await open.Page.Locator("table.descent-table").WaitForAsync();
        double[] off = await open.Page.EvaluateAsync<double[]>("""
            () => {
              const mid = e => { const r = e.getBoundingClientRect(); return r.x + r.width / 2; };
              const heads = [...document.querySelectorAll('table.descent-table thead a')].map(mid);
              const boxes = [...document.querySelectorAll('.sheet-effect rect')].map(mid);
              const bars = [...document.querySelectorAll('.descent .piece-clean')].map(mid).slice(-heads.length);
              return heads.flatMap((x, i) => [boxes[i] - x, bars[i] - x]);
            }
            """);
        Assert.Equal(8, off.Length);
        Assert.All(off, distance => Assert.InRange(distance, -2, 2));
    }

    [BrowserFact]
    public async Task TodayLinesAndEffect_LeadToTheLine_AndItLeadsBack()
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address);
        foreach ((string path, string awaited) in new[] { ("/", "Ring thickness stands for"), ("/lines", "N4"), ("/lines/north/effects/N4", "Coefficient of N4") })
        {
            await open.GoAsync(path, awaited);
            await open.Page.Locator("main").GetByRole(AriaRole.Link, new() { Name = "north", Exact = true }).First.ClickAsync();
            await open.Page.GetByText(Awaited).First.WaitForAsync();
        }

        await open.Page.Locator("table.descent-table thead").GetByRole(AriaRole.Link, new() { Name = "N3" }).ClickAsync();
        await open.Page.GetByText("Coefficient of N3").First.WaitForAsync();
        await open.GoAsync(Line, Awaited);
        await open.Page.GetByRole(AriaRole.Link, new() { Name = "All lines" }).ClickAsync();
        await Assertions.Expect(open.Page).ToHaveURLAsync(new Regex("/lines#line.north$"));
        open.NothingWentWrong();
    }

    [BrowserFact]
    public async Task Paper_TakesAPageForThePictures_AndOneForTheBalance()
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address, dark: true);
        await open.GoAsync(Line, Awaited);
        await open.Page.Locator("table.descent-table").WaitForAsync();
        byte[] paper = await open.Page.PdfAsync(new() { PreferCSSPageSize = true });
        Assert.Equal(2, Regex.Count(System.Text.Encoding.Latin1.GetString(paper), @"/Type\s*/Page\b(?!s)"));
    }

    [BrowserFact]
    public async Task LineWithoutReadings_SaysWhyNothingIsKnown_ForEveryKindOfLine()
    {
        foreach (string example in new[] { "mixed-seven-effects.yaml", "thermal-recompression.yaml", "bleeds-and-flash.yaml" })
        {
            await using RunningService service = await RunningService.StartAsync(dashboard.Server, Examples.Text(example), SmallPlant.Now);
            string line = Assert.Single((await service.GetAsync<LinesWire>("/api/v1/lines")).Lines).Name;
            foreach (int width in new[] { 320, 1280 })
            {
                await using OpenPage open = await chromium.OpenAsync(service.Address, width: width, height: 700);
                await open.GoAsync($"/lines/{line}", "have no coefficient");
                await Assertions.Expect(open.Page.Locator("main")).ToContainTextAsync("No temperature of this line is known yet");
                await open.NothingScrollsSidewaysAsync(example);
                await open.AccessibleAsync(example);
                open.NothingWentWrong();
            }
        }
    }
}
