using System.Globalization;
using System.Text.Json.Nodes;
using ArrayWatch.EndToEnd.Tests.Servers;
using ArrayWatch.Messaging;

namespace ArrayWatch.EndToEnd.Tests.Messaging;

/// <summary>What goes out through a real Mosquitto.</summary>
public sealed class PublisherTests : IAsyncLifetime
{
    private readonly MosquittoBroker _broker = new();

    public ValueTask InitializeAsync() => _broker.InitializeAsync();

    public ValueTask DisposeAsync() => _broker.DisposeAsync();

    [Theory]
    [InlineData(MqttVersion.Mqtt5)]
    [InlineData(MqttVersion.Mqtt311)]
    public async Task Reports_go_where_the_contract_says_and_only_standings_are_retained(MqttVersion version)
    {
        await using Peer peer = await Peer.ConnectAsync(_broker.Port, "arraywatch/#");
        await using MessagingHost host = await MessagingHost.StartAsync(Options() with { Version = version }, new FakeInbox());

        await host.Sink.WriteAsync(Reports.Alert(1), CancellationToken.None);
        await host.Sink.WriteAsync(Reports.Health(5), CancellationToken.None);
        await host.Sink.WriteAsync(Reports.Corrections(), CancellationToken.None);
        await host.Sink.WriteAsync(Reports.Metrics(), CancellationToken.None);

        await Eventually.HoldsAsync(() => peer.Messages.Count >= 4);
        Assert.Equal(
            ["arraywatch/aft/alerts", "arraywatch/aft/corrections", "arraywatch/aft/health", "arraywatch/service/status"],
            peer.Messages.Select(static m => m.Topic).Order());
        Assert.All(peer.Messages, static m => Assert.Equal(1, m.QualityOfService));
        JsonNode alert = Body(peer, "arraywatch/aft/alerts");
        Assert.Equal("returned-unacknowledged", alert["state"]!.GetValue<string>());
        Assert.Equal(-61.5, alert["estimate"]!["levelDecibels"]!.GetValue<double>());
        Assert.Equal("faulty", Body(peer, "arraywatch/aft/health")["channels"]![0]!["standing"]!.GetValue<string>());
        Assert.Null(Body(peer, "arraywatch/aft/corrections")["channels"]![0]!["standardError"]![0]);

        await using Peer late = await Peer.ConnectAsync(_broker.Port, "arraywatch/#");
        await Eventually.HoldsAsync(() => late.Messages.Count >= 3);
        Assert.Equal(
            ["arraywatch/aft/corrections", "arraywatch/aft/health", "arraywatch/service/status"],
            late.Messages.Select(static m => m.Topic).Order());
        Assert.All(late.Messages, static m => Assert.True(m.Retained));
    }

    [Fact]
    public async Task The_status_says_online_and_after_a_clean_stop_offline()
    {
        await using Peer peer = await Peer.ConnectAsync(_broker.Port, "arraywatch/service/status");
        await using (MessagingHost host = await MessagingHost.StartAsync(Options(), new FakeInbox(), new FakeInbox("port")))
        {
            await Eventually.HoldsAsync(() => States(peer).Contains("online"));
            Assert.Equal(["aft", "port"], Body(peer, "arraywatch/service/status")["arrays"]!.AsArray().Select(static a => a!.GetValue<string>()));
        }

        await Eventually.HoldsAsync(() => peer.Messages.Count >= 2);
        Assert.Equal(["online", "offline"], States(peer));
        // A goodbye of its own has the time; the will has none.
        Assert.Contains("\"time\"", peer.Messages.Last().Body, StringComparison.Ordinal);
        await using Peer late = await Peer.ConnectAsync(_broker.Port, "arraywatch/service/status");
        await Eventually.HoldsAsync(() => States(late).SequenceEqual(["offline"]));
    }

    [Fact]
    public async Task The_will_says_offline_when_the_connection_breaks_and_the_return_says_online()
    {
        await using Peer peer = await Peer.ConnectAsync(_broker.Port, "arraywatch/service/status");
        await using TcpRelay relay = new(_broker.Port);
        await using MessagingHost host = await MessagingHost.StartAsync(Options() with { Port = relay.Port }, new FakeInbox());
        await Eventually.HoldsAsync(() => States(peer).SequenceEqual(["online"]));

        relay.Cut();
        await Eventually.HoldsAsync(() => States(peer).SequenceEqual(["online", "offline"]));
        Assert.Equal("{\"state\":\"offline\"}", peer.Messages.Last().Body);

        relay.Mend();
        await Eventually.HoldsAsync(() => States(peer).SequenceEqual(["online", "offline", "online"]));
    }

    [Fact]
    public async Task While_the_broker_is_away_alerts_wait_in_order_and_of_health_the_newest()
    {
        await using TcpRelay relay = new(_broker.Port);
        relay.Cut();
        await using MessagingHost host = await MessagingHost.StartAsync(Options() with { Port = relay.Port }, new FakeInbox());
        await using Peer peer = await Peer.ConnectAsync(_broker.Port, "arraywatch/aft/#");
        for (int i = 0; i < 300; i++)
        {
            await host.Sink.WriteAsync(Reports.Health(i), CancellationToken.None);
            await host.Sink.WriteAsync(Reports.Alert(i), CancellationToken.None);
        }

        relay.Mend();

        await Eventually.HoldsAsync(() => peer.Messages.Count >= 301);
        Heard[] heard = [.. peer.Messages];
        Assert.Equal(301, heard.Length);
        Assert.Equal(
            Enumerable.Range(0, 300).Select(static i => i.ToString(CultureInfo.InvariantCulture)),
            heard.Where(static m => m.Topic.EndsWith("alerts", StringComparison.Ordinal)).Select(static m => JsonNode.Parse(m.Body)!["id"]!.GetValue<string>()));
        Assert.Equal(299, Body(peer, "arraywatch/aft/health")["frames"]!.GetValue<long>());
    }

    [Fact]
    public async Task Alerts_go_out_while_an_inbox_is_stuck()
    {
        FakeInbox inbox = new();
        await using Peer peer = await Peer.ConnectAsync(_broker.Port, "arraywatch/aft/alerts");
        await using MessagingHost host = await MessagingHost.StartAsync(Options(), inbox);
        inbox.Hold();
        await Eventually.HoldsAsync(() =>
        {
            if (inbox.Entered > 0) return true;
            _ = peer.PublishFrameAsync(1);
            return false;
        });

        await host.Sink.WriteAsync(Reports.Alert(1), CancellationToken.None);

        await Eventually.HoldsAsync(() => !peer.Messages.IsEmpty);
        inbox.LetGo();
    }

    [Fact]
    public async Task A_password_file_is_read_and_a_wrong_one_is_mended_without_a_restart()
    {
        string directory = Directory.CreateTempSubdirectory("arraywatch-password-").FullName;
        try
        {
            string hashes = Path.Combine(directory, "hashes"), secret = Path.Combine(directory, "secret");
            // "correct", hashed as Mosquitto's own tool does (PBKDF2 with SHA-512, 101 rounds).
            byte[] salt = "twelve bytes"u8.ToArray();
            byte[] hash = System.Security.Cryptography.Rfc2898DeriveBytes.Pbkdf2("correct", salt, 101, System.Security.Cryptography.HashAlgorithmName.SHA512, 64);
            await File.WriteAllTextAsync(hashes, $"watch:$7$101${Convert.ToBase64String(salt)}${Convert.ToBase64String(hash)}\n", TestContext.Current.CancellationToken);
            await File.WriteAllTextAsync(secret, "wrong\n", TestContext.Current.CancellationToken);
            await using MosquittoBroker broker = MosquittoBroker.With("allow_anonymous true", $"password_file {hashes}");
            await broker.InitializeAsync();
            await using Peer peer = await Peer.ConnectAsync(broker.Port, "arraywatch/service/status");
            await using MessagingHost host = await MessagingHost.StartAsync(
                new MqttOptions { Port = broker.Port, UserName = "watch", PasswordFile = secret }, new FakeInbox());

            await File.WriteAllTextAsync(secret, "correct\n", TestContext.Current.CancellationToken);

            await Eventually.HoldsAsync(() => States(peer).Contains("online"));
        }
        finally
        {
            Directory.Delete(directory, recursive: true);
        }
    }

    [Fact]
    public async Task A_password_file_that_is_missing_stops_the_start()
    {
        MqttOptions options = Options() with { UserName = "watch", PasswordFile = "/nonexistent/password" };
        MessagingStartException exception = await Assert.ThrowsAsync<MessagingStartException>(() => MessagingHost.StartAsync(options, new FakeInbox()));
        Assert.Contains("/nonexistent/password", exception.Message, StringComparison.Ordinal);
    }

    private static string[] States(Peer peer) => [.. peer.Messages.Select(static m => JsonNode.Parse(m.Body)!["state"]!.GetValue<string>())];

    private static JsonNode Body(Peer peer, string topic) => JsonNode.Parse(peer.Messages.Last(m => m.Topic == topic).Body)!;

    private MqttOptions Options() => new() { Port = _broker.Port };
}
