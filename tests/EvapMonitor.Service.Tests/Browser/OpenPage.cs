using Deque.AxeCore.Commons;
using Deque.AxeCore.Playwright;
using Microsoft.Playwright;

namespace EvapMonitor.Service.Tests.Browser;

/// <summary>A page with an ear for everything that goes wrong in it: console errors, breaches of the content policy, failed requests.</summary>
public sealed class OpenPage : IAsyncDisposable
{
    private readonly IBrowserContext _context;
    private readonly List<string> _wrong = [];

    internal OpenPage(IBrowserContext context, IPage page)
    {
        (_context, Page) = (context, page);
        page.Console += (_, message) =>
        {
            if (message.Type is "error" or "warning") Note($"console: {message.Text}");
        };
        page.PageError += (_, error) => Note($"page: {error}");
        page.Response += (_, answer) =>
        {
            if (answer.Status >= 400) Note($"{answer.Status} {answer.Url}");
        };
    }

    public IPage Page { get; }

    public async Task GoAsync(string path, string awaited)
    {
        await Page.GotoAsync(path);
        await Page.GetByText(awaited).First.WaitForAsync();
    }

    /// <summary>Fails with all that went wrong so far.</summary>
    public void NothingWentWrong()
    {
        lock (_wrong) Assert.Empty(_wrong);
    }

    /// <summary>Fails with each breach of WCAG 2.2 A and AA that axe finds.</summary>
    public async Task AccessibleAsync(string where)
    {
        AxeResult result = await Page.RunAxe(new AxeRunOptions { RunOnly = RunOnlyOptions.Tags("wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa", "best-practice") });
        Assert.Empty(result.Violations.Select(breach => $"{where}: {breach.Id}: {string.Join(" | ", breach.Nodes.Select(node => node.Html))}"));
        Assert.NotEmpty(result.Passes);
    }

    /// <summary>Fails when the page is wider than its window.</summary>
    public async Task NothingScrollsSidewaysAsync(string where)
    {
        int[] widths = await Page.EvaluateAsync<int[]>("[document.documentElement.scrollWidth, document.documentElement.clientWidth]");
        Assert.True(widths[0] <= widths[1], $"{where} is {widths[0]} px wide in a window of {widths[1]} px");
    }

    public async Task PictureAsync(string name)
    {
        if (Environment.GetEnvironmentVariable("EVAPMONITOR_SCREENSHOTS") is not { Length: > 0 } folder) return;
        await Page.ScreenshotAsync(new PageScreenshotOptions { Path = Path.Combine(folder, name + ".png"), FullPage = true });
    }

    public async ValueTask DisposeAsync() => await _context.DisposeAsync();

    private void Note(string what)
    {
        lock (_wrong) _wrong.Add(what);
    }
}
