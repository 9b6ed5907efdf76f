using System.Text;
using ArrayWatch.Messaging.Connection;
using CsCheck;
using MQTTnet;
using MQTTnet.Formatter;
using MQTTnet.Packets;
using MQTTnet.Protocol;

namespace ArrayWatch.Tests.Messaging;

public sealed class PublishPacketTests
{
    [Theory]
    [InlineData(MqttProtocolVersion.V500, 0)]
    [InlineData(MqttProtocolVersion.V500, 1)]
    [InlineData(MqttProtocolVersion.V311, 0)]
    [InlineData(MqttProtocolVersion.V311, 1)]
    public void Reads_what_another_implementation_writes(MqttProtocolVersion version, int qualityOfService)
    {
        MqttPublishPacket packet = new()
        {
            Topic = "arraywatch/aft/snapshots",
            QualityOfServiceLevel = (MqttQualityOfServiceLevel)qualityOfService,
            PacketIdentifier = (ushort)(qualityOfService == 0 ? 0 : 4711),
            Retain = true,
            Payload = new System.Buffers.ReadOnlySequence<byte>([1, 2, 3]),
        };
        if (version == MqttProtocolVersion.V500)
        {
            packet.ContentType = "application/cbor";
            packet.MessageExpiryInterval = 60;
            packet.PayloadFormatIndicator = MqttPayloadFormatIndicator.CharacterData;
            packet.ResponseTopic = "r";
            packet.CorrelationData = [9, 9];
            packet.SubscriptionIdentifiers = [1, 300];
            packet.UserProperties = [new MqttUserProperty("a", Encoding.UTF8.GetBytes("b")), new MqttUserProperty("a", Encoding.UTF8.GetBytes(""))];
        }
        byte[] bytes = new MqttPacketFormatterAdapter(version, new MqttBufferWriter(4096, 65535)).Encode(packet).ToArray();

        ReceivedMessage message = PublishPacket.Read(bytes[0], bytes.AsMemory(2), bytes.Length - 2, version == MqttProtocolVersion.V500);

        Assert.Equal("arraywatch/aft/snapshots", Encoding.UTF8.GetString(message.Topic.Span));
        Assert.Equal([1, 2, 3], message.Payload.ToArray());
        Assert.Equal(3, message.PayloadBytes);
        Assert.False(message.IsTooLarge);
        Assert.True(message.Retained);
        Assert.Equal(packet.PacketIdentifier, message.PacketIdentifier);
        Assert.Equal(packet.ContentType, message.ContentType);
    }

    [Fact]
    public void Refuses_QoS_2_and_properties_that_do_not_belong_there()
    {
        Assert.Throws<MqttProtocolException>(() => PublishPacket.Read(0x34, new byte[] { 0, 1, (byte)'t', 0, 1 }, 5, hasProperties: false));
        Assert.Throws<MqttProtocolException>(() => PublishPacket.Read(0x30, new byte[] { 0, 1, (byte)'t', 2, 0x11, 0 }, 6, hasProperties: true));
    }

    [Fact]
    public void Any_bytes_are_a_message_or_a_breach_of_protocol()
    {
        // Fixed start values: the same bytes each time, so that there are no false failures.
        PCG random = new(5, 20_260_501);
        Gen<(byte, byte[], bool)> packets = Gen.Select(Gen.Byte, Gen.Byte[0, 40].Array[0, 60], Gen.Bool);
        for (int i = 0; i < 100_000; i++)
        {
            (byte flags, byte[] body, bool hasProperties) = packets.Generate(random, null, out _);
            try
            {
                ReceivedMessage message = PublishPacket.Read(flags, body, body.Length, hasProperties);
                Assert.Equal(message.Payload.Length, message.PayloadBytes);
            }
            catch (MqttProtocolException)
            {
                // Expected for most.
            }
        }
    }
}
