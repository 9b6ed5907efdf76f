namespace ArrayWatch.Signals.Statistics;

/// <summary>Elementary functions that keep their relative accuracy near zero.</summary>
public static class MoreMath
{
    /// <summary>ln(1 + x).</summary>
    /// <param name="x">At least −1; −1 gives −∞, less gives NaN.</param>
    /// <returns>The value, to a few units in the last place (Kahan's correction by the rounded sum).</returns>
    public static double Log1p(double x)
    {
        double sum = 1 + x;
        if (sum == 1 || double.IsInfinity(sum)) return x;
        return Math.Log(sum) * (x / (sum - 1));
    }

    /// <summary>e^x − 1.</summary>
    /// <param name="x">Any number.</param>
    /// <returns>The value, to a few units in the last place (Kahan's correction by the rounded exponential).</returns>
    public static double Expm1(double x)
    {
        if (Math.Abs(x) > 0.7) return Math.Exp(x) - 1;
        double power = Math.Exp(x);
        if (power == 1) return x;
        return (power - 1) * (x / Math.Log(power));
    }

    /// <summary>ln(1 − e^x): the logarithm of the complement of a probability given by its logarithm.</summary>
    /// <param name="x">Not positive; 0 gives −∞.</param>
    /// <returns>The value.</returns>
    public static double Log1mExp(double x) => x > -0.7 ? Math.Log(-Expm1(x)) : Log1p(-Math.Exp(x));

    /// <summary>x − ln(1 + x), without cancellation near zero.</summary>
    /// <param name="x">Above −1.</param>
    /// <returns>The value, not negative.</returns>
    public static double ExcessOverLog1p(double x)
    {
        if (Math.Abs(x) > 0.1) return x - Log1p(x);
        // With r = x/(2 + x), ln(1 + x) = 2(r + r³/3 + …) and x − 2r = x r.
        double r = x / (2 + x), square = r * r, sum = 0, power = r * square;
        for (int k = 3; k < 40; k += 2)
        {
            sum += power / k;
            power *= square;
        }

        return (x * r) - (2 * sum);
    }
}
