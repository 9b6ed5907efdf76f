using System.Diagnostics;
using System.Net;
using ArrayWatch.EndToEnd.Tests.Messaging;
using ArrayWatch.EndToEnd.Tests.Servers;

namespace ArrayWatch.EndToEnd.Tests.Service;

public sealed class LifeTests(MosquittoBroker broker) : IClassFixture<MosquittoBroker>
{
    private static readonly TimeSpan _contract = TimeSpan.FromSeconds(10);

    [Theory]
    [InlineData("TERM")]
    [InlineData("INT")]
    public async Task A_signal_ends_it_with_0_in_time_and_the_broker_says_offline(string signal)
    {
        using WorkFolder folder = new();
        await using Watcher watcher = await Watcher.ConnectAsync(broker.Port);
        await using ServiceProcess service = ServiceProcess.Start("run", "--config", folder.Write(WorkFolder.Small(broker.Port, MosquittoBroker.FreePort())));
        await watcher.StatusIsAsync("online");
        Stopwatch clock = Stopwatch.StartNew();
        await service.SignalAsync(signal);
        Assert.Equal(0, await service.EndAsync());
        Assert.True(clock.Elapsed < _contract, $"took {clock.Elapsed}");
        await watcher.StatusIsAsync("offline");
        Assert.Empty(service.Errors);
    }

    [Fact]
    public async Task Without_web_there_is_no_http_and_the_service_runs()
    {
        using WorkFolder folder = new();
        await using Watcher watcher = await Watcher.ConnectAsync(broker.Port);
        await using ServiceProcess service = ServiceProcess.Start("run", "--config", folder.Write(WorkFolder.Small(broker.Port, null)));
        await watcher.StatusIsAsync("online");
        Assert.DoesNotContain("Now listening", service.Output, StringComparison.Ordinal);
        await service.SignalAsync("TERM");
        Assert.Equal(0, await service.EndAsync());
    }

    [Fact]
    public async Task Started_from_another_folder_it_serves_pages_health_and_measurements()
    {
        using WorkFolder folder = new();
        int port = MosquittoBroker.FreePort();
        await using ServiceProcess service = ServiceProcess.Start("run", "--config", folder.Write(WorkFolder.Small(broker.Port, port)));
        using HttpClient http = new() { BaseAddress = new Uri($"http://127.0.0.1:{port}") };
        await AnswersAsync(http, "/health/ready", HttpStatusCode.OK);
        Assert.Equal(HttpStatusCode.OK, (await http.GetAsync("/health/live", TestContext.Current.CancellationToken)).StatusCode);
        Assert.Contains("aft", await http.GetStringAsync("/api/arrays", TestContext.Current.CancellationToken), StringComparison.Ordinal);
        string page = await http.GetStringAsync("/", TestContext.Current.CancellationToken);
        string style = page.Split("href=\"").Skip(1).Select(static p => p.Split('"')[0]).First(static p => p.Contains(".css", StringComparison.Ordinal));
        Assert.Equal("text/css", (await http.GetAsync(style, TestContext.Current.CancellationToken)).Content.Headers.ContentType?.MediaType);
        HttpResponseMessage measurements = await http.GetAsync("/metrics", TestContext.Current.CancellationToken);
        Assert.Equal("application/openmetrics-text", measurements.Content.Headers.ContentType?.MediaType);
        string text = await measurements.Content.ReadAsStringAsync(TestContext.Current.CancellationToken);
        Assert.Contains("arraywatch_messaging_connected", text, StringComparison.Ordinal);
        Assert.Contains("dotnet_", text, StringComparison.Ordinal);
        Assert.EndsWith("# EOF\n", text, StringComparison.Ordinal);
    }

    [Fact]
    public async Task It_is_not_ready_while_the_broker_is_away_but_lives_and_comes_back()
    {
        await using MosquittoBroker own = new();
        await own.InitializeAsync();
        await own.StopAsync();
        using WorkFolder folder = new();
        int port = MosquittoBroker.FreePort();
        await using ServiceProcess service = ServiceProcess.Start("run", "--config", folder.Write(WorkFolder.Small(own.Port, port)));
        using HttpClient http = new() { BaseAddress = new Uri($"http://127.0.0.1:{port}") };
        await AnswersAsync(http, "/health/ready", HttpStatusCode.ServiceUnavailable);
        Assert.Equal(HttpStatusCode.OK, (await http.GetAsync("/health/live", TestContext.Current.CancellationToken)).StatusCode);
        await own.StartAsync();
        await AnswersAsync(http, "/health/ready", HttpStatusCode.OK);
    }

    private static Task AnswersAsync(HttpClient http, string address, HttpStatusCode code) => Eventually.HoldsAsync(() =>
    {
        try
        {
            using HttpRequestMessage request = new(HttpMethod.Get, address);
            using HttpResponseMessage response = http.Send(request);
            return response.StatusCode == code;
        }
        catch (HttpRequestException)
        {
            return false;
        }
    });
}
