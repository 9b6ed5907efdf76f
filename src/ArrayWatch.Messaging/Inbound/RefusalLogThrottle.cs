namespace ArrayWatch.Messaging.Inbound;

/// <summary>Lets the reason of a refusal into the log at most once a minute for each array, and counts what it held back.</summary>
/// <remarks>One for each array; for one thread at a time.</remarks>
/// <param name="time">The clock.</param>
public sealed class RefusalLogThrottle(TimeProvider time)
{
    /// <summary>One minute.</summary>
    public static readonly TimeSpan Interval = TimeSpan.FromMinutes(1);

    private long? _last;
    private long _heldBack;

    /// <summary>Whether to log this refusal.</summary>
    /// <param name="heldBack">Refusals since the last that was logged, this one not counted.</param>
    public bool Admit(out long heldBack)
    {
        if (_last is { } last && time.GetElapsedTime(last) < Interval)
        {
            heldBack = ++_heldBack;
            return false;
        }
        heldBack = _heldBack;
        _heldBack = 0;
        _last = time.GetTimestamp();
        return true;
    }
}
