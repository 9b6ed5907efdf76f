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
    /// <param name="services">Must also hold an <see cref="IReadOnlyList{ArrayDefinition}"/>.</param>
    /// <param name="options">The store.</param>
    /// <param name="influx">The server; null for none.</param>
    public static IServiceCollection AddStorage(this IServiceCollection services, StoreOptions options, InfluxOptions? influx)
    {
        ArgumentNullException.ThrowIfNull(options);
        services.AddSingleton(p => new MetricStore(
            options with { KeepsOutbox = influx is not null }, p.GetRequiredService<IReadOnlyList<ArrayDefinition>>(),
            p.GetService<TimeProvider>() ?? TimeProvider.System, p.GetRequiredService<ILogger<MetricStore>>()));
        services.AddSingleton<IHistory>(p => p.GetRequiredService<MetricStore>());
        services.AddSingleton<IMonitorSink>(p => p.GetRequiredService<MetricStore>());
        if (influx is null) return services;
        return services.AddSingleton<IHostedService>(p => new InfluxForwarder(
            p.GetRequiredService<MetricStore>(), influx, p.GetRequiredService<IReadOnlyList<ArrayDefinition>>(),
            p.GetService<TimeProvider>() ?? TimeProvider.System, p.GetRequiredService<ILogger<InfluxForwarder>>()));
    }
}
