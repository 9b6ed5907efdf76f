using System.Text;
using ArrayWatch.EndToEnd.Tests.Servers;
using ArrayWatch.Messaging;
using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.EndToEnd.Tests.Messaging;

/// <summary>What comes in through a real Mosquitto.</summary>
public sealed class SubscriberTests : IAsyncLifetime
{
    private readonly MosquittoBroker _broker = new();
    private readonly FakeInbox _inbox = new();
    private Peer _peer = null!;

    public async ValueTask InitializeAsync()
    {
        await _broker.InitializeAsync();
        _peer = await Peer.ConnectAsync(_broker.Port, "arraywatch/service/status");
    }

    public async ValueTask DisposeAsync()
    {
        _inbox.LetGo();
        await _peer.DisposeAsync();
        await _broker.DisposeAsync();
    }

    [Theory]
    [InlineData(MqttVersion.Automatic, 0)]
    [InlineData(MqttVersion.Automatic, 1)]
    [InlineData(MqttVersion.Mqtt311, 0)]
    [InlineData(MqttVersion.Mqtt311, 1)]
    public async Task Frames_arrive_in_order_by_each_version_and_quality_of_service(MqttVersion version, int qualityOfService)
    {
        await using MessagingHost host = await StartAsync(Options() with { Version = version });

        await _peer.PublishFramesAsync(1, 200, qualityOfService);

        await Eventually.HoldsAsync(() => _inbox.Sequences.Count >= 200);
        Assert.Equal(Numbers(1, 200), _inbox.Sequences);
        Assert.False(_inbox.Overlapped);
    }

    [Fact]
    public async Task A_message_is_acknowledged_only_after_it_was_folded_in()
    {
        await using TcpRelay relay = new(_broker.Port);
        await using MessagingHost host = await StartAsync(Options(relay.Port));
        int before = relay.Acknowledgements;
        _inbox.Hold();

        await _peer.PublishFrameAsync(1);
        await Eventually.HoldsAsync(() => _inbox.Entered == 1);
        Assert.Equal(before, relay.Acknowledgements);

        _inbox.LetGo();
        await Eventually.HoldsAsync(() => relay.Acknowledgements > before);
        Assert.Equal([1UL], _inbox.Sequences);
    }

    [Fact]
    public async Task What_was_not_acknowledged_when_the_connection_broke_comes_again()
    {
        await using TcpRelay relay = new(_broker.Port);
        await using MessagingHost host = await StartAsync(Options(relay.Port));
        _inbox.Hold();
        await _peer.PublishFramesAsync(1, 3);
        await Eventually.HoldsAsync(() => _inbox.Entered == 1);

        relay.Cut();
        _inbox.LetGo();
        relay.Mend();

        await Eventually.HoldsAsync(() => _inbox.Sequences.Contains(3UL));
        // Frame 1 was folded in, but its acknowledgement could not be sent.
        Assert.Equal([1UL, 2UL, 3UL], _inbox.Sequences.SkipWhile((s, i) => i == 0).SkipWhile(static s => s != 1).Take(3));
        Assert.Equal(1UL, _inbox.Sequences.First());
    }

    [Fact]
    public async Task What_came_while_the_service_was_away_is_delivered_when_it_is_back()
    {
        await using (MessagingHost first = await StartAsync(Options()))
        {
            await _peer.PublishFramesAsync(1, 5);
            await Eventually.HoldsAsync(() => _inbox.Sequences.Count == 5);
        }
        await _peer.PublishFramesAsync(6, 100);

        await using MessagingHost second = await StartAsync(Options());

        await Eventually.HoldsAsync(() => _inbox.Sequences.Count >= 105);
        Assert.Equal(Numbers(1, 105), _inbox.Sequences);
    }

    [Fact]
    public async Task A_restart_of_the_broker_is_survived_with_what_it_held()
    {
        await using MessagingHost host = await StartAsync(Options());
        await _peer.PublishFramesAsync(1, 3);
        await Eventually.HoldsAsync(() => _inbox.Sequences.Count == 3);

        _inbox.Hold();
        await _peer.PublishFramesAsync(4, 50);
        await Eventually.HoldsAsync(() => _inbox.Entered == 4);
        await _broker.StopAsync();
        await _broker.StartAsync();
        _inbox.LetGo();

        await using Peer later = await Peer.ConnectAsync(_broker.Port);
        await later.PublishFramesAsync(54, 10);
        await Eventually.HoldsAsync(() => _inbox.Sequences.Contains(63UL));
        Assert.Equal(Numbers(1, 63), _inbox.Sequences.Distinct());
        Assert.Equal(Numbers(1, 63), _inbox.Sequences.Distinct().Order());
    }

    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    public async Task A_slow_inbox_holds_the_broker_back_and_nothing_is_lost(int qualityOfService)
    {
        await using MessagingHost host = await StartAsync(Options());
        _inbox.Hold();
        await _peer.PublishFramesAsync(1, 5000, qualityOfService);
        await Eventually.HoldsAsync(() => _inbox.Entered == 1);
        Assert.Empty(_inbox.Sequences);
        _inbox.LetGo();

        await Eventually.HoldsAsync(() => _inbox.Sequences.Count >= 5000);
        Assert.Equal(Numbers(1, 5000), _inbox.Sequences);
    }

    [Fact]
    public async Task One_slow_array_does_not_hold_up_another()
    {
        FakeInbox other = new("port");
        await using MessagingHost host = await StartAsync(Options(), other);
        _inbox.Hold();
        await _peer.PublishFramesAsync(1, 200);
        for (ulong i = 1; i <= 200; i++) await _peer.PublishFrameAsync(i, array: "port");

        await Eventually.HoldsAsync(() => other.Sequences.Count == 200);
        Assert.Empty(_inbox.Sequences);
        _inbox.LetGo();
        await Eventually.HoldsAsync(() => _inbox.Sequences.Count == 200);
    }

    [Fact]
    public async Task Bad_messages_are_refused_and_acknowledged_and_the_stream_goes_on()
    {
        await using TcpRelay relay = new(_broker.Port);
        await using MessagingHost host = await StartAsync(Options(relay.Port) with { MaxMessageBytes = 100_000 });
        int before = relay.Acknowledgements;
        _inbox.OnFrame = static s => { if (s == 2) throw new InvalidOperationException("The pipeline stumbles."); };

        await _peer.PublishAsync("arraywatch/aft/snapshots", [1, 2, 3]);
        await _peer.PublishAsync("arraywatch/aft/snapshots", Peer.Frame(1), contentType: "application/json");
        await _peer.PublishAsync("arraywatch/aft/snapshots", new byte[100_001]);
        await _peer.PublishAsync("arraywatch/aft/snapshots", new byte[5_000_000]);
        await _peer.PublishAsync("arraywatch/aft/samples", [0xA0]);
        await _peer.PublishAsync("arraywatch/aft/environment", "{\"soundSpeed\":-1}"u8.ToArray());
        await _peer.PublishFrameAsync(2);
        await _peer.PublishAsync("arraywatch/aft/snapshots", Peer.Frame(3), contentType: "application/cbor");

        await Eventually.HoldsAsync(() => _inbox.Sequences.Contains(3UL));
        Assert.Equal(
            [RefusalReason.NotDecodable, RefusalReason.NotDecodable, RefusalReason.TooLarge, RefusalReason.TooLarge, RefusalReason.NotSupported, RefusalReason.NotDecodable],
            _inbox.Refusals.Select(static r => r.Reason));
        await Eventually.HoldsAsync(() => relay.Acknowledgements == before + 8);
    }

    [Theory]
    [InlineData(MqttVersion.Mqtt5)]
    [InlineData(MqttVersion.Mqtt311)]
    public async Task Retained_snapshots_are_left_out_and_the_retained_environment_is_taken(MqttVersion version)
    {
        await _peer.PublishFrameAsync(7, retain: true);
        await _peer.PublishAsync("arraywatch/aft/environment", Encoding.UTF8.GetBytes("{\"temperature\":12}"), retain: true);

        await using MessagingHost host = await StartAsync(Options() with { Version = version });
        await Eventually.HoldsAsync(() => !_inbox.Readings.IsEmpty);
        await _peer.PublishFrameAsync(8);

        await Eventually.HoldsAsync(() => _inbox.Sequences.Contains(8UL));
        Assert.Equal([8UL], _inbox.Sequences);
        Assert.Equal(12, _inbox.Readings.First().Temperature);
    }

    [Fact]
    public async Task A_broker_that_falls_silent_is_left_and_found_again()
    {
        await using TcpRelay relay = new(_broker.Port);
        await using MessagingHost host = await StartAsync(Options(relay.Port) with { KeepAlive = TimeSpan.FromSeconds(1) });
        await _peer.PublishFrameAsync(1);
        await Eventually.HoldsAsync(() => _inbox.Sequences.Count == 1);

        relay.Silence();
        await _peer.PublishFrameAsync(2);
        relay.Speak();
        await _peer.PublishFrameAsync(3);

        await Eventually.HoldsAsync(() => _inbox.Sequences.Contains(3UL) && _inbox.Sequences.Contains(2UL));
    }

    private static IEnumerable<ulong> Numbers(int first, int last) => Enumerable.Range(first, last - first + 1).Select(static i => (ulong)i);

    private MqttOptions Options(int? port = null) => new() { Port = port ?? _broker.Port };

    /// <summary>Starts it and waits until it listens.</summary>
    private async Task<MessagingHost> StartAsync(MqttOptions options, params FakeInbox[] others)
    {
        FakeInbox[] inboxes = [_inbox, .. others];
        MessagingHost host = await MessagingHost.StartAsync(options, inboxes);
        foreach (FakeInbox inbox in inboxes)
        {
            // A reading that arrives shows that the subscription stands; it is sent until it does.
            int had = inbox.Readings.Count;
            await Eventually.HoldsAsync(() =>
            {
                if (inbox.Readings.Count > had) return true;
                _ = _peer.PublishAsync($"arraywatch/{inbox.Id}/environment", "{}"u8.ToArray(), qualityOfService: 0);
                return false;
            });
        }
        return host;
    }
}
