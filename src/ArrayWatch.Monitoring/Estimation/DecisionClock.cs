namespace ArrayWatch.Monitoring.Estimation;

/// <summary>
/// Says when a decision is due: every sixth of the fast memory of event time, at least once a minute, and not twice in a
/// frame. One caller at a time.
/// </summary>
internal sealed class DecisionClock(TimeSpan timeConstant)
{
    // Event times are doubles of seconds since 1970: half a microsecond is their rounding.
    private const double Rounding = 1e-6;

    private const double LongestSeconds = 60;

    private double _last = double.NaN;

    /// <summary>Seconds from one decision to the next, when frames are shorter.</summary>
    public double IntervalSeconds { get; } = Math.Min(LongestSeconds, timeConstant.TotalSeconds / 6);

    /// <summary>Starts counting from an event time.</summary>
    public void Begin(double timeSeconds) => _last = timeSeconds;

    /// <summary>Whether a decision is due; answers true once.</summary>
    public bool IsDue(double timeSeconds)
    {
        if (!(timeSeconds - _last >= IntervalSeconds - Rounding)) return false;
        _last = timeSeconds;
        return true;
    }
}
