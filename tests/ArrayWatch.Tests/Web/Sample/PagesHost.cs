using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Web;
using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Hosting;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Tests.Web.Sample;

/// <summary>The pages alone, over invented arrays, on a free loopback port.</summary>
internal sealed class PagesHost : IAsyncDisposable
{
    private readonly WebApplication _app;

    private PagesHost(WebApplication app, SampleFleet fleet, SampleHistory history, string address)
    {
        _app = app;
        Fleet = fleet;
        History = history;
        Address = address;
    }

    public SampleFleet Fleet { get; }

    public SampleHistory History { get; }

    /// <summary>Without a slash at the end.</summary>
    public string Address { get; }

    public static async Task<PagesHost> StartAsync(int port = 0)
    {
        // The program's own name makes the framework read the program's manifest of page files, which the build copies here.
        WebApplicationBuilder builder = WebApplication.CreateBuilder(new WebApplicationOptions { ApplicationName = "ArrayWatch", EnvironmentName = "Production" });
        builder.Logging.SetMinimumLevel(LogLevel.Warning);
        builder.WebHost.UseUrls($"http://127.0.0.1:{port}");
        DateTimeOffset now = TimeProvider.System.GetUtcNow();
        SampleHistory history = new(channels: 32);
        SampleFleet fleet = new(TimeProvider.System, history,
            SampleArrays.FaultyLine(now), SampleArrays.HealthyPlane(), SampleArrays.SilentVolume(), SampleArrays.LargePlane(), SampleArrays.Waiting());
        history.Kept = () => fleet.Coherence("aft", 500, "slow");
        builder.Services.AddSingleton<IFleet>(fleet);
        builder.Services.AddSingleton<IHistory>(history);
        builder.Services.AddPages();
        WebApplication app = builder.Build();
        app.MapPages();
        await app.StartAsync();
        return new(app, fleet, history, app.Urls.First());
    }

    public async ValueTask DisposeAsync() => await _app.DisposeAsync();
}
