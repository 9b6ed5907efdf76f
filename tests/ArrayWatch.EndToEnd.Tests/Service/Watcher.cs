using System.Collections.Concurrent;
using System.Text.Json.Nodes;
using ArrayWatch.EndToEnd.Tests.Messaging;
using MQTTnet;
using MQTTnet.Protocol;

namespace ArrayWatch.EndToEnd.Tests.Service;

/// <summary>A client that keeps everything the service says, and can send to it.</summary>
internal sealed class Watcher : IAsyncDisposable
{
    private readonly IMqttClient _client = new MqttClientFactory().CreateMqttClient();

    /// <summary>Topic and body of each message, in the order of arrival.</summary>
    public ConcurrentQueue<(string Topic, JsonNode Body)> Messages { get; } = new();

    /// <summary>Bodies of one topic.</summary>
    public IEnumerable<JsonNode> Of(string topic) => Messages.Where(m => m.Topic == topic).Select(static m => m.Body);

    /// <summary>State of the last status message.</summary>
    public string? Status => Of("arraywatch/service/status").LastOrDefault()?["state"]?.GetValue<string>();

    public static async Task<Watcher> ConnectAsync(int port)
    {
        Watcher watcher = new();
        watcher._client.ApplicationMessageReceivedAsync += e =>
        {
            if (!e.ApplicationMessage.Topic.EndsWith("/snapshots", StringComparison.Ordinal))
                watcher.Messages.Enqueue((e.ApplicationMessage.Topic, JsonNode.Parse(e.ApplicationMessage.ConvertPayloadToString())!));
            return Task.CompletedTask;
        };
        await watcher._client.ConnectAsync(new MqttClientOptionsBuilder().WithTcpServer("127.0.0.1", port).WithClientId($"watcher-{Guid.NewGuid():N}").Build());
        foreach (string topic in (string[])["alerts", "health", "corrections", "status"])
            await watcher._client.SubscribeAsync($"arraywatch/+/{topic}", MqttQualityOfServiceLevel.AtLeastOnce);
        return watcher;
    }

    public Task PublishAsync(string topic, byte[] body) => _client.PublishAsync(
        new MqttApplicationMessageBuilder().WithTopic(topic).WithPayload(body).WithQualityOfServiceLevel(MqttQualityOfServiceLevel.AtLeastOnce).Build());

    public Task StatusIsAsync(string state) => Eventually.HoldsAsync(() => Status == state);

    /// <inheritdoc/>
    public ValueTask DisposeAsync()
    {
        _client.Dispose();
        return ValueTask.CompletedTask;
    }
}
