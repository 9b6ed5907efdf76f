using System.Formats.Cbor;
using System.Globalization;
using System.Text.Json;
using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>What the decoders have in common at their doors.</summary>
internal static class Decoding
{
    /// <summary>The refusal of a message that is too large; null when it is not.</summary>
    public static Refusal? CheckSize(long bytes, int maxMessageBytes) => bytes <= maxMessageBytes
        ? null
        : new Refusal(RefusalReason.TooLarge, string.Create(CultureInfo.InvariantCulture,
            $"The message has {bytes} bytes, over the limit of {maxMessageBytes}; send fewer snapshots a message or raise broker.maxMessageBytes."));

    /// <summary>True for what malformed bytes can make the readers throw.</summary>
    public static bool IsMalformed(Exception exception) =>
        exception is MessageRefusedException or CborContentException or JsonException
            or InvalidOperationException or OverflowException or FormatException or ArgumentException;

    /// <summary>The refusal that such an exception stands for.</summary>
    /// <param name="exception">What was thrown.</param>
    /// <param name="format">How the body is written; null when that was not known yet.</param>
    /// <param name="cborPosition">The byte that a CBOR reader had come to; null when that is not known.</param>
    public static Refusal ToRefusal(Exception exception, PayloadFormat? format, int? cborPosition = null)
    {
        if (exception is MessageRefusedException refused) return refused.Refusal;
        string where = exception is JsonException { LineNumber: { } line, BytePositionInLine: { } position }
            ? string.Create(CultureInfo.InvariantCulture, $" at line {line + 1}, byte {position + 1}")
            : cborPosition is { } at ? string.Create(CultureInfo.InvariantCulture, $" at byte {at}") : "";
        return new Refusal(RefusalReason.NotDecodable,
            $"The body is not well-formed {(format == PayloadFormat.Json ? "JSON" : "CBOR")}{where} ({Text.Shorten(exception.Message)}); check the publisher's encoder.");
    }
}
