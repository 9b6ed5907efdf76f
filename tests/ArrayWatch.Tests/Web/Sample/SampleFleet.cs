using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Signals;

namespace ArrayWatch.Tests.Web.Sample;

/// <summary>Invented arrays with one fault or another, whose alerts live by the same rules as real ones.</summary>
internal sealed class SampleFleet : IFleet
{
    private readonly Lock _gate = new();
    private readonly TimeProvider _time;
    private readonly Dictionary<string, SampleArray> _arrays;
    private readonly List<AlertEvent> _alerts = [];
    private readonly SampleHistory _history;
    private long _revision;

    public SampleFleet(TimeProvider time, SampleHistory history, params SampleArray[] arrays)
    {
        _time = time;
        _history = history;
        _arrays = arrays.ToDictionary(static a => a.Id);
        foreach (SampleArray array in arrays)
        {
            foreach (AlertEvent alert in array.Alerts) Raise(alert);
        }
    }

    public IReadOnlyList<ArrayOverview> Arrays
    {
        get
        {
            lock (_gate) return [.. _arrays.Values.Select(a => a.Overview(_time.GetUtcNow(), OpenAlerts.Count(e => e.Array == a.Id)))];
        }
    }

    public IReadOnlyList<AlertEvent> OpenAlerts
    {
        get
        {
            lock (_gate) return [.. _alerts.Where(static a => a.State != AlertState.Normal).OrderByDescending(static a => a.Raised)];
        }
    }

    public long Revision => Interlocked.Read(ref _revision);

    public HealthReport? Health(string arrayId) => _arrays.GetValueOrDefault(arrayId)?.Health(_time.GetUtcNow(), OpenAlerts);

    public CorrectionReport? Corrections(string arrayId) => _arrays.GetValueOrDefault(arrayId)?.Corrections(_time.GetUtcNow());

    public CoherencePicture? Coherence(string arrayId, double frequency, string scale) =>
        _arrays.GetValueOrDefault(arrayId)?.Coherence(frequency, scale, _time.GetUtcNow());

    public void Raise(AlertEvent alert)
    {
        lock (_gate)
        {
            _alerts.RemoveAll(a => a.Id == alert.Id);
            _alerts.Add(alert);
        }
        _history.Keep(alert);
        Interlocked.Increment(ref _revision);
    }

    public void Change(string arrayId, Func<SampleArray, SampleArray> change)
    {
        lock (_gate) _arrays[arrayId] = change(_arrays[arrayId]);
        Interlocked.Increment(ref _revision);
    }

    public async Task<AlertEvent?> ActAsync(AlertAction action, CancellationToken cancellation)
    {
        AlertEvent? alert = OpenAlerts.FirstOrDefault(a => a.Id == action.Alert);
        if (alert is null) return null;
        if (action.Verb == AlertVerb.Unshelve && alert.State != AlertState.Shelved)
            throw new InvalidOperationException("the alert is not shelved, so it cannot be taken back from the shelf");
        AlertEvent after = action.Verb switch
        {
            AlertVerb.Acknowledge => alert with { State = alert.Returned is null ? AlertState.Acknowledged : AlertState.Normal, AcknowledgedBy = action.Who },
            AlertVerb.Shelve => alert with { State = AlertState.Shelved, Until = action.Until },
            AlertVerb.Unshelve => alert with { State = AlertState.Unacknowledged, Until = null },
            _ => alert with { State = alert.State == AlertState.OutOfService ? AlertState.Unacknowledged : AlertState.OutOfService, Until = action.Until },
        };
        string verb = action.Verb == AlertVerb.OutOfService ? "out-of-service" : action.Verb.ToString().ToLowerInvariant();
        await _history.AuditAsync(new AuditEntry(action.Alert, _time.GetUtcNow(), verb, action.Who, action.Why, action.Until), cancellation);
        Raise(after with { Changed = _time.GetUtcNow() });
        return after;
    }
}
