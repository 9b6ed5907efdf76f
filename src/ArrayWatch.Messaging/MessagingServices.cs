using ArrayWatch.Messaging.Broker;
using ArrayWatch.Messaging.Inbound;
using ArrayWatch.Messaging.Outbound;
using ArrayWatch.Monitoring.Ports;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.DependencyInjection.Extensions;

namespace ArrayWatch.Messaging;

/// <summary>Puts messaging into a host.</summary>
public static class MessagingServices
{
    /// <summary>
    /// Adds the broker in this process if asked for, the subscriber, the publisher and the sink that feeds it. Needs an
    /// <see cref="IArrayDirectory"/>. Starting throws <see cref="MessagingStartException"/> when a port or a file cannot be had.
    /// </summary>
    /// <exception cref="ArgumentException">An option is out of range.</exception>
    public static IServiceCollection AddMessaging(this IServiceCollection services, MqttOptions options)
    {
        ArgumentNullException.ThrowIfNull(services);
        ArgumentNullException.ThrowIfNull(options);
        options.Check();
        services.TryAddSingleton(TimeProvider.System);
        services.AddMetrics();
        services.AddSingleton(options);
        services.AddSingleton<MessagingMetrics>();
        services.AddSingleton(static provider =>
        {
            OutboundQueue queue = new();
            provider.GetRequiredService<MessagingMetrics>().ObserveQueue(() => queue.Count);
            return queue;
        });
        services.AddSingleton<IMonitorSink, MqttSink>();
        // Stopped in reverse: first no more messages come in, then the last reports go out, then the broker ends.
        if (options.Embedded) services.AddHostedService<EmbeddedBroker>();
        services.AddHostedService<PublisherService>();
        services.AddHostedService<SubscriberService>();
        return services;
    }
}
