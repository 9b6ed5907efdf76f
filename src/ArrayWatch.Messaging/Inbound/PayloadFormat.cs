namespace ArrayWatch.Messaging.Inbound;

/// <summary>How a message body is written.</summary>
internal enum PayloadFormat
{
    /// <summary>RFC 8949.</summary>
    Cbor,

    /// <summary>RFC 8259.</summary>
    Json,
}

/// <summary>Tells the format of a body: the content type decides, and without one the first byte.</summary>
internal static class PayloadFormats
{
    /// <summary>CBOR's tag 55799, "what follows is CBOR", as its three bytes (RFC 8949, 3.4.6).</summary>
    private static ReadOnlySpan<byte> SelfDescribedCbor => [0xD9, 0xD9, 0xF7];

    private static ReadOnlySpan<byte> Utf8ByteOrderMark => [0xEF, 0xBB, 0xBF];

    /// <exception cref="MessageRefusedException">It is neither.</exception>
    public static PayloadFormat Resolve(string? contentType, ReadOnlySpan<byte> body)
    {
        if (body.IsEmpty) MessageRefusedException.NotDecodable("The body is empty; send one CBOR or JSON map.");
        if (!string.IsNullOrEmpty(contentType)) return FromContentType(contentType);
        byte first = body[0];
        // Major type 5, a map, is 0xA0 to 0xBF; JSON text begins with a brace, or white space before it.
        if (first is >= 0xA0 and <= 0xBF || body.StartsWith(SelfDescribedCbor)) return PayloadFormat.Cbor;
        if (first is (byte)'{' or (byte)' ' or (byte)'\t' or (byte)'\r' or (byte)'\n' || body.StartsWith(Utf8ByteOrderMark)) return PayloadFormat.Json;
        MessageRefusedException.NotDecodable(
            $"The first byte, 0x{first:X2}, begins neither a CBOR map nor a JSON object; send one of them, or state the content type.");
        return default;
    }

    /// <summary>The JSON text without a byte order mark.</summary>
    public static ReadOnlySpan<byte> WithoutByteOrderMark(ReadOnlySpan<byte> json) =>
        json.StartsWith(Utf8ByteOrderMark) ? json[Utf8ByteOrderMark.Length..] : json;

    private static PayloadFormat FromContentType(string contentType)
    {
        ReadOnlySpan<char> type = contentType;
        int parameters = type.IndexOf(';');
        if (parameters >= 0) type = type[..parameters];
        type = type.Trim();
        if (type.Equals("application/cbor", StringComparison.OrdinalIgnoreCase)) return PayloadFormat.Cbor;
        if (type.Equals("application/json", StringComparison.OrdinalIgnoreCase)) return PayloadFormat.Json;
        MessageRefusedException.NotDecodable(
            $"The content type '{Text.Shorten(contentType)}' is not known; use application/cbor or application/json.");
        return default;
    }
}
