using ArrayWatch.Monitoring.Ports;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Messaging.Outbound;

/// <summary>Hands alerts, health and corrections to the publisher; metrics and coherence pictures do not go to the broker.</summary>
/// <remarks>Safe from any thread; never waits.</remarks>
internal sealed partial class MqttSink(OutboundQueue queue, MessagingMetrics metrics, ILogger<MqttSink> logger) : IMonitorSink
{
    private int _full;

    /// <inheritdoc/>
    public string Name => "mqtt";

    /// <inheritdoc/>
    public ValueTask WriteAsync(MonitorOutput output, CancellationToken cancellation)
    {
        ArgumentNullException.ThrowIfNull(output);
        if (output is not (AlertOutput or HealthOutput or CorrectionsOutput)) return ValueTask.CompletedTask;
        if (queue.Add(output))
        {
            Volatile.Write(ref _full, 0);
            return ValueTask.CompletedTask;
        }
        metrics.LeftOut();
        if (Interlocked.Exchange(ref _full, 1) == 0) LogLeftOut(OutboundQueue.MostAlerts);
        return ValueTask.CompletedTask;
    }

    [LoggerMessage(EventIds.AlertLeftOut, LogLevel.Error, "More than {Most} alerts wait for the broker; the oldest are left out. The store still has them; bring the broker back")]
    private partial void LogLeftOut(int most);
}
