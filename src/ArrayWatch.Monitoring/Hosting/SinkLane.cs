using System.Threading.Channels;
using ArrayWatch.Monitoring.Ports;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Monitoring.Hosting;

/// <summary>The queue before one sink and the loop that empties it. Posting is safe from any thread.</summary>
/// <remarks>
/// Order is kept. Alerts are always taken, and a write that fails is tried again, with growing pauses, for about four
/// minutes: a sink whose far end is away queues by itself, so that a failure here is a fault of the sink, and one alert
/// must not keep all others. Anything else waits briefly for room when <see cref="Capacity"/> outputs wait, is counted
/// and left out when there is none, and is not tried again: a newer one follows.
/// </remarks>
internal sealed partial class SinkLane(IMonitorSink sink, TimeProvider time, MonitorMeter meter, ILogger log) : IDisposable
{
    internal const int Capacity = 1024;

    private const int AlertAttempts = 12;

    private static readonly TimeSpan Patience = TimeSpan.FromMilliseconds(50);
    private static readonly TimeSpan FirstPause = TimeSpan.FromMilliseconds(250);
    private static readonly TimeSpan LongestPause = TimeSpan.FromSeconds(30);

    private readonly Channel<MonitorOutput> _queue = Channel.CreateUnbounded<MonitorOutput>(new() { SingleReader = true });
    private readonly ManualResetEventSlim _room = new(true);
    private int _waiting;
    private volatile bool _stuck;
    private long _leftOut;

    /// <summary>Outputs left out for want of room.</summary>
    public long LeftOut => Interlocked.Read(ref _leftOut);

    /// <summary>Takes an output, or counts it as left out.</summary>
    public void Post(MonitorOutput output)
    {
        if (output is not AlertOutput && !HasRoom())
        {
            Interlocked.Increment(ref _leftOut);
            meter.LeftOut(sink.Name);
            return;
        }

        Interlocked.Increment(ref _waiting);
        if (!_queue.Writer.TryWrite(output)) Interlocked.Decrement(ref _waiting);
    }

    /// <summary>Takes no more; the loop ends when the queue is empty.</summary>
    public void Complete() => _queue.Writer.TryComplete();

    /// <summary>Empties the queue into the sink until it is complete.</summary>
    public async Task RunAsync(CancellationToken cancellation)
    {
        await foreach (MonitorOutput output in _queue.Reader.ReadAllAsync(cancellation).ConfigureAwait(false))
        {
            await WriteAsync(output, cancellation).ConfigureAwait(false);
            if (Interlocked.Decrement(ref _waiting) >= Capacity) continue;
            _stuck = false;
            _room.Set();
        }
    }

    /// <inheritdoc/>
    public void Dispose() => _room.Dispose();

    private bool HasRoom()
    {
        if (Volatile.Read(ref _waiting) < Capacity) return true;

        // Once a wait was in vain, nobody waits again until the sink has moved.
        if (_stuck) return false;
        _room.Reset();
        if (Volatile.Read(ref _waiting) < Capacity || _room.Wait(Patience)) return true;
        _stuck = true;
        LogStuck(sink.Name, Capacity);
        return false;
    }

    private async Task WriteAsync(MonitorOutput output, CancellationToken cancellation)
    {
        int attempts = output is AlertOutput ? AlertAttempts : 1;
        TimeSpan pause = FirstPause;
        for (int attempt = 1; attempt <= attempts; attempt++)
        {
            try
            {
                await sink.WriteAsync(output, cancellation).ConfigureAwait(false);
                return;
            }
            catch (OperationCanceledException) when (cancellation.IsCancellationRequested)
            {
                throw;
            }
#pragma warning disable CA1031 // A sink is another's code: whatever it throws must not stop the others.
            catch (Exception failure)
#pragma warning restore CA1031
            {
                meter.Failure(sink.Name);
                LogWriteFailed(failure, sink.Name, output.GetType().Name, output.Array, attempt, attempts);
            }

            if (attempt == attempts) return;
            await Task.Delay(pause, time, cancellation).ConfigureAwait(false);
            pause = pause * 2 < LongestPause ? pause * 2 : LongestPause;
        }
    }

    [LoggerMessage(3101, LogLevel.Warning, "sink {Sink} does not keep up: {Waiting} outputs wait; all but alerts are left out until it does")]
    private partial void LogStuck(string sink, int waiting);

    [LoggerMessage(3102, LogLevel.Error, "sink {Sink} failed on {Output} of {Array} (attempt {Attempt} of {Attempts})")]
    private partial void LogWriteFailed(Exception failure, string sink, string output, string array, int attempt, int attempts);
}
