namespace ArrayWatch.Monitoring.Estimation;

/// <summary>
/// Leaves out snapshots whose power is impossible against the running level, such as a shot or a slammed door,
/// and follows a level that really changes. Scale-free. Pure; one caller at a time.
/// </summary>
/// <remarks>
/// <para>Each channel and bin has a running power p with a memory of an eighth of the fast one (at least sixteen
/// intervals). A snapshot's ratio on a channel is the mean over the bins of |x|²/p, and the snapshot's ratio r is
/// the median over the channels: one loud channel is that channel's business and never a transient.</para>
/// <para>In a steady Gaussian field r is at most a mean of F exponential variables of mean 1, so that
/// P(r ≥ t) ≤ exp(−F (t − 1 − ln t)) (Chernoff's bound). The limit is the t at which this is e⁻¹⁸, and 6 dB more for
/// levels that move and for the level's own error: 19 dB above the level with one bin, 12 dB with twelve, 8.9 dB
/// with sixty-four.</para>
/// <para>What stays above the limit is no transient: when loud snapshots have lasted for three seconds (at least
/// four intervals; quiet ones between them count back twice), the level is learnt anew from there. A change of 12 dB
/// in a minute stays within 2 dB of the running level and is simply followed.</para>
/// </remarks>
internal sealed class TransientGuard
{
    private const int Learning = 8;
    private const double Improbable = 18;
    private const double MarginDecibels = 6;
    private const double PersistSeconds = 3;
    private const int PersistIntervals = 4;

    private readonly int _channels;
    private readonly int _bins;
    private readonly double _memorySeconds;
    private readonly double[] _level;
    private readonly double[] _ratios;
    private double _loudSeconds;
    private long _learnt;

    /// <summary>Starts without a level.</summary>
    public TransientGuard(int channels, int bins, TimeSpan timeConstant)
    {
        _channels = channels;
        _bins = bins;
        _memorySeconds = timeConstant.TotalSeconds / 8;
        _level = new double[channels * bins];
        _ratios = new double[channels];
        Limit = LimitFor(bins);
    }

    /// <summary>Ratio above which a snapshot is left out.</summary>
    public double Limit { get; }

    /// <summary>Snapshots left out so far.</summary>
    public long LeftOut { get; private set; }

    /// <summary>Writes a weight for each snapshot: 0 for one to leave out, 1 otherwise.</summary>
    /// <param name="data">2·K·F·N values, row-major over snapshot, bin, channel, real then imaginary.</param>
    /// <param name="intervalSeconds">Seconds from one snapshot to the next.</param>
    /// <param name="weights">K of them.</param>
    public void Weigh(ReadOnlySpan<float> data, double intervalSeconds, Span<double> weights)
    {
        int stride = 2 * _channels * _bins;
        for (int k = 0; k < weights.Length; k++) weights[k] = Admit(data.Slice(k * stride, stride), intervalSeconds) ? 1 : 0;
    }

    /// <summary>Forgets the level, as after a gap in which it may have gone anywhere.</summary>
    public void Relearn()
    {
        _learnt = 0;
        _loudSeconds = 0;
    }

    /// <summary>Solves t − 1 − ln t = 18/F for t above 1, and adds the margin.</summary>
    internal static double LimitFor(int bins)
    {
        double want = Improbable / bins, t = 1 + want + Math.Sqrt(2 * want);
        for (int i = 0; i < 50; i++) t -= (t - 1 - Math.Log(t) - want) / (1 - (1 / t));
        return t * Math.Pow(10, MarginDecibels / 10);
    }

    private bool Admit(ReadOnlySpan<float> snapshot, double interval)
    {
        double ratio = MedianRatio(snapshot);
        if (!double.IsFinite(ratio)) return true;
        if (_learnt >= Learning && ratio > Limit)
        {
            _loudSeconds += interval;
            if (_loudSeconds < Math.Max(PersistSeconds, PersistIntervals * interval))
            {
                LeftOut++;
                return false;
            }

            Relearn();
        }

        _loudSeconds = Math.Max(0, _loudSeconds - (2 * interval));
        Learn(snapshot, interval);
        return true;
    }

    /// <summary>Not a number when a value of the snapshot is not finite: such a snapshot is left out elsewhere.</summary>
    private double MedianRatio(ReadOnlySpan<float> snapshot)
    {
        Array.Clear(_ratios);
        for (int f = 0; f < _bins; f++)
        {
            for (int n = 0; n < _channels; n++)
            {
                int at = (f * _channels) + n;
                double power = Power(snapshot, at);
                if (!double.IsFinite(power)) return double.NaN;
                _ratios[n] += _level[at] > 0 ? power / _level[at] : power > 0 ? double.MaxValue / (2 * _bins) : 1;
            }
        }

        Array.Sort(_ratios);
        return _ratios[(_channels - 1) / 2] / _bins;
    }

    private void Learn(ReadOnlySpan<float> snapshot, double interval)
    {
        _learnt++;
        double memory = Math.Max(_memorySeconds, 16 * interval);
        double share = Math.Max(1.0 / _learnt, 1 - Math.Exp(-interval / memory));
        for (int at = 0; at < _level.Length; at++) _level[at] += share * (Power(snapshot, at) - _level[at]);
    }

    private static double Power(ReadOnlySpan<float> snapshot, int at)
    {
        double re = snapshot[2 * at], im = snapshot[(2 * at) + 1];
        return (re * re) + (im * im);
    }
}
