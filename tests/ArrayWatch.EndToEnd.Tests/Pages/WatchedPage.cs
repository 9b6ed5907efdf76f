using Microsoft.Playwright;

namespace ArrayWatch.EndToEnd.Tests.Pages;

/// <summary>A browser page that remembers every complaint and every request to another host.</summary>
internal sealed class WatchedPage : IAsyncDisposable
{
    private readonly IBrowserContext _context;

    private WatchedPage(IBrowserContext context, IPage page)
    {
        _context = context;
        Page = page;
    }

    public IPage Page { get; }

    public List<string> Complaints { get; } = [];

    public List<string> Foreign { get; } = [];

    public static async Task<WatchedPage> OpenAsync(IBrowser browser, string address, int width = 1280, int height = 800, ColorScheme scheme = ColorScheme.Light)
    {
        IBrowserContext context = await browser.NewContextAsync(new BrowserNewContextOptions
        {
            ViewportSize = new ViewportSize { Width = width, Height = height },
            ColorScheme = scheme,
        });
        context.SetDefaultTimeout(60_000);
        WatchedPage watched = new(context, await context.NewPageAsync());
        watched.Page.Console += (_, message) =>
        {
            if (message.Type is "error" or "warning") watched.Complaints.Add(message.Text);
        };
        watched.Page.PageError += (_, error) => watched.Complaints.Add(error);
        watched.Page.RequestFailed += (_, request) => watched.Complaints.Add($"failed: {request.Url} {request.Failure}");
        watched.Page.Request += (_, request) =>
        {
            if (!request.Url.StartsWith(address, StringComparison.Ordinal) && !request.Url.StartsWith("data:", StringComparison.Ordinal) && !request.Url.StartsWith("blob:", StringComparison.Ordinal))
                watched.Foreign.Add(request.Url);
        };
        return watched;
    }

    /// <summary>Goes to a page and waits until its circuit runs: only then does the clock in its header move.</summary>
    public async Task GoAsync(string url)
    {
        await Page.GotoAsync(url);
        string before = await Page.Locator("#server-clock").GetAttributeAsync("datetime") ?? "";
        await Page.WaitForFunctionAsync("before => document.getElementById('server-clock')?.dateTime !== before", before);
    }

    public async ValueTask DisposeAsync() => await _context.DisposeAsync();
}
