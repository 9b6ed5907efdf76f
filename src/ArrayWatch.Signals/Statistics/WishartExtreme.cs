using MathNet.Numerics;

namespace ArrayWatch.Signals.Statistics;

/// <summary>
/// Exact law of the largest eigenvalue of a sample covariance S = (1/ν) Σ x xᴴ of white circular complex Gaussian noise
/// of unit power: for p channels and ν ≥ p.
/// </summary>
/// <remarks>
/// The eigenvalues t of νS are the Laguerre ensemble: P(t₁ ≤ t) = det(1 − G), G_jk = ∫_t^∞ φ_j φ_k, with φ_0 … φ_(p−1) the orthonormal
/// Laguerre functions of weight t^(ν−p) e^(−t) (Khatri, Ann. Math. Statist. 35, 1807–1810, 1964, gives the same law as a determinant of
/// incomplete gamma functions, which loses all digits beyond a dozen channels; Bornemann, Markov Process. Relat. Fields 16, 2010, the
/// quadrature). ν need not be whole.
/// </remarks>
internal static class WishartExtreme
{
    private const int Nodes = 72;

    /// <summary>ln P(λ₁ &gt; <paramref name="eigenvalue"/>), accurate far into the tail.</summary>
    /// <param name="eigenvalue">In units of the noise power.</param>
    /// <param name="channels">p.</param>
    /// <param name="snapshots">ν ≥ p.</param>
    public static double LogUpper(double eigenvalue, int channels, double snapshots)
    {
        if (eigenvalue <= 0) return 0;
        double start = eigenvalue * snapshots, length = Reach(start, channels, snapshots);
        GaussLegendre rule = GaussLegendre.WithNodes(Nodes);
        double[,] functions = new double[channels, Nodes];
        for (int m = 0; m < Nodes; m++)
            Laguerre(start + (length * rule.Nodes[m]), snapshots - channels, Math.Sqrt(length * rule.Weights[m]), functions, m);
        return MoreMath.Log1mExp(FredholmDeterminant.LogOneMinus(Gram(functions)));
    }

    /// <summary>How far beyond <paramref name="start"/> the functions must be followed until their squares have fallen by e^−40.</summary>
    private static double Reach(double start, int p, double n)
    {
        // Beyond the edges a, b the density falls at the rate √((t−a)(t−b))/t (large deviations of the ensemble).
        double root = Math.Sqrt(n) - Math.Sqrt(p), sum = Math.Sqrt(n) + Math.Sqrt(p), low = root * root, high = sum * sum;
        double t = Math.Max(start, high), fallen = 0;
        // The scale of fluctuation at the edge, and steps that grow with the distance.
        double step = 0.25 * sum * Math.Cbrt((1 / Math.Sqrt(n)) + (1 / Math.Sqrt(p)));
        while (fallen < 40)
        {
            t += step;
            fallen += step * Math.Sqrt((t - low) * (t - high)) / t;
        }

        return t - start;
    }

    /// <summary>φ_0(t) … φ_(p−1)(t) times <paramref name="factor"/> into one column, by the three-term recurrence with a running scale.</summary>
    private static void Laguerre(double t, double alpha, double factor, double[,] functions, int column)
    {
        double log = 0.5 * ((alpha * Math.Log(t)) - t - SpecialFunctions.GammaLn(alpha + 1));
        double previous = 0, current = 1;
        for (int k = 0; k < functions.GetLength(0); k++)
        {
            functions[k, column] = factor * current * Math.Exp(log);
            double next = ((((2 * k) + 1 + alpha - t) * current) - (Math.Sqrt(k * (k + alpha)) * previous)) / Math.Sqrt((k + 1) * (k + 1 + alpha));
            (previous, current) = (current, next);
            double size = Math.Abs(current);
            if (size < 1e100) continue;
            (previous, current, log) = (previous / size, current / size, log + Math.Log(size));
        }
    }

    /// <summary>V Vᵀ or Vᵀ V, whichever is smaller: both have the same eigenvalues but for zeros.</summary>
    private static double[,] Gram(double[,] v)
    {
        int rows = v.GetLength(0), columns = v.GetLength(1);
        bool byRows = rows <= columns;
        int n = byRows ? rows : columns, inner = byRows ? columns : rows;
        double[,] gram = new double[n, n];
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j <= i; j++)
            {
                double sum = 0;
                for (int k = 0; k < inner; k++) sum += byRows ? v[i, k] * v[j, k] : v[k, i] * v[k, j];
                gram[i, j] = gram[j, i] = sum;
            }
        }

        return gram;
    }
}
