using ArrayWatch.Monitoring;
using ArrayWatch.Monitoring.Ports;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Storage;

/// <summary>Registers the store.</summary>
public static class StorageRegistration
{
    /// <summary>Adds the embedded store as history and sink, and the forwarder when there is a server to forward to.</summary>
    /// <param name="services">Where to add.</param>
    /// <param name="arrays">The arrays of the configuration: their labels name the stored rows.</param>
    /// <param name="options">The store.</param>
    /// <param name="influx">The server; null for none.</param>
    public static IServiceCollection AddStorage(this IServiceCollection services, IReadOnlyList<ArrayDefinition> arrays, StoreOptions options, InfluxOptions? influx)
    {
        ArgumentNullException.ThrowIfNull(options);
        services.AddSingleton(p => new MetricStore(
            options with { KeepsOutbox = influx is not null }, arrays,
            p.GetService<TimeProvider>() ?? TimeProvider.System, p.GetRequiredService<ILogger<MetricStore>>()));
        services.AddSingleton<IHistory>(p => p.GetRequiredService<MetricStore>());
        services.AddSingleton<IMonitorSink>(p => p.GetRequiredService<MetricStore>());
        if (influx is null) return services;
        return services.AddSingleton<IHostedService>(p => new InfluxForwarder(
            p.GetRequiredService<MetricStore>(), influx, arrays,
            p.GetService<TimeProvider>() ?? TimeProvider.System, p.GetRequiredService<ILogger<InfluxForwarder>>()));
    }
}
