namespace ArrayWatch.Messaging.Connection;

/// <summary>The broker breaks the protocol; the connection is given up and made anew.</summary>
internal sealed class MqttProtocolException : Exception
{
    public MqttProtocolException()
    {
    }

    public MqttProtocolException(string message)
        : base(message)
    {
    }

    public MqttProtocolException(string message, Exception innerException)
        : base(message, innerException)
    {
    }
}
