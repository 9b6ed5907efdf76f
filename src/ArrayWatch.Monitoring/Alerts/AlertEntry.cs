using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Reports;
using ArrayWatch.Monitoring.Streams;

namespace ArrayWatch.Monitoring.Alerts;

/// <summary>One open alert: what is wrong, what people and rules have done to it, and what was last said of it. One caller at a time.</summary>
internal sealed class AlertEntry
{
    /// <summary>A new alert.</summary>
    public AlertEntry(string key, string id, DateTimeOffset raised, Finding finding)
    {
        (Key, Id, Raised, Finding, Current) = (key, id, raised, finding, finding);
    }

    /// <summary>An alert that was open when the service last stopped.</summary>
    public AlertEntry(AlertEvent stored)
    {
        Key = AlertCondition.KeyOf(stored.Kind, stored.Indices, stored.Cause);
        (Id, Raised, Returned) = (stored.Id, stored.Raised, stored.Returned);
        Active = Present = stored.Returned is null;
        Acknowledged = stored.State == AlertState.Acknowledged;
        Shelved = stored.State == AlertState.Shelved;
        Suppressed = stored.State == AlertState.SuppressedByDesign;
        OutOfService = stored.State == AlertState.OutOfService;
        (AcknowledgedBy, Until, Priority, Effect) = (stored.AcknowledgedBy, stored.Until, stored.Priority, stored.Effect);
        Restored = true;
        Last = stored;
        Finding = new Finding
        {
            Kind = stored.Kind,
            Indices = stored.Indices,
            Group = stored.Group,
            OnsetSeconds = EventTime.ToSeconds(stored.Onset),
            Confidence = stored.Confidence,
            Estimate = stored.Estimate,
            Cause = stored.Cause,
            Alternatives = stored.Alternatives ?? [],
            Reason = stored.Reason,
            Evidence = stored.Evidence ?? new Dictionary<string, double>(),
        };
        Current = Finding;
    }

    public string Key { get; }

    public string Id { get; }

    /// <summary>When it was raised, event time.</summary>
    public DateTimeOffset Raised { get; }

    /// <summary>When the fault was gone, event time; null while it stands.</summary>
    public DateTimeOffset? Returned { get; set; }

    /// <summary>What is wrong, as last told.</summary>
    public Finding Finding { get; set; }

    /// <summary>What is wrong, as last seen.</summary>
    public Finding Current { get; set; }

    /// <summary>Whether the alert stands: the fault is there, or is held for chattering.</summary>
    public bool Active { get; set; }

    /// <summary>Whether the fault was there at the last look.</summary>
    public bool Present { get; set; }

    public bool Acknowledged { get; set; }

    public bool Shelved { get; set; }

    public bool Suppressed { get; set; }

    public bool OutOfService { get; set; }

    /// <summary>Whether it is held because it came and went too often.</summary>
    public bool Held { get; set; }

    /// <summary>Whether it is known from before alone: no evidence since has spoken for or against it yet.</summary>
    public bool Restored { get; set; }

    /// <summary>Event time since which evidence comes in on a restored alert, seconds since 1970; NaN before that.</summary>
    public double UnsettledSeconds { get; set; } = double.NaN;

    public string? AcknowledgedBy { get; set; }

    public DateTimeOffset? Until { get; set; }

    public AlertPriority Priority { get; set; }

    public IReadOnlyDictionary<string, double>? Effect { get; set; }

    /// <summary>Event time at which the fault was last there, seconds since 1970; NaN when this run has not seen it.</summary>
    public double SeenSeconds { get; set; } = double.NaN;

    /// <summary>Event time of <see cref="Last"/>, seconds since 1970; NaN when an earlier run sent it.</summary>
    public double SentSeconds { get; set; } = double.NaN;

    /// <summary>What was last said of it.</summary>
    public AlertEvent? Last { get; set; }

    /// <summary>Evidence starts from nothing.</summary>
    public void Unsettle()
    {
        Restored = true;
        UnsettledSeconds = double.NaN;
    }

    /// <summary>Where it stands: a person's out-of-service and shelf come first, then the service's own rule, then fault and acknowledgement.</summary>
    public AlertState State =>
        OutOfService ? AlertState.OutOfService
        : Shelved ? AlertState.Shelved
        : Suppressed ? AlertState.SuppressedByDesign
        : (Active, Acknowledged) switch
        {
            (true, false) => AlertState.Unacknowledged,
            (true, true) => AlertState.Acknowledged,
            (false, false) => AlertState.ReturnedUnacknowledged,
            (false, true) => AlertState.Normal,
        };
}
