using System.Net;
using System.Net.Sockets;
using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;
using MQTTnet.Server;

namespace ArrayWatch.Messaging.Broker;

/// <summary>
/// A broker in this process, for a demonstration or a small installation: MQTT 3.1.1 and 5, retained messages and
/// sessions in memory. It takes anybody who reaches its port, which is this machine only unless asked otherwise.
/// </summary>
internal sealed partial class EmbeddedBroker(MqttOptions options, ILogger<EmbeddedBroker> logger) : IHostedService, IDisposable
{
    /// <summary>Messages that wait for one client; beyond it the broker drops new ones.</summary>
    private const int MostPendingMessages = 20_000;

    private readonly MqttServer _server = Create(options);

    /// <inheritdoc/>
    public async Task StartAsync(CancellationToken cancellationToken)
    {
        try
        {
            await _server.StartAsync().ConfigureAwait(false);
        }
        catch (SocketException exception)
        {
            throw new MessagingStartException(
                $"Port {options.Port} for the embedded broker (broker.port) cannot be had: {exception.Message}; stop what listens there or choose another port.", exception);
        }
        LogStarted(options.EmbeddedOnAllAddresses ? "all addresses" : "127.0.0.1", options.Port);
    }

    /// <inheritdoc/>
    public Task StopAsync(CancellationToken cancellationToken) => _server.IsStarted ? _server.StopAsync() : Task.CompletedTask;

    /// <inheritdoc/>
    public void Dispose() => _server.Dispose();

    private static MqttServer Create(MqttOptions options)
    {
        MqttServerOptions settings = new MqttServerOptionsBuilder()
            .WithDefaultEndpoint()
            .WithDefaultEndpointPort(options.Port)
            .WithDefaultEndpointBoundIPAddress(options.EmbeddedOnAllAddresses ? IPAddress.Any : IPAddress.Loopback)
            .WithDefaultEndpointBoundIPV6Address(options.EmbeddedOnAllAddresses ? IPAddress.IPv6Any : IPAddress.None)
            .WithPersistentSessions()
            .WithMaxPendingMessagesPerClient(MostPendingMessages)
            .Build();
        // Without this a closing connection is reset, and what was sent last is lost.
        settings.DefaultEndpointOptions.LingerState = null;
        return new MqttServerFactory().CreateMqttServer(settings);
    }

    [LoggerMessage(EventIds.BrokerStarted, LogLevel.Information, "The embedded broker listens at {Address}, port {Port}")]
    private partial void LogStarted(string address, int port);
}
