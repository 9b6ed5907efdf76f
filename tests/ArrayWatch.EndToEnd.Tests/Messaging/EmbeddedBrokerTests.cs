using System.Net;
using System.Net.Sockets;
using ArrayWatch.EndToEnd.Tests.Servers;
using ArrayWatch.Messaging;
using MQTTnet.Formatter;
using MQTTnet.Protocol;
using MQTTnet.Server;

namespace ArrayWatch.EndToEnd.Tests.Messaging;

/// <summary>The broker in the process, and brokers of other ages.</summary>
public sealed class EmbeddedBrokerTests
{
    private readonly FakeInbox _inbox = new();

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    public async Task Frames_arrive_through_it(int qualityOfService)
    {
        MqttOptions options = new() { Embedded = true, Port = MosquittoBroker.FreePort() };
        await using MessagingHost host = await MessagingHost.StartAsync(options, _inbox);
        await using Peer peer = await ListeningPeerAsync(options.Port);

        await peer.PublishFramesAsync(1, 1000, qualityOfService);

        await Eventually.HoldsAsync(() => _inbox.Sequences.Count >= 1000);
        Assert.Equal(Enumerable.Range(1, 1000).Select(static i => (ulong)i), _inbox.Sequences);
    }

    [Fact]
    public async Task A_slow_inbox_loses_nothing_through_it()
    {
        MqttOptions options = new() { Embedded = true, Port = MosquittoBroker.FreePort() };
        await using MessagingHost host = await MessagingHost.StartAsync(options, _inbox);
        await using Peer peer = await ListeningPeerAsync(options.Port);
        _inbox.Hold();

        await peer.PublishFramesAsync(1, 3000);
        _inbox.LetGo();

        await Eventually.HoldsAsync(() => _inbox.Sequences.Count >= 3000);
        Assert.Equal(Enumerable.Range(1, 3000).Select(static i => (ulong)i), _inbox.Sequences);
    }

    [Fact]
    public async Task It_keeps_retained_messages()
    {
        MqttOptions options = new() { Embedded = true, Port = MosquittoBroker.FreePort() };
        await using MessagingHost host = await MessagingHost.StartAsync(options, _inbox);
        await host.Sink.WriteAsync(Reports.Health(3), CancellationToken.None);

        await using Peer peer = await Peer.ConnectAsync(options.Port, "arraywatch/aft/health", "arraywatch/service/status");
        await Eventually.HoldsAsync(() => peer.Messages.Count >= 2);
    }

    [Fact]
    public async Task It_listens_only_on_this_machine_unless_asked()
    {
        MqttOptions options = new() { Embedded = true, Port = MosquittoBroker.FreePort() };
        await using MessagingHost host = await MessagingHost.StartAsync(options, _inbox);

        using Socket other = new(SocketType.Stream, ProtocolType.Tcp);
        SocketException refused = await Assert.ThrowsAsync<SocketException>(() => other.ConnectAsync(new IPEndPoint(IPAddress.Parse("127.0.0.2"), options.Port), TestContext.Current.CancellationToken).AsTask());
        Assert.Equal(SocketError.ConnectionRefused, refused.SocketErrorCode);
    }

    [Fact]
    public async Task A_port_that_is_taken_stops_the_start_with_one_line()
    {
        using TcpListener taken = new(IPAddress.Loopback, 0);
        taken.Start();
        int port = ((IPEndPoint)taken.LocalEndpoint).Port;

        MessagingStartException exception = await Assert.ThrowsAsync<MessagingStartException>(
            () => MessagingHost.StartAsync(new MqttOptions { Embedded = true, Port = port }, _inbox));

        Assert.Contains($"Port {port}", exception.Message, StringComparison.Ordinal);
        Assert.DoesNotContain('\n', exception.Message);
    }

    [Fact]
    public async Task A_broker_that_refuses_MQTT_5_is_spoken_to_in_3_1_1()
    {
        int port = MosquittoBroker.FreePort();
        using MqttServer old = new MqttServerFactory().CreateMqttServer(new MqttServerOptionsBuilder().WithDefaultEndpoint().WithDefaultEndpointPort(port).Build());
        old.ValidatingConnectionAsync += e =>
        {
            bool isService = e.ClientId.StartsWith("arraywatch", StringComparison.Ordinal);
            if (isService && e.ProtocolVersion == MqttProtocolVersion.V500) e.ReasonCode = MqttConnectReasonCode.UnsupportedProtocolVersion;
            return Task.CompletedTask;
        };
        await old.StartAsync();
        await using MessagingHost host = await MessagingHost.StartAsync(new MqttOptions { Port = port }, _inbox);
        await using Peer peer = await ListeningPeerAsync(port, "arraywatch/service/status");

        await peer.PublishFrameAsync(1);

        await Eventually.HoldsAsync(() => _inbox.Sequences.Count == 1);
        await Eventually.HoldsAsync(() => !peer.Messages.IsEmpty);
    }

    /// <summary>A peer, once the service listens.</summary>
    private async Task<Peer> ListeningPeerAsync(int port, params string[] topics)
    {
        Peer peer = await Peer.ConnectAsync(port, topics);
        await Eventually.HoldsAsync(() =>
        {
            if (!_inbox.Readings.IsEmpty) return true;
            _ = peer.PublishAsync("arraywatch/aft/environment", "{}"u8.ToArray(), qualityOfService: 0);
            return false;
        });
        return peer;
    }
}
