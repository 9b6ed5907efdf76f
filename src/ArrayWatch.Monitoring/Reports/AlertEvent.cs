namespace ArrayWatch.Monitoring.Reports;

/// <summary>An alert as of its last change: the alert message, the stored row and the page's line. Immutable.</summary>
public sealed record AlertEvent
{
    /// <summary>ULID; sorts by the time of raising.</summary>
    public required string Id { get; init; }

    /// <summary>Id of the array.</summary>
    public required string Array { get; init; }

    /// <summary>What is wrong, in the trade's word.</summary>
    public required string Kind { get; init; }

    /// <summary>Where it stands in the life of an alarm, after IEC 62682.</summary>
    public required AlertState State { get; init; }

    /// <summary>How soon somebody should act.</summary>
    public required AlertPriority Priority { get; init; }

    /// <summary>Labels of the channels.</summary>
    public required IReadOnlyList<string> Channels { get; init; }

    /// <summary>0-based indices of the channels, in the same order.</summary>
    public required IReadOnlyList<int> Indices { get; init; }

    /// <summary>The module or connector whose channels failed together; null for none.</summary>
    public string? Group { get; init; }

    /// <summary>When the fault began, event time.</summary>
    public required DateTimeOffset Onset { get; init; }

    /// <summary>When the alert was raised, event time.</summary>
    public required DateTimeOffset Raised { get; init; }

    /// <summary>When the fault was gone, event time; null while it stands.</summary>
    public DateTimeOffset? Returned { get; init; }

    /// <summary>When this event was made, event time.</summary>
    public required DateTimeOffset Changed { get; init; }

    /// <summary>Estimates by their contract names.</summary>
    public required IReadOnlyDictionary<string, object> Estimate { get; init; }

    /// <summary>0 to 1.</summary>
    public required double Confidence { get; init; }

    /// <summary>A suspected cause; null for none.</summary>
    public string? Cause { get; init; }

    /// <summary>What it costs: array gain lost, dB, by "conventional" and "adaptive", worst look direction.</summary>
    public IReadOnlyDictionary<string, double>? Effect { get; init; }

    /// <summary>What to do now, in a sentence.</summary>
    public required string Advice { get; init; }

    /// <summary>Kinds that cannot be told from this one; null for none.</summary>
    public IReadOnlyList<string>? Alternatives { get; init; }

    /// <summary>Why there are alternatives; null for nothing to say.</summary>
    public string? Reason { get; init; }

    /// <summary>Numbers that a person can check.</summary>
    public IReadOnlyDictionary<string, double>? Evidence { get; init; }

    /// <summary>Who acknowledged it; null while nobody has.</summary>
    public string? AcknowledgedBy { get; init; }

    /// <summary>When shelving or out-of-service ends by itself, wall clock; null for no end.</summary>
    public DateTimeOffset? Until { get; init; }
}

/// <summary>States of an alarm after IEC 62682 (ISA-18.2).</summary>
public enum AlertState
{
    /// <summary>Standing, and nobody has said that they know.</summary>
    Unacknowledged,

    /// <summary>Standing, and somebody knows.</summary>
    Acknowledged,

    /// <summary>Gone before anybody said that they know.</summary>
    ReturnedUnacknowledged,

    /// <summary>Gone and known.</summary>
    Normal,

    /// <summary>Put aside by a person for a time.</summary>
    Shelved,

    /// <summary>Held back by the service's own rule (a group alert stands over it).</summary>
    SuppressedByDesign,

    /// <summary>Taken out of use by a person, for maintenance.</summary>
    OutOfService,
}

/// <summary>How soon somebody should act.</summary>
public enum AlertPriority
{
    /// <summary>At the next convenient time.</summary>
    Low,

    /// <summary>This watch.</summary>
    Medium,

    /// <summary>Now: beams are spoilt.</summary>
    High,
}
