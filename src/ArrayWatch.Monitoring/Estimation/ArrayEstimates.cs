using ArrayWatch.Signals;
using ArrayWatch.Signals.Covariance;

namespace ArrayWatch.Monitoring.Estimation;

/// <summary>The three memories of one array, folded together behind one guard against transients. One caller at a time.</summary>
internal sealed class ArrayEstimates
{
    private readonly TransientGuard _guard;
    private double[] _weights = [];
    private float[] _patched = [];

    /// <summary>Starts empty.</summary>
    public ArrayEstimates(ArrayDefinition array, IReadOnlyList<double> frequencies)
    {
        Frequencies = frequencies;
        int n = array.Geometry.Count, bins = frequencies.Count;
        Fast = new(n, bins, array.TimeConstant, array.ConjugatePhase);
        Recent = new(n, bins, array.TimeConstant / 4, array.ConjugatePhase);
        Slow = new(n, bins, array.SlowTimeConstant, array.ConjugatePhase);
        _guard = new(n, bins, array.TimeConstant);
    }

    /// <summary>Bin centres, Hz.</summary>
    public IReadOnlyList<double> Frequencies { get; }

    /// <summary>Memory τ.</summary>
    public ExponentialCovariance Fast { get; }

    /// <summary>Memory τ/4.</summary>
    public ExponentialCovariance Recent { get; }

    /// <summary>Slow memory.</summary>
    public ExponentialCovariance Slow { get; }

    /// <summary>Snapshots left out as transients.</summary>
    public long Transients => _guard.LeftOut;

    /// <summary>Folds a frame that the stream guard has let through.</summary>
    /// <param name="frame">The frame.</param>
    /// <param name="gapSeconds">Time without data before it.</param>
    /// <param name="outOfService">Channels that nobody listens to: their non-finite values count as zero, so that they spoil no snapshot.</param>
    public void Fold(in SnapshotFrame frame, double gapSeconds, IReadOnlySet<int> outOfService)
    {
        if (gapSeconds > 0)
        {
            Fast.Fade(gapSeconds);
            Recent.Fade(gapSeconds);
            Slow.Fade(gapSeconds);
            if (gapSeconds > Fast.TimeConstant.TotalSeconds) _guard.Relearn();
        }

        if (_weights.Length < frame.Snapshots) _weights = new double[frame.Snapshots];
        Span<double> weights = _weights.AsSpan(0, frame.Snapshots);
        ReadOnlySpan<float> data = outOfService.Count == 0 ? frame.Data : Patch(frame, outOfService);
        _guard.Weigh(data, frame.IntervalSeconds, weights);
        Fast.Fold(data, frame.Snapshots, frame.IntervalSeconds, frame.Overlap, weights);
        Recent.Fold(data, frame.Snapshots, frame.IntervalSeconds, frame.Overlap, weights);
        Slow.Fold(data, frame.Snapshots, frame.IntervalSeconds, frame.Overlap, weights);
    }

    private ReadOnlySpan<float> Patch(in SnapshotFrame frame, IReadOnlySet<int> outOfService)
    {
        if (_patched.Length < frame.Data.Length) _patched = new float[frame.Data.Length];
        Span<float> patched = _patched.AsSpan(0, frame.Data.Length);
        frame.Data.CopyTo(patched);
        foreach (int channel in outOfService)
        {
            for (int at = 2 * channel; at < patched.Length; at += 2 * frame.Channels)
            {
                if (float.IsFinite(patched[at]) && float.IsFinite(patched[at + 1])) continue;
                patched[at] = patched[at + 1] = 0;
            }
        }

        return patched;
    }
}
