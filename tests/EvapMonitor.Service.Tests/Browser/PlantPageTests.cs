using EvapMonitor.Service.Api.Wire;
using EvapMonitor.Service.Tests.Revisions;
using EvapMonitor.Service.Tests.Support;
using Microsoft.Playwright;

namespace EvapMonitor.Service.Tests.Browser;

/// <summary>The plant file given in the browser: corrected, changed, with mistakes.</summary>
public sealed class PlantPageTests(PostgresServer server, Chromium chromium)
{
    [BrowserFact]
    public async Task FileGivenOnThePage_IsInForceFromItsDay_AndItsDifferencesAreShown()
    {
        await using RunningService service = await RunningService.StartAsync(server, SteadyHistory.Plant(), SmallPlant.Now);
        await service.ImportAsync(SteadyHistory.Days(2));
        await service.EvaluatedAsync();
        await using OpenPage open = await chromium.OpenAsync(service.Address);
        await open.GoAsync("/plant", "No day has been computed anew yet.");
        await open.Page.GetByText("Give a corrected or changed plant file").ClickAsync();
        await GiveAsync(open, SteadyHistory.Plant(200));
        await open.Page.GetByLabel("The plant was changed, or will be").CheckAsync();
        await open.Page.GetByLabel("In force from the UTC day").FillAsync("2026-04-15");
        await Assertions.Expect(open.Page.GetByText("The UTC day of Wed 15 Apr 2026 begins at Wed 15 Apr 2026 02:00 (Europe/Copenhagen).")).ToBeVisibleAsync();
        await open.Page.GetByRole(AriaRole.Button, new() { Name = "Give this file" }).ClickAsync();
        await Assertions.Expect(open.Page.GetByText("Accepted as revision 2. 2 days of readings are computed anew").First).ToBeVisibleAsync();
        await Assertions.Expect(open.Page.GetByRole(AriaRole.Row, new() { Name = "Plant revision 2 was accepted." })).ToContainTextAsync("done: 2 days");
        ILocator revision = open.Page.GetByRole(AriaRole.Row, new() { NameRegex = new("^1 past ") });
        await Assertions.Expect(revision).ToContainTextAsync("Wed 15 Apr 2026 02:00");
        await open.Page.GetByRole(AriaRole.Button, new() { Name = "Differences of revision 2" }).ClickAsync();
        await Assertions.Expect(open.Page.GetByText("Against revision 1: 1 line added, 1 line removed.")).ToBeVisibleAsync();
        Assert.Contains("area: 100 m2", await open.Page.Locator(".stretch li.removed").InnerTextAsync());
        Assert.Contains("+", await open.Page.Locator(".stretch li.added .sign").InnerTextAsync());
        await open.AccessibleAsync("/plant");
        await open.PictureAsync("plant");
        open.NothingWentWrong();
    }

    [BrowserFact]
    public async Task FileWithMistakes_ShowsThemAll_WithLineAndColumn()
    {
        await using RunningService service = await RunningService.StartAsync(server, SteadyHistory.Plant(), SmallPlant.Now);
        await using OpenPage open = await chromium.OpenAsync(service.Address, width: 320, height: 800);
        await open.GoAsync("/plant", "Revision 1");
        await open.Page.GetByText("Give a corrected or changed plant file").ClickAsync();
        await GiveAsync(open, SteadyHistory.Plant().Replace("100 m2", "100", StringComparison.Ordinal).Replace("liquor: feed", "liquor: nowhere", StringComparison.Ordinal));
        await open.Page.GetByRole(AriaRole.Button, new() { Name = "Give this file" }).ClickAsync();
        await Assertions.Expect(open.Page.GetByText("was not taken: The plant file has 2 mistakes; nothing was applied").First).ToBeVisibleAsync();
        await Assertions.Expect(open.Page.Locator(".log tbody tr")).ToHaveCountAsync(2);
        await Assertions.Expect(open.Page.Locator(".log tbody")).ToContainTextAsync("lines.one.effects[0].area");
        await open.NothingScrollsSidewaysAsync("/plant");
        await open.AccessibleAsync("/plant");
    }

    [BrowserFact]
    public async Task RecomputationOnThePage_IsStopped_AndGoneOnWith()
    {
        await using RunningService service = await RunningService.StartAsync(server, SteadyHistory.Plant(), SmallPlant.Now);
        await service.ImportAsync(SteadyHistory.Days(2));
        await service.EvaluatedAsync();
        await using OpenPage open = await chromium.OpenAsync(service.Address);
        RecomputationWire one;
        await using (Npgsql.NpgsqlConnection hold = await service.Database.OpenConnectionAsync(TestContext.Current.CancellationToken))
        {
            // While the lease is locked no result can be written.
            await using Npgsql.NpgsqlTransaction transaction = await hold.BeginTransactionAsync(TestContext.Current.CancellationToken);
            await using (var command = new Npgsql.NpgsqlCommand("SELECT 1 FROM line_lease FOR UPDATE", hold)) await command.ExecuteNonQueryAsync(TestContext.Current.CancellationToken);
            one = await service.Http.RecomputationAsync("", "{}");
            await open.GoAsync("/plant", "Asked for by this machine.");
            await open.Page.GetByRole(AriaRole.Button, new() { Name = "Stop what began so: Asked for by this machine." }).ClickAsync();
            await Assertions.Expect(open.Page.GetByText("stopped: 0 of 3 days computed; 3 keep their earlier results")).ToBeVisibleAsync();
            await open.AccessibleAsync("/plant");
        }

        await open.Page.GetByRole(AriaRole.Button, new() { Name = "Go on with what began so: Asked for by this machine." }).ClickAsync();
        await service.RecomputedAsync(one.Id);
        await Assertions.Expect(open.Page.GetByText("done: 3 days")).ToBeVisibleAsync();
        open.NothingWentWrong();
    }

    private static Task GiveAsync(OpenPage open, string text) => open.Page.GetByLabel("Plant file (.yaml)").SetInputFilesAsync(
        new FilePayload { Name = "plant.yaml", MimeType = "application/yaml", Buffer = System.Text.Encoding.UTF8.GetBytes(text) });
}
