using System.Text.Json.Nodes;
using ArrayWatch.EndToEnd.Tests.Messaging;
using ArrayWatch.EndToEnd.Tests.Servers;

namespace ArrayWatch.EndToEnd.Tests.Service;

public sealed class AlertTests(MosquittoBroker broker) : IClassFixture<MosquittoBroker>
{
    [Fact]
    public async Task Every_kind_of_fault_becomes_an_alert_over_mqtt_and_http_and_outlives_a_restart()
    {
        using WorkFolder folder = new();
        int port = MosquittoBroker.FreePort();
        string configuration = folder.Write(FaultyArrays.Configuration(broker.Port, port));
        using HttpClient http = new() { BaseAddress = new Uri($"http://127.0.0.1:{port}") };
        await using Watcher watcher = await Watcher.ConnectAsync(broker.Port);
        await using (ServiceProcess service = ServiceProcess.Start("run", "--config", configuration))
        {
            await watcher.StatusIsAsync("online");
            await FaultyArrays.PlayAsync(watcher);
            foreach ((string kind, var fault) in FaultyArrays.All)
            {
                await Eventually.HoldsAsync(() => watcher.Of($"arraywatch/{kind}/alerts").Any(a => Is(a, kind, fault.Channels)), kind);
                await Eventually.HoldsAsync(() => watcher.Of($"arraywatch/{kind}/health").Any(), $"{kind} health");
                await Eventually.HoldsAsync(() => watcher.Of($"arraywatch/{kind}/corrections").Any(), $"{kind} corrections");
            }

            await AlertsAreThereAsync(http);
            await service.SignalAsync("TERM");
            Assert.Equal(0, await service.EndAsync());
        }

        await watcher.StatusIsAsync("offline");
        await using ServiceProcess again = ServiceProcess.Start("run", "--config", configuration);
        await watcher.StatusIsAsync("online");
        await IsServedAsync(http);
        await AlertsAreThereAsync(http);
    }

    /// <summary>The pages come last when the service starts, after it has said that it is online.</summary>
    private static Task IsServedAsync(HttpClient http) => Eventually.HoldsAsync(() =>
    {
        try
        {
            using HttpRequestMessage request = new(HttpMethod.Get, "/health/live");
            using HttpResponseMessage response = http.Send(request);
            return response.IsSuccessStatusCode;
        }
        catch (HttpRequestException)
        {
            return false;
        }
    });

    private static async Task AlertsAreThereAsync(HttpClient http)
    {
        JsonArray alerts = JsonNode.Parse(await http.GetStringAsync("/api/alerts", TestContext.Current.CancellationToken))!.AsArray();
        Assert.All(FaultyArrays.All, pair => Assert.Contains(alerts, a => a!["array"]!.GetValue<string>() == pair.Key && Is(a, pair.Key, pair.Value.Channels)));
    }

    private static bool Is(JsonNode alert, string kind, IReadOnlyList<int> channels) =>
        alert["kind"]!.GetValue<string>() == kind
        && alert["indices"]!.AsArray().Select(static i => i!.GetValue<int>()).Order().SequenceEqual(channels.Order());
}
