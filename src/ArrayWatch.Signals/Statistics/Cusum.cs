namespace ArrayWatch.Signals.Statistics;

/// <summary>
/// Average run lengths of the cumulative-sum chart S ← max(0, S + x − k), alarm when S &gt; h, for independent x of unit
/// variance and mean μ (Page, Biometrika 41, 100–115, 1954). Run lengths count decisions, those of one side unless
/// <see cref="TwoSided"/> joins two.
/// </summary>
public static class Cusum
{
    private const double LargestThreshold = 40;
    private const double LargestRunLength = 1e10;

    /// <summary>Average run length from a start at zero.</summary>
    /// <param name="mean">μ, −10 to 10.</param>
    /// <param name="reference">k, −10 to 10: half the shift that is looked for.</param>
    /// <param name="threshold">h, 0 to 40, positive.</param>
    /// <returns>Decisions; relative error near 1e-9 up to 10⁶, growing with the length to 1e-5 at 10¹⁰.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    /// <remarks>
    /// The integral equation L(u) = 1 + L(0)Φ(k−u−μ) + ∫₀ʰ L(y) φ(y+k−u−μ) dy. Where the answer is beyond 10¹⁰
    /// rounding rules it: <see cref="Siegmund"/> is better there.
    /// </remarks>
    public static double AverageRunLength(double mean, double reference, double threshold)
    {
        Arguments(mean, reference, threshold);
        double drift = reference - mean;
        int nodes = 32 + (int)Math.Ceiling(8 * threshold);
        return RunLength.Solve(
            0, threshold, nodes, 0, (y, u) => RunLength.Density(y + drift - u), u => RunLength.Normal(drift - u), 0);
    }

    /// <summary>
    /// Siegmund's approximation (e^(−2Δb) + 2Δb − 1)/(2Δ²), Δ = μ − k, b = h + 1.166 (Sequential Analysis, 1985): within 1 % without
    /// a shift, a few per cent short for large shifts.
    /// </summary>
    /// <param name="mean">μ, −10 to 10.</param>
    /// <param name="reference">k, −10 to 10.</param>
    /// <param name="threshold">h, 0 to 40, positive.</param>
    /// <returns>Decisions; may be infinite.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double Siegmund(double mean, double reference, double threshold)
    {
        Arguments(mean, reference, threshold);
        double drift = mean - reference, b = threshold + 1.166, x = -2 * drift * b;
        // (e^x − 1 − x)/x² tends to ½, where the difference would lose all digits.
        if (Math.Abs(x) < 1e-3) return b * b * (1 + (x / 3));
        return (MoreMath.Expm1(x) - x) / (2 * drift * drift);
    }

    /// <summary>Run length of two one-sided charts that run together: 1/L = 1/L⁺ + 1/L⁻.</summary>
    /// <param name="upward">L⁺, positive.</param>
    /// <param name="downward">L⁻, positive.</param>
    /// <returns>L.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double TwoSided(double upward, double downward)
    {
        Check.InRange(upward, double.Epsilon, double.PositiveInfinity, "the run length upward");
        Check.InRange(downward, double.Epsilon, double.PositiveInfinity, "the run length downward");
        return 1 / ((1 / upward) + (1 / downward));
    }

    /// <summary>The threshold whose run length without a shift is <paramref name="runLength"/>, one-sided.</summary>
    /// <param name="reference">k, 0.05 to 10.</param>
    /// <param name="runLength">Decisions between false alarms, 10 to 10³⁰; at k and above, so that a threshold exists.</param>
    /// <returns>h; relative error of the run length below 1e-5 up to 10⁸, within 2 % above.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range, or a run length that even h = 0 exceeds.</exception>
    public static double ThresholdFor(double reference, double runLength)
    {
        Check.InRange(reference, 0.05, 10, "the reference value");
        Check.InRange(runLength, 10, 1e30, "the run length");
        bool exact = runLength <= LargestRunLength / 100;
        double Excess(double h) => Math.Log((exact ? AverageRunLength(0, reference, h) : Siegmund(0, reference, h)) / runLength);

        double low = 1e-6, high = LargestThreshold;
        if (Excess(low) > 0)
            throw new ArgumentOutOfRangeException(nameof(runLength), $"with a reference value of {reference} the run length exceeds {runLength} at every threshold");
        if (Siegmund(0, reference, high) < runLength)
            throw new ArgumentOutOfRangeException(nameof(runLength), $"with a reference value of {reference} a run length of {runLength} needs a threshold above {LargestThreshold}");
        // ln of the run length is nearly straight in h, and Siegmund's form right within a few per cent: a good start for secants.
        double guess = Roots.Rising(h => Math.Log(Siegmund(0, reference, h) / runLength), low, high, 5, 1, 1e-9);
        return exact ? Roots.Rising(Excess, low, high, guess, 0.02, 1e-9) : guess;
    }

    /// <summary>
    /// Lorden's lower bound on the run length without a change of a log-likelihood-ratio chart (Ann. Math. Statist. 42, 1897–1908, 1971):
    /// e^b for a threshold of b nepers. For a shift δ with k = δ/2, b = δh.
    /// </summary>
    /// <param name="logThreshold">b, nepers, not negative.</param>
    /// <returns>Decisions.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Negative or not finite.</exception>
    public static double LordenBound(double logThreshold)
        => Math.Exp(Check.InRange(logThreshold, 0, double.MaxValue, "the threshold in nepers"));

    /// <summary>
    /// The threshold that Lorden's bound asks for: b = ln L nepers. Holds for any law of the evidence, so it is the safe choice where the
    /// evidence is not Gaussian.
    /// </summary>
    /// <param name="runLength">L, at least 1.</param>
    /// <returns>b, nepers.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Below one or not finite.</exception>
    public static double LordenThreshold(double runLength)
        => Math.Log(Check.InRange(runLength, 1, double.MaxValue, "the run length"));

    private static void Arguments(double mean, double reference, double threshold)
    {
        Check.InRange(mean, -10, 10, "the mean");
        Check.InRange(reference, -10, 10, "the reference value");
        Check.InRange(threshold, 1e-9, LargestThreshold, "the threshold");
    }
}
