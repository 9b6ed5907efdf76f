using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Web.Api;
using ArrayWatch.Web.Live;
using Microsoft.Extensions.DependencyInjection;

namespace ArrayWatch.Web;

/// <summary>Registers what the pages and the HTTP interface need.</summary>
public static class PagesServices
{
    /// <summary>
    /// Adds the pages and the HTTP interface. They also need an <c>IFleet</c> and an <c>IHistory</c>, which the
    /// program registers, and a <see cref="TimeProvider"/>, which is the system's unless another one is registered.
    /// </summary>
    public static IServiceCollection AddPages(this IServiceCollection services)
    {
        ArgumentNullException.ThrowIfNull(services);
        services.AddRazorComponents().AddInteractiveServerComponents();
        services.AddOpenApi("v1", ApiDescription.Configure);
        services.ConfigureHttpJsonOptions(static o =>
        {
            foreach (var converter in ReportJson.Options.Converters) o.SerializerOptions.Converters.Add(converter);
        });
        services.AddScoped<LiveTick>();
        services.AddScoped<Watchkeeper>();
        if (!services.Any(static s => s.ServiceType == typeof(TimeProvider))) services.AddSingleton(TimeProvider.System);
        return services;
    }
}
