using System.Collections.Frozen;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using Microsoft.Extensions.Logging;

namespace ArrayWatch.Monitoring.Hosting;

/// <summary>All arrays. Readers see immutable views, replaced whole by each array's pipeline. Safe from any thread.</summary>
public sealed partial class Fleet : IFleet, IArrayDirectory
{
    /// <summary>Who the audit log names when the clock, not a person, ends a shelf.</summary>
    public const string Clock = "clock";

    private readonly ArrayPipeline[] _pipelines;
    private readonly FrozenDictionary<string, ArrayPipeline> _byId;
    private readonly IHistory _history;
    private readonly TimeProvider _time;
    private readonly ILogger<Fleet> _logger;
    private long _revision;

    /// <summary>One pipeline an array.</summary>
    /// <exception cref="ArgumentException">Two arrays have one id, or an array cannot be diagnosed as configured; the message says why.</exception>
    public Fleet(
        IReadOnlyList<ArrayDefinition> arrays,
        OutputDispatcher dispatcher,
        IHistory history,
        TimeProvider time,
        MonitorMeter meter,
        ILogger<Fleet> logger)
    {
        ArgumentNullException.ThrowIfNull(arrays);
        ArgumentNullException.ThrowIfNull(dispatcher);
        (_history, _time, _logger) = (history, time, logger);
        _pipelines = [.. arrays.Select(a => new ArrayPipeline(a, dispatcher.Post, Changed, time, meter, logger))];
        _byId = _pipelines.ToFrozenDictionary(p => p.Id, StringComparer.Ordinal);
    }

    /// <inheritdoc/>
    public IReadOnlyCollection<IArrayInbox> Inboxes => _pipelines;

    /// <inheritdoc/>
    public IReadOnlyList<ArrayOverview> Arrays => [.. _pipelines.Select(p => p.View.Overview)];

    /// <inheritdoc/>
    public IReadOnlyList<AlertEvent> OpenAlerts =>
        [.. _pipelines.SelectMany(p => p.View.OpenAlerts).OrderByDescending(a => a.Raised).ThenByDescending(a => a.Id, StringComparer.Ordinal)];

    /// <inheritdoc/>
    public long Revision => Interlocked.Read(ref _revision);

    /// <inheritdoc/>
    public IArrayInbox? Find(string arrayId) => _byId.GetValueOrDefault(arrayId);

    /// <inheritdoc/>
    public HealthReport? Health(string arrayId) => _byId.GetValueOrDefault(arrayId)?.View.Health;

    /// <inheritdoc/>
    public CorrectionReport? Corrections(string arrayId) => _byId.GetValueOrDefault(arrayId)?.View.Corrections;

    /// <inheritdoc/>
    public CoherencePicture? Coherence(string arrayId, double frequency, string scale) =>
        _byId.GetValueOrDefault(arrayId)?.Coherence(frequency, scale);

    /// <inheritdoc/>
    public async Task<AlertEvent?> ActAsync(AlertAction action, CancellationToken cancellation)
    {
        ArgumentNullException.ThrowIfNull(action);
        foreach (ArrayPipeline p in _pipelines)
        {
            // The view is read first, so that an array in the midst of a decision does not hold up another's alert.
            if (p.View.OpenAlerts.All(a => a.Id != action.Alert) || p.Act(action) is not { } result) continue;
            LogAction(p.Id, result.Done, action.Alert, action.Who);
            await _history.AuditAsync(Entry(action.Alert, result.Done, action.Who, action.Why, action.Until), cancellation).ConfigureAwait(false);
            return result.Alert;
        }

        return null;
    }

    /// <summary>Takes up the alerts that were open when the service last stopped.</summary>
    public async Task RestoreAsync(CancellationToken cancellation)
    {
        foreach (ArrayPipeline p in _pipelines)
        {
            IReadOnlyList<AlertEvent> open = await _history.OpenAlertsAsync(p.Id, cancellation).ConfigureAwait(false);
            p.Restore(open);
            if (open.Count > 0) LogRestored(p.Id, open.Count);
        }
    }

    /// <summary>Lets each array look at the wall clock: silence, ends of shelves.</summary>
    public async Task TickAsync(CancellationToken cancellation)
    {
        foreach (ArrayPipeline p in _pipelines)
        {
            foreach ((AlertEvent alert, string done) in p.Tick())
            {
                LogAction(p.Id, done, alert.Id, Clock);
                await _history.AuditAsync(Entry(alert.Id, done, Clock, "its end has come", null), cancellation).ConfigureAwait(false);
            }
        }
    }

    private AuditEntry Entry(string alert, string done, string who, string why, DateTimeOffset? until) =>
        new(alert, _time.GetUtcNow(), done, who, why, until);

    private void Changed() => Interlocked.Increment(ref _revision);

    [LoggerMessage(3201, LogLevel.Information, "{Array}: {Done} of alert {Alert} by {Who}")]
    private partial void LogAction(string array, string done, string alert, string who);

    [LoggerMessage(3202, LogLevel.Information, "{Array}: {Count} open alerts taken up from the store")]
    private partial void LogRestored(string array, int count);
}
