using ArrayWatch.EndToEnd.Tests.Servers;
using ArrayWatch.Tests.Web.Sample;
using Microsoft.Playwright;
using static Microsoft.Playwright.Assertions;

namespace ArrayWatch.EndToEnd.Tests.Pages;

public sealed class PagesInBrowserTests(Chromium chromium) : IClassFixture<Chromium>
{
    private static readonly LocatorAssertionsToContainTextOptions _patient = new() { Timeout = 30_000 };

    [Theory]
    [InlineData("/", "aft: 2 channels faulty: H12 and H18", "article.card")]
    [InlineData("/arrays/aft", "2 channels faulty: H12 and H18 carry each other's data", "figure.geometry svg")]
    [InlineData("/arrays/meadow", "All 16 channels trusted", "table.channels")]
    [InlineData("/arrays/dome", "Data stopped", ".stale")]
    [InlineData("/arrays/spare", "No data yet", "figure.geometry svg")]
    [InlineData("/arrays/aft/coherence", "2 channels faulty", ".chart .js-plotly-plot .heatmaplayer image")]
    [InlineData("/arrays/field/coherence", "All 256 channels trusted", ".chart .js-plotly-plot .heatmaplayer image")]
    [InlineData("/arrays/aft/trends", "2 channels faulty", ".chart .js-plotly-plot .scatterlayer path")]
    [InlineData("/arrays/aft/corrections", "2 channels faulty", "table.beams")]
    [InlineData("/alerts", "2 alerts wait for acknowledgement", "article.alert")]
    [InlineData("/alerts/01JSWAP0000000000000000001", "H12 and H18 carry each other's data", "article.alert")]
    [InlineData("/help", "What the words and marks mean", "dl.terms")]
    [InlineData("/arrays/nowhere", "There is no array", "h1")]
    public async Task Each_page_draws_its_first_fact_without_complaint_and_without_leaving_the_host(string path, string fact, string part)
    {
        await using PagesHost host = await PagesHost.StartAsync();
        await using WatchedPage watched = await WatchedPage.OpenAsync(chromium.Browser, host.Address);

        await watched.GoAsync(host.Address + path);

        await Expect(watched.Page.Locator("h1").First).ToContainTextAsync(fact, _patient);
        await Expect(watched.Page.Locator(part).First).ToBeVisibleAsync(new() { Timeout = 60_000 });
        Assert.Empty(watched.Complaints);
        Assert.Empty(watched.Foreign);
    }

    [Fact]
    public async Task An_alert_appears_live_and_can_be_acknowledged_on_the_page()
    {
        await using PagesHost host = await PagesHost.StartAsync();
        await using WatchedPage watched = await WatchedPage.OpenAsync(chromium.Browser, host.Address);
        await watched.GoAsync(host.Address + "/alerts?array=meadow");
        await Expect(watched.Page.Locator(".empty")).ToContainTextAsync("No alert matches", _patient);

        host.Fleet.Raise(SampleArrays.Phase(TimeProvider.System.GetUtcNow()));

        ILocator card = watched.Page.Locator("article.alert");
        await Expect(card).ToContainTextAsync("M07: phase off by +47°", _patient);
        await card.GetByRole(AriaRole.Button, new() { Name = "Acknowledge…" }).ClickAsync();
        await card.GetByLabel("Who").FillAsync("Second mate");
        await card.GetByLabel("Why").FillAsync("seen");
        await card.GetByRole(AriaRole.Button, new() { Name = "Acknowledge", Exact = true }).ClickAsync();
        await Expect(card).ToContainTextAsync("standing, acknowledged by Second mate", _patient);
        Assert.Empty(watched.Complaints);
    }

    [Fact]
    public async Task A_page_that_loses_its_server_says_so_and_comes_back_by_itself()
    {
        PagesHost host = await PagesHost.StartAsync();
        int port = new Uri(host.Address).Port;
        await using WatchedPage watched = await WatchedPage.OpenAsync(chromium.Browser, host.Address);
        await watched.GoAsync(host.Address + "/");

        await host.DisposeAsync();
        await Expect(watched.Page.Locator("#page-lost")).ToContainTextAsync("no longer updated", new() { Timeout = 60_000 });
        await Expect(watched.Page.Locator("#page-lost")).ToBeVisibleAsync(new() { Timeout = 60_000 });

        await using PagesHost again = await PagesHost.StartAsync(port);
        await Expect(watched.Page.Locator("#page-lost")).ToBeHiddenAsync(new() { Timeout = 90_000 });
        await Expect(watched.Page.Locator("h1")).ToContainTextAsync("aft: 2 channels faulty", _patient);
    }
}
