using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Monitoring.Ports;

/// <summary>What the store keeps, for the pages, the HTTP interface and a restart.</summary>
public interface IHistory
{
    /// <summary>A downsampled series of one metric.</summary>
    /// <param name="array">Id of the array.</param>
    /// <param name="metric">Metric name, as in <see cref="MetricSet"/>.</param>
    /// <param name="channel">0-based channel index; null for a field metric.</param>
    /// <param name="from">Event time, inclusive.</param>
    /// <param name="to">Event time, exclusive.</param>
    /// <param name="points">At most this many points, 2 to 10 000.</param>
    /// <param name="cancellation">Stops the query.</param>
    Task<TrendSeries> TrendAsync(string array, string metric, int? channel, DateTimeOffset from, DateTimeOffset to, int points, CancellationToken cancellation);

    /// <summary>One metric of every channel over time, for the channel × time picture.</summary>
    Task<TrendGrid> TrendGridAsync(string array, string metric, DateTimeOffset from, DateTimeOffset to, int points, CancellationToken cancellation);

    /// <summary>Alerts as of their last change, newest raised first.</summary>
    /// <param name="array">Only this array; null for all.</param>
    /// <param name="state">Only this state; null for all.</param>
    /// <param name="from">Raised at or after; null for no bound.</param>
    /// <param name="to">Raised before; null for no bound.</param>
    /// <param name="limit">At most this many.</param>
    /// <param name="cancellation">Stops the query.</param>
    Task<IReadOnlyList<AlertEvent>> AlertsAsync(string? array, AlertState? state, DateTimeOffset? from, DateTimeOffset? to, int limit, CancellationToken cancellation);

    /// <summary>Every change of one alert, oldest first.</summary>
    Task<IReadOnlyList<AlertEvent>> AlertHistoryAsync(string alertId, CancellationToken cancellation);

    /// <summary>Alerts of an array that were not back to normal when the service last stopped.</summary>
    Task<IReadOnlyList<AlertEvent>> OpenAlertsAsync(string array, CancellationToken cancellation);

    /// <summary>Kept coherence pictures' times and frequencies, newest first.</summary>
    Task<IReadOnlyList<CoherenceEntry>> CoherenceEntriesAsync(string array, DateTimeOffset from, DateTimeOffset to, CancellationToken cancellation);

    /// <summary>One kept coherence picture; null when there is none.</summary>
    Task<CoherencePicture?> CoherenceAsync(string array, long entry, CancellationToken cancellation);

    /// <summary>Writes one line of the audit log: who did what to which alert, why.</summary>
    Task AuditAsync(AuditEntry entry, CancellationToken cancellation);

    /// <summary>The audit log of one alert, oldest first.</summary>
    Task<IReadOnlyList<AuditEntry>> AuditLogAsync(string alertId, CancellationToken cancellation);
}

/// <summary>A series; NaN where there is nothing. Minimum and maximum are those of each point's interval.</summary>
public sealed record TrendSeries(DateTimeOffset[] Times, double[] Mean, double[] Minimum, double[] Maximum);

/// <summary>Channel × time values: Values[channel][time], NaN where there is nothing.</summary>
public sealed record TrendGrid(DateTimeOffset[] Times, double[][] Values);

/// <summary>One kept coherence picture.</summary>
public sealed record CoherenceEntry(long Entry, DateTimeOffset Time, double Frequency);

/// <summary>Who did what to which alert.</summary>
/// <param name="Alert">Id of the alert.</param>
/// <param name="Time">Wall clock.</param>
/// <param name="Action">"acknowledge", "shelve", "unshelve", "out-of-service", "return-to-service".</param>
/// <param name="Who">Name given by the caller.</param>
/// <param name="Why">Reason given by the caller; may be empty.</param>
/// <param name="Until">End that the caller asked for; null for none.</param>
public sealed record AuditEntry(string Alert, DateTimeOffset Time, string Action, string Who, string Why, DateTimeOffset? Until);
