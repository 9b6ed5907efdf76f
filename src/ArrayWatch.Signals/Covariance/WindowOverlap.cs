namespace ArrayWatch.Signals.Covariance;

/// <summary>How much snapshots of overlapping analysis windows have in common.</summary>
/// <remarks>
/// The spectral estimates of white noise in two Hann windows, a share τ of a window apart, have the amplitude
/// correlation c(τ) = ∫w(t)w(t+τ)dt / ∫w²dt, their powers c²: P.D. Welch, "The use of fast Fourier transform
/// for the estimation of power spectra", IEEE Trans. Audio Electroacoust. AU-15, 1967, 70–73; F.J. Harris,
/// Proc. IEEE 66, 1978, 51–83. Publishers state the overlap and not the window: Hann is assumed, common
/// practice; for others in use c² differs by some hundredths.
/// </remarks>
public static class WindowOverlap
{
    /// <summary>Largest overlap that is counted as it is; more counts as this, 999 predecessors.</summary>
    public const double Greatest = 0.999;

    /// <summary>Amplitude correlation c of two Hann windows.</summary>
    /// <param name="shift">Share of a window that they are apart, at least 0; from 1 on the answer is 0.</param>
    public static double HannCorrelation(double shift)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(shift);
        if (!(shift < 1)) return 0;
        double turn = 2 * Math.PI * shift;
        return 2.0 / 3 * (((1 - shift) * (1 + (Math.Cos(turn) / 2))) + (3 * Math.Sin(turn) / (4 * Math.PI)));
    }

    /// <summary>Power correlations ρ_j = c(j(1−o))² with the window j = 1, 2, … before, as many as overlap.</summary>
    /// <param name="overlap">Share that consecutive windows overlap, 0 ≤ o &lt; 1.</param>
    /// <exception cref="ArgumentOutOfRangeException">An overlap outside that range, or not a number.</exception>
    public static double[] PowerCorrelations(double overlap)
    {
        if (!(overlap >= 0 && overlap < 1)) throw new ArgumentOutOfRangeException(nameof(overlap), overlap, "an overlap lies from 0 up to, not including, 1");
        double shift = 1 - Math.Min(overlap, Greatest);
        var correlations = new List<double>();
        for (int j = 1; j * shift < 1; j++)
        {
            double c = HannCorrelation(j * shift);
            correlations.Add(c * c);
        }

        return [.. correlations];
    }
}
