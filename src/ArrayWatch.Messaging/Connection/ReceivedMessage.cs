namespace ArrayWatch.Messaging.Connection;

/// <summary>A published message as it lies in the connection's buffer: valid until the next receive.</summary>
internal readonly struct ReceivedMessage
{
    /// <summary>UTF-8.</summary>
    public required ReadOnlyMemory<byte> Topic { get; init; }

    /// <summary>The body; empty when it was too large to be taken in.</summary>
    public required ReadOnlyMemory<byte> Payload { get; init; }

    /// <summary>Bytes of the body as sent.</summary>
    public required int PayloadBytes { get; init; }

    /// <summary>MQTT 5 content type; null for none.</summary>
    public required string? ContentType { get; init; }

    /// <summary>0 for QoS 0, which is not acknowledged.</summary>
    public required ushort PacketIdentifier { get; init; }

    /// <summary>True: the broker had kept it from before the subscription.</summary>
    public required bool Retained { get; init; }

    /// <summary>True: the body was over the limit and was let pass by.</summary>
    public bool IsTooLarge => Payload.Length < PayloadBytes;
}
