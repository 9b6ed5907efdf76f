using MathNet.Numerics;

namespace ArrayWatch.Signals.Statistics;

/// <summary>
/// The Tracy–Widom law for complex data (β = 2): the limit law of the largest eigenvalue of a sample
/// covariance of white noise, centred and scaled.
/// </summary>
/// <remarks>
/// F₂(s) is the Fredholm determinant of 1 − K on (s, ∞), K the Airy kernel
/// K(x, y) = [Ai(x)Ai′(y) − Ai′(x)Ai(y)]/(x − y), discretised by Gauss–Legendre nodes (Bornemann, Markov Process.
/// Relat. Fields 16, 803–866, 2010). Absolute error near 1e-13; the upper tail is relative, from
/// −ln F₂ = Σ tr Kᵐ/m. One evaluation takes near a millisecond: a quantile is to be computed once, not for each matrix.
/// </remarks>
public static class TracyWidom
{
    private const int Nodes = 56;
    private const double Lowest = -9;
    private const double Highest = 30;

    /// <summary>F₂(s) = P(X ≤ s).</summary>
    /// <param name="s">Any number but NaN; below −9 the answer is 0 (F₂(−9) is near 1e-27), above 30 it is 1.</param>
    /// <returns>0 to 1.</returns>
    /// <exception cref="ArgumentOutOfRangeException">NaN.</exception>
    public static double Cdf(double s) => s <= Lowest ? 0 : Math.Exp(LogCdf(s));

    /// <summary>ln P(X &gt; s), accurate far into the upper tail.</summary>
    /// <param name="s">Any number but NaN; taken as 30 above 30, where the logarithm is near −223.</param>
    /// <returns>Not positive, nepers.</returns>
    /// <exception cref="ArgumentOutOfRangeException">NaN.</exception>
    public static double LogUpper(double s) => s <= Lowest ? 0 : MoreMath.Log1mExp(LogCdf(s));

    /// <summary>The s with P(X &gt; s) = <paramref name="upperProbability"/>.</summary>
    /// <param name="upperProbability">10⁻⁹⁰ to 1 − 10⁻¹⁰.</param>
    /// <returns>s, absolute error below 1e-8.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A probability out of that range.</exception>
    public static double UpperQuantile(double upperProbability)
    {
        Check.InRange(upperProbability, 1e-90, 1 - 1e-10, "the probability to exceed");
        double target = Deviate(LogOf(upperProbability));
        return Roots.Rising(s => Deviate(LogUpper(s)) - target, Lowest, Highest, -1.77 + (0.9 * target), 0.1, 1e-9);
    }

    /// <summary>ln p, without the rounding of a probability near one.</summary>
    internal static double LogOf(double probability)
        => probability < 0.5 ? Math.Log(probability) : MoreMath.Log1p(-(1 - probability));

    /// <summary>
    /// The normal deviate with the same upper probability: on this scale the laws of largest eigenvalues are smooth and nearly straight.
    /// </summary>
    internal static double Deviate(double logUpper) => logUpper switch
    {
        >= 0 => double.NegativeInfinity,
        double.NegativeInfinity => double.PositiveInfinity,
        _ => NormalTail.QuantileOfLogUpper(logUpper),
    };

    private static double LogCdf(double s)
    {
        Check.InRange(s, double.NegativeInfinity, double.PositiveInfinity, "the argument of the Tracy–Widom law");
        s = Math.Min(s, Highest);
        return FredholmDeterminant.LogOneMinus(Kernel(s));
    }

    private static double[,] Kernel(double s)
    {
        // Beyond this length the kernel has fallen by more than thirty decades below its value at s, or at 0.
        double length = s < 0 ? 14 - s : Math.Max(2, 30 / Math.Sqrt(s + 4));
        GaussLegendre rule = GaussLegendre.WithNodes(Nodes);
        double[] x = new double[Nodes], root = new double[Nodes], value = new double[Nodes], slope = new double[Nodes];
        for (int i = 0; i < Nodes; i++)
        {
            x[i] = s + (length * rule.Nodes[i]);
            root[i] = Math.Sqrt(length * rule.Weights[i]);
            value[i] = SpecialFunctions.AiryAi(x[i]);
            slope[i] = SpecialFunctions.AiryAiPrime(x[i]);
        }

        double[,] kernel = new double[Nodes, Nodes];
        for (int i = 0; i < Nodes; i++)
        {
            kernel[i, i] = root[i] * root[i] * ((slope[i] * slope[i]) - (x[i] * value[i] * value[i]));
            for (int j = 0; j < i; j++)
                kernel[i, j] = kernel[j, i] = root[i] * root[j] * ((value[i] * slope[j]) - (slope[i] * value[j])) / (x[i] - x[j]);
        }

        return kernel;
    }
}
