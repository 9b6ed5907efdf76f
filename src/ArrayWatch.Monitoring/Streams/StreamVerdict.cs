using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Monitoring.Streams;

/// <summary>What is to be done with one frame.</summary>
/// <param name="Refusal">Why it is refused; null when it may be folded in.</param>
/// <param name="Begins">Whether it begins a new stream.</param>
/// <param name="Restart">Whether what is known must be forgotten first: other bins, or a clock that was set back.</param>
/// <param name="GapSeconds">Time without data before it, seconds; 0 for none.</param>
/// <param name="MissingFrames">Frames that the sequence says are lost before it.</param>
internal readonly record struct StreamVerdict(
    Refusal? Refusal, StreamBegin Begins = StreamBegin.No, bool Restart = false, double GapSeconds = 0, ulong MissingFrames = 0)
{
    public static StreamVerdict Refuse(RefusalReason reason, string detail) => new(new Refusal(reason, detail));
}

/// <summary>Whether a frame begins a stream, and by what sign.</summary>
internal enum StreamBegin
{
    /// <summary>It goes on with the one before.</summary>
    No,

    /// <summary>The first frame of all.</summary>
    First,

    /// <summary>The sequence starts again below, and time goes on: the publisher was restarted.</summary>
    SequenceRestarted,

    /// <summary>After a gap longer than ten slow memories nothing of the old stream counts.</summary>
    LongGap,

    /// <summary>A run of frames in good order whose clock stands earlier: the publisher's clock was set back.</summary>
    ClockSetBack,
}
