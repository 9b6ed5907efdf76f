namespace ArrayWatch.Messaging;

/// <summary>How to reach the broker. Filled by the program from its validated configuration.</summary>
public sealed record MqttOptions
{
    /// <summary>16 MiB.</summary>
    public const int DefaultMaxMessageBytes = 16 * 1024 * 1024;

    /// <summary>MQTT packets end at 256 MiB.</summary>
    private const int MostMessageBytes = 255 * 1024 * 1024;

    /// <summary>True: a broker runs in this process, at <see cref="Port"/>, and <see cref="Host"/> is not used.</summary>
    public bool Embedded { get; init; }

    /// <summary>True: the broker in this process takes connections from other machines too; false, the default: only from this one.</summary>
    public bool EmbeddedOnAllAddresses { get; init; }

    /// <summary>Name or address of the broker.</summary>
    public string Host { get; init; } = "127.0.0.1";

    /// <summary>1 to 65535; 1883 unless stated.</summary>
    public int Port { get; init; } = 1883;

    /// <summary>First part of every topic, without a slash at its ends.</summary>
    public string TopicPrefix { get; init; } = "arraywatch";

    /// <summary>Stable over restarts, and different for each service on a broker: sessions are found by it.</summary>
    public string ClientId { get; init; } = "arraywatch";

    /// <summary>How long the broker keeps what comes while this service is away; an hour unless stated. MQTT 3.1.1 leaves it to the broker.</summary>
    public TimeSpan SessionExpiry { get; init; } = TimeSpan.FromHours(1);

    /// <summary>Larger message bodies are refused.</summary>
    public int MaxMessageBytes { get; init; } = DefaultMaxMessageBytes;

    /// <summary>Which MQTT to speak.</summary>
    public MqttVersion Version { get; init; } = MqttVersion.Automatic;

    /// <summary>Null for none.</summary>
    public string? UserName { get; init; }

    /// <summary>Null for none. Takes precedence over <see cref="PasswordFile"/>.</summary>
    public string? Password { get; init; }

    /// <summary>A file that holds the password, read at each connection so that it can be changed; line ends at its end are left out. Null for none.</summary>
    public string? PasswordFile { get; init; }

    /// <summary>True: TLS, with the certificate checked against the system's trusted authorities.</summary>
    public bool UseTls { get; init; }

    /// <summary>How often this service shows that it is alive, when nothing else is sent; 60 s unless stated.</summary>
    public TimeSpan KeepAlive { get; init; } = TimeSpan.FromSeconds(60);

    /// <summary>QoS 1 messages that the broker may have under way to one array at a time; 1 to 65535. MQTT 5 only.</summary>
    public int ReceiveMaximum { get; init; } = 64;

    /// <exception cref="ArgumentException">An option is out of range; the message names it by its key and gives the range.</exception>
    internal void Check()
    {
        Demand(Port is >= 1 and <= 65535, "port", Port, "between 1 and 65535");
        Demand(!string.IsNullOrWhiteSpace(Host), "host", Host, "a name or an address");
        Demand(IsTopic(TopicPrefix), "topicPrefix", TopicPrefix, "a topic without +, # and a slash at its ends");
        Demand(!string.IsNullOrWhiteSpace(ClientId), "clientId", ClientId, "a stable name");
        Demand(SessionExpiry >= TimeSpan.Zero, "sessionExpiry", SessionExpiry, "not negative");
        Demand(MaxMessageBytes is >= 1024 and <= MostMessageBytes, "maxMessageBytes", MaxMessageBytes, $"between 1024 and {MostMessageBytes}");
        Demand(KeepAlive.TotalSeconds is >= 1 and <= ushort.MaxValue, "keepAlive", KeepAlive, "between 1 and 65535 seconds");
        Demand(ReceiveMaximum is >= 1 and <= ushort.MaxValue, "receiveMaximum", ReceiveMaximum, "between 1 and 65535");
    }

    private static bool IsTopic(string topic) =>
        !string.IsNullOrEmpty(topic) && topic.IndexOfAny(['+', '#', '\0']) < 0 && topic[0] != '/' && topic[^1] != '/';

    private static void Demand(bool isMet, string key, object? value, string range)
    {
        if (!isMet) throw new ArgumentException($"broker.{key} is '{value}'; it must be {range}.");
    }
}

/// <summary>Versions of MQTT.</summary>
public enum MqttVersion
{
    /// <summary>5, and 3.1.1 with a broker that refuses 5.</summary>
    Automatic,

    /// <summary>MQTT 5.0 (OASIS, 2019).</summary>
    Mqtt5,

    /// <summary>MQTT 3.1.1 (OASIS, 2014).</summary>
    Mqtt311,
}
