using ArrayWatch.Signals;

namespace ArrayWatch.Monitoring.Ports;

/// <summary>Where messaging delivers what arrived for one array. Calls for one array come one at a time.</summary>
public interface IArrayInbox
{
    /// <summary>Id of the array.</summary>
    string Id { get; }

    /// <summary>Number of channels of the array.</summary>
    int ChannelCount { get; }

    /// <summary>Folds a frame into the estimates and decides when a decision is due, or refuses it. Reads the frame in place.</summary>
    /// <returns>Null when it was folded in; otherwise why not, already counted.</returns>
    Refusal? Accept(in SnapshotFrame frame);

    /// <summary>Takes what the platform knows.</summary>
    void Accept(EnvironmentReading reading);

    /// <summary>Counts a message that could not even be decoded.</summary>
    void Refuse(Refusal refusal);
}

/// <summary>Finds the inbox of an array by its id.</summary>
public interface IArrayDirectory
{
    /// <summary>All arrays of the configuration.</summary>
    IReadOnlyCollection<IArrayInbox> Inboxes { get; }

    /// <summary>The inbox of an array; null when the configuration has no such array.</summary>
    IArrayInbox? Find(string arrayId);
}

/// <summary>Why a message was refused.</summary>
/// <param name="Reason">The counter.</param>
/// <param name="Detail">What is wrong, where, and what to do; one sentence.</param>
public sealed record Refusal(RefusalReason Reason, string Detail);

/// <summary>Reasons to refuse a message; each has its own counter.</summary>
public enum RefusalReason
{
    /// <summary>Bytes that are no such message.</summary>
    NotDecodable,

    /// <summary>Data do not fill the stated shape.</summary>
    WrongShape,

    /// <summary>Not this array's number of channels.</summary>
    WrongChannelCount,

    /// <summary>Other bin centres than the stream began with.</summary>
    FrequenciesChanged,

    /// <summary>Earlier than what was already folded in.</summary>
    TimeBackwards,

    /// <summary>A sequence number seen before.</summary>
    SequenceRepeated,

    /// <summary>More bytes than allowed.</summary>
    TooLarge,

    /// <summary>A kind of message that this service does not take for this array.</summary>
    NotSupported,

    /// <summary>A time, interval, overlap or bin centre outside its range.</summary>
    OutOfRange,
}

/// <summary>What the platform knows of the water, the air and itself; null where it does not say.</summary>
public sealed record EnvironmentReading
{
    /// <summary>Event time.</summary>
    public DateTimeOffset? Time { get; init; }

    /// <summary>m/s.</summary>
    public double? SoundSpeed { get; init; }

    /// <summary>°C.</summary>
    public double? Temperature { get; init; }

    /// <summary>Practical salinity.</summary>
    public double? Salinity { get; init; }

    /// <summary>Metres.</summary>
    public double? Depth { get; init; }

    /// <summary>Degrees.</summary>
    public double? Heading { get; init; }

    /// <summary>m/s.</summary>
    public double? Speed { get; init; }

    /// <summary>m/s.</summary>
    public double? WindSpeed { get; init; }
}
