using System.Net.Sockets;
using System.Security.Authentication;
using MQTTnet.Exceptions;

namespace ArrayWatch.Messaging.Connection;

/// <summary>Tells the troubles that networks and brokers make from faults of this program.</summary>
internal static class ConnectTrouble
{
    /// <summary>True for what an absent, closing, refusing or broken broker brings about: its message says all.</summary>
    public static bool IsExpected(Exception exception) =>
        exception is BrokerRefusedException or MqttProtocolException or MessagingStartException or MqttCommunicationException
            or MqttProtocolViolationException or MqttClientNotConnectedException or SocketException or IOException
            or ObjectDisposedException or AuthenticationException or OperationCanceledException;
}
