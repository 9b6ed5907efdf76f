using System.Formats.Cbor;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>Reads single values of a CBOR message, and steps over what is not needed within a bounded depth.</summary>
internal static class CborValues
{
    /// <summary>Levels of arrays and maps that are followed.</summary>
    public const int MaxDepth = 16;

    private const CborTag DateTimeText = (CborTag)0;
    private const CborTag EpochSeconds = (CborTag)1;
    private const CborTag SelfDescribed = (CborTag)55799;

    /// <summary>Enters the message's map.</summary>
    public static void EnterMap(CborReader reader)
    {
        if (reader.PeekState() == CborReaderState.Tag && reader.PeekTag() == SelfDescribed) reader.ReadTag();
        if (reader.PeekState() != CborReaderState.StartMap)
            MessageRefusedException.NotDecodable($"The CBOR message is {Describe(reader.PeekState())}; send one map with text keys.");
        reader.ReadStartMap();
    }

    /// <summary>Leaves the message's map.</summary>
    public static void LeaveMap(CborReader reader)
    {
        reader.ReadEndMap();
        if (reader.BytesRemaining != 0)
            MessageRefusedException.NotDecodable($"{reader.BytesRemaining} bytes follow the CBOR map; send one map a message and nothing after it.");
    }

    /// <summary>Reads a text key in place; empty after a key of another type, which is stepped over.</summary>
    public static ReadOnlyMemory<byte> ReadKey(CborReader reader)
    {
        switch (reader.PeekState())
        {
            case CborReaderState.TextString:
                return reader.ReadDefiniteLengthTextStringBytes();
            case CborReaderState.StartIndefiniteLengthTextString:
                MessageRefusedException.NotDecodable("A key is a text string of indefinite length; write keys with their length.");
                return default;
            default:
                Skip(reader);
                return default;
        }
    }

    /// <summary>A number: integer or floating point of any width.</summary>
    public static double ReadNumber(CborReader reader, string key)
    {
        switch (reader.PeekState())
        {
            case CborReaderState.UnsignedInteger:
                return reader.ReadUInt64();
            case CborReaderState.NegativeInteger:
                return -1.0 - reader.ReadCborNegativeIntegerRepresentation();
            case CborReaderState.HalfPrecisionFloat or CborReaderState.SinglePrecisionFloat or CborReaderState.DoublePrecisionFloat:
                return reader.ReadDouble();
            default:
                MessageRefusedException.NotDecodable($"'{key}' holds {Describe(reader.PeekState())}; it must be a number.");
                return default;
        }
    }

    /// <summary>An unsigned integer.</summary>
    public static ulong ReadUnsigned(CborReader reader, string key)
    {
        if (reader.PeekState() != CborReaderState.UnsignedInteger)
            MessageRefusedException.NotDecodable($"'{key}' holds {Describe(reader.PeekState())}; it must be an unsigned integer.");
        return reader.ReadUInt64();
    }

    /// <summary>Seconds since 1970: a number, tag 1 with a number, or tag 0 with a date-time text (RFC 8949, 3.4.1 and 3.4.2).</summary>
    public static double ReadTime(CborReader reader, string key)
    {
        if (reader.PeekState() != CborReaderState.Tag) return ReadNumber(reader, key);
        CborTag tag = reader.ReadTag();
        if (tag == EpochSeconds) return ReadNumber(reader, key);
        if (tag != DateTimeText)
            MessageRefusedException.NotDecodable($"'{key}' has CBOR tag {(ulong)tag}; use tag 0, tag 1 or a plain number.");
        if (reader.PeekState() != CborReaderState.TextString)
            MessageRefusedException.NotDecodable($"'{key}' has tag 0 but holds {Describe(reader.PeekState())}; tag 0 takes a text of stated length.");
        ReadOnlySpan<byte> text = reader.ReadDefiniteLengthTextStringBytes().Span;
        if (!Rfc3339.TryParse(text, out double seconds))
            MessageRefusedException.NotDecodable($"'{key}' is '{Text.Shorten(text)}'; write it as 2026-05-01T04:12:30.5Z (RFC 3339).");
        return seconds;
    }

    /// <summary>Steps over one value, at most <see cref="MaxDepth"/> levels deep, without keeping anything of it.</summary>
    public static void Skip(CborReader reader, int depth = 1)
    {
        while (reader.PeekState() == CborReaderState.Tag) reader.ReadTag();
        switch (reader.PeekState())
        {
            case CborReaderState.StartArray:
                CheckDepth(depth);
                reader.ReadStartArray();
                while (reader.PeekState() != CborReaderState.EndArray) Skip(reader, depth + 1);
                reader.ReadEndArray();
                break;
            case CborReaderState.StartMap:
                CheckDepth(depth);
                reader.ReadStartMap();
                while (reader.PeekState() != CborReaderState.EndMap)
                {
                    Skip(reader, depth + 1);
                    Skip(reader, depth + 1);
                }
                reader.ReadEndMap();
                break;
            default:
                reader.SkipValue();
                break;
        }
    }

    /// <summary>What stands there, in words for an error message.</summary>
    public static string Describe(CborReaderState state) => state switch
    {
        CborReaderState.UnsignedInteger or CborReaderState.NegativeInteger => "an integer",
        CborReaderState.HalfPrecisionFloat or CborReaderState.SinglePrecisionFloat or CborReaderState.DoublePrecisionFloat => "a floating-point number",
        CborReaderState.ByteString => "a byte string",
        CborReaderState.StartIndefiniteLengthByteString => "a byte string of indefinite length",
        CborReaderState.TextString => "a text",
        CborReaderState.StartIndefiniteLengthTextString => "a text of indefinite length",
        CborReaderState.StartArray => "an array",
        CborReaderState.StartMap => "a map",
        CborReaderState.Tag => "a tagged value",
        CborReaderState.Null => "null",
        CborReaderState.Boolean => "a truth value",
        _ => "something else",
    };

    private static void CheckDepth(int depth)
    {
        if (depth > MaxDepth)
            MessageRefusedException.NotDecodable($"Arrays and maps are nested more than {MaxDepth} deep; send a flat map.");
    }
}
