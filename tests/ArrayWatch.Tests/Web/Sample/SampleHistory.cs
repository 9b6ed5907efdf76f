using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;

namespace ArrayWatch.Tests.Web.Sample;

/// <summary>A store in memory, with invented trends: channel 11 goes wrong in the last third of whatever is asked for.</summary>
internal sealed class SampleHistory(int channels) : IHistory
{
    private readonly Lock _gate = new();
    private readonly List<AlertEvent> _changes = [];
    private readonly List<AuditEntry> _audit = [];

    /// <summary>What every query throws; null to answer.</summary>
    public Exception? Failure { get; set; }

    public Func<CoherencePicture?> Kept { get; set; } = static () => null;

    public void Keep(AlertEvent alert)
    {
        lock (_gate) _changes.Add(alert);
    }

    public Task<TrendSeries> TrendAsync(string array, string metric, int? channel, DateTimeOffset from, DateTimeOffset to, int points, CancellationToken cancellation)
    {
        ThrowIfFailing();
        int count = Math.Min(points, 200);
        double[] mean = [.. Enumerable.Range(0, count).Select(t => metric == "unheard-of" ? double.NaN : Value(channel ?? 0, t, count))];
        return Task.FromResult(new TrendSeries(Times(from, to, count), mean, [.. mean.Select(static v => v - 0.4)], [.. mean.Select(static v => v + 0.4)]));
    }

    public Task<TrendGrid> TrendGridAsync(string array, string metric, DateTimeOffset from, DateTimeOffset to, int points, CancellationToken cancellation)
    {
        ThrowIfFailing();
        int count = Math.Min(points, 120);
        return Task.FromResult(new TrendGrid(Times(from, to, count),
            [.. Enumerable.Range(0, channels).Select(c => Enumerable.Range(0, count).Select(t => Value(c, t, count)).ToArray())]));
    }

    public Task<IReadOnlyList<AlertEvent>> AlertsAsync(string? array, AlertState? state, DateTimeOffset? from, DateTimeOffset? to, int limit, CancellationToken cancellation)
    {
        ThrowIfFailing();
        lock (_gate)
        {
            return Task.FromResult<IReadOnlyList<AlertEvent>>(
            [
                .. _changes.GroupBy(static a => a.Id).Select(static g => g.Last())
                    .Where(a => (array is null || a.Array == array) && (state is null || a.State == state) && !(a.Raised < from) && !(a.Raised >= to))
                    .OrderByDescending(static a => a.Raised).Take(limit),
            ]);
        }
    }

    public Task<IReadOnlyList<AlertEvent>> AlertHistoryAsync(string alertId, CancellationToken cancellation)
    {
        ThrowIfFailing();
        lock (_gate) return Task.FromResult<IReadOnlyList<AlertEvent>>([.. _changes.Where(a => a.Id == alertId)]);
    }

    public Task<IReadOnlyList<AlertEvent>> OpenAlertsAsync(string array, CancellationToken cancellation) => AlertsAsync(array, null, null, null, 1000, cancellation);

    public Task<IReadOnlyList<CoherenceEntry>> CoherenceEntriesAsync(string array, DateTimeOffset from, DateTimeOffset to, CancellationToken cancellation)
    {
        ThrowIfFailing();
        return Task.FromResult<IReadOnlyList<CoherenceEntry>>([.. Enumerable.Range(1, 12).Select(i => new CoherenceEntry(i, to.AddMinutes(-10 * i), 500))]);
    }

    public Task<CoherencePicture?> CoherenceAsync(string array, long entry, CancellationToken cancellation)
    {
        ThrowIfFailing();
        return Task.FromResult(Kept());
    }

    public Task AuditAsync(AuditEntry entry, CancellationToken cancellation)
    {
        lock (_gate) _audit.Add(entry);
        return Task.CompletedTask;
    }

    public Task<IReadOnlyList<AuditEntry>> AuditLogAsync(string alertId, CancellationToken cancellation)
    {
        lock (_gate) return Task.FromResult<IReadOnlyList<AuditEntry>>([.. _audit.Where(a => a.Alert == alertId)]);
    }

    private static DateTimeOffset[] Times(DateTimeOffset from, DateTimeOffset to, int count) =>
        [.. Enumerable.Range(0, count).Select(i => from + ((to - from) * ((i + 0.5) / count)))];

    private static double Value(int channel, int t, int count) =>
        channel == 4 && t > count / 2 && t < (count / 2) + 12 ? double.NaN
        : (0.3 * Math.Sin((channel * 1.3) + (t * 0.31))) + (channel == 11 && t > 2 * count / 3 ? -7 : 0);

    private void ThrowIfFailing()
    {
        if (Failure is { } failure) throw failure;
    }
}
