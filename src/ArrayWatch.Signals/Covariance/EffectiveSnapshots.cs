namespace ArrayWatch.Signals.Covariance;

/// <summary>
/// Effective number of independent snapshots of a weighted average: ν = (Σ_i w_i)² / Σ_ij w_i w_j ρ_|i−j|, kept up
/// as weights fade and join, exact from the first snapshot on.
/// </summary>
/// <remarks>
/// The double sum grows by w² + 2w Σ_j ρ_j w_−j with each snapshot; only the weights of windows that still
/// overlap are remembered. A single-writer accumulator.
/// </remarks>
internal sealed class EffectiveSnapshots
{
    private double[] _recent = [];
    private double _doubleSum;

    /// <summary>Σw.</summary>
    public double Weight { get; private set; }

    /// <summary>ν; 0 when empty.</summary>
    public double Count => _doubleSum > 0 ? Weight * Weight / _doubleSum : 0;

    /// <summary>Multiplies every weight.</summary>
    public void Fade(double factor)
    {
        Weight *= factor;
        _doubleSum *= factor * factor;
        foreach (ref double w in _recent.AsSpan()) w *= factor;
    }

    /// <summary>Adds a snapshot; of weight 0 when it is left out but its window passed.</summary>
    /// <param name="weight">w, at least 0.</param>
    /// <param name="correlations">ρ_1, ρ_2, …</param>
    public void Add(double weight, double[] correlations)
    {
        if (_recent.Length != correlations.Length) Array.Resize(ref _recent, correlations.Length);
        double shared = 0;
        for (int j = 0; j < correlations.Length; j++) shared += correlations[j] * _recent[j];
        Weight += weight;
        _doubleSum += weight * (weight + (2 * shared));
        if (_recent.Length == 0) return;
        Array.Copy(_recent, 0, _recent, 1, _recent.Length - 1);
        _recent[0] = weight;
    }

    /// <summary>Windows to come do not overlap those that were.</summary>
    public void Break() => Array.Clear(_recent);

    /// <summary>Forgets everything.</summary>
    public void Reset()
    {
        Weight = _doubleSum = 0;
        _recent = [];
    }
}
