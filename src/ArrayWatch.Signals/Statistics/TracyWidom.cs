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
/// −ln F₂ = Σ tr Kᵐ/m. One evaluation takes some 0.4 ms, so a threshold is to be computed once, not for each matrix.
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
        // Solved where the function is smooth and nearly straight: on the scale of normal deviates.
        double target = Deviate(upperProbability < 0.5 ? Math.Log(upperProbability) : MoreMath.Log1p(-(1 - upperProbability)));
        double low = Lowest, high = Highest, s = Math.Clamp(-1.77 + (0.9 * target), Lowest + 1, Highest - 1);
        for (int i = 0; i < 60; i++)
        {
            double value = Deviate(LogUpper(s)) - target;
            if (value > 0) high = s;
            else low = s;
            double slope = (Deviate(LogUpper(s + 1e-4)) - target - value) / 1e-4;
            double next = s - (value / slope);
            if (!(next > low && next < high)) next = (low + high) / 2;
            bool done = Math.Abs(next - s) < 1e-10;
            s = next;
            if (done) break;
        }

        return s;
    }

    /// <summary>The normal deviate with the same upper probability; rises with s.</summary>
    private static double Deviate(double logUpper) => logUpper >= 0 ? double.NegativeInfinity : NormalTail.QuantileOfLogUpper(logUpper);

    private static double LogCdf(double s)
    {
        Check.InRange(s, double.NegativeInfinity, double.PositiveInfinity, "the argument of the Tracy–Widom law");
        s = Math.Min(s, Highest);
        double[,] kernel = Kernel(s);
        double trace = 0;
        for (int i = 0; i < Nodes; i++) trace += kernel[i, i];
        return trace < 0.05 ? -LogSeries(kernel) : LogDeterminant(kernel);
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

    /// <summary>Σ tr Kᵐ/m = −ln det(1 − K) for a small trace: no subtraction from 1, hence relative accuracy.</summary>
    private static double LogSeries(double[,] kernel)
    {
        double sum = 0;
        double[,] power = kernel;
        for (int m = 1; ; m++)
        {
            double trace = 0;
            for (int i = 0; i < Nodes; i++) trace += power[i, i];
            sum += trace / m;
            if (m > 1 && trace / m < 1e-16 * sum) return sum;
            power = Times(power, kernel);
        }
    }

    private static double[,] Times(double[,] a, double[,] b)
    {
        double[,] c = new double[Nodes, Nodes];
        for (int i = 0; i < Nodes; i++)
        {
            for (int k = 0; k < Nodes; k++)
            {
                double f = a[i, k];
                for (int j = 0; j < Nodes; j++) c[i, j] += f * b[k, j];
            }
        }

        return c;
    }

    /// <summary>ln det(1 − K) by Cholesky factorisation; 1 − K is positive definite.</summary>
    private static double LogDeterminant(double[,] kernel)
    {
        double log = 0;
        double[,] l = new double[Nodes, Nodes];
        for (int j = 0; j < Nodes; j++)
        {
            double d = 1 - kernel[j, j];
            for (int k = 0; k < j; k++) d -= l[j, k] * l[j, k];
            // Far in the lower tail eigenvalues of K round to 1; the determinant is then zero to all digits.
            if (!(d > 0)) return double.NegativeInfinity;
            log += Math.Log(d);
            l[j, j] = Math.Sqrt(d);
            for (int i = j + 1; i < Nodes; i++)
            {
                double sum = -kernel[i, j];
                for (int k = 0; k < j; k++) sum -= l[i, k] * l[j, k];
                l[i, j] = sum / l[j, j];
            }
        }

        return log;
    }
}
