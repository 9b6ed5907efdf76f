using System.Numerics;
using System.Runtime.InteropServices;

namespace ArrayWatch.NoiseField.Fitting;

/// <summary>
/// Non-negative least squares on normal equations: minimises ½ xᵀGx − bᵀx over x ≥ 0 by cyclic coordinate
/// descent from a given start (Franc, Hlaváč and Navara, "Sequential coordinate-wise algorithm for the
/// non-negative least squares problem", CAIP 2005). It needs no factorisation, so that nearly
/// collinear atoms (neighbours of a dense grid) do no harm.
/// </summary>
public static class NonNegativeLeastSquares
{
    /// <summary>Solves in place.</summary>
    /// <param name="gram">G, n² values, row-major, symmetric and positive semidefinite.</param>
    /// <param name="right">b, n values.</param>
    /// <param name="x">The start, n values ≥ 0; receives the solution.</param>
    /// <param name="tolerance">Stop when no coordinate's optimality is violated by more than this share of the largest |b|.</param>
    /// <param name="mostSweeps">Stop after this many passes in any case.</param>
    /// <exception cref="ArgumentException">The lengths do not agree.</exception>
    public static void Solve(ReadOnlySpan<double> gram, ReadOnlySpan<double> right, Span<double> x, double tolerance = 1e-6, int mostSweeps = 200)
    {
        int n = right.Length;
        if (gram.Length != n * n || x.Length != n) throw new ArgumentException($"a Gram matrix of {gram.Length} and {x.Length} unknowns do not go with {n} right sides", nameof(gram));
        double[] gradient = new double[n];
        double scale = 0;
        for (int i = 0; i < n; i++)
        {
            double g = -right[i];
            ReadOnlySpan<double> row = gram.Slice(i * n, n);
            for (int j = 0; j < n; j++) g += row[j] * x[j];
            gradient[i] = g;
            scale = Math.Max(scale, Math.Abs(right[i]));
        }

        for (int sweep = 0; sweep < mostSweeps; sweep++)
        {
            double worst = 0;
            for (int i = 0; i < n; i++)
            {
                double diagonal = gram[(i * n) + i];
                if (!(diagonal > 0)) continue;
                double next = Math.Max(0, x[i] - (gradient[i] / diagonal)), step = next - x[i];
                if (step == 0) continue;
                worst = Math.Max(worst, Math.Abs(step) * diagonal);
                x[i] = next;
                ReadOnlySpan<double> row = gram.Slice(i * n, n);
                AddScaled(gradient, row, step);
            }

            if (worst <= tolerance * scale) return;
        }
    }

    private static void AddScaled(Span<double> to, ReadOnlySpan<double> from, double factor)
    {
        Span<Vector<double>> vt = MemoryMarshal.Cast<double, Vector<double>>(to);
        ReadOnlySpan<Vector<double>> vf = MemoryMarshal.Cast<double, Vector<double>>(from);
        Vector<double> f = new(factor);
        for (int i = 0; i < vt.Length; i++) vt[i] += vf[i] * f;
        for (int i = vt.Length * Vector<double>.Count; i < to.Length; i++) to[i] += factor * from[i];
    }
}
