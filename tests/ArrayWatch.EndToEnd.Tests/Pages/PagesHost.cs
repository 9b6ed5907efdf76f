using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Tests.Web.Sample;
using ArrayWatch.Web;
using Microsoft.AspNetCore.Builder;
using Microsoft.AspNetCore.Hosting;
using Microsoft.AspNetCore.Hosting.Server;
using Microsoft.AspNetCore.Hosting.Server.Features;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.EndToEnd.Tests.Pages;

/// <summary>The pages alone, over invented arrays, on a free loopback port.</summary>
internal sealed class PagesHost : IAsyncDisposable
{
    private readonly WebApplication _app;

    private PagesHost(WebApplication app, SampleFleet fleet, string address)
    {
        _app = app;
        Fleet = fleet;
        Address = address;
    }

    public SampleFleet Fleet { get; }

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
        string address = app.Services.GetRequiredService<IServer>().Features.GetRequiredFeature<IServerAddressesFeature>().Addresses.First();
        return new(app, fleet, address);
    }

    public async ValueTask DisposeAsync() => await _app.DisposeAsync();
}
