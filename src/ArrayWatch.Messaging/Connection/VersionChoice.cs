using MQTTnet.Formatter;

namespace ArrayWatch.Messaging.Connection;

/// <summary>Which version of MQTT to try: as configured, or 5 and 3.1.1 by turns until one is accepted.</summary>
internal sealed class VersionChoice(MqttVersion configured)
{
    private bool _accepted;

    /// <summary>The version to try now.</summary>
    public MqttProtocolVersion Current { get; private set; } =
        configured == MqttVersion.Mqtt311 ? MqttProtocolVersion.V311 : MqttProtocolVersion.V500;

    /// <summary>The broker took it; it is kept from now on.</summary>
    public void Accept() => _accepted = true;

    /// <summary>The broker refused it.</summary>
    /// <returns>True when there is another version to try at once.</returns>
    public bool Refuse()
    {
        if (configured != MqttVersion.Automatic || _accepted) return false;
        bool wasFirst = Current == MqttProtocolVersion.V500;
        Current = wasFirst ? MqttProtocolVersion.V311 : MqttProtocolVersion.V500;
        return wasFirst;
    }
}
