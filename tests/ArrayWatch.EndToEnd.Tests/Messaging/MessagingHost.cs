using ArrayWatch.Messaging;
using ArrayWatch.Monitoring.Ports;
using Microsoft.Extensions.DependencyInjection;
using Microsoft.Extensions.Hosting;

namespace ArrayWatch.EndToEnd.Tests.Messaging;

/// <summary>The service's messaging by itself, with fake inboxes behind it.</summary>
internal sealed class MessagingHost : IAsyncDisposable
{
    private readonly IHost _host;

    private MessagingHost(IHost host) => _host = host;

    public IMonitorSink Sink => _host.Services.GetRequiredService<IMonitorSink>();

    public static async Task<MessagingHost> StartAsync(MqttOptions options, params FakeInbox[] inboxes)
    {
        HostApplicationBuilder builder = Host.CreateEmptyApplicationBuilder(null);
        builder.Services.AddLogging();
        builder.Services.AddSingleton<IArrayDirectory>(new FakeDirectory(inboxes));
        builder.Services.AddMessaging(options);
        IHost host = builder.Build();
        try
        {
            await host.StartAsync();
        }
        catch
        {
            host.Dispose();
            throw;
        }
        return new MessagingHost(host);
    }

    public Task StopAsync() => _host.StopAsync();

    public async ValueTask DisposeAsync()
    {
        await _host.StopAsync();
        _host.Dispose();
    }
}
