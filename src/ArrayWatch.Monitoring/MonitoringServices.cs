using ArrayWatch.Monitoring.Hosting;
using ArrayWatch.Monitoring.Ports;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.DependencyInjection.Extensions;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Monitoring;

/// <summary>Registers the monitoring of arrays.</summary>
public static class MonitoringServices
{
    /// <summary>
    /// Adds the fleet, the dispatcher and the watch on the wall clock. <see cref="IHistory"/> and the
    /// <see cref="IMonitorSink"/>s come from others. Register the store before this, so that it is open when alerts are
    /// taken up, and messaging after it, so that no frame comes before that.
    /// </summary>
    /// <param name="services">The services.</param>
    /// <param name="arrays">The arrays of the validated configuration, ids distinct.</param>
    public static IServiceCollection AddMonitoring(this IServiceCollection services, IReadOnlyList<ArrayDefinition> arrays)
    {
        ArgumentNullException.ThrowIfNull(services);
        ArgumentNullException.ThrowIfNull(arrays);
        services.TryAddSingleton(TimeProvider.System);
        services.AddSingleton<MonitorMeter>();
        services.AddSingleton<OutputDispatcher>();
        services.AddSingleton(s => new Fleet(
            arrays,
            s.GetRequiredService<OutputDispatcher>(),
            s.GetRequiredService<IHistory>(),
            s.GetRequiredService<TimeProvider>(),
            s.GetRequiredService<MonitorMeter>(),
            s.GetRequiredService<ILogger<Fleet>>()));
        services.AddSingleton<IFleet>(s => s.GetRequiredService<Fleet>());
        services.AddSingleton<IArrayDirectory>(s => s.GetRequiredService<Fleet>());
        services.AddHostedService(s => s.GetRequiredService<OutputDispatcher>());
        services.AddHostedService<AlertRestorer>();
        services.AddHostedService<SilenceWatch>();
        return services;
    }
}
