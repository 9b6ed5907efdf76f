using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Messaging.Outbound;

/// <summary>
/// What waits for the broker. Alerts go first, in order, and up to <see cref="MostAlerts"/> are kept; of an array's
/// health and corrections only the newest matters, and a newer one takes the place of the one that waits.
/// </summary>
/// <remarks>Safe from any thread; one reader takes from it.</remarks>
internal sealed class OutboundQueue
{
    /// <summary>Beyond it the oldest alert gives way: an hour of nearly three changes a second without a broker.</summary>
    public const int MostAlerts = 10_000;

    private readonly Lock _lock = new();
    private readonly LinkedList<MonitorOutput> _alerts = new();
    private readonly OrderedDictionary<(string Array, Type Kind), MonitorOutput> _newest = [];
    private TaskCompletionSource _arrival = new(TaskCreationOptions.RunContinuationsAsynchronously);

    /// <summary>How many wait.</summary>
    public int Count
    {
        get
        {
            lock (_lock) return _alerts.Count + _newest.Count;
        }
    }

    /// <summary>Takes one in.</summary>
    /// <returns>False when the oldest alert had to give way.</returns>
    public bool Add(MonitorOutput output)
    {
        bool fits = true;
        lock (_lock)
        {
            if (output is AlertOutput)
            {
                _alerts.AddLast(output);
                fits = _alerts.Count <= MostAlerts;
                if (!fits) _alerts.RemoveFirst();
            }
            else
            {
                _newest[(output.Array, output.GetType())] = output;
            }
            _arrival.TrySetResult();
        }
        return fits;
    }

    /// <summary>What to send next, which stays until <see cref="Complete"/>; null when nothing waits.</summary>
    public MonitorOutput? Peek()
    {
        lock (_lock)
        {
            if (_alerts.First is { } alert) return alert.Value;
            if (_newest.Count > 0) return _newest.GetAt(0).Value;
            if (_arrival.Task.IsCompleted) _arrival = new(TaskCreationOptions.RunContinuationsAsynchronously);
            return null;
        }
    }

    /// <summary>It has been sent; a newer one in its place stays.</summary>
    public void Complete(MonitorOutput output)
    {
        lock (_lock)
        {
            if (output is AlertOutput)
            {
                if (ReferenceEquals(_alerts.First?.Value, output)) _alerts.RemoveFirst();
                return;
            }
            (string, Type) key = (output.Array, output.GetType());
            if (_newest.TryGetValue(key, out MonitorOutput? waiting) && ReferenceEquals(waiting, output)) _newest.Remove(key);
        }
    }

    /// <summary>Waits until something is there, after <see cref="Peek"/> found nothing.</summary>
    public Task WaitAsync(CancellationToken cancellation)
    {
        lock (_lock) return _arrival.Task.WaitAsync(cancellation);
    }
}
