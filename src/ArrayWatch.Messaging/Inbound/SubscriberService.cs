using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Messaging.Connection;
using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Messaging.Inbound;

/// <summary>
/// Brings each array's messages from the broker to its inbox. Every array has a connection, a session and a task of its
/// own: order is kept within an array, a slow array holds back only its own stream, and nothing is queued in this process.
/// </summary>
internal sealed class SubscriberService(
    IArrayDirectory directory, MqttOptions options, MessagingMetrics metrics, TimeProvider time, ILoggerFactory loggers) : BackgroundService
{
    /// <inheritdoc/>
    public override Task StartAsync(CancellationToken cancellationToken)
    {
        _ = Credentials.Password(options);
        return base.StartAsync(cancellationToken);
    }

    /// <inheritdoc/>
    protected override Task ExecuteAsync(CancellationToken stoppingToken)
    {
        ILogger logger = loggers.CreateLogger<SubscriberService>();
        return Task.WhenAll(directory.Inboxes.Select(inbox =>
        {
            ArrayIntake intake = new(inbox, options, metrics, time, logger);
            ArraySubscriber subscriber = new(inbox.Id, intake, options, metrics, time, logger);
            // A task of the pool each: one array's first message must not hold up another's connection.
            return Task.Run(() => subscriber.RunAsync(stoppingToken), CancellationToken.None);
        }));
    }
}
