using OpenTelemetry.Metrics;
using OpenTelemetry.Resources;

namespace ArrayWatch.Hosting;

/// <summary>The service's own counters, for whoever scrapes them.</summary>
internal static class Measurements
{
    private const string Address = "/metrics";
    private const string OpenMetricsType = "application/openmetrics-text; version=1.0.0; charset=utf-8";

    /// <summary>Collects the meters of all parts and of the runtime.</summary>
    public static IServiceCollection AddMeasurements(this IServiceCollection services)
    {
        services.AddOpenTelemetry().ConfigureResource(static r => r.AddService("arraywatch")).WithMetrics(static metrics => metrics
            .AddMeter("ArrayWatch.*")
            .AddMeter("System.Runtime")
            .AddPrometheusExporter());
        return services;
    }

    /// <summary>Serves them in the OpenMetrics text format, also to those who do not say which format they want.</summary>
    public static void MapOpenMetrics(this WebApplication app)
    {
        app.Use(static (context, next) =>
        {
            HttpRequest request = context.Request;
            if (request.Path == Address && !request.Headers.Accept.ToString().Contains("text/plain", StringComparison.OrdinalIgnoreCase))
                request.Headers.Accept = OpenMetricsType;
            return next(context);
        });
        app.MapPrometheusScrapingEndpoint(Address);
    }
}
