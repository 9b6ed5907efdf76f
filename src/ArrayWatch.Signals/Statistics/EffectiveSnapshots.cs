namespace ArrayWatch.Signals.Statistics;

/// <summary>
/// How many independent snapshots an average is worth: the number n for which the variance of a power estimate is
/// (its square)/n.
/// </summary>
public static class EffectiveSnapshots
{
    /// <summary>Exponential weights λᵏ over K independent snapshots, normalised: (1+λ)(1−λᴷ)/[(1−λ)(1+λᴷ)].</summary>
    /// <param name="lambda">λ, 0 ≤ λ &lt; 1.</param>
    /// <param name="count">K, at least 1; leave out for the settled value (1+λ)/(1−λ).</param>
    /// <returns>1 to K.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double Exponential(double lambda, double count = double.PositiveInfinity)
    {
        Lambda(lambda);
        Check.InRange(count, 1, double.PositiveInfinity, "the number of snapshots");
        double last = Math.Pow(lambda, count);
        return (1 + lambda) * (1 - last) / ((1 - lambda) * (1 + last));
    }

    /// <summary>
    /// Plain average of L overlapped windows, L/(1 + 2Σ_j(1 − j/L)ρ_j) (Welch, IEEE Trans. Audio Electroacoust. AU-15, 70–73, 1967).
    /// </summary>
    /// <param name="count">L, at least 1.</param>
    /// <param name="correlations">ρ_1, ρ_2, … of the powers, see <see cref="OverlapCorrelations"/>.</param>
    /// <returns>At most L.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A count below one, or a correlation outside 0 to 1.</exception>
    public static double Overlapped(long count, ReadOnlySpan<double> correlations)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(count, 1);
        double factor = 1;
        for (int j = 1; j <= correlations.Length && j < count; j++)
            factor += 2 * (1 - ((double)j / count)) * Check.InRange(correlations[j - 1], 0, 1, "a correlation", nameof(correlations));
        return count / factor;
    }

    /// <summary>
    /// Exponential weights over overlapped windows, once settled: [(1+λ)/(1−λ)]/(1 + 2Σ_j λʲρ_j).
    /// </summary>
    /// <param name="lambda">λ from one window to the next, 0 ≤ λ &lt; 1.</param>
    /// <param name="correlations">ρ_1, ρ_2, … of the powers, see <see cref="OverlapCorrelations"/>.</param>
    /// <returns>The number.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double ExponentialOverlapped(double lambda, ReadOnlySpan<double> correlations)
    {
        Lambda(lambda);
        double factor = 1, power = 1;
        foreach (double c in correlations)
        {
            power *= lambda;
            factor += 2 * power * Check.InRange(c, 0, 1, "a correlation", nameof(correlations));
        }

        return (1 + lambda) / (1 - lambda) / factor;
    }

    /// <summary>
    /// Correlations of the powers of overlapped windows of white noise, ρ_j = [Σ_k w(k) w(k + jD)/Σ_k w²(k)]² (Welch 1967).
    /// </summary>
    /// <param name="window">w, M samples, not all zero.</param>
    /// <param name="step">D, samples from one window to the next, at least 1.</param>
    /// <returns>ρ_1 to the last one that is not zero; empty when the windows do not overlap.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A step below one, or a window without power.</exception>
    public static double[] OverlapCorrelations(ReadOnlySpan<double> window, int step)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(step, 1);
        double power = 0;
        foreach (double w in window) power += w * w;
        Check.Above(power, 0, "the power of the window", nameof(window));
        double[] correlations = new double[(window.Length - 1) / step];
        for (int j = 0; j < correlations.Length; j++)
        {
            int shift = (j + 1) * step;
            double sum = 0;
            for (int k = 0; k + shift < window.Length; k++) sum += window[k] * window[k + shift];
            correlations[j] = sum / power * (sum / power);
        }

        return correlations;
    }

    /// <summary>
    /// The same for a Hann window of many samples and any overlap, in closed form: with s the shift as a share of the window,
    /// c(s) = (1−s)(2 + cos 2πs)/3 + sin(2πs)/(2π), and ρ_j = c(j(1−o))².
    /// </summary>
    /// <param name="overlap">o, 0 ≤ o ≤ 0.999.</param>
    /// <returns>ρ_1, ρ_2, …; empty when the windows do not overlap.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An overlap out of its range.</exception>
    public static double[] HannCorrelations(double overlap)
    {
        double shift = 1 - Check.InRange(overlap, 0, 0.999, "the overlap");
        int count = (int)Math.Ceiling((1 / shift) - 1 - 1e-9);
        double[] correlations = new double[Math.Max(0, count)];
        for (int j = 0; j < correlations.Length; j++)
        {
            double s = (j + 1) * shift;
            double c = ((1 - s) * (2 + Math.Cos(2 * Math.PI * s)) / 3) + (Math.Sin(2 * Math.PI * s) / (2 * Math.PI));
            correlations[j] = c * c;
        }

        return correlations;
    }

    private static void Lambda(double lambda)
    {
        if (!(lambda >= 0 && lambda < 1))
            throw new ArgumentOutOfRangeException(nameof(lambda), $"the forgetting factor is {lambda}; at least 0 and below 1 is allowed");
    }
}
