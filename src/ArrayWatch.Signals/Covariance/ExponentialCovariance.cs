using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Signals.Covariance;

/// <summary>
/// Exponentially weighted, bias-corrected spatial covariance of N channels at F bins:
/// S ← λ S + (1−λ) x xᴴ with λ = exp(−Δt/τ), a block of K snapshots folded as one rank-K update.
/// One writer at a time; readers need the writer's lock.
/// </summary>
public sealed class ExponentialCovariance
{
    private readonly ComplexMatrix[] _sums;
    private double _weight;
    private double _squaredWeight;
    private double _overlapFactor = 1;

    /// <summary>Creates an empty estimate.</summary>
    /// <param name="channels">N, at least 1.</param>
    /// <param name="bins">F, at least 1.</param>
    /// <param name="timeConstant">Memory τ, positive.</param>
    /// <exception cref="ArgumentOutOfRangeException">A size or a time constant that is not positive.</exception>
    public ExponentialCovariance(int channels, int bins, TimeSpan timeConstant)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(channels, 1);
        ArgumentOutOfRangeException.ThrowIfLessThan(bins, 1);
        ArgumentOutOfRangeException.ThrowIfLessThanOrEqual(timeConstant, TimeSpan.Zero);
        Channels = channels;
        Bins = bins;
        TimeConstant = timeConstant;
        _sums = [.. Enumerable.Range(0, bins).Select(_ => new ComplexMatrix(channels, channels))];
    }

    /// <summary>Number of channels, N.</summary>
    public int Channels { get; }

    /// <summary>Number of bins, F.</summary>
    public int Bins { get; }

    /// <summary>Memory, τ.</summary>
    public TimeSpan TimeConstant { get; }

    /// <summary>Snapshots that have been folded in since the last <see cref="Reset"/>.</summary>
    public long Snapshots { get; private set; }

    /// <summary>
    /// Effective number of independent snapshots, ν = (Σw)²/Σw² divided by the variance factor of
    /// overlapping windows; (1+λ)/(1−λ) once settled, 0 when empty.
    /// </summary>
    public double DegreesOfFreedom => _squaredWeight > 0 ? _weight * _weight / _squaredWeight / _overlapFactor : 0;

    /// <summary>Folds a block in.</summary>
    /// <param name="data">2·K·F·N values, row-major over snapshot, bin, channel, real then imaginary.</param>
    /// <param name="snapshots">K, at least 1.</param>
    /// <param name="intervalSeconds">Seconds from one snapshot to the next, positive.</param>
    /// <param name="overlap">Share that consecutive windows overlap, 0 ≤ o &lt; 1.</param>
    /// <returns>The number of snapshots left out because they hold a non-finite value.</returns>
    /// <exception cref="ArgumentException">The data do not have that shape.</exception>
    public int Fold(ReadOnlySpan<float> data, int snapshots, double intervalSeconds, double overlap)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(snapshots, 1);
        int stride = 2 * Bins * Channels;
        if (data.Length != snapshots * stride) throw new ArgumentException($"{data.Length} values are not 2·{snapshots}·{Bins}·{Channels}", nameof(data));
        double lambda = Math.Exp(-intervalSeconds / TimeConstant.TotalSeconds);
        int spoilt = 0;
        for (int k = 0; k < snapshots; k++)
        {
            ReadOnlySpan<float> x = data.Slice(k * stride, stride);
            Scale(lambda);
            bool finite = true;
            foreach (float v in x) finite &= float.IsFinite(v);
            if (!finite)
            {
                spoilt++;
                continue;
            }

            for (int f = 0; f < Bins; f++) Add(_sums[f], x.Slice(2 * f * Channels, 2 * Channels), 1 - lambda);
            _weight += 1 - lambda;
            _squaredWeight += (1 - lambda) * (1 - lambda);
            Snapshots++;
        }

        return spoilt;
    }

    /// <summary>Lets the memory fade over <paramref name="seconds"/> without data.</summary>
    public void Fade(double seconds) => Scale(Math.Exp(-Math.Max(0, seconds) / TimeConstant.TotalSeconds));

    /// <summary>Forgets everything.</summary>
    public void Reset()
    {
        foreach (ComplexMatrix s in _sums) s.Clear();
        _weight = _squaredWeight = 0;
        Snapshots = 0;
    }

    /// <summary>Writes the bias-corrected estimate of one bin, both triangles.</summary>
    /// <param name="bin">0 to F−1.</param>
    /// <param name="destination">N×N; receives S[l, m] = E[x_l x_m*]; zero when nothing was folded in.</param>
    /// <exception cref="ArgumentException">The destination is not N×N.</exception>
    public void CopyBin(int bin, ComplexMatrix destination)
    {
        ArgumentNullException.ThrowIfNull(destination);
        destination.CopyFrom(_sums[bin]);
        if (_weight <= 0) return;
        for (int i = 0; i < destination.Re.Length; i++)
        {
            destination.Re[i] /= _weight;
            destination.Im[i] /= _weight;
        }
    }

    private void Scale(double factor)
    {
        foreach (ComplexMatrix s in _sums)
        {
            for (int i = 0; i < s.Re.Length; i++)
            {
                s.Re[i] *= factor;
                s.Im[i] *= factor;
            }
        }

        _weight *= factor;
        _squaredWeight *= factor * factor;
    }

    private void Add(ComplexMatrix s, ReadOnlySpan<float> x, double weight)
    {
        for (int l = 0; l < Channels; l++)
        {
            double ar = weight * x[2 * l], ai = weight * x[(2 * l) + 1];
            for (int m = 0; m < Channels; m++)
            {
                double br = x[2 * m], bi = -x[(2 * m) + 1];
                s.Re[(l * Channels) + m] += (ar * br) - (ai * bi);
                s.Im[(l * Channels) + m] += (ar * bi) + (ai * br);
            }
        }
    }
}
