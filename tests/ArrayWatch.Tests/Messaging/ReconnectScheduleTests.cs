using ArrayWatch.Messaging;
using ArrayWatch.Messaging.Connection;
using MQTTnet.Formatter;

namespace ArrayWatch.Tests.Messaging;

public sealed class ReconnectScheduleTests
{
    [Fact]
    public void Pauses_double_up_to_the_longest_and_each_is_at_least_half()
    {
        ReconnectSchedule schedule = new(new Random(1));
        TimeSpan nominal = ReconnectSchedule.First;
        for (int i = 0; i < 20; i++)
        {
            TimeSpan pause = schedule.Next();
            Assert.InRange(pause, nominal / 2, nominal);
            nominal = nominal * 2 < ReconnectSchedule.Longest ? nominal * 2 : ReconnectSchedule.Longest;
        }
        Assert.Equal(ReconnectSchedule.Longest, nominal);
        schedule.Reset();
        Assert.InRange(schedule.Next(), ReconnectSchedule.First / 2, ReconnectSchedule.First);
    }

    [Fact]
    public void Automatic_tries_5_then_3_1_1_then_5_again_until_one_is_accepted()
    {
        VersionChoice choice = new(MqttVersion.Automatic);
        Assert.Equal(MqttProtocolVersion.V500, choice.Current);
        Assert.True(choice.Refuse());
        Assert.Equal(MqttProtocolVersion.V311, choice.Current);
        Assert.False(choice.Refuse());
        Assert.Equal(MqttProtocolVersion.V500, choice.Current);
        choice.Accept();
        Assert.False(choice.Refuse());
        Assert.Equal(MqttProtocolVersion.V500, choice.Current);
    }

    [Fact]
    public void A_broker_that_took_3_1_1_is_asked_for_5_first_at_the_next_connection()
    {
        VersionChoice choice = new(MqttVersion.Automatic);
        Assert.True(choice.Refuse());
        choice.Accept();
        Assert.Equal(MqttProtocolVersion.V500, choice.Current);
        Assert.True(choice.Refuse());
        Assert.Equal(MqttProtocolVersion.V311, choice.Current);
    }

    [Theory]
    [InlineData(MqttVersion.Mqtt5, MqttProtocolVersion.V500)]
    [InlineData(MqttVersion.Mqtt311, MqttProtocolVersion.V311)]
    public void A_configured_version_stays(MqttVersion configured, MqttProtocolVersion expected)
    {
        VersionChoice choice = new(configured);
        Assert.False(choice.Refuse());
        Assert.Equal(expected, choice.Current);
    }
}
