using MQTTnet.Packets;
using MQTTnet.Protocol;

namespace ArrayWatch.Messaging;

/// <summary>Topics of the contract: {prefix}/{array}/… and {prefix}/service/status.</summary>
internal static class Topics
{
    /// <summary>Where the service says whether it lives.</summary>
    public static string Status(string prefix) => $"{prefix}/service/status";

    /// <summary>One topic of one array.</summary>
    public static string Of(string prefix, string array, string leaf) => $"{prefix}/{array}/{leaf}";

    /// <summary>What an array listens to. Kept snapshots and samples belong to a stream long gone, and are not asked for.</summary>
    public static IReadOnlyList<MqttTopicFilter> Subscriptions(string prefix, string array) =>
    [
        Filter(Of(prefix, array, "snapshots"), MqttRetainHandling.DoNotSendOnSubscribe),
        Filter(Of(prefix, array, "samples"), MqttRetainHandling.DoNotSendOnSubscribe),
        Filter(Of(prefix, array, "environment"), MqttRetainHandling.SendAtSubscribe),
    ];

    private static MqttTopicFilter Filter(string topic, MqttRetainHandling retained) => new()
    {
        Topic = topic,
        QualityOfServiceLevel = MqttQualityOfServiceLevel.AtLeastOnce,
        RetainHandling = retained,
    };
}
