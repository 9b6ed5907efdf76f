using System.Diagnostics.Metrics;
using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Messaging;

/// <summary>Counters of messaging, under the meter <see cref="MeterName"/>. Safe from any thread.</summary>
public sealed class MessagingMetrics
{
    /// <summary>Name of the meter, for the exporter.</summary>
    public const string MeterName = "ArrayWatch.Messaging";

    private readonly Counter<long> _messages;
    private readonly Counter<long> _bytes;
    private readonly Counter<long> _refused;
    private readonly Counter<long> _retainedIgnored;
    private readonly Counter<long> _failures;
    private readonly Counter<long> _connections;
    private readonly Counter<long> _published;
    private readonly Counter<long> _leftOut;
    private readonly UpDownCounter<long> _connected;
    private readonly Meter _meter;

    /// <summary>Makes the counters.</summary>
    public MessagingMetrics(IMeterFactory factory)
    {
        ArgumentNullException.ThrowIfNull(factory);
        _meter = factory.Create(MeterName);
        _messages = _meter.CreateCounter<long>("arraywatch.messaging.messages", "{message}", "Messages received, by array and kind.");
        _bytes = _meter.CreateCounter<long>("arraywatch.messaging.received", "By", "Bytes of message bodies received, by array.");
        _refused = _meter.CreateCounter<long>("arraywatch.messaging.refused", "{message}", "Messages refused, by array and reason.");
        _retainedIgnored = _meter.CreateCounter<long>("arraywatch.messaging.retained_ignored", "{message}", "Retained snapshots and samples let pass by, by array.");
        _failures = _meter.CreateCounter<long>("arraywatch.messaging.failures", "{message}", "Messages at which the pipeline failed, by array.");
        _connections = _meter.CreateCounter<long>("arraywatch.messaging.connections", "{connection}", "Connections made to the broker, by client.");
        _connected = _meter.CreateUpDownCounter<long>("arraywatch.messaging.connected", "{connection}", "Connections to the broker that stand.");
        _published = _meter.CreateCounter<long>("arraywatch.messaging.published", "{message}", "Reports that the broker has taken, by kind.");
        _leftOut = _meter.CreateCounter<long>("arraywatch.messaging.left_out", "{message}", "Alerts that were left out for want of room, or refused by the broker.");
    }

    internal void Received(string array, string kind, long bytes)
    {
        _messages.Add(1, Tag("array", array), Tag("kind", kind));
        _bytes.Add(bytes, Tag("array", array));
    }

    internal void Refused(string array, RefusalReason reason) => _refused.Add(1, Tag("array", array), Tag("reason", Enum.GetName(reason)));

    internal void RetainedIgnored(string array) => _retainedIgnored.Add(1, Tag("array", array));

    internal void Failed(string array) => _failures.Add(1, Tag("array", array));

    internal void Connected(string client)
    {
        _connections.Add(1, Tag("client", client));
        _connected.Add(1);
    }

    internal void Disconnected() => _connected.Add(-1);

    internal void Published(string kind) => _published.Add(1, Tag("kind", kind));

    internal void LeftOut() => _leftOut.Add(1);

    internal void ObserveQueue(Func<int> length) =>
        _meter.CreateObservableGauge("arraywatch.messaging.queue", length, "{message}", "Reports that wait for the broker.");

    private static KeyValuePair<string, object?> Tag(string name, string? value) => new(name, value);
}
