using System.Diagnostics.CodeAnalysis;

namespace ArrayWatch.Messaging.Connection;

/// <summary>The broker refuses the connection or a subscription.</summary>
[SuppressMessage("Design", "CA1032", Justification = "Always made with what the broker answered.")]
internal sealed class BrokerRefusedException(string message, bool refusesVersion) : Exception(message)
{
    /// <summary>True: it does not speak this version of MQTT, or closed before it answered, as some do that do not.</summary>
    public bool RefusesVersion { get; } = refusesVersion;
}
