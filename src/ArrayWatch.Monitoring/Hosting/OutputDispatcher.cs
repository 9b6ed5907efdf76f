using ArrayWatch.Monitoring.Ports;
using Microsoft.Extensions.Hosting;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Monitoring.Hosting;

/// <summary>
/// Carries outputs from the pipelines to every sink, each through a queue of its own, so that a slow or failing sink stops
/// neither the fold nor the others. Safe from any thread.
/// </summary>
public sealed partial class OutputDispatcher : IHostedService, IDisposable
{
    private readonly SinkLane[] _lanes;
    private readonly ILogger<OutputDispatcher> _logger;
    private readonly CancellationTokenSource _stop = new();
    private Task _running = Task.CompletedTask;

    /// <summary>One queue a sink.</summary>
    public OutputDispatcher(IEnumerable<IMonitorSink> sinks, TimeProvider time, MonitorMeter meter, ILogger<OutputDispatcher> logger)
    {
        ArgumentNullException.ThrowIfNull(sinks);
        _lanes = [.. sinks.Select(s => new SinkLane(s, time, meter, logger))];
        _logger = logger;
    }

    /// <summary>Outputs left out so far because a sink had no room for them.</summary>
    public long LeftOut => _lanes.Sum(l => l.LeftOut);

    /// <summary>Hands an output to every sink; waits briefly at most.</summary>
    public void Post(MonitorOutput output)
    {
        ArgumentNullException.ThrowIfNull(output);
        foreach (SinkLane lane in _lanes) lane.Post(output);
    }

    /// <inheritdoc/>
    public Task StartAsync(CancellationToken cancellationToken)
    {
        _running = Task.WhenAll(_lanes.Select(l => Task.Run(() => l.RunAsync(_stop.Token), CancellationToken.None)));
        return Task.CompletedTask;
    }

    /// <summary>Takes no more and waits until every sink has what was posted, or the host's patience ends.</summary>
    public async Task StopAsync(CancellationToken cancellationToken)
    {
        foreach (SinkLane lane in _lanes) lane.Complete();
        try
        {
            await _running.WaitAsync(cancellationToken).ConfigureAwait(false);
        }
        catch (OperationCanceledException)
        {
            LogStoppedEarly();
            await _stop.CancelAsync().ConfigureAwait(false);
        }
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        _stop.Dispose();
        foreach (SinkLane lane in _lanes) lane.Dispose();
    }

    [LoggerMessage(3103, LogLevel.Warning, "stopped before every sink had taken what was waiting")]
    private partial void LogStoppedEarly();
}
