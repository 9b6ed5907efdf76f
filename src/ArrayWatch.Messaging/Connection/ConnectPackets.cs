using System.Text;
using MQTTnet.Formatter;
using MQTTnet.Packets;
using MQTTnet.Protocol;

namespace ArrayWatch.Messaging.Connection;

/// <summary>The packets around a subscription, and the fixed ones.</summary>
internal static class ConnectPackets
{
    /// <summary>Types of packets, in the upper four bits of the first byte.</summary>
    public const int ConnectAcknowledgement = 2, Publish = 3, SubscribeAcknowledgement = 9, PingResponse = 13, Disconnect = 14;

    /// <summary>PINGREQ.</summary>
    public static readonly byte[] PingRequest = [0xC0, 0];

    /// <summary>DISCONNECT, normal: the will is not sent, and the session stays as long as was agreed.</summary>
    public static readonly byte[] NormalDisconnect = [0xE0, 0];

    /// <summary>First byte and length of a PUBACK that says success.</summary>
    public static ReadOnlySpan<byte> PublishAcknowledgement => [0x40, 2];

    private const ushort SubscribeIdentifier = 1;

    public static ReadOnlyMemory<byte> Connect(MqttOptions options, string clientId, string? password, MqttProtocolVersion version) => Encode(version, new MqttConnectPacket
    {
        ClientId = clientId,
        CleanSession = false,
        SessionExpiryInterval = (uint)Math.Clamp(options.SessionExpiry.TotalSeconds, 0, uint.MaxValue),
        ReceiveMaximum = (ushort)options.ReceiveMaximum,
        KeepAlivePeriod = (ushort)Math.Clamp(options.KeepAlive.TotalSeconds, 1, ushort.MaxValue),
        Username = options.UserName,
        Password = password is null ? null : Encoding.UTF8.GetBytes(password),
    });

    public static ReadOnlyMemory<byte> Subscribe(IEnumerable<MqttTopicFilter> filters, MqttProtocolVersion version) => Encode(version, new MqttSubscribePacket
    {
        PacketIdentifier = SubscribeIdentifier,
        TopicFilters = [.. filters],
    });

    /// <summary>Whether the broker has kept the session.</summary>
    /// <exception cref="BrokerRefusedException">It refuses the connection.</exception>
    public static bool ReadConnectAcknowledgement(byte flags, ReadOnlySpan<byte> body, MqttProtocolVersion version)
    {
        if (flags >> 4 != ConnectAcknowledgement || body.Length < 2)
            throw new MqttProtocolException($"The broker answered the connection request with packet type {flags >> 4} of {body.Length} bytes.");
        byte code = body[1];
        if (code == 0) return (body[0] & 1) != 0;
        // 1 is MQTT 3.1.1's "unacceptable protocol version", which old brokers answer to MQTT 5 too.
        bool refusesVersion = code is 1 or (byte)MqttConnectReasonCode.UnsupportedProtocolVersion;
        string reason = code < 0x80 ? ReturnCode(code) : ((MqttConnectReasonCode)code).ToString();
        string advice = code is 4 or 5 or 0x86 or 0x87 ? "check broker.userName and broker.passwordFile" : "check the broker's log";
        throw new BrokerRefusedException(
            $"The broker refuses the connection ({reason}, 0x{code:X2}, {(version == MqttProtocolVersion.V500 ? "MQTT 5" : "MQTT 3.1.1")}); {advice}.",
            refusesVersion);
    }

    /// <exception cref="BrokerRefusedException">It refuses a subscription.</exception>
    public static void CheckSubscribeAcknowledgement(ReadOnlySpan<byte> body, bool hasProperties, IReadOnlyList<MqttTopicFilter> filters)
    {
        int position = 2;
        if (body.Length < position) throw new MqttProtocolException("A subscription's acknowledgement has no packet identifier.");
        if (hasProperties)
        {
            int length = PublishPacket.VariableByteInteger(body, ref position);
            position += length;
        }
        if (body.Length - position != filters.Count)
            throw new MqttProtocolException($"The broker acknowledged {body.Length - position} subscriptions of {filters.Count}.");
        for (int i = 0; i < filters.Count; i++)
        {
            if (body[position + i] >= 0x80)
                throw new BrokerRefusedException($"The broker refuses the subscription to {filters[i].Topic} (0x{body[position + i]:X2}); give this client the right to read it.", refusesVersion: false);
        }
    }

    private static string ReturnCode(byte code) => code switch
    {
        1 => "unacceptable protocol version",
        2 => "identifier rejected",
        3 => "server unavailable",
        4 => "bad user name or password",
        5 => "not authorized",
        _ => "unknown reason",
    };

    private static ReadOnlyMemory<byte> Encode(MqttProtocolVersion version, MqttPacket packet) =>
        new MqttPacketFormatterAdapter(version, new MqttBufferWriter(4096, 65535)).Encode(packet).ToArray();
}
