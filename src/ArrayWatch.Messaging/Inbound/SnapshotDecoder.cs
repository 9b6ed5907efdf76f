using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Signals;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>
/// Turns the body of a snapshot message into a frame, or into a stated refusal; no bytes make it throw. Little-endian
/// float32 data are viewed where they lie; all else is converted into a buffer that is reused.
/// </summary>
/// <remarks>For one thread at a time. It holds on to buffers of at most five times the largest message allowed (a JSON body of one-digit numbers), and of nothing for float32 data in CBOR.</remarks>
public sealed class SnapshotDecoder
{
    private readonly CborSnapshotReader _cbor = new();
    private readonly SnapshotFields _fields;
    private readonly int _maxMessageBytes;

    /// <param name="maxMessageBytes">Larger bodies are refused; positive.</param>
    public SnapshotDecoder(int maxMessageBytes = MqttOptions.DefaultMaxMessageBytes)
    {
        ArgumentOutOfRangeException.ThrowIfNegativeOrZero(maxMessageBytes);
        _maxMessageBytes = maxMessageBytes;
        _fields = new SnapshotFields(maxMessageBytes);
    }

    /// <summary>Decodes one body.</summary>
    /// <param name="body">The bytes; the frame may refer to them.</param>
    /// <param name="contentType">The content type stated with the message; null or empty when there is none.</param>
    /// <param name="frame">The frame, valid until the next call and as long as the body is; empty after a refusal.</param>
    /// <returns>Null when decoded; otherwise why not.</returns>
    public Refusal? Decode(ReadOnlyMemory<byte> body, string? contentType, out SnapshotFrame frame)
    {
        frame = default;
        if (Decoding.CheckSize(body.Length, _maxMessageBytes) is { } tooLarge) return tooLarge;
        PayloadFormat? format = null;
        try
        {
            format = PayloadFormats.Resolve(contentType, body.Span);
            _fields.Clear();
            if (format == PayloadFormat.Cbor) _cbor.Read(body, _fields);
            else JsonSnapshotReader.Read(body.Span, _fields);
            frame = _fields.ToFrame();
            return null;
        }
        catch (Exception exception) when (Decoding.IsMalformed(exception))
        {
            return Decoding.ToRefusal(exception, format, format == PayloadFormat.Cbor ? body.Length - _cbor.BytesRemaining : null);
        }
    }
}
