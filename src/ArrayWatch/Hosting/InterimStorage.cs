using ArrayWatch.Configuration;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
namespace ArrayWatch.Hosting;

/// <summary>Stands where the store will be: keeps nothing.</summary>
internal static class InterimStorage
{
    public static IServiceCollection AddStorage(this IServiceCollection s, StoreSettings a, InfluxSettings? b) { _ = a; _ = b; return s.AddSingleton<IHistory, NoHistory>(); }
    private sealed class NoHistory : IHistory
    {
        public Task<IReadOnlyList<AlertEvent>> AlertHistoryAsync(string alertId, CancellationToken cancellation) => Task.FromResult<IReadOnlyList<AlertEvent>>([]);
        public Task<IReadOnlyList<AlertEvent>> AlertsAsync(string? array, AlertState? state, DateTimeOffset? from, DateTimeOffset? to, int limit, CancellationToken cancellation) => Task.FromResult<IReadOnlyList<AlertEvent>>([]);
        public Task AuditAsync(AuditEntry entry, CancellationToken cancellation) => Task.CompletedTask;
        public Task<IReadOnlyList<AuditEntry>> AuditLogAsync(string alertId, CancellationToken cancellation) => Task.FromResult<IReadOnlyList<AuditEntry>>([]);
        public Task<CoherencePicture?> CoherenceAsync(string array, long entry, CancellationToken cancellation) => Task.FromResult<CoherencePicture?>(null);
        public Task<IReadOnlyList<CoherenceEntry>> CoherenceEntriesAsync(string array, DateTimeOffset from, DateTimeOffset to, CancellationToken cancellation) => Task.FromResult<IReadOnlyList<CoherenceEntry>>([]);
        public Task<IReadOnlyList<AlertEvent>> OpenAlertsAsync(string array, CancellationToken cancellation) => Task.FromResult<IReadOnlyList<AlertEvent>>([]);
        public Task<TrendSeries> TrendAsync(string array, string metric, int? channel, DateTimeOffset from, DateTimeOffset to, int points, CancellationToken cancellation) => Task.FromResult(new TrendSeries([], [], [], []));
        public Task<TrendGrid> TrendGridAsync(string array, string metric, DateTimeOffset from, DateTimeOffset to, int points, CancellationToken cancellation) => Task.FromResult(new TrendGrid([], []));
    }
}
