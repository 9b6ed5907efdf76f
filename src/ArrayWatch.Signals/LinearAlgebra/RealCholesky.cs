using System.Buffers;
using System.Numerics;
using System.Runtime.InteropServices;

namespace ArrayWatch.Signals.LinearAlgebra;

/// <summary>Symmetric positive definite systems in double precision, row-major and in place: A = L Lᵀ.</summary>
/// <remarks>Every inner loop runs along rows. Safe to call concurrently on different matrices.</remarks>
public static class RealCholesky
{
    /// <summary>Overwrites the lower triangle of A by L; the rest of A is neither read nor written.</summary>
    /// <param name="matrix">n² values, row-major.</param>
    /// <param name="n">Size, at least 1.</param>
    /// <returns>False when A is not positive definite or not finite; L is then incomplete.</returns>
    /// <exception cref="ArgumentException">The matrix does not have n² values.</exception>
    public static bool TryFactor(Span<double> matrix, int n)
    {
        Check(matrix.Length, n);
        for (int i = 0; i < n; i++)
        {
            Span<double> row = matrix.Slice(i * n, i + 1);
            for (int j = 0; j < i; j++)
            {
                ReadOnlySpan<double> other = matrix.Slice(j * n, j + 1);
                row[j] = (row[j] - Dot(row[..j], other[..j])) / other[j];
            }

            double d = row[i] - Dot(row[..i], row[..i]);
            if (!(d > 0) || !double.IsFinite(d)) return false;
            row[i] = Math.Sqrt(d);
        }

        return true;
    }

    /// <summary>Solves A x = b.</summary>
    /// <param name="factor">L as <see cref="TryFactor"/> left it, n² values.</param>
    /// <param name="n">Size, at least 1.</param>
    /// <param name="b">The right side, n values; receives x.</param>
    /// <exception cref="ArgumentException">The lengths do not agree.</exception>
    public static void Solve(ReadOnlySpan<double> factor, int n, Span<double> b)
    {
        Check(factor.Length, n);
        if (b.Length != n) throw new ArgumentException($"{b.Length} values are not a right side of {n}", nameof(b));
        for (int i = 0; i < n; i++) b[i] = (b[i] - Dot(factor.Slice(i * n, i), b[..i])) / factor[(i * n) + i];
        for (int i = n - 1; i >= 0; i--)
        {
            b[i] /= factor[(i * n) + i];
            AddScaled(b[..i], factor.Slice(i * n, i), -b[i]);
        }
    }

    /// <summary>Overwrites L by A⁻¹, both triangles.</summary>
    /// <param name="factor">L as <see cref="TryFactor"/> left it, n² values; receives A⁻¹.</param>
    /// <param name="n">Size, at least 1.</param>
    /// <exception cref="ArgumentException">The lengths do not agree.</exception>
    public static void Invert(Span<double> factor, int n)
    {
        Check(factor.Length, n);
        double[] rented = ArrayPool<double>.Shared.Rent(n * n);
        Span<double> inverse = rented.AsSpan(0, n * n);
        inverse.Clear();
        for (int i = 0; i < n; i++)
        {
            // Row i of L⁻¹ from the rows above it.
            Span<double> row = inverse.Slice(i * n, i + 1);
            double d = 1 / factor[(i * n) + i];
            for (int k = 0; k < i; k++) AddScaled(row[..(k + 1)], inverse.Slice(k * n, k + 1), -d * factor[(i * n) + k]);
            row[i] = d;
        }

        factor.Clear();
        for (int k = 0; k < n; k++)
        {
            ReadOnlySpan<double> row = inverse.Slice(k * n, k + 1);
            for (int i = 0; i <= k; i++) AddScaled(factor.Slice(i * n, i + 1), row[..(i + 1)], row[i]);
        }

        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < i; j++) factor[(j * n) + i] = factor[(i * n) + j];
        }

        ArrayPool<double>.Shared.Return(rented);
    }

    private static void Check(int length, int n)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(n, 1);
        if (length != (long)n * n) throw new ArgumentException($"{length} values are not a {n}×{n} matrix");
    }

    private static double Dot(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        ReadOnlySpan<Vector<double>> va = MemoryMarshal.Cast<double, Vector<double>>(a), vb = MemoryMarshal.Cast<double, Vector<double>>(b);
        Vector<double> s0 = default, s1 = default, s2 = default, s3 = default;
        int i = 0;
        for (; i <= va.Length - 4; i += 4)
        {
            s0 = Vector.MultiplyAddEstimate(va[i], vb[i], s0);
            s1 = Vector.MultiplyAddEstimate(va[i + 1], vb[i + 1], s1);
            s2 = Vector.MultiplyAddEstimate(va[i + 2], vb[i + 2], s2);
            s3 = Vector.MultiplyAddEstimate(va[i + 3], vb[i + 3], s3);
        }

        for (; i < va.Length; i++) s0 = Vector.MultiplyAddEstimate(va[i], vb[i], s0);
        double sum = Vector.Sum(s0 + s1 + (s2 + s3));
        for (i *= Vector<double>.Count; i < a.Length; i++) sum += a[i] * b[i];
        return sum;
    }

    private static void AddScaled(Span<double> to, ReadOnlySpan<double> from, double factor)
    {
        Span<Vector<double>> vt = MemoryMarshal.Cast<double, Vector<double>>(to);
        ReadOnlySpan<Vector<double>> vf = MemoryMarshal.Cast<double, Vector<double>>(from);
        Vector<double> f = new(factor);
        for (int i = 0; i < vt.Length; i++) vt[i] = Vector.MultiplyAddEstimate(vf[i], f, vt[i]);
        for (int i = vt.Length * Vector<double>.Count; i < to.Length; i++) to[i] += factor * from[i];
    }
}
