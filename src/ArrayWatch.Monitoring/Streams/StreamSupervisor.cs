using ArrayWatch.Detection;
using ArrayWatch.Monitoring.Alerts;
using ArrayWatch.Monitoring.Ports;

namespace ArrayWatch.Monitoring.Streams;

/// <summary>Says what is wrong with the stream itself, from what was counted over ten minutes of event time. One caller at a time.</summary>
/// <remarks>
/// A single lost or repeated frame is counted and no more. A condition stands while the share of the last ten
/// minutes is beyond <see cref="Share"/> (1 %, common practice, no source) with at least <see cref="LeastFrames"/> frames
/// (<see cref="LeastMessages"/> messages or snapshots), or holds a gap longer than <see cref="LongGapFrames"/> frames; it
/// goes when the share has come down to half of that, so that one near the limit does not come and go.
/// </remarks>
internal sealed class StreamSupervisor(int channels)
{
    internal const double Share = 0.01;
    internal const int LeastFrames = 3;
    internal const int LeastMessages = 10;
    internal const int LongGapFrames = 10;

    private const double ReleaseFactor = 0.5;

    private readonly StreamWindow _window = new(channels);
    private readonly long[] _notFinite = new long[channels];
    private readonly Dictionary<string, double> _onsets = new(StringComparer.Ordinal);
    private readonly bool[] _spoilt = new bool[channels];
    private readonly long[] _refused = new long[RefusalReasons.Count];

    /// <summary>Frames that the sequence says are lost, since the start.</summary>
    public long MissingFrames { get; private set; }

    /// <summary>Frames after a gap in time that the sequence does not show, since the start.</summary>
    public long LateFrames { get; private set; }

    /// <summary>Messages refused since the start, by <see cref="RefusalReason"/>.</summary>
    public IReadOnlyList<long> Refused => _refused;

    /// <summary>Snapshots since the start in which a channel held a value that is not finite.</summary>
    public IReadOnlyList<long> NotFinite => _notFinite;

    /// <summary>Counts a frame that was let through.</summary>
    public void Frame(in StreamVerdict verdict, double timeSeconds, int snapshots)
    {
        if (verdict.Begins is StreamBegin.ClockSetBack or StreamBegin.LongGap) _window.Clear();
        _window.MoveTo(timeSeconds);
        _window.CountFrame(snapshots);
        bool late = verdict.GapSeconds > 0 && verdict.MissingFrames == 0 && verdict.Begins == StreamBegin.No;
        _window.CountGap(verdict.MissingFrames, late);
        MissingFrames += (long)Math.Min(verdict.MissingFrames, 1UL << 40);
        if (late) LateFrames++;
    }

    /// <summary>Counts a message that was refused.</summary>
    public void Refuse(RefusalReason reason)
    {
        _refused[(int)reason]++;
        _window.CountRefusal(reason);
    }

    /// <summary>Counts snapshots in which a channel held a value that is not finite.</summary>
    public void CountNotFinite(int channel, long snapshots)
    {
        _notFinite[channel] += snapshots;
        _window.CountNotFinite(channel, snapshots);
    }

    /// <summary>What is wrong now.</summary>
    public IReadOnlyList<Finding> Judge(double timeSeconds)
    {
        _window.MoveTo(timeSeconds);
        long frames = _window.Frames, missing = _window.Missing, late = _window.Late, refused = _window.Refused, repeated = _window.Repeated;
        List<Finding> findings = [];
        bool gap = _window.LongestGap > LongGapFrames;
        Add(findings, timeSeconds, StreamCauses.Missing, missing, frames, LeastFrames, gap, new()
        {
            ["framesMissing"] = (double)missing, ["framesReceived"] = (double)frames, ["longestGapFrames"] = (double)_window.LongestGap,
        });
        Add(findings, timeSeconds, StreamCauses.Late, late, frames, LeastFrames, false, new()
        {
            ["framesLate"] = (double)late, ["framesReceived"] = (double)frames,
        });
        Add(findings, timeSeconds, StreamCauses.Repeated, repeated, frames, LeastMessages, false, new()
        {
            ["framesRepeated"] = (double)repeated, ["framesReceived"] = (double)frames,
        });
        Add(findings, timeSeconds, StreamCauses.Refused, refused, frames, LeastMessages, false, new()
        {
            ["messagesRefused"] = (double)refused, ["framesReceived"] = (double)frames,
        });
        JudgeNotFinite(findings, timeSeconds);
        return findings;
    }

    private void JudgeNotFinite(List<Finding> findings, double timeSeconds)
    {
        long snapshots = _window.Snapshots, most = 0;
        List<int> channelsSpoilt = [];
        for (int n = 0; n < _spoilt.Length; n++)
        {
            long spoilt = _window.NotFinite(n);
            double limit = _spoilt[n] ? ReleaseFactor * Share : Share;
            _spoilt[n] = spoilt > limit * snapshots && (_spoilt[n] || spoilt >= LeastMessages);
            if (!_spoilt[n]) continue;
            channelsSpoilt.Add(n);
            most = Math.Max(most, spoilt);
        }

        if (channelsSpoilt.Count == 0)
        {
            _onsets.Remove(StreamCauses.NotFinite);
            return;
        }

        findings.Add(Make(StreamCauses.NotFinite, channelsSpoilt, Onset(StreamCauses.NotFinite, timeSeconds), new()
        {
            ["snapshotsSpoilt"] = (double)most, ["snapshotsReceived"] = (double)snapshots,
        }));
    }

    private void Add(
        List<Finding> findings, double timeSeconds, string cause, long bad, long good, int least, bool certain, Dictionary<string, object> estimate)
    {
        bool stands = _onsets.ContainsKey(cause);
        double share = bad + good > 0 ? (double)bad / (bad + good) : 0;
        bool beyond = certain || (stands ? share > ReleaseFactor * Share : share > Share && bad >= least);
        if (!beyond)
        {
            _onsets.Remove(cause);
            return;
        }

        estimate["share"] = share;
        findings.Add(Make(cause, [], Onset(cause, timeSeconds), estimate));
    }

    private double Onset(string cause, double timeSeconds)
    {
        if (!_onsets.TryGetValue(cause, out double onset)) _onsets[cause] = onset = timeSeconds;
        return onset;
    }

    internal static Finding Make(string cause, IReadOnlyList<int> indices, double onsetSeconds, Dictionary<string, object> estimate) => new()
    {
        Kind = AlertCondition.StreamKind,
        Indices = indices,
        OnsetSeconds = onsetSeconds,
        Confidence = 1,
        Estimate = estimate,
        Cause = cause,
    };
}
