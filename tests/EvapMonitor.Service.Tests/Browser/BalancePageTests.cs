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
        await row.GetByRole(AriaRole.Button, new() { Name = $"30 days of {FeedFlow}" }).ClickAsync();
        ILocator figure = open.Page.Locator("figure.corrections");
        await Assertions.Expect(figure).ToContainTextAsync("dotted while it is left out");
        Assert.Matches(@"^M\d", await figure.Locator(".corrections-line").GetAttributeAsync("d"));
        Assert.Matches(@"^M\d", await figure.Locator(".corrections-out").GetAttributeAsync("d"));
        await Assertions.Expect(figure).ToContainTextAsync("In the last 30 days between −");
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
                await open.Page.GetByRole(AriaRole.Button, new() { Name = $"30 days of {FeedFlow}" }).ClickAsync();
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
