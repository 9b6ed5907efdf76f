using MathNet.Numerics;

namespace ArrayWatch.Signals.Statistics;

/// <summary>
/// Tails of the gamma and chi-square laws in logarithms: ln Q(a, x) = ln[Γ(a, x)/Γ(a)] and its complement
/// keep their relative accuracy far out and for large a.
/// </summary>
/// <remarks>
/// Series below x = a + 1 and Legendre's continued fraction above (Abramowitz and Stegun 1964, 6.5.29 and
/// 6.5.31). The common factor x^a e^(−x)/Γ(a + 1) comes from its deviance form, without the cancellation of large
/// logarithms.
/// </remarks>
public static class GammaTail
{
    private const double LargestShape = 1e9;

    /// <summary>ln Q(a, x), the logarithm of P(G &gt; x) for a gamma law of shape a and unit scale.</summary>
    /// <param name="shape">a, 0 to 10⁹, positive.</param>
    /// <param name="x">Not negative; ∞ gives −∞.</param>
    /// <returns>Not positive, nepers; relative error of Q near 1e-12.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double LogUpper(double shape, double x)
    {
        (double log, bool isUpper) = Evaluate(shape, x);
        return isUpper ? log : MoreMath.Log1mExp(log);
    }

    /// <summary>ln P(a, x), the logarithm of P(G ≤ x) for a gamma law of shape a and unit scale.</summary>
    /// <param name="shape">a, 0 to 10⁹, positive.</param>
    /// <param name="x">Not negative; 0 gives −∞.</param>
    /// <returns>Not positive, nepers; relative error of P near 1e-12.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double LogLower(double shape, double x)
    {
        (double log, bool isUpper) = Evaluate(shape, x);
        return isUpper ? MoreMath.Log1mExp(log) : log;
    }

    /// <summary>ln P(X &gt; x) for a chi-square law.</summary>
    /// <param name="x">Not negative.</param>
    /// <param name="degreesOfFreedom">Positive, need not be whole.</param>
    /// <returns>Not positive, nepers.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double LogChiSquareUpper(double x, double degreesOfFreedom) => LogUpper(degreesOfFreedom / 2, x / 2);

    /// <summary>The x for which ln P(X &gt; x) = <paramref name="logProbability"/> under a chi-square law.</summary>
    /// <param name="logProbability">Below 0 and finite, nepers.</param>
    /// <param name="degreesOfFreedom">Positive, need not be whole.</param>
    /// <returns>x, to about 1e-10 relative.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double ChiSquareQuantileOfLogUpper(double logProbability, double degreesOfFreedom)
    {
        Check.InRange(logProbability, -1e300, -double.Epsilon, "the logarithm of a probability");
        Check.InRange(degreesOfFreedom, double.Epsilon, 2 * LargestShape, "the number of degrees of freedom");
        double low = 0, high = Math.Max(1, degreesOfFreedom);
        while (LogChiSquareUpper(high, degreesOfFreedom) > logProbability) (low, high) = (high, 2 * high);
        // ln of the survival function falls monotonically: bisection to a tight bracket is enough and cannot fail.
        while (high - low > 1e-13 * high && high > double.Epsilon)
        {
            double middle = (low + high) / 2;
            if (middle <= low || middle >= high) break;
            if (LogChiSquareUpper(middle, degreesOfFreedom) > logProbability) low = middle;
            else high = middle;
        }

        return (low + high) / 2;
    }

    private static (double Log, bool IsUpper) Evaluate(double a, double x)
    {
        Check.InRange(a, double.Epsilon, LargestShape, "the shape of the gamma law", "shape");
        Check.InRange(x, 0, double.PositiveInfinity, "the argument of the gamma law");
        if (x == 0) return (double.NegativeInfinity, false);
        if (double.IsPositiveInfinity(x)) return (double.NegativeInfinity, true);
        double prefactor = LogPrefactor(a, x);
        if (x < a + 1)
        {
            double term = 1, sum = 1;
            for (int n = 1; term > 1e-17 * sum && n < 1_000_000; n++)
            {
                term *= x / (a + n);
                sum += term;
            }

            return (Math.Min(0, prefactor + Math.Log(sum)), false);
        }

        return (Math.Min(0, prefactor + Math.Log(a) + Math.Log(ContinuedFraction(a, x))), true);
    }

    /// <summary>Γ(a, x) / (x^a e^(−x)) by the modified Lentz method.</summary>
    private static double ContinuedFraction(double a, double x)
    {
        const double Tiny = 1e-300;
        double b = x + 1 - a, c = 1 / Tiny, d = 1 / Math.Max(b, Tiny), h = d;
        for (int i = 1; i < 1_000_000; i++)
        {
            double numerator = -i * (i - a);
            b += 2;
            d = (numerator * d) + b;
            if (Math.Abs(d) < Tiny) d = Tiny;
            c = b + (numerator / c);
            if (Math.Abs(c) < Tiny) c = Tiny;
            d = 1 / d;
            double factor = c * d;
            h *= factor;
            if (Math.Abs(factor - 1) < 1e-16) break;
        }

        return h;
    }

    /// <summary>ln[x^a e^(−x)/Γ(a + 1)].</summary>
    private static double LogPrefactor(double a, double x)
    {
        if (a < 12) return (a * Math.Log(x)) - x - SpecialFunctions.GammaLn(a + 1);
        double square = 1 / (a * a);
        double stirling = (1.0 / 12 + (square * (-1.0 / 360 + (square * (1.0 / 1260 + (square * (-1.0 / 1680 + (square / 1188)))))))) / a;
        return (-a * MoreMath.ExcessOverLog1p((x - a) / a)) - (0.5 * Math.Log(2 * Math.PI * a)) - stirling;
    }
}
