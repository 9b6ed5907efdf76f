using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Monitoring.Streams;

namespace ArrayWatch.Monitoring.Alerts;

/// <summary>
/// The life of one array's alerts after IEC 62682: raised, acknowledged, shelved, held back, out of service, back to
/// normal. Pure: event time comes with each call, and wall-clock time with those that end a shelf. One caller at a time.
/// </summary>
/// <remarks>
/// A fault that comes again before its return was acknowledged goes on under its id, and is announced anew; after it
/// was back to normal it is a new alert. A fault that comes and goes too often stays standing, with that as its
/// reason, until it has been gone for a whole window. An estimate that changes materially is told again, at
/// most every <see cref="RetellSeconds"/> of event time.
/// </remarks>
internal sealed class AlertBook
{
    internal const double RetellSeconds = 300;

    private readonly ArrayDefinition _array;
    private readonly AlertWriter _writer;
    private readonly ChatterWatch _chatter;
    private readonly Dictionary<string, AlertEntry> _open = new(StringComparer.Ordinal);

    /// <summary>Starts without an alert.</summary>
    public AlertBook(ArrayDefinition array)
    {
        _array = array;
        _chatter = new ChatterWatch(Math.Max(60, 10 * array.TimeConstant.TotalSeconds));
        _writer = new AlertWriter(array, _chatter.WindowSeconds);
    }

    /// <summary>Every alert that is not back to normal, as last told, newest raised first.</summary>
    public IReadOnlyList<AlertEvent> Open =>
        [.. _open.Values.Select(e => e.Last).OfType<AlertEvent>().OrderByDescending(a => a.Id, StringComparer.Ordinal)];

    /// <summary>Channels that a person took out of service.</summary>
    public IReadOnlySet<int> OutOfServiceChannels =>
        _open.Values.Where(e => e.OutOfService).SelectMany(e => e.Finding.Indices).ToHashSet();

    /// <summary>Takes up alerts that were open when the service last stopped. They stand until evidence says otherwise.</summary>
    public void Restore(IEnumerable<AlertEvent> alerts)
    {
        foreach (AlertEvent a in alerts)
        {
            if (a.State == AlertState.Normal || a.Indices.Any(i => i < 0 || i >= _array.Geometry.Count)) continue;
            AlertEntry entry = new(a);
            _open.TryAdd(entry.Key, entry);
        }
    }

    /// <summary>Evidence starts from nothing: open alerts stand, as after a restart, until it speaks again.</summary>
    public void Unsettle()
    {
        foreach (AlertEntry e in _open.Values) e.Unsettle();
    }

    /// <summary>Takes what is wrong now, and answers the alerts that have changed by it.</summary>
    /// <param name="timeSeconds">Event time, seconds since 1970.</param>
    /// <param name="conditions">Everything that is wrong now.</param>
    /// <param name="evidence">Whether a fault that is not among them can be said to be gone.</param>
    /// <param name="effect">What the array's beams have lost now; null when unknown.</param>
    public IReadOnlyList<AlertEvent> Update(
        double timeSeconds, IReadOnlyList<AlertCondition> conditions, ReturnEvidence evidence, IReadOnlyDictionary<string, double>? effect)
    {
        Dictionary<string, AlertState?> before = _open.Values.ToDictionary(e => e.Key, e => e.Last?.State, StringComparer.Ordinal);
        HashSet<AlertEntry> changed = [];
        _chatter.Sweep(timeSeconds);
        HashSet<string> seen = new(StringComparer.Ordinal);
        foreach (AlertCondition c in conditions)
        {
            if (seen.Add(c.Key)) See(c, timeSeconds, effect, changed);
        }

        foreach (AlertEntry e in _open.Values)
        {
            if (double.IsNaN(e.SentSeconds) || e.SentSeconds > timeSeconds) e.SentSeconds = timeSeconds;
            if (seen.Contains(e.Key) || !e.Active || e.OutOfService) continue;
            if (e.Restored && double.IsNaN(e.UnsettledSeconds) && evidence.Speaks(e.Finding)) e.UnsettledSeconds = timeSeconds;
            if (evidence.SaysGone(e.Finding, e.Restored ? timeSeconds - e.UnsettledSeconds : null)) Miss(e, timeSeconds, changed);
        }

        HoldBack();
        foreach (AlertEntry e in _open.Values)
        {
            if (before.GetValueOrDefault(e.Key) is not { } state || state != e.State) changed.Add(e);
        }

        return Tell(changed, timeSeconds);
    }

    /// <summary>Carries out a person's action.</summary>
    /// <returns>The alert after it and the action's name in the audit log; null when no such alert is open.</returns>
    /// <exception cref="InvalidOperationException">The action is not possible in the alert's state; the message says why.</exception>
    public (AlertEvent Alert, string Done)? Act(AlertAction action, double timeSeconds, DateTimeOffset now)
    {
        if (_open.Values.FirstOrDefault(e => e.Id == action.Alert) is not { } entry) return null;
        string done = AlertActions.Apply(entry, action, now);
        return (Tell([entry], timeSeconds)[0], done);
    }

    /// <summary>Ends shelves and out-of-service whose end has passed on the wall clock.</summary>
    public IReadOnlyList<(AlertEvent Alert, string Done)> Expire(double timeSeconds, DateTimeOffset now)
    {
        List<(AlertEvent, string)> told = [];
        foreach (AlertEntry e in _open.Values.Where(e => (e.Shelved || e.OutOfService) && e.Until <= now).OrderBy(e => e.Id, StringComparer.Ordinal).ToArray())
        {
            string done = e.OutOfService ? "return-to-service" : "unshelve";
            if (e.OutOfService) AlertActions.BringBack(e);
            else AlertActions.TakeFromShelf(e);
            told.Add((Tell([e], timeSeconds)[0], done));
        }

        return told;
    }

    private void See(AlertCondition condition, double timeSeconds, IReadOnlyDictionary<string, double>? effect, HashSet<AlertEntry> changed)
    {
        if (!_open.TryGetValue(condition.Key, out AlertEntry? entry))
        {
            DateTimeOffset raised = EventTime.FromSeconds(timeSeconds);
            entry = new AlertEntry(condition.Key, AlertIdentity.Create(_array.Id, condition.Key, raised), raised, condition.Finding)
            {
                Priority = AlertPolicy.Priority(condition.Finding, effect),
                Effect = effect,
            };
            _open.Add(condition.Key, entry);
            changed.Add(entry);
        }

        if (!entry.Present) _chatter.Raised(entry.Key, timeSeconds);
        entry.Current = entry.Restored ? KeepOnset(entry.Finding, condition.Finding) : condition.Finding;
        if (!entry.Active)
        {
            entry.Returned = null;
            entry.Acknowledged = false;
            entry.AcknowledgedBy = null;
            changed.Add(entry);
        }
        else if (timeSeconds - entry.SentSeconds >= RetellSeconds && MaterialChange.Between(entry.Finding, entry.Current))
        {
            // Compared with what was last told, so that a slow drift adds up to a change worth telling.
            entry.Effect = effect;
            changed.Add(entry);
        }

        entry.Active = entry.Present = true;
        entry.Restored = false;
        entry.SeenSeconds = timeSeconds;
    }

    /// <summary>A fault that stood before a restart began when it then began, not when it was seen again.</summary>
    private static Finding KeepOnset(Finding before, Finding now) => now with { OnsetSeconds = Math.Min(before.OnsetSeconds, now.OnsetSeconds) };

    private void Miss(AlertEntry entry, double timeSeconds, HashSet<AlertEntry> changed)
    {
        bool went = entry.Present;
        entry.Present = false;
        if (!entry.Held && went && _chatter.Chatters(entry.Key, timeSeconds))
        {
            entry.Held = true;
            changed.Add(entry);
        }

        if (entry.Held && timeSeconds >= entry.SeenSeconds && timeSeconds - entry.SeenSeconds < _chatter.WindowSeconds) return;
        entry.Held = entry.Active = entry.Restored = false;
        entry.Returned = EventTime.FromSeconds(timeSeconds);
        if (entry.Suppressed)
        {
            // Never announced while its group's alert stood over it: there is nothing to acknowledge.
            entry.Suppressed = false;
            entry.Acknowledged = true;
        }

        changed.Add(entry);
    }

    private void HoldBack()
    {
        AlertEntry[] groups = [.. _open.Values.Where(e => e.Active && !e.OutOfService && e.Finding.Group is not null)];
        foreach (AlertEntry e in _open.Values)
            e.Suppressed = e.Active && groups.Any(g => g != e && AlertPolicy.Covers(g.Finding, e.Finding));
    }

    private List<AlertEvent> Tell(IEnumerable<AlertEntry> entries, double timeSeconds)
    {
        List<AlertEvent> told = [];
        foreach (AlertEntry e in entries.OrderBy(e => e.Id, StringComparer.Ordinal))
        {
            e.Finding = e.Current;
            e.Last = _writer.Write(e, timeSeconds);
            e.SentSeconds = timeSeconds;
            told.Add(e.Last);
            if (e.State == AlertState.Normal) _open.Remove(e.Key);
        }

        return told;
    }
}
