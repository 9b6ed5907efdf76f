using MQTTnet.Formatter;

namespace ArrayWatch.Messaging.Connection;

/// <summary>
/// Which version of MQTT to try: as configured, or 5 and 3.1.1 by turns until one is accepted. A broker that has taken 5
/// once is not asked for less again; one that was left at 3.1.1 is asked for 5 first at the next connection, since a
/// broker in the middle of a restart also closes without an answer.
/// </summary>
internal sealed class VersionChoice(MqttVersion configured)
{
    private readonly MqttProtocolVersion _first = configured == MqttVersion.Mqtt311 ? MqttProtocolVersion.V311 : MqttProtocolVersion.V500;
    private bool _takes5;

    /// <summary>The version to try now.</summary>
    public MqttProtocolVersion Current { get; private set; } =
        configured == MqttVersion.Mqtt311 ? MqttProtocolVersion.V311 : MqttProtocolVersion.V500;

    /// <summary>The broker took the current version.</summary>
    public void Accept()
    {
        _takes5 |= Current == MqttProtocolVersion.V500;
        Current = _first;
    }

    /// <summary>The broker refused the current version.</summary>
    /// <returns>True when there is another version to try at once.</returns>
    public bool Refuse()
    {
        if (configured != MqttVersion.Automatic || _takes5) return false;
        bool wasFirst = Current == _first;
        Current = wasFirst ? MqttProtocolVersion.V311 : _first;
        return wasFirst;
    }
}
