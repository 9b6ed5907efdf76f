using System.Diagnostics.Metrics;
using ArrayWatch.Messaging;
using Microsoft.Extensions.Diagnostics.HealthChecks;

namespace ArrayWatch.Hosting;

/// <summary>Tells whether the broker is connected, from messaging's own count of the connections that stand. Safe from any thread.</summary>
internal sealed class BrokerLink : IHealthCheck, IHostedService, IDisposable
{
    private readonly MeterListener _listener = new();
    private long _connections;

    /// <summary>Prepares to listen.</summary>
    public BrokerLink()
    {
        _listener.InstrumentPublished = static (instrument, listener) =>
        {
            if (instrument.Meter.Name == MessagingMetrics.MeterName && instrument.Name == "arraywatch.messaging.connected")
                listener.EnableMeasurementEvents(instrument);
        };
        _listener.SetMeasurementEventCallback<long>((_, change, _, _) => Interlocked.Add(ref _connections, change));
    }

    /// <inheritdoc/>
    public Task StartAsync(CancellationToken cancellationToken)
    {
        _listener.Start();
        return Task.CompletedTask;
    }

    /// <inheritdoc/>
    public Task StopAsync(CancellationToken cancellationToken) => Task.CompletedTask;

    /// <inheritdoc/>
    public Task<HealthCheckResult> CheckHealthAsync(HealthCheckContext context, CancellationToken cancellationToken = default) =>
        Task.FromResult(Interlocked.Read(ref _connections) > 0
            ? HealthCheckResult.Healthy("connected")
            : HealthCheckResult.Unhealthy("no connection to the broker; see the log"));

    /// <inheritdoc/>
    public void Dispose() => _listener.Dispose();
}
