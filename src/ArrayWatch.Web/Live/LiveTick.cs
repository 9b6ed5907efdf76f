using ArrayWatch.Monitoring.Ports;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Web.Live;

/// <summary>
/// The one clock of a circuit: once a second it tells the page's parts to draw ages anew, and whether the fleet has
/// changed since. Runs only while something listens; the loop is awaited on disposal. One circuit at a time.
/// </summary>
internal sealed partial class LiveTick(IFleet fleet, TimeProvider time, ILogger<LiveTick> log) : IAsyncDisposable
{
    private readonly Lock _gate = new();
    private readonly CancellationTokenSource _stop = new();
    private readonly List<Func<bool, Task>> _listeners = [];
    private Task? _loop;

    /// <summary>Wall clock.</summary>
    public DateTimeOffset Now => time.GetUtcNow();

    /// <summary>Calls <paramref name="listener"/> once a second, with true when the fleet changed, until the answer is disposed.</summary>
    public IDisposable Listen(Func<bool, Task> listener)
    {
        ArgumentNullException.ThrowIfNull(listener);
        lock (_gate)
        {
            ObjectDisposedException.ThrowIf(_stop.IsCancellationRequested, this);
            _listeners.Add(listener);
            _loop ??= RunAsync(new PeriodicTimer(TimeSpan.FromSeconds(1), time), _stop.Token);
        }
        return new Subscription(this, listener);
    }

    /// <inheritdoc/>
    public async ValueTask DisposeAsync()
    {
        Task? loop;
        lock (_gate)
        {
            if (_stop.IsCancellationRequested) return;
            _stop.Cancel();
            _listeners.Clear();
            loop = _loop;
        }
        if (loop is not null) await loop.ConfigureAwait(false);
        _stop.Dispose();
    }

    private async Task RunAsync(PeriodicTimer timer, CancellationToken stop)
    {
        using (timer)
        {
            long seen = fleet.Revision;
            try
            {
                while (await timer.WaitForNextTickAsync(stop).ConfigureAwait(false))
                {
                    long revision = fleet.Revision;
                    bool changed = revision != seen;
                    seen = revision;
                    await TellAsync(changed).ConfigureAwait(false);
                }
            }
            catch (OperationCanceledException) when (stop.IsCancellationRequested)
            {
                // The circuit has ended.
            }
        }
    }

    private async Task TellAsync(bool changed)
    {
        Func<bool, Task>[] listeners;
        lock (_gate) listeners = [.. _listeners];
        foreach (Func<bool, Task> listener in listeners)
        {
            try
            {
                await listener(changed).ConfigureAwait(false);
            }
            catch (ObjectDisposedException)
            {
                // That part of the page went away between the tick and the call.
            }
#pragma warning disable CA1031 // One part's failure must not stop the clock of the others.
            catch (Exception e)
#pragma warning restore CA1031
            {
                LogListenerFailed(e);
            }
        }
    }

    private void Forget(Func<bool, Task> listener)
    {
        lock (_gate) _listeners.Remove(listener);
    }

    [LoggerMessage(EventId = 7001, Level = LogLevel.Error, Message = "A part of a page could not be updated; it stays as it was until the next change")]
    private partial void LogListenerFailed(Exception exception);

    private sealed class Subscription(LiveTick owner, Func<bool, Task> listener) : IDisposable
    {
        public void Dispose() => owner.Forget(listener);
    }
}
