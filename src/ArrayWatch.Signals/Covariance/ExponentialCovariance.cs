using ArrayWatch.Signals.Kernels;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Signals.Covariance;

/// <summary>
/// Exponentially weighted, bias-corrected spatial covariance of N channels at F bins:
/// S ← λ S + (1−λ) x xᴴ with λ = exp(−Δt/τ), a block of K snapshots folded as one rank-K update,
/// S ← λᴷ S + Σ_k (1−λ) λ^(K−1−k) x_k x_kᴴ.
/// </summary>
/// <remarks>
/// <para>One writer at a time; readers need the writer's lock, since reading folds in what is pending.</para>
/// <para>Weights and degrees of freedom are kept in double precision, products and sums in single
/// (<see cref="RankUpdate"/>): an element (l, m) is right to about 2⁻²⁴ √(S_ll S_mm) √M, where M is the number of
/// updates within the memory (10⁻⁶ for M = 300), and M must stay below 10⁷. Up to 64 snapshots wait and are folded together. With b the
/// decay since the first that waits, and a that since the last update, snapshot k waits with weight w_k/b_k,
/// and the update is S ← a S + b Σ y yᴴ: exact, and independent of what is still to come.</para>
/// <para>Data of any unit are scaled by a power of two so that their peak lies between 2⁸ and 2⁴⁸: squares
/// neither overflow nor vanish for peaks of 10⁻³⁸ to 10³⁸. Sums that silence has let fade below
/// 2⁻¹⁰⁰ of that scale become zeros, so that no subnormal number slows the updates.</para>
/// </remarks>
public sealed class ExponentialCovariance
{
    private const int Capacity = RankUpdate.MaximumDepth;
    private const int Enough = 32;
    private const double LeastPendingDecay = 1.0 / (1 << 16);
    private const double SweepAfterDecay = 1.0 / (1 << 20);
    private const float Negligible = 7.8886e-31f;
    private const int LowestPeakExponent = 8;
    private const int AimedPeakExponent = 30;
    private const int HighestPeakExponent = 48;
    private const int GreatestScaleExponent = 100;
    private const double GreatestKeep = 1e30;

    private readonly CovarianceStore _store;
    private readonly EffectiveSnapshots _effective = new();
    private readonly long[] _nonFinite;
    private readonly int[] _chosen = new int[Capacity];
    private readonly float[] _amplitudes = new float[Capacity];
    private double[] _correlations = [];
    private double _overlap;
    private int _pending;
    private int _arriving;
    private double _keep = 1;
    private double _gain = 1;
    private double _pendingWeight;
    private double _storedWeight;
    private double _peakPower;
    private double _sinceSweep = 1;
    private int _exponent;
    private int _storedExponent;

    /// <summary>Creates an empty estimate.</summary>
    /// <param name="channels">N, at least 1.</param>
    /// <param name="bins">F, at least 1.</param>
    /// <param name="timeConstant">Memory τ, positive.</param>
    /// <param name="conjugatePhase">Whether the data follow e^{−jωt}, and are to be conjugated on the way in.</param>
    /// <exception cref="ArgumentOutOfRangeException">A size or a time constant that is not positive.</exception>
    public ExponentialCovariance(int channels, int bins, TimeSpan timeConstant, bool conjugatePhase = false)
        : this(channels, bins, timeConstant, conjugatePhase, KernelTiers.Best)
    {
    }

    /// <summary>Creates an empty estimate that works in a given tier.</summary>
    internal ExponentialCovariance(int channels, int bins, TimeSpan timeConstant, bool conjugatePhase, KernelTier tier)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(channels, 1);
        ArgumentOutOfRangeException.ThrowIfLessThan(bins, 1);
        ArgumentOutOfRangeException.ThrowIfLessThanOrEqual(timeConstant, TimeSpan.Zero);
        Channels = channels;
        Bins = bins;
        TimeConstant = timeConstant;
        ConjugatePhase = conjugatePhase;
        _nonFinite = new long[channels];
        _store = new CovarianceStore(tier, channels, bins);
    }

    /// <summary>Number of channels, N.</summary>
    public int Channels { get; }

    /// <summary>Number of bins, F.</summary>
    public int Bins { get; }

    /// <summary>Memory, τ.</summary>
    public TimeSpan TimeConstant { get; }

    /// <summary>Whether data are conjugated on the way in.</summary>
    public bool ConjugatePhase { get; }

    /// <summary>Snapshots that have been folded in since the last <see cref="Reset"/>.</summary>
    public long Snapshots { get; private set; }

    /// <summary>
    /// For each channel, in how many snapshots since the last <see cref="Reset"/> it held a value that is not finite.
    /// </summary>
    public ReadOnlySpan<long> NonFiniteSnapshots => _nonFinite;

    /// <summary>
    /// Effective number of independent snapshots, ν = (Σw)² / Σ_ij w_i w_j ρ_|i−j| with the power correlation ρ of
    /// overlapping windows (<see cref="WindowOverlap"/>); without overlap (Σw)²/Σw², which is (1+λ)/(1−λ) once
    /// settled. 0 when empty.
    /// </summary>
    public double DegreesOfFreedom => _effective.Count;

    /// <summary>Folds a block in.</summary>
    /// <param name="data">2·K·F·N values, row-major over snapshot, bin, channel, real then imaginary.</param>
    /// <param name="snapshots">K, at least 1.</param>
    /// <param name="intervalSeconds">Seconds from one snapshot to the next, positive.</param>
    /// <param name="overlap">Share that consecutive windows overlap, 0 ≤ o &lt; 1.</param>
    /// <param name="weights">
    /// None, or K factors of the snapshots' weights, 0 to 1: less than 1 for one that is to count less.
    /// </param>
    /// <returns>The number of snapshots left out because they hold a non-finite value.</returns>
    /// <exception cref="ArgumentException">The data or the weights do not have that shape.</exception>
    /// <exception cref="ArgumentOutOfRangeException">A number outside its range; nothing is folded in then.</exception>
    public int Fold(ReadOnlySpan<float> data, int snapshots, double intervalSeconds, double overlap, ReadOnlySpan<double> weights = default)
    {
        CheckBlock(data, snapshots, intervalSeconds, weights);
        if (overlap != _overlap)
        {
            _correlations = WindowOverlap.PowerCorrelations(overlap);
            _overlap = overlap;
        }

        int stride = 2 * Bins * Channels, spoilt = 0;
        double lambda = Math.Exp(-intervalSeconds / TimeConstant.TotalSeconds);
        for (int k = 0; k < snapshots; k++)
        {
            ReadOnlySpan<float> x = data.Slice(k * stride, stride);
            if (Waiting > 0 && _gain * lambda < LeastPendingDecay) Drain(data, update: true);
            Decay(lambda);
            float peak = PeakScan.Peak(x);
            if (!float.IsFinite(peak))
            {
                spoilt++;
                CountNonFinite(x);
                _effective.Add(0, _correlations);
                continue;
            }

            Rescale(data, peak);
            Admit(k, (1 - lambda) * (weights.IsEmpty ? 1 : weights[k]));
            if (Waiting == Capacity) Drain(data, update: true);
        }

        Drain(data, update: Waiting >= Enough);
        return spoilt;
    }

    /// <summary>Lets the memory fade over <paramref name="seconds"/> without data; windows before and after share nothing.</summary>
    /// <param name="seconds">Length of the gap; nothing happens unless it is positive.</param>
    public void Fade(double seconds)
    {
        if (!(seconds > 0)) return;
        Decay(Math.Exp(-seconds / TimeConstant.TotalSeconds));
        _effective.Break();
        if (_gain < LeastPendingDecay) Drain([], update: true);
    }

    /// <summary>Forgets everything.</summary>
    public void Reset()
    {
        _store.Clear();
        _effective.Reset();
        Array.Clear(_nonFinite);
        _pending = _arriving = _exponent = _storedExponent = 0;
        _keep = _gain = _sinceSweep = 1;
        _pendingWeight = _storedWeight = _peakPower = 0;
        Snapshots = 0;
    }

    /// <summary>Writes the bias-corrected estimate of one bin, both triangles.</summary>
    /// <param name="bin">0 to F−1.</param>
    /// <param name="destination">N×N; receives S[l, m] = E[x_l x_m*]; zero when nothing was folded in.</param>
    /// <exception cref="ArgumentException">The destination is not N×N.</exception>
    /// <exception cref="ArgumentOutOfRangeException">There is no such bin.</exception>
    public void CopyBin(int bin, ComplexMatrix destination)
    {
        ArgumentNullException.ThrowIfNull(destination);
        ArgumentOutOfRangeException.ThrowIfNegative(bin);
        ArgumentOutOfRangeException.ThrowIfGreaterThanOrEqual(bin, Bins);
        if (destination.Rows != Channels || destination.Columns != Channels)
            throw new ArgumentException($"{Channels}×{Channels} does not fit {destination.Rows}×{destination.Columns}", nameof(destination));
        if (_pending > 0) Drain([], update: true);

        // What has faded since the last update has faded from sums and weight alike: neither needs to be touched.
        double factor = _storedWeight > 0 ? Math.ScaleB(1 / _storedWeight, 2 * _storedExponent) : 0;
        _store.Copy(bin, factor, destination);
    }

    private int Waiting => _pending + _arriving;

    private void CheckBlock(ReadOnlySpan<float> data, int snapshots, double intervalSeconds, ReadOnlySpan<double> weights)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(snapshots, 1);
        if (!(intervalSeconds > 0 && double.IsFinite(intervalSeconds)))
            throw new ArgumentOutOfRangeException(nameof(intervalSeconds), intervalSeconds, "an interval is positive and finite");
        if (data.Length != 2L * snapshots * Bins * Channels)
            throw new ArgumentException($"{data.Length} values are not 2·{snapshots}·{Bins}·{Channels}", nameof(data));
        if (!weights.IsEmpty && weights.Length != snapshots)
            throw new ArgumentException($"{weights.Length} weights are not one for each of {snapshots} snapshots", nameof(weights));
        foreach (double w in weights)
        {
            if (!(w >= 0 && w <= 1)) throw new ArgumentOutOfRangeException(nameof(weights), w, "a weight lies from 0 to 1");
        }
    }

    private void Decay(double factor)
    {
        _keep *= factor;
        _peakPower *= factor;
        if (Waiting > 0) _gain *= factor;
        _effective.Fade(factor);
    }

    /// <summary>Chooses another power of two when the peak, fading like the sums, has left its range.</summary>
    private void Rescale(ReadOnlySpan<float> data, double peak)
    {
        _peakPower = Math.Max(_peakPower, peak * peak);
        if (_peakPower <= 0) return;
        int exponent = Math.ILogB(_peakPower) >> 1;
        if (exponent - _exponent is >= LowestPeakExponent and <= HighestPeakExponent) return;
        int chosen = Math.Clamp(exponent - AimedPeakExponent, -GreatestScaleExponent, GreatestScaleExponent);
        if (chosen == _exponent) return;
        Drain(data, update: true);
        _exponent = chosen;
    }

    private void Admit(int snapshot, double weight)
    {
        _effective.Add(weight, _correlations);
        if (weight <= 0) return;
        double waiting = weight / _gain;
        _chosen[_arriving] = snapshot;
        _amplitudes[_arriving] = (float)Math.ScaleB(Math.Sqrt(waiting), -_exponent);
        _arriving++;
        _pendingWeight += waiting;
        Snapshots++;
    }

    /// <summary>Packs what has arrived, and folds in all that waits when told to.</summary>
    private void Drain(ReadOnlySpan<float> data, bool update)
    {
        int depth = Waiting, stride = 2 * Bins * Channels;
        if (depth == 0) return;
        float keep = (float)Math.Min(Math.ScaleB(_keep, 2 * (_storedExponent - _exponent)), GreatestKeep), gain = (float)_gain;

        // When nothing waited, one room serves all bins in turn and stays in the cache.
        bool share = update && _pending == 0;
        for (int bin = 0; bin < Bins; bin++)
        {
            int room = share ? 0 : bin;
            for (int i = 0; i < _arriving; i++)
                _store.Pack(bin, room, _pending + i, data.Slice(_chosen[i] * stride, stride), _amplitudes[i], ConjugatePhase);
            if (update) _store.Update(bin, room, depth, keep, gain);
        }

        _pending = update ? 0 : depth;
        _arriving = 0;
        if (!update) return;
        _storedWeight = (_keep * _storedWeight) + (_gain * _pendingWeight);
        _storedExponent = _exponent;
        _keep = _gain = 1;
        _pendingWeight = 0;
        _sinceSweep *= Math.Min(1, keep);
        if (_sinceSweep >= SweepAfterDecay) return;
        _store.Sweep(Negligible);
        _sinceSweep = 1;
    }

    private void CountNonFinite(ReadOnlySpan<float> snapshot)
    {
        for (int n = 0; n < Channels; n++)
        {
            bool finite = true;
            for (int f = 0; f < Bins; f++)
            {
                int at = 2 * ((f * Channels) + n);
                finite &= float.IsFinite(snapshot[at]) && float.IsFinite(snapshot[at + 1]);
            }

            if (!finite) _nonFinite[n]++;
        }
    }
}
