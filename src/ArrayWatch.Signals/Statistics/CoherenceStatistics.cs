namespace ArrayWatch.Signals.Statistics;

/// <summary>
/// Laws of the estimated magnitude-squared coherence |S_lm|²/(S_ll S_mm) and of the multiple coherence from n
/// independent snapshots of circular complex Gaussian data. n need not be whole: it is the effective number.
/// Not for the bins at zero and half the sampling rate, whose data are real.
/// </summary>
/// <remarks>
/// Goodman, Ann. Math. Statist. 34, 152–177, 1963; Carter, Knapp and Nuttall, IEEE Trans. Audio Electroacoust. AU-21,
/// 337–344, 1973. With an effective n the laws hold well for half-overlapped Hann windows; for exponential weights they
/// are conservative: a nominal 5 % of false alarms is 4.2 % at λ = 0.9.
/// </remarks>
public static class CoherenceStatistics
{
    private const double LargestSnapshots = 1e7;

    /// <summary>The level that the estimate exceeds with a given probability when there is no coherence: 1 − a^(1/(n−1)).</summary>
    /// <param name="snapshots">n, above 1.</param>
    /// <param name="falseAlarm">a, between 0 and 1.</param>
    /// <returns>The threshold, 0 to 1.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double ZeroCoherenceThreshold(double snapshots, double falseAlarm)
    {
        Snapshots(snapshots);
        Check.OpenProbability(falseAlarm, "the false-alarm probability");
        return -MoreMath.Expm1(Math.Log(falseAlarm) / (snapshots - 1));
    }

    /// <summary>ln P(estimate &gt; <paramref name="estimate"/>) when there is no coherence: (n − 1) ln(1 − Ĉ).</summary>
    /// <param name="estimate">Ĉ, 0 to 1.</param>
    /// <param name="snapshots">n, above 1.</param>
    /// <returns>Not positive, nepers.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double LogZeroCoherenceTail(double estimate, double snapshots)
    {
        Snapshots(snapshots);
        Check.InRange(estimate, 0, 1, "the coherence estimate");
        return (snapshots - 1) * MoreMath.Log1p(-estimate);
    }

    /// <summary>P(Ĉ ≤ <paramref name="estimate"/>) when the true magnitude-squared coherence is <paramref name="coherence"/>.</summary>
    /// <param name="estimate">0 to 1.</param>
    /// <param name="coherence">C, 0 to 1.</param>
    /// <param name="snapshots">n, above 1, at most 10⁷.</param>
    /// <returns>0 to 1.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    /// <remarks>
    /// The density (n−1)(1−C)ⁿ(1−x)^(n−2) ₂F₁(n, n; 1; Cx) is a mixture: Ĉ is Beta(1+K, n−1) where K is negative binomial,
    /// P(K=k) = Γ(n+k)/(Γ(n) k!) Cᵏ(1−C)ⁿ. All terms are positive, so nothing cancels, and n may be any real number.
    /// </remarks>
    public static double Cdf(double estimate, double coherence, double snapshots)
    {
        Snapshots(snapshots);
        Check.InRange(estimate, 0, 1, "the coherence estimate");
        Check.InRange(coherence, 0, 1, "the coherence");
        if (estimate == 1) return 1;
        if (coherence == 1 || estimate == 0) return 0;
        if (coherence == 0) return -MoreMath.Expm1(LogZeroCoherenceTail(estimate, snapshots));
        double mean = snapshots * coherence / (1 - coherence), spread = Math.Sqrt(mean / (1 - coherence));
        // Twelve deviations and a margin for the skewed law at small means leave out less than 1e-16.
        double first = Math.Max(0, Math.Floor(mean - (12 * spread))), last = Math.Ceiling(mean + (12 * spread) + 60);
        if (last - first > 1e8) throw new ArgumentOutOfRangeException(nameof(coherence), $"a coherence of {coherence} with {snapshots} snapshots is too near one");

        // I_x(a, b) = I_x(a+1, b) + x^a (1−x)^b/(a B(a, b)): downward, so that only positive terms are added.
        double below = Math.Exp(BetaTail.LogLower(estimate, last + 1, snapshots - 1));
        double logWeight = LogNegativeBinomial(last, coherence, snapshots), weight = Math.Exp(logWeight);
        double difference = Math.Exp(LogDifference(last, estimate, snapshots));
        double sum = 0;
        for (double k = last; ; k--)
        {
            sum += weight * below;
            if (k <= first) break;
            below += difference;
            // Far above the mean both are too small to be held to all digits; they are taken up again as they grow.
            difference = difference < 1e-250
                ? Math.Exp(LogDifference(k - 1, estimate, snapshots))
                : difference * k / (estimate * (k + snapshots - 2));
            weight = weight < 1e-250
                ? Math.Exp(LogNegativeBinomial(k - 1, coherence, snapshots))
                : weight * k / (coherence * (k + snapshots - 1));
        }

        return Math.Min(1, sum);
    }

    /// <summary>Expected value of the estimate.</summary>
    /// <param name="coherence">C, 0 to 1.</param>
    /// <param name="snapshots">n, above 1, at most 10⁷.</param>
    /// <returns>1/n + (n−1)/(n+1)·C·₂F₁(1, 1; n+2; C); subtract C for the bias.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double Mean(double coherence, double snapshots)
    {
        Snapshots(snapshots);
        Check.InRange(coherence, 0, 1, "the coherence");
        double term = 1, sum = 1;
        for (int k = 1; k < 100_000_000 && term > 1e-17 * sum; k++)
        {
            term *= k * coherence / (snapshots + 1 + k);
            sum += term;
        }

        return (1 / snapshots) + ((snapshots - 1) / (snapshots + 1) * coherence * sum);
    }

    /// <summary>Variance of the estimate: exact at C = 0, 2C(1−C)²/n to first order in 1/n elsewhere, whichever is larger.</summary>
    /// <param name="coherence">C, 0 to 1.</param>
    /// <param name="snapshots">n, above 1.</param>
    /// <returns>The variance.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double Variance(double coherence, double snapshots)
    {
        Snapshots(snapshots);
        Check.InRange(coherence, 0, 1, "the coherence");
        double complement = (1 - coherence) * (1 - coherence);
        double atZero = (snapshots - 1) / (snapshots * snapshots * (snapshots + 1));
        return Math.Max(atZero * complement, 2 * coherence * complement / snapshots);
    }

    /// <summary>Exact equal-tailed confidence interval for the true coherence.</summary>
    /// <param name="estimate">Ĉ, 0 to 1.</param>
    /// <param name="snapshots">n, above 1, at most 10⁷.</param>
    /// <param name="confidence">Such as 0.95.</param>
    /// <returns>The limits, 0 to 1; the lower one is 0 where the estimate may be chance.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static (double Lower, double Upper) ConfidenceInterval(double estimate, double snapshots, double confidence)
    {
        Snapshots(snapshots);
        Check.InRange(estimate, 0, 1, "the coherence estimate");
        double tail = (1 - Check.OpenProbability(confidence, "the confidence")) / 2;
        if (estimate == 1) return (1, 1);
        return (Solve(1 - tail), Solve(tail));

        // Cdf falls as the true coherence rises.
        double Solve(double probability)
        {
            if (Cdf(estimate, 0, snapshots) <= probability) return 0;
            // Toward C = 1 no estimate below 1 is left; the upper bound keeps the sum short.
            double low = 0, high = Math.Min(1 - 1e-7, 1 - ((1 - estimate) * 1e-4));
            while (high - low > 1e-11)
            {
                double middle = (low + high) / 2;
                if (Cdf(estimate, middle, snapshots) > probability) low = middle;
                else high = middle;
            }

            return (low + high) / 2;
        }
    }

    /// <summary>
    /// The level that the multiple coherence of one channel with p others exceeds by chance: when there is none, the estimate
    /// follows Beta(p, n − p).
    /// </summary>
    /// <param name="others">p, at least 1.</param>
    /// <param name="snapshots">n, above p.</param>
    /// <param name="falseAlarm">Between 0 and 1.</param>
    /// <returns>The threshold, 0 to 1.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double ZeroMultipleCoherenceThreshold(int others, double snapshots, double falseAlarm)
    {
        Others(others, snapshots);
        return BetaTail.QuantileOfLogUpper(
            Math.Log(Check.OpenProbability(falseAlarm, "the false-alarm probability")), others, snapshots - others);
    }

    /// <summary>ln P(multiple coherence &gt; <paramref name="estimate"/>) when there is none.</summary>
    /// <param name="estimate">0 to 1.</param>
    /// <param name="others">p, at least 1.</param>
    /// <param name="snapshots">n, above p.</param>
    /// <returns>Not positive, nepers.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double LogZeroMultipleCoherenceTail(double estimate, int others, double snapshots)
    {
        Others(others, snapshots);
        return BetaTail.LogUpper(Check.InRange(estimate, 0, 1, "the coherence estimate"), others, snapshots - others);
    }

    /// <summary>Standard error of a cross-spectrum's phase, √[(1 − C)/(2nC)] (Bendat and Piersol), for small errors.</summary>
    /// <param name="coherence">C, 0 to 1.</param>
    /// <param name="snapshots">n, above 1.</param>
    /// <returns>Radians; not more than π/√3, that of a phase of which nothing is known.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double PhaseStandardError(double coherence, double snapshots)
    {
        Snapshots(snapshots);
        Check.InRange(coherence, 0, 1, "the coherence");
        return Math.Min(Math.PI / Math.Sqrt(3), Math.Sqrt((1 - coherence) / (2 * snapshots * coherence)));
    }

    private static void Snapshots(double snapshots)
    {
        if (!(snapshots > 1 && snapshots <= LargestSnapshots))
            throw new ArgumentOutOfRangeException(nameof(snapshots), $"the number of snapshots is {snapshots}; above 1 and at most {LargestSnapshots} is allowed");
    }

    private static void Others(int others, double snapshots)
    {
        Snapshots(snapshots);
        if (others < 1 || others >= snapshots)
            throw new ArgumentOutOfRangeException(nameof(others), $"{others} other channels with {snapshots} snapshots; at least 1 and fewer than the snapshots are allowed");
    }

    private static double LogNegativeBinomial(double k, double coherence, double n)
        => LogRising(n, k) + (k * Math.Log(coherence)) + (n * MoreMath.Log1p(-coherence));

    /// <summary>ln of I_x(k, n−1) − I_x(k+1, n−1).</summary>
    private static double LogDifference(double k, double x, double n)
        => k <= 0 ? double.NegativeInfinity : LogRising(n - 1, k) + (k * Math.Log(x)) + ((n - 1) * MoreMath.Log1p(-x));

    /// <summary>ln[Γ(n + k)/(Γ(n) k!)].</summary>
    private static double LogRising(double n, double k)
        => MathNet.Numerics.SpecialFunctions.GammaLn(n + k)
            - MathNet.Numerics.SpecialFunctions.GammaLn(n)
            - MathNet.Numerics.SpecialFunctions.GammaLn(k + 1);
}
