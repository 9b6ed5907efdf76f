using System.Collections.Concurrent;

namespace ArrayWatch.Signals.Statistics;

/// <summary>
/// A Gauss–Legendre quadrature rule on [0, 1]: ∫₀¹ f(u) du ≈ Σ w_k f(u_k), exact for polynomials up to
/// degree 2n−1. Immutable; rules are made once and shared.
/// </summary>
/// <remarks>
/// Nodes are the zeros of the Legendre polynomial P_n, found by Newton's method from
/// cos(π(k − ¼)/(n + ½)) (Abramowitz and Stegun 1964, 22.16.6 and 25.4.29).
/// </remarks>
public sealed class GaussLegendre
{
    /// <summary>Largest number of nodes.</summary>
    public const int MaximumNodes = 4096;

    private static readonly ConcurrentDictionary<int, GaussLegendre> Rules = new();

    private GaussLegendre(int count)
    {
        Nodes = new double[count];
        Weights = new double[count];
        for (int k = 0; k < (count + 1) / 2; k++)
        {
            double x = Math.Cos(Math.PI * (k + 0.75) / (count + 0.5)), derivative = 1;
            for (int iteration = 0; iteration < 100; iteration++)
            {
                (double value, derivative) = Legendre(count, x);
                double step = value / derivative;
                x -= step;
                if (Math.Abs(step) < 1e-15) break;
            }

            derivative = Legendre(count, x).Derivative;
            // The rule on [−1, 1] has weights 2/((1−x²)P′²); half of that here.
            double weight = 1 / ((1 - x) * (1 + x) * derivative * derivative);
            (Nodes[k], Nodes[count - 1 - k]) = ((1 - x) / 2, (1 + x) / 2);
            Weights[k] = Weights[count - 1 - k] = weight;
        }
    }

    /// <summary>Nodes u_k in ascending order, inside (0, 1). Not to be written to.</summary>
    public double[] Nodes { get; }

    /// <summary>Weights w_k, positive, summing to 1. Not to be written to.</summary>
    public double[] Weights { get; }

    /// <summary>The rule with <paramref name="count"/> nodes.</summary>
    /// <param name="count">1 to <see cref="MaximumNodes"/>.</param>
    /// <returns>The rule.</returns>
    /// <exception cref="ArgumentOutOfRangeException">A count out of that range.</exception>
    public static GaussLegendre WithNodes(int count)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(count, 1);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(count, MaximumNodes);
        return Rules.GetOrAdd(count, static n => new GaussLegendre(n));
    }

    private static (double Value, double Derivative) Legendre(int n, double x)
    {
        double previous = 1, current = x;
        if (n == 1) return (x, 1);
        for (int m = 2; m <= n; m++) (previous, current) = (current, ((((2 * m) - 1) * x * current) - ((m - 1) * previous)) / m);
        return (current, n * ((x * current) - previous) / ((x - 1) * (x + 1)));
    }
}
