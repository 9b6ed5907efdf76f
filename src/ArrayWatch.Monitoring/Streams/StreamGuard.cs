using System.Globalization;
using ArrayWatch.Monitoring.Ports;
using ArrayWatch.Signals;

namespace ArrayWatch.Monitoring.Streams;

/// <summary>
/// Decides of each frame whether it may be folded in: shape, ranges, bins, order in sequence and time.
/// Pure: what it answers follows from the frames alone. One caller at a time.
/// </summary>
/// <remarks>
/// <para>A stream is a run of frames with the same bins, in rising sequence and time. A new one begins, and may
/// bring other bins, when the sequence starts again at a lower number while time goes on (the publisher was
/// restarted), or after a gap longer than ten slow memories.</para>
/// <para>A frame that stands before what was folded in is refused: as repeated when its sequence number has been
/// passed, as time gone backwards otherwise. A publisher whose clock was set back would be refused for ever, so
/// <see cref="RunFrames"/> refused frames that follow one another by one in sequence and rise in time over at
/// least a fast memory begin a new stream, from which everything is learnt again. Frames that a broker delivers
/// twice do not get there: they are as many as it keeps in flight.</para>
/// </remarks>
internal sealed class StreamGuard(int channels, TimeSpan timeConstant, TimeSpan slowTimeConstant)
{
    /// <summary>Refused frames in good order that begin a stream with an earlier clock.</summary>
    internal const int RunFrames = 64;

    private const double LongGapMemories = 10;

    private double[] _frequencies = [];
    private bool _begun;
    private double _interval;
    private int _run;
    private ulong _runSequence;
    private double _runStart;
    private double _runTime;

    /// <summary>Bin centres of the stream, Hz; empty before the first frame.</summary>
    public IReadOnlyList<double> Frequencies => _frequencies;

    /// <summary>Sequence number of the last frame let through; null before the first.</summary>
    public ulong? LastSequence { get; private set; }

    /// <summary>Event time of the last snapshot let through, seconds since 1970.</summary>
    public double LastTimeSeconds { get; private set; }

    /// <summary>Judges a frame and, when it is let through, moves on to it.</summary>
    public StreamVerdict Judge(in SnapshotFrame frame)
    {
        if (Shape(frame) is { } shape) return new StreamVerdict(shape);
        if (Ranges(frame) is { } range) return new StreamVerdict(range);
        StreamVerdict verdict = _begun ? Order(frame) : new StreamVerdict(null, StreamBegin.First, Restart: true);
        if (verdict.Refusal is not null) return verdict;
        bool sameBins = frame.Frequencies.SequenceEqual(_frequencies);
        if (!sameBins)
        {
            if (verdict.Begins == StreamBegin.No)
            {
                return StreamVerdict.Refuse(
                    RefusalReason.FrequenciesChanged,
                    $"the {frame.Bins} bin centres differ from the stream's {_frequencies.Length}; start a new stream: begin its sequence again");
            }

            verdict = verdict with { Restart = true };
            _frequencies = frame.Frequencies.ToArray();
        }

        _begun = true;
        _run = 0;
        _interval = frame.IntervalSeconds;
        LastSequence = frame.Sequence;
        LastTimeSeconds = frame.TimeSeconds + ((frame.Snapshots - 1) * frame.IntervalSeconds);
        return verdict;
    }

    private static string Text(double value) => value.ToString("G6", CultureInfo.InvariantCulture);

    private Refusal? Shape(in SnapshotFrame frame)
    {
        if (frame.Channels != channels)
            return new(RefusalReason.WrongChannelCount, $"the frame has {frame.Channels} channels, the array has {channels}");
        if (frame.Snapshots < 1 || frame.Bins < 1)
            return new(RefusalReason.WrongShape, $"{frame.Snapshots} snapshots of {frame.Bins} bins; at least one of each is needed");
        long values = 2L * frame.Snapshots * frame.Bins * channels;
        return frame.Data.Length == values
            ? null
            : new(RefusalReason.WrongShape, $"{frame.Data.Length} values do not fill the stated shape, which takes {values}");
    }

    private static Refusal? Ranges(in SnapshotFrame frame)
    {
        if (!(frame.IntervalSeconds > 0 && double.IsFinite(frame.IntervalSeconds)))
            return new(RefusalReason.OutOfRange, $"the interval is {Text(frame.IntervalSeconds)} s; it must be positive and finite");
        if (!(frame.Overlap >= 0 && frame.Overlap < 1))
            return new(RefusalReason.OutOfRange, $"the overlap is {Text(frame.Overlap)}; 0 to below 1 is allowed");
        double last = frame.TimeSeconds + ((frame.Snapshots - 1) * frame.IntervalSeconds);
        if (!(frame.TimeSeconds >= 0 && last <= EventTime.MaximumSeconds))
            return new(RefusalReason.OutOfRange, $"the time is {Text(frame.TimeSeconds)} s since 1970; years 1970 to 9999 are allowed");
        double before = double.NegativeInfinity;
        for (int f = 0; f < frame.Bins; f++)
        {
            double hertz = frame.Frequencies[f];
            if (!double.IsFinite(hertz) || hertz < 0 || !(hertz > before))
                return new(RefusalReason.OutOfRange, $"bin {f} stands at {Text(hertz)} Hz; bin centres must be finite, not negative and ascending");
            before = hertz;
        }

        return null;
    }

    private StreamVerdict Order(in SnapshotFrame frame)
    {
        double half = 0.5 * Math.Min(_interval, frame.IntervalSeconds);
        double gap = frame.TimeSeconds - (LastTimeSeconds + _interval);
        ulong last = LastSequence.GetValueOrDefault();
        if (gap > LongGapMemories * slowTimeConstant.TotalSeconds) return new(null, StreamBegin.LongGap, GapSeconds: gap);
        bool earlier = gap < -half;
        if (!earlier && frame.Sequence < last)
            return new(null, StreamBegin.SequenceRestarted, GapSeconds: gap > half ? gap : 0);
        if (!earlier && frame.Sequence > last)
            return new(null, GapSeconds: gap > half ? gap : 0, MissingFrames: frame.Sequence - last - 1);
        if (Runs(frame)) return new(null, StreamBegin.ClockSetBack, Restart: true);
        return frame.Sequence <= last
            ? StreamVerdict.Refuse(RefusalReason.SequenceRepeated, $"sequence {frame.Sequence} does not follow {last}")
            : StreamVerdict.Refuse(
                RefusalReason.TimeBackwards,
                $"the frame begins {Text(-gap)} s before its time; {Text(half)} s, half an interval, are allowed");
    }

    /// <summary>Counts refused frames that are in good order among themselves.</summary>
    private bool Runs(in SnapshotFrame frame)
    {
        if (_run > 0 && frame.Sequence == _runSequence + 1 && frame.TimeSeconds > _runTime) _run++;
        else (_run, _runStart) = (1, frame.TimeSeconds);
        (_runSequence, _runTime) = (frame.Sequence, frame.TimeSeconds);
        return _run >= RunFrames && _runTime - _runStart >= timeConstant.TotalSeconds;
    }
}
