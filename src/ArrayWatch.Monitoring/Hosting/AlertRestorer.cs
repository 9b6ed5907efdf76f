using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Monitoring.Hosting;

/// <summary>Takes up open alerts from the store before the first frame comes.</summary>
public sealed partial class AlertRestorer(Fleet fleet, ILogger<AlertRestorer> logger) : IHostedService
{
    /// <inheritdoc/>
    public async Task StartAsync(CancellationToken cancellationToken)
    {
        try
        {
            await fleet.RestoreAsync(cancellationToken).ConfigureAwait(false);
        }
#pragma warning disable CA1031 // Watching without the old alerts is better than not watching.
        catch (Exception failure) when (!cancellationToken.IsCancellationRequested)
#pragma warning restore CA1031
        {
            LogFailed(failure);
        }
    }

    /// <inheritdoc/>
    public Task StopAsync(CancellationToken cancellationToken) => Task.CompletedTask;

    [LoggerMessage(3401, LogLevel.Error, "open alerts could not be read from the store; those faults will be raised as new alerts")]
    private partial void LogFailed(Exception failure);
}
