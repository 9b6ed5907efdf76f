namespace ArrayWatch.Monitoring.Streams;

/// <summary>Seconds since 1970, as streams carry them, to calendar time and back.</summary>
internal static class EventTime
{
    /// <summary>The last second of the year 9999.</summary>
    public const double MaximumSeconds = 253_402_300_799;

    /// <summary>Calendar time, to the microsecond; times outside 1970 to 9999 give the nearest limit.</summary>
    public static DateTimeOffset FromSeconds(double seconds) =>
        DateTimeOffset.UnixEpoch.AddTicks((long)Math.Round(Math.Clamp(seconds, 0, MaximumSeconds) * 1e6) * TimeSpan.TicksPerMicrosecond);

    /// <summary>Seconds since 1970.</summary>
    public static double ToSeconds(DateTimeOffset time) => (time - DateTimeOffset.UnixEpoch).TotalSeconds;
}
