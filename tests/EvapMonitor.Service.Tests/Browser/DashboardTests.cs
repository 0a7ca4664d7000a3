using System.Text.RegularExpressions;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;
using Microsoft.Playwright;

namespace EvapMonitor.Service.Tests.Browser;

public sealed class DashboardTests(DashboardService dashboard, Chromium chromium) : IClassFixture<DashboardService>
{
    private const string Effect = "/lines/north/effects/N4", Line = "/lines/north";

    /// <summary>Each page with a text that stands on it once it is whole.</summary>
    private static readonly (string Path, string Awaited)[] Pages =
    [
        ("/", "Ring thickness stands for"), ("/lines", "N4"), (Line, "Where the kelvins go"), (Effect, "Coefficient of N4"), ("/cleanings", "Log a cleaning"), ("/instruments", "N.FT-10"), ("/plant", "Revision 1"),
    ];

    private RunningService Service => dashboard.Service;

    [BrowserFact]
    public async Task Today_SaysWhatTheInterfaceSays()
    {
        EffectWire effect = await Service.GetAsync<EffectWire>("/api/v1/lines/north/effects/N4");
        Assert.Equal("due", effect.Due.State);
        await using OpenPage open = await chromium.OpenAsync(Service.Address);
        await open.GoAsync("/", "Ring thickness stands for");
        string said = await open.Page.Locator("section.line").InnerTextAsync();
        // The sentence counts hours, which may pass from one to the next meanwhile.
        Assert.Matches(Regex.Replace(Regex.Escape(effect.Due.Sentence.TrimEnd('.')), @"for\\ \d+", @"for\s\d+").Replace("\\ ", @"\s"), said);
        foreach (ILocator cell in await open.Page.Locator("ul.effects > li").AllAsync()) Assert.InRange(await cell.Locator("svg").CountAsync(), 1, 2);
        Assert.Equal(["N1", "N2", "N3", "N4"], await open.Page.Locator(".effect-name").AllInnerTextsAsync());
        Assert.Contains($"cleanliness {Math.Round(effect.Now!.Cleanliness!.Value * 100)} %", await open.Page.Locator("ul.effects > li").Nth(3).InnerTextAsync());
        open.NothingWentWrong();
    }

    [BrowserFact]
    public async Task Effect_DrawsItsChart_AndOpensItsTable()
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address);
        await open.GoAsync(Effect, "Coefficient of N4");
        ILocator chart = open.Page.Locator("figure.chart").First;
        await chart.Locator("canvas").WaitForAsync();
        // A chart without a line has hardly any ink.
        int ink = await chart.Locator("canvas").EvaluateAsync<int>("c => { const d = c.getContext('2d').getImageData(0, 0, c.width, c.height).data; let n = 0; for (let i = 3; i < d.length; i += 4) if (d[i] > 0) n++; return n; }");
        Assert.True(ink > 5000, $"{ink} pixels drawn");
        Assert.Equal(0, await chart.Locator("table").CountAsync());
        await chart.GetByRole(AriaRole.Button, new() { Name = "Table" }).ClickAsync();
        ILocator rows = chart.Locator("table tbody tr");
        Assert.InRange(await rows.CountAsync(), 40, 151);
        Assert.Matches(@"\d ± \d", await rows.First.InnerTextAsync());
        await chart.Locator(".plot").FocusAsync();
        await open.Page.Keyboard.PressAsync("t");
        await Assertions.Expect(chart.Locator("table")).ToHaveCountAsync(0);
        await open.Page.Keyboard.PressAsync("ArrowLeft");
        await Assertions.Expect(chart.Locator(".values b")).ToContainTextAsync("±");
        open.NothingWentWrong();
    }

    [BrowserFact]
    public async Task Import_IsSentAndItsProgressShown()
    {
        await using RunningService service = await RunningService.StartAsync(dashboard.Server, SmallPlant.Text, SmallPlant.Now);
        await using OpenPage open = await chromium.OpenAsync(service.Address);
        await open.GoAsync("/plant", "Revision 1");
        await open.Page.Locator(".upload input[type=file]").SetInputFilesAsync(new FilePayload { Name = "spring.csv", MimeType = "text/csv", Buffer = History.Long(250_000) });
        await Assertions.Expect(open.Page.Locator("section.work progress").First).ToBeVisibleAsync();
        await Assertions.Expect(open.Page.Locator("table tbody tr").First).ToContainTextAsync("done", new() { Timeout = 60_000 });
        await Assertions.Expect(open.Page.Locator("table tbody tr").First).ToContainTextAsync("spring.csv");
        await Assertions.Expect(open.Page.Locator("table tbody tr").First).ToContainTextAsync(new Regex(@"250\s?000"));
        open.NothingWentWrong();
    }

    [BrowserFact]
    public async Task Cleaning_IsLoggedByTheForm_AndTakenBack()
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address);
        await open.GoAsync("/cleanings", "Log a cleaning");
        await open.Page.GetByRole(AriaRole.Button, new() { Name = "Log this cleaning" }).ClickAsync();
        Assert.True(await open.Page.Locator("[aria-invalid=true]").CountAsync() >= 2);
        await open.Page.GetByLabel("Effect").SelectOptionAsync("north/N2");
        await open.Page.GetByLabel("Start, local time (Europe/Copenhagen)").FillAsync("2026-03-03T08:00");
        await open.Page.GetByLabel("End, local time (Europe/Copenhagen)").FillAsync("2026-03-03T10:30");
        await open.Page.GetByLabel("Kind").FillAsync("boil-out");
        await open.Page.GetByLabel("Note").FillAsync(DashboardService.Hostile);
        await open.Page.GetByRole(AriaRole.Button, new() { Name = "Log this cleaning" }).ClickAsync();
        ILocator row = open.Page.Locator("table tbody tr").Filter(new() { HasText = "boil-out" });
        await Assertions.Expect(row).ToHaveCountAsync(1);
        string told = await row.InnerTextAsync();
        Assert.Contains("N2", told);
        Assert.Contains("08:00", told);
        Assert.Contains(DashboardService.Hostile, told);
        CleaningWire logged = (await Service.GetAsync<CleaningsWire>("/api/v1/cleanings?line=north&effect=N2")).Cleanings.Single();
        Assert.Equal(new DateTimeOffset(2026, 3, 3, 7, 0, 0, TimeSpan.Zero), logged.Start);
        await open.Page.GetByRole(AriaRole.Button, new() { Name = "Take it back" }).ClickAsync();
        await Assertions.Expect(row).ToHaveCountAsync(0);
        Assert.Empty((await Service.GetAsync<CleaningsWire>("/api/v1/cleanings?line=north&effect=N2")).Cleanings);
        open.NothingWentWrong();
    }

    [BrowserFact]
    public async Task TextFromOutside_StaysText()
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address);
        await open.GoAsync("/instruments", "Signals that no plant file names");
        await Assertions.Expect(open.Page.GetByText(DashboardService.Hostile)).ToHaveCountAsync(1);
        await open.GoAsync("/plant", "Revision 1");
        await Assertions.Expect(open.Page.Locator("pre.plant-file")).ToContainTextAsync("<script>document.title='taken'</script>");
        await open.Page.Locator("details summary").First.ClickAsync();
        await Assertions.Expect(open.Page.Locator("details li").First).ToContainTextAsync(DashboardService.Hostile);
        Assert.Equal(0, await open.Page.Locator("img[src=x], pre script").CountAsync());
        Assert.DoesNotContain("taken", await open.Page.TitleAsync());
        open.NothingWentWrong();
    }

    [BrowserTheory]
    [InlineData(false)]
    [InlineData(true)]
    public async Task EveryPage_IsAccessible(bool dark)
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address, dark);
        foreach ((string path, string awaited) in Pages)
        {
            await open.GoAsync(path, awaited);
            await open.AccessibleAsync(path);
            if (Pictured(path) is { } name) await open.PictureAsync($"{name}-{(dark ? "dark" : "light")}");
        }

        open.NothingWentWrong();
    }

    [BrowserFact]
    public async Task EveryPage_FitsANarrowPhone()
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address, width: 320, height: 640, touch: true);
        foreach ((string path, string awaited) in Pages)
        {
            await open.GoAsync(path, awaited);
            await open.NothingScrollsSidewaysAsync(path);
            if (Pictured(path) is { } name) await open.PictureAsync($"{name}-phone");
        }

        open.NothingWentWrong();
    }

    private static string? Pictured(string path) => path switch { "/" => "today", Line => "line", Effect => "effect", _ => null };

    [BrowserFact]
    public async Task UnknownPage_SaysSo()
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address);
        await open.Page.GotoAsync("/nowhere");
        await Assertions.Expect(open.Page.Locator("main")).ToContainTextAsync(new Regex("no such page|is not here|There is no", RegexOptions.IgnoreCase));
        open.NothingWentWrong();
    }
}
