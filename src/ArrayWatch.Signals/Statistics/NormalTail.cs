using MathNet.Numerics;

namespace ArrayWatch.Signals.Statistics;

/// <summary>Upper tail Q(z) = P(Z &gt; z) of the standard normal law, in logarithms, so that it keeps its relative accuracy far out.</summary>
public static class NormalTail
{
    private const double HalfLogTwoPi = 0.918938533204672741780;

    /// <summary>ln Q(z); relative error of Q near 1e-14 for every z, also where Q itself underflows.</summary>
    /// <param name="z">Any number; ∞ gives −∞, NaN gives NaN.</param>
    /// <returns>ln Q(z), not positive, nepers.</returns>
    /// <remarks>
    /// The complementary error function up to z = 8; Laplace's continued fraction
    /// Q(z) = φ(z)/(z + 1/(z + 2/(z + 3/(z + …)))) above (Abramowitz and Stegun 1964, 26.2.14).
    /// </remarks>
    public static double LogUpper(double z)
    {
        if (z < 0) return Log1Minus(0.5 * SpecialFunctions.Erfc(-z / Constants.Sqrt2));
        if (z < 8) return Math.Log(0.5 * SpecialFunctions.Erfc(z / Constants.Sqrt2));
        if (double.IsNaN(z)) return z;
        if (double.IsInfinity(z)) return double.NegativeInfinity;
        double fraction = z;
        for (int k = 60; k >= 1; k--) fraction = z + (k / fraction);
        return (-0.5 * z * z) - HalfLogTwoPi - Math.Log(fraction);
    }

    /// <summary>The z for which ln Q(z) = <paramref name="logProbability"/>.</summary>
    /// <param name="logProbability">Below 0 and finite, nepers.</param>
    /// <returns>z, to about 1e-13 relative.</returns>
    /// <exception cref="ArgumentOutOfRangeException">Not below zero, or not finite.</exception>
    public static double QuantileOfLogUpper(double logProbability)
    {
        Check.InRange(logProbability, -double.MaxValue, -double.Epsilon, "the logarithm of a probability");
        // ln Q is concave, so Newton's method comes in from the right-hand side of the root without overshooting.
        double z = logProbability < -0.7 ? Math.Sqrt(-2 * logProbability) : -Math.Sqrt(-2 * LogOfComplement(logProbability));
        for (int i = 0; i < 100; i++)
        {
            double value = LogUpper(z);
            double hazard = Math.Exp((-0.5 * z * z) - HalfLogTwoPi - value);
            double step = (value - logProbability) / hazard;
            z += Math.Clamp(step, -2, 2);
            if (Math.Abs(step) <= 1e-14 * Math.Max(1, Math.Abs(z))) break;
        }

        return z;
    }

    private static double LogOfComplement(double log) => Math.Log(Math.Max(-MoreMath.Expm1(log), double.Epsilon));

    private static double Log1Minus(double p) => MoreMath.Log1p(-p);
}
