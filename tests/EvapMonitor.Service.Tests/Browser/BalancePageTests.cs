using System.Globalization;
using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Support;
using Microsoft.Playwright;

namespace EvapMonitor.Service.Tests.Browser;

/// <summary>What the pages say of a line whose feed flow reads a tenth too much.</summary>
public sealed class BalancePageTests(FaultyService faulty, Chromium chromium) : IClassFixture<FaultyService>
{
    private const string FeedFlow = "N.FT-10", Awaited = "What was measured, and what fits together";

    private RunningService Service => faulty.Service;

    [BrowserFact]
    public async Task LinePage_PutsMeasuredBesideReconciled_AndNamesTheInstrument()
    {
        BalanceWire balance = await Service.GetAsync<BalanceWire>("/api/v1/lines/north/balance");
        await using OpenPage open = await chromium.OpenAsync(Service.Address);
        await open.GoAsync("/lines/north", Awaited);
        await Assertions.Expect(open.Page.Locator(".line-balance")).ToContainTextAsync($"{FeedFlow} does not fit the other readings and is left out of the balance, since");
        string row = await open.Page.Locator("table.balance tr", new() { HasText = FeedFlow }).First.InnerTextAsync();
        Assert.Contains(balance.Variables[0].Reconciled!.Value.ToString("0.0", CultureInfo.InvariantCulture), row);
        Assert.Contains($"{FeedFlow} left out", row);
        string drawing = string.Join('|', await open.Page.Locator("figure.sheet svg text").AllTextContentsAsync());
        Assert.Contains(balance.Variables[0].Reconciled!.Value.ToString("0", CultureInfo.InvariantCulture) + "*", drawing);
        Assert.Contains(" t/h*", drawing);
        open.NothingWentWrong();
    }

    [BrowserFact]
    public async Task Instruments_SayWhoDoesNotFit_AndDrawTheirCorrections()
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address);
        await open.GoAsync("/instruments", FeedFlow);
        ILocator row = open.Page.Locator("table.signals tr", new() { HasText = FeedFlow }).First;
        await Assertions.Expect(row.Locator("td.fit b")).ToContainTextAsync("left out of the balance: the others want −");
        await Assertions.Expect(open.Page.Locator("table.signals tr", new() { HasText = "N.FT-90" }).First.Locator("td.fit")).ToContainTextAsync("fits the others");
        await row.GetByRole(AriaRole.Button, new() { Name = $"30 days, log of {FeedFlow}" }).ClickAsync();
        ILocator figure = open.Page.Locator("figure.corrections");
        await Assertions.Expect(figure).ToContainTextAsync("dotted while it is left out");
        Assert.Matches(@"^M\d", await figure.Locator(".corrections-line").GetAttributeAsync("d"));
        Assert.Matches(@"^M\d", await figure.Locator(".corrections-out").GetAttributeAsync("d"));
        await Assertions.Expect(figure).ToContainTextAsync("In the last 30 days between −");
        open.NothingWentWrong();
    }

    [BrowserFact]
    public async Task Instrument_IsExcludedByTheForm_AndTakenBack()
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address);
        await open.GoAsync("/instruments", FeedFlow);
        ILocator row = open.Page.Locator("table.signals tr", new() { HasText = "N3.FT-3" }).First;
        await row.GetByRole(AriaRole.Button, new() { Name = "30 days, log of N3.FT-3" }).ClickAsync();
        ILocator log = open.Page.Locator(".instrument-log");
        await Assertions.Expect(log).ToContainTextAsync("Nothing is logged of N3.FT-3.");
        await log.GetByText("Exclude N3.FT-3 for a time").ClickAsync();
        await log.GetByRole(AriaRole.Button, new() { Name = "Exclude N3.FT-3" }).ClickAsync();
        await Assertions.Expect(log).ToContainTextAsync("Give a date and a time.");
        await log.GetByLabel("From, local time").FillAsync("2026-03-02T08:00");
        await log.GetByLabel("Note").FillAsync("orifice eaten");
        await log.GetByRole(AriaRole.Button, new() { Name = "Exclude N3.FT-3" }).ClickAsync();
        ILocator entry = log.Locator("li", new() { HasText = "until further notice: orifice eaten" });
        await Assertions.Expect(entry).ToContainTextAsync("Excluded from");
        await entry.GetByRole(AriaRole.Button, new() { Name = "take back" }).ClickAsync();
        await Assertions.Expect(log).ToContainTextAsync("Nothing is logged of N3.FT-3.");
        // The days are computed anew twice; the other tests of this service must find what they found before.
        await Service.EvaluatedAsync();
        open.NothingWentWrong();
    }

    [BrowserFact]
    public async Task Effect_TellsItsCampaign_AndWhatTheCleanExpectationRestsOn()
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address);
        await Service.SurfacesAsync();
        await open.GoAsync("/lines/north/effects/N2", "Ring thickness stands for");
        ILocator campaigns = open.Page.Locator("table.campaigns");
        await Assertions.Expect(campaigns).ToContainTextAsync("first data");
        await open.Page.GetByText("What the clean expectation rests on").ClickAsync();
        await Assertions.Expect(open.Page.Locator("main")).ToContainTextAsync("design value");
        await open.AccessibleAsync("effect");
        open.NothingWentWrong();
    }

    [BrowserFact]
    public async Task Today_NamesTheInstrument()
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address);
        await open.GoAsync("/", "Ring thickness stands for");
        await Assertions.Expect(open.Page.Locator("main")).ToContainTextAsync($"{FeedFlow} does not fit the other readings and is left out of the balance.");
        open.NothingWentWrong();
    }

    [BrowserTheory]
    [InlineData(320, false)]
    [InlineData(1280, true)]
    public async Task Pages_AreAccessible_AndDoNotScrollSideways(int width, bool dark)
    {
        await using OpenPage open = await chromium.OpenAsync(Service.Address, width: width, height: 800, dark: dark);
        foreach ((string path, string awaited) in new[] { ("/lines/north", Awaited), ("/instruments", "against the others"), ("/", FeedFlow) })
        {
            await open.GoAsync(path, awaited);
            if (path == "/instruments")
            {
                await open.Page.GetByRole(AriaRole.Button, new() { Name = $"30 days, log of {FeedFlow}" }).ClickAsync();
                await open.Page.Locator("figure.corrections svg").WaitForAsync();
            }
            else if (path != "/") await open.Page.GetByText("What follows without an instrument").ClickAsync();
            await open.NothingScrollsSidewaysAsync(path);
            await open.AccessibleAsync(path);
            await open.PictureAsync($"balance-{width}{path.Replace('/', '-')}");
        }

        open.NothingWentWrong();
    }
}
