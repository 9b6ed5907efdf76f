namespace ArrayWatch.Monitoring.Ports;

/// <summary>Where what the service finds goes: a broker, a store, a notifier. Called from one thread an array.</summary>
public interface IMonitorSink
{
    /// <summary>Short unique name, for logs and counters.</summary>
    string Name { get; }

    /// <summary>
    /// Takes one output. It must return soon: a sink whose far end is slow or absent queues, bounds its
    /// queue, and counts what it had to leave out.
    /// </summary>
    ValueTask WriteAsync(MonitorOutput output, CancellationToken cancellation);
}
