using Microsoft.Playwright;

namespace ArrayWatch.EndToEnd.Tests.Servers;

/// <summary>The host's own Chromium without a window. Use it as a class fixture.</summary>
public sealed class Chromium : IAsyncLifetime
{
    private static readonly string[] _places = ["/usr/bin/chromium", "/usr/bin/chromium-browser", "/usr/bin/google-chrome"];
    private IPlaywright? _playwright;

    /// <summary>The running browser.</summary>
    public IBrowser Browser { get; private set; } = null!;

    /// <inheritdoc/>
    public async ValueTask InitializeAsync()
    {
        string executable = _places.FirstOrDefault(File.Exists)
            ?? throw new InvalidOperationException("Chromium is not installed; tests/run.sh installs it (apt-get install chromium).");
        _playwright = await Playwright.CreateAsync();
        Browser = await _playwright.Chromium.LaunchAsync(new BrowserTypeLaunchOptions
        {
            ExecutablePath = executable,
            Headless = true,
            Args =
            [
                "--headless", "--no-sandbox", "--disable-gpu", "--disable-quic", "--no-first-run",
                "--disable-background-networking", "--disable-component-update", "--disable-sync",
            ],
        });
    }

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        await Browser.DisposeAsync();
        _playwright?.Dispose();
    }
}
