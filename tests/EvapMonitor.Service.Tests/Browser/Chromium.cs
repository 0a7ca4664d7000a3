using EvapMonitor.Service.Tests.Support;
using Microsoft.Playwright;

[assembly: AssemblyFixture(typeof(EvapMonitor.Service.Tests.Browser.Chromium))]

namespace EvapMonitor.Service.Tests.Browser;

/// <summary>The one browser of a test run, started when first asked for.</summary>
public sealed class Chromium : IAsyncDisposable
{
    private readonly SemaphoreSlim _gate = new(1);
    private IPlaywright? _playwright;
    private IBrowser? _browser;

    /// <summary>Opens a page of its own.</summary>
    public async Task<OpenPage> OpenAsync(string address, bool dark = false, int width = 1280, int height = 900, bool touch = false)
    {
        IBrowser browser = await StartedAsync();
        IBrowserContext context = await browser.NewContextAsync(new BrowserNewContextOptions
        {
            BaseURL = address,
            ColorScheme = dark ? ColorScheme.Dark : ColorScheme.Light,
            ReducedMotion = ReducedMotion.Reduce,
            ViewportSize = new ViewportSize { Width = width, Height = height },
            HasTouch = touch,
            Locale = "en-GB",
            TimezoneId = "America/Lima",
        });
        context.SetDefaultTimeout(20_000);
        return new OpenPage(context, await context.NewPageAsync());
    }

    public async ValueTask DisposeAsync()
    {
        if (_browser is not null) await _browser.DisposeAsync();
        _playwright?.Dispose();
        _gate.Dispose();
    }

    private async Task<IBrowser> StartedAsync()
    {
        await _gate.WaitAsync(TestContext.Current.CancellationToken);
        try
        {
            _playwright ??= await Playwright.CreateAsync();
            return _browser ??= await _playwright.Chromium.LaunchAsync(new BrowserTypeLaunchOptions
            {
                ExecutablePath = Prerequisites.ChromiumPath,
                Args = ["--no-sandbox", "--disable-dev-shm-usage", "--disable-gpu"],
            });
        }
        finally
        {
            _gate.Release();
        }
    }
}
