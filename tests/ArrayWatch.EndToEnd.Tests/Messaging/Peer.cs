using System.Buffers;
using System.Collections.Concurrent;
using System.Formats.Cbor;
using System.Text;
using MQTTnet;
using MQTTnet.Formatter;
using MQTTnet.Protocol;

namespace ArrayWatch.EndToEnd.Tests.Messaging;

/// <summary>Another program on the broker: it publishes frames and listens to what the service says.</summary>
internal sealed class Peer : IAsyncDisposable
{
    private readonly IMqttClient _client = new MqttClientFactory().CreateMqttClient();

    public ConcurrentQueue<Heard> Messages { get; } = new();

    public static async Task<Peer> ConnectAsync(int port, params string[] topics)
    {
        Peer peer = new();
        peer._client.ApplicationMessageReceivedAsync += e =>
        {
            MqttApplicationMessage m = e.ApplicationMessage;
            peer.Messages.Enqueue(new Heard(m.Topic, Encoding.UTF8.GetString(m.Payload.ToArray()), m.Retain, (int)m.QualityOfServiceLevel, m.ContentType));
            return Task.CompletedTask;
        };
        MqttClientOptions options = new MqttClientOptionsBuilder()
            .WithTcpServer("127.0.0.1", port).WithProtocolVersion(MqttProtocolVersion.V500).WithClientId($"peer-{Guid.NewGuid():N}").Build();
        await peer._client.ConnectAsync(options);
        foreach (string topic in topics)
            await peer._client.SubscribeAsync(topic, MqttQualityOfServiceLevel.AtLeastOnce);
        return peer;
    }

    /// <summary>A message of one snapshot, one bin, two channels.</summary>
    public static byte[] Frame(ulong sequence)
    {
        CborWriter w = new();
        w.WriteStartMap(6);
        w.WriteTextString("time");
        w.WriteDouble(1_777_608_750 + sequence * 0.125);
        w.WriteTextString("sequence");
        w.WriteUInt64(sequence);
        w.WriteTextString("interval");
        w.WriteDouble(0.125);
        w.WriteTextString("frequencies");
        w.WriteStartArray(1);
        w.WriteInt32(100);
        w.WriteEndArray();
        w.WriteTextString("shape");
        w.WriteStartArray(3);
        w.WriteInt32(1);
        w.WriteInt32(1);
        w.WriteInt32(2);
        w.WriteEndArray();
        w.WriteTextString("data");
        w.WriteTag((CborTag)85);
        w.WriteByteString(new byte[16]);
        w.WriteEndMap();
        return w.Encode();
    }

    public Task PublishFrameAsync(ulong sequence, int qualityOfService = 1, string array = "aft", bool retain = false) =>
        PublishAsync($"arraywatch/{array}/snapshots", Frame(sequence), qualityOfService, retain);

    public async Task PublishFramesAsync(ulong first, int count, int qualityOfService = 1)
    {
        for (int i = 0; i < count; i++) await PublishFrameAsync(first + (ulong)i, qualityOfService);
    }

    public Task PublishAsync(string topic, byte[] body, int qualityOfService = 1, bool retain = false, string? contentType = null) =>
        _client.PublishAsync(new MqttApplicationMessageBuilder().WithTopic(topic).WithPayload(body).WithRetainFlag(retain)
            .WithContentType(contentType).WithQualityOfServiceLevel((MqttQualityOfServiceLevel)qualityOfService).Build());

    public async ValueTask DisposeAsync()
    {
        if (_client.IsConnected) await _client.DisconnectAsync();
        _client.Dispose();
    }
}

/// <summary>A message that a peer got.</summary>
internal sealed record Heard(string Topic, string Body, bool Retained, int QualityOfService, string? ContentType);
