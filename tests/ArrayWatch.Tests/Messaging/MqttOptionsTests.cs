using ArrayWatch.Messaging;
using Microsoft.Extensions.DependencyInjection;

namespace ArrayWatch.Tests.Messaging;

public sealed class MqttOptionsTests
{
    public static TheoryData<string, MqttOptions> OutOfRange => new()
    {
        { "broker.port is '0'", new MqttOptions { Port = 0 } },
        { "broker.port is '65536'", new MqttOptions { Port = 65536 } },
        { "broker.host", new MqttOptions { Host = " " } },
        { "broker.topicPrefix", new MqttOptions { TopicPrefix = "a/#" } },
        { "broker.topicPrefix", new MqttOptions { TopicPrefix = "a/" } },
        { "broker.topicPrefix", new MqttOptions { TopicPrefix = "" } },
        { "broker.clientId", new MqttOptions { ClientId = "" } },
        { "broker.sessionExpiry", new MqttOptions { SessionExpiry = TimeSpan.FromSeconds(-1) } },
        { "broker.maxMessageBytes", new MqttOptions { MaxMessageBytes = 1023 } },
        { "broker.maxMessageBytes", new MqttOptions { MaxMessageBytes = int.MaxValue } },
        { "broker.keepAlive", new MqttOptions { KeepAlive = TimeSpan.Zero } },
        { "broker.keepAlive", new MqttOptions { KeepAlive = TimeSpan.FromSeconds(65536) } },
        { "broker.receiveMaximum", new MqttOptions { ReceiveMaximum = 0 } },
    };

    [Theory]
    [MemberData(nameof(OutOfRange))]
    public void What_is_out_of_range_is_named_with_its_value_and_range(string named, MqttOptions options)
    {
        ArgumentException exception = Assert.Throws<ArgumentException>(() => new ServiceCollection().AddMessaging(options));
        Assert.StartsWith(named, exception.Message, StringComparison.Ordinal);
        Assert.Contains("must be", exception.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void The_ends_of_the_ranges_are_taken()
    {
        new ServiceCollection().AddMessaging(new MqttOptions());
        new ServiceCollection().AddMessaging(new MqttOptions { Port = 1, MaxMessageBytes = 1024, KeepAlive = TimeSpan.FromSeconds(1), ReceiveMaximum = 1, SessionExpiry = TimeSpan.Zero });
        new ServiceCollection().AddMessaging(new MqttOptions { Port = 65535, MaxMessageBytes = 255 * 1024 * 1024, KeepAlive = TimeSpan.FromSeconds(65535), ReceiveMaximum = 65535 });
    }

    [Fact]
    public void Defaults_are_those_of_the_contract()
    {
        MqttOptions options = new();
        Assert.Equal(("127.0.0.1", 1883, "arraywatch"), (options.Host, options.Port, options.TopicPrefix));
        Assert.Equal(TimeSpan.FromHours(1), options.SessionExpiry);
        Assert.Equal(16 * 1024 * 1024, options.MaxMessageBytes);
        Assert.False(options.Embedded);
    }
}
