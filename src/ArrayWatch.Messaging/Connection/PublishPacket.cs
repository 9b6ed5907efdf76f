using System.Buffers.Binary;
using System.Text;

namespace ArrayWatch.Messaging.Connection;

/// <summary>Reads a PUBLISH packet in place (MQTT 5.0, section 3.3; MQTT 3.1.1, section 3.3).</summary>
internal static class PublishPacket
{
    private const int ContentTypeProperty = 0x03;

    /// <param name="flags">First byte of the packet.</param>
    /// <param name="body">What follows the fixed header, or as much of it as was taken in.</param>
    /// <param name="bodyBytes">Bytes of the whole body.</param>
    /// <param name="hasProperties">True for MQTT 5.</param>
    /// <exception cref="MqttProtocolException">The broker breaks the protocol.</exception>
    public static ReceivedMessage Read(byte flags, ReadOnlyMemory<byte> body, int bodyBytes, bool hasProperties)
    {
        ReadOnlySpan<byte> span = body.Span;
        int position = 0;
        int topicLength = UInt16(span, ref position);
        ReadOnlyMemory<byte> topic = Slice(body, ref position, topicLength);
        int qualityOfService = (flags >> 1) & 3;
        if (qualityOfService > 1) throw new MqttProtocolException($"The broker sent a message at QoS {qualityOfService}, though QoS 1 was asked for.");
        ushort identifier = qualityOfService == 0 ? (ushort)0 : (ushort)UInt16(span, ref position);
        string? contentType = hasProperties ? ReadContentType(span, ref position) : null;
        return new ReceivedMessage
        {
            Topic = topic,
            Payload = bodyBytes == body.Length ? body[position..] : ReadOnlyMemory<byte>.Empty,
            PayloadBytes = bodyBytes - position,
            ContentType = contentType,
            PacketIdentifier = identifier,
            Retained = (flags & 1) != 0,
        };
    }

    /// <summary>A variable byte integer (MQTT 5.0, section 1.5.5).</summary>
    public static int VariableByteInteger(ReadOnlySpan<byte> span, ref int position)
    {
        int value = 0;
        for (int shift = 0; shift < 28; shift += 7)
        {
            byte b = Byte(span, ref position);
            value |= (b & 0x7F) << shift;
            if ((b & 0x80) == 0) return value;
        }
        throw new MqttProtocolException("A variable byte integer has more than four bytes.");
    }

    private static string? ReadContentType(ReadOnlySpan<byte> span, ref int position)
    {
        string? contentType = null;
        int length = VariableByteInteger(span, ref position);
        int end = position + length;
        if (end > span.Length) throw Short();
        while (position < end)
        {
            int property = VariableByteInteger(span, ref position);
            int size = property switch
            {
                0x01 => 1,                                                      // payload format indicator
                0x02 => 4,                                                      // message expiry interval
                ContentTypeProperty or 0x08 or 0x09 => UInt16(span, ref position), // content type, response topic, correlation data
                0x0B => VariableByteInteger(span, ref position) & 0,            // subscription identifier
                0x23 => 2,                                                      // topic alias
                0x26 => UserPropertyRest(span, ref position),
                _ => throw new MqttProtocolException($"A message has the property 0x{property:X2}, which MQTT 5 does not allow there."),
            };
            if (size > span.Length - position) throw Short();
            if (property == ContentTypeProperty) contentType = ToContentType(span.Slice(position, size));
            position += size;
        }
        if (position != end) throw new MqttProtocolException("A message's properties are longer than they say.");
        return contentType;
    }

    /// <summary>Steps over a user property's name; the answer is the length of its value, which follows.</summary>
    private static int UserPropertyRest(ReadOnlySpan<byte> span, ref int position)
    {
        int name = UInt16(span, ref position);
        if (name > span.Length - position) throw Short();
        position += name;
        return UInt16(span, ref position);
    }

    // The two that matter are known, so that a message costs no string.
    private static string ToContentType(ReadOnlySpan<byte> utf8) => utf8 switch
    {
        _ when utf8.SequenceEqual("application/cbor"u8) => "application/cbor",
        _ when utf8.SequenceEqual("application/json"u8) => "application/json",
        _ => Encoding.UTF8.GetString(utf8),
    };

    private static byte Byte(ReadOnlySpan<byte> span, ref int position) =>
        position < span.Length ? span[position++] : throw Short();

    private static int UInt16(ReadOnlySpan<byte> span, ref int position)
    {
        if (span.Length - position < 2) throw Short();
        ushort value = BinaryPrimitives.ReadUInt16BigEndian(span[position..]);
        position += 2;
        return value;
    }

    private static ReadOnlyMemory<byte> Slice(ReadOnlyMemory<byte> body, ref int position, int length)
    {
        if (length > body.Length - position) throw Short();
        ReadOnlyMemory<byte> slice = body.Slice(position, length);
        position += length;
        return slice;
    }

    private static MqttProtocolException Short() => new("A packet ends before what it announces.");
}
