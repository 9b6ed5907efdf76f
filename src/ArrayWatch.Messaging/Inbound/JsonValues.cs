using System.Text;
using System.Text.Json;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>Reads single values of a JSON message.</summary>
internal static class JsonValues
{
    private const int LongestEscaped = 256;
    private static readonly JsonReaderOptions _options = new() { MaxDepth = CborValues.MaxDepth };

    /// <summary>A reader just inside the message's object.</summary>
    public static Utf8JsonReader EnterObject(ReadOnlySpan<byte> body)
    {
        Utf8JsonReader reader = new(PayloadFormats.WithoutByteOrderMark(body), _options);
        if (!reader.Read() || reader.TokenType != JsonTokenType.StartObject)
            MessageRefusedException.NotDecodable($"The JSON message is {Describe(reader.TokenType)}; send one object.");
        return reader;
    }

    /// <summary>Steps to the next key; false at the object's end.</summary>
    public static bool NextProperty(ref Utf8JsonReader reader) => reader.Read() && reader.TokenType == JsonTokenType.PropertyName;

    /// <summary>Checks that nothing follows the object.</summary>
    public static void Leave(ref Utf8JsonReader reader)
    {
        // Anything but white space makes the reader throw.
        reader.Read();
    }

    public static void EnterArray(ref Utf8JsonReader reader, string key)
    {
        if (reader.TokenType != JsonTokenType.StartArray)
            MessageRefusedException.NotDecodable($"'{key}' holds {Describe(reader.TokenType)}; it must be an array of numbers.");
    }

    public static double Number(ref Utf8JsonReader reader, string key)
    {
        if (reader.TokenType == JsonTokenType.Number && reader.TryGetDouble(out double value)) return value;
        MessageRefusedException.NotDecodable($"'{key}' holds {Describe(reader.TokenType)}; it must be a number.");
        return default;
    }

    public static ulong Unsigned(ref Utf8JsonReader reader, string key)
    {
        if (reader.TokenType == JsonTokenType.Number && reader.TryGetUInt64(out ulong value)) return value;
        MessageRefusedException.NotDecodable($"'{key}' holds {Describe(reader.TokenType)}; it must be an unsigned integer without a point or an exponent.");
        return default;
    }

    /// <summary>Seconds since 1970: a number or an RFC 3339 text.</summary>
    public static double Time(ref Utf8JsonReader reader, string key)
    {
        if (reader.TokenType != JsonTokenType.String) return Number(ref reader, key);
        ReadOnlySpan<byte> text = Unescaped(ref reader);
        if (!Rfc3339.TryParse(text, out double seconds))
        {
            MessageRefusedException.NotDecodable($"'{key}' is '{Text.Shorten(text)}'; write it as 2026-05-01T04:12:30.5Z (RFC 3339).");
            return default;
        }
        return seconds;
    }

    /// <summary>
    /// The bytes of a key or a text; empty when they are escaped and longer than any that is known. Some encoders escape
    /// the plus sign of a time's offset.
    /// </summary>
    public static ReadOnlySpan<byte> Unescaped(ref Utf8JsonReader reader)
    {
        if (!reader.ValueIsEscaped) return reader.ValueSpan;
        return reader.ValueSpan.Length > LongestEscaped ? default : Encoding.UTF8.GetBytes(reader.GetString()!);
    }

    private static string Describe(JsonTokenType token) => token switch
    {
        JsonTokenType.Number => "a number",
        JsonTokenType.String => "a text",
        JsonTokenType.StartArray => "an array",
        JsonTokenType.StartObject => "an object",
        JsonTokenType.True or JsonTokenType.False => "a truth value",
        JsonTokenType.Null => "null",
        _ => "something else",
    };
}
