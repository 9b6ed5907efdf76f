using MathNet.Numerics;

namespace ArrayWatch.Signals.Statistics;

/// <summary>Tails of the beta law in logarithms: ln I_x(a, b) and its complement keep their relative accuracy far out.</summary>
/// <remarks>Continued fraction of the incomplete beta function (Abramowitz and Stegun 1964, 26.5.8), on the side where it converges fast.</remarks>
public static class BetaTail
{
    /// <summary>ln P(B ≤ x) = ln I_x(a, b).</summary>
    /// <param name="x">0 to 1.</param>
    /// <param name="a">First shape, 10⁻⁶ to 10⁹.</param>
    /// <param name="b">Second shape, 10⁻⁶ to 10⁹.</param>
    /// <returns>Not positive, nepers.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double LogLower(double x, double a, double b)
    {
        Check.InRange(x, 0, 1, "the argument of the beta law");
        Check.InRange(a, 1e-6, 1e9, "the first shape of the beta law");
        Check.InRange(b, 1e-6, 1e9, "the second shape of the beta law");
        if (x == 0) return double.NegativeInfinity;
        if (x == 1) return 0;
        return x <= (a + 1) / (a + b + 2)
            ? Direct(Math.Log(x), MoreMath.Log1p(-x), x, a, b)
            : MoreMath.Log1mExp(Direct(MoreMath.Log1p(-x), Math.Log(x), 1 - x, b, a));
    }

    /// <summary>ln P(B &gt; x) = ln I_(1−x)(b, a).</summary>
    /// <param name="x">0 to 1.</param>
    /// <param name="a">First shape, 10⁻⁶ to 10⁹.</param>
    /// <param name="b">Second shape, 10⁻⁶ to 10⁹.</param>
    /// <returns>Not positive, nepers.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double LogUpper(double x, double a, double b)
    {
        Check.InRange(x, 0, 1, "the argument of the beta law");
        Check.InRange(a, 1e-6, 1e9, "the first shape of the beta law");
        Check.InRange(b, 1e-6, 1e9, "the second shape of the beta law");
        if (x == 0) return 0;
        if (x == 1) return double.NegativeInfinity;
        return x <= (a + 1) / (a + b + 2)
            ? MoreMath.Log1mExp(Direct(Math.Log(x), MoreMath.Log1p(-x), x, a, b))
            : Direct(MoreMath.Log1p(-x), Math.Log(x), 1 - x, b, a);
    }

    /// <summary>The x for which ln P(B &gt; x) = <paramref name="logProbability"/>.</summary>
    /// <param name="logProbability">Below 0 and finite, nepers.</param>
    /// <param name="a">First shape, 10⁻⁶ to 10⁹.</param>
    /// <param name="b">Second shape, 10⁻⁶ to 10⁹.</param>
    /// <returns>x, 0 to 1.</returns>
    /// <exception cref="ArgumentOutOfRangeException">An argument out of its range.</exception>
    public static double QuantileOfLogUpper(double logProbability, double a, double b)
    {
        Check.InRange(logProbability, -1e300, -double.Epsilon, "the logarithm of a probability");
        double low = 0, high = 1;
        for (int i = 0; i < 200 && high - low > 1e-16 * high; i++)
        {
            double middle = (low + high) / 2;
            if (LogUpper(middle, a, b) > logProbability) low = middle;
            else high = middle;
        }

        return (low + high) / 2;
    }

    private static double Direct(double logX, double logComplement, double x, double a, double b)
    {
        const double Tiny = 1e-300;
        double front = (a * logX) + (b * logComplement) - SpecialFunctions.BetaLn(a, b) - Math.Log(a);
        double c = 1, d = 1 - ((a + b) * x / (a + 1));
        d = 1 / (Math.Abs(d) < Tiny ? Tiny : d);
        double h = d;
        for (int m = 1; m < 1_000_000; m++)
        {
            double even = m * (b - m) * x / ((a + (2.0 * m) - 1) * (a + (2.0 * m)));
            double odd = -(a + m) * (a + b + m) * x / ((a + (2.0 * m)) * (a + (2.0 * m) + 1));
            h *= Step(even, ref c, ref d);
            double factor = Step(odd, ref c, ref d);
            h *= factor;
            if (Math.Abs(factor - 1) < 1e-16) break;
        }

        return Math.Min(0, front + Math.Log(h));

        static double Step(double numerator, ref double c, ref double d)
        {
            d = 1 + (numerator * d);
            d = 1 / (Math.Abs(d) < Tiny ? Tiny : d);
            c = 1 + (numerator / c);
            if (Math.Abs(c) < Tiny) c = Tiny;
            return c * d;
        }
    }
}
