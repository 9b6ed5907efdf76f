using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Monitoring.Hosting;

/// <summary>Looks at the wall clock once a second for what event time cannot tell: nothing arrives, a shelf has ended.</summary>
public sealed partial class SilenceWatch(Fleet fleet, TimeProvider time, ILogger<SilenceWatch> logger) : BackgroundService
{
    private static readonly TimeSpan Period = TimeSpan.FromSeconds(1);

    /// <inheritdoc/>
    protected override async Task ExecuteAsync(CancellationToken stoppingToken)
    {
        using PeriodicTimer timer = new(Period, time);
        while (await timer.WaitForNextTickAsync(stoppingToken).ConfigureAwait(false))
        {
            try
            {
                await fleet.TickAsync(stoppingToken).ConfigureAwait(false);
            }
            catch (OperationCanceledException) when (stoppingToken.IsCancellationRequested)
            {
                return;
            }
#pragma warning disable CA1031 // The watch must outlive a store that cannot be written just now.
            catch (Exception failure)
#pragma warning restore CA1031
            {
                LogFailed(failure);
            }
        }
    }

    [LoggerMessage(3301, LogLevel.Error, "the look at the wall clock failed; the next follows in a second")]
    private partial void LogFailed(Exception failure);
}
