using ArrayWatch.Monitoring.Ports;
using Microsoft.AspNetCore.Diagnostics.HealthChecks;
using Microsoft.Extensions.Diagnostics.HealthChecks;

namespace ArrayWatch.Hosting;

/// <summary>Answers whether the process lives and whether it can do its work.</summary>
internal static class HealthServices
{
    private const string Ready = "ready";

    /// <summary>Adds the checks. Ready: the broker is connected and the store can be written.</summary>
    public static IServiceCollection AddHealth(this IServiceCollection services)
    {
        services.AddSingleton<BrokerLink>();
        // First among the hosted services, so that no connection is missed.
        services.Insert(0, ServiceDescriptor.Singleton<IHostedService>(static p => p.GetRequiredService<BrokerLink>()));
        services.AddHealthChecks()
            .AddCheck<BrokerLink>("broker", tags: [Ready])
            .AddCheck<StoreCheck>("store", tags: [Ready]);
        return services;
    }

    /// <summary>Maps <c>/health/live</c> and <c>/health/ready</c>: 200 or 503, and a line for each check.</summary>
    public static void MapHealth(this WebApplication app)
    {
        app.MapHealthChecks("/health/live", new HealthCheckOptions { Predicate = static _ => false, ResponseWriter = WriteAsync });
        app.MapHealthChecks("/health/ready", new HealthCheckOptions { Predicate = static check => check.Tags.Contains(Ready), ResponseWriter = WriteAsync });
    }

    private static Task WriteAsync(HttpContext context, HealthReport report)
    {
        context.Response.ContentType = "application/json";
        return context.Response.WriteAsJsonAsync(new
        {
            status = report.Status == HealthStatus.Healthy ? "ok" : "failing",
            checks = report.Entries.ToDictionary(static e => e.Key, static e => e.Value.Description ?? e.Value.Status.ToString()),
        });
    }

    /// <summary>Writes nothing that lasts: reads one alert, which fails when the store's file is away or broken.</summary>
    private sealed class StoreCheck(IHistory history) : IHealthCheck
    {
        public async Task<HealthCheckResult> CheckHealthAsync(HealthCheckContext context, CancellationToken cancellationToken = default)
        {
            await history.AlertsAsync(null, null, null, null, 1, cancellationToken);
            return HealthCheckResult.Healthy("writable");
        }
    }
}
