using System.Runtime.CompilerServices;
using ArrayWatch.Signals.Kernels;

namespace ArrayWatch.Signals.LinearAlgebra;

/// <summary>Factorisation of Hermitian matrices, in place and without allocation.</summary>
/// <remarks>Safe to call concurrently on different matrices.</remarks>
public static class Hermitian
{
    /// <summary>
    /// Inverts the positive definite <paramref name="a"/> into <paramref name="inverse"/> by Cholesky
    /// factorisation (A = L Lᴴ, A⁻¹ = L⁻ᴴ L⁻¹).
    /// </summary>
    /// <param name="a">
    /// Hermitian, n×n; its lower triangle is read, and it is overwritten by L⁻¹, zero above the diagonal
    /// (in part, when the method answers false).
    /// </param>
    /// <param name="inverse">n×n, not <paramref name="a"/>; receives both triangles of A⁻¹.</param>
    /// <param name="logDeterminant">ln det A, nepers; NaN when the method answers false.</param>
    /// <returns>False when A is not positive definite, or holds a value that is not finite.</returns>
    /// <exception cref="ArgumentException">The shapes do not agree, or the two are one matrix.</exception>
    /// <remarks>
    /// Blocks of 16: column blocks are factored left-looking, as products; the inverse of each diagonal
    /// block stands in its place, so that every triangular solve is a product too. About 8n³/3·2 real
    /// operations in all.
    /// </remarks>
    [SkipLocalsInit]
    public static unsafe bool TryInvert(ComplexMatrix a, ComplexMatrix inverse, out double logDeterminant)
    {
        ArgumentNullException.ThrowIfNull(a);
        ArgumentNullException.ThrowIfNull(inverse);
        int n = a.Rows;
        if (a.Columns != n || inverse.Rows != n || inverse.Columns != n)
            throw new ArgumentException($"square matrices of one size are needed, not {n}×{a.Columns} and {inverse.Rows}×{inverse.Columns}", nameof(inverse));
        if (ReferenceEquals(a, inverse)) throw new ArgumentException("the inverse needs a matrix of its own", nameof(inverse));
        fixed (double* ar = a.Re, ai = a.Im, xr = inverse.Re, xi = inverse.Im)
        {
            ComplexView l = ComplexView.Of(a, ar, ai), x = ComplexView.Of(inverse, xr, xi);
            double log = 0;
            if (!TryFactor(n, l, ref log))
            {
                logDeterminant = double.NaN;
                return false;
            }

            InvertFactor(n, l, x);
            ProductWithAdjoint(n, l, x);
            logDeterminant = log;
            return true;
        }
    }

    /// <summary>Finds the algebraically largest eigenvalues of a Hermitian matrix and their unit vectors.</summary>
    /// <param name="matrix">Hermitian, n×n, both triangles; left as it is.</param>
    /// <param name="count">Number wanted, 1 to n.</param>
    /// <param name="values">Receives <paramref name="count"/> eigenvalues, descending.</param>
    /// <param name="vectors">count×n; row p receives the unit vector of eigenvalue p, of arbitrary phase.</param>
    /// <returns>
    /// The largest residual ‖A v − λ v‖ over the largest |λ|: 0 when the whole decomposition was made, else
    /// about 10⁻¹² unless the wanted eigenvalues lie in a dense cluster. Each λ is within the residual of
    /// an eigenvalue.
    /// </returns>
    /// <exception cref="ArgumentException">The shapes do not agree.</exception>
    public static double LargestEigenpairs(ComplexMatrix matrix, int count, Span<double> values, ComplexMatrix vectors)
    {
        ArgumentNullException.ThrowIfNull(matrix);
        ArgumentNullException.ThrowIfNull(vectors);
        int n = matrix.Rows;
        ArgumentOutOfRangeException.ThrowIfLessThan(count, 1);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(count, n);
        if (matrix.Columns != n || values.Length != count || vectors.Rows != count || vectors.Columns != n)
            throw new ArgumentException($"{count} pairs of a {n}×{matrix.Columns} matrix do not go into {values.Length} values and {vectors.Rows}×{vectors.Columns} vectors", nameof(vectors));
        return Eigenpairs.Solve(matrix, count, values, vectors);
    }

    /// <summary>Leaves L below the diagonal blocks and the inverse of L's diagonal blocks on them.</summary>
    [SkipLocalsInit]
    private static unsafe bool TryFactor(int n, ComplexView l, ref double log)
    {
        double* work = stackalloc double[HermitianBlock.WorkLength];
        for (int j = 0; j < n; j += HermitianBlock.Size)
        {
            int wide = Math.Min(HermitianBlock.Size, n - j), rest = n - j - wide;
            ComplexView diagonal = l.At(j, j), below = l.At(j + wide, j);
            if (j > 0) ComplexProduct.Multiply(n - j, wide, j, l.At(j, 0), l.At(j, 0).Transposed().Conjugated(), diagonal, ProductMode.Subtract);
            if (!HermitianBlock.TryInvertFactor(wide, diagonal, work, ref log)) return false;
            if (rest > 0) ComplexProduct.Multiply(rest, wide, wide, below, diagonal.Transposed().Conjugated(), below, ProductMode.Set);
        }

        return true;
    }

    /// <summary>L⁻¹ by block rows: X[I, :I] = −(X[I, I] L[I, :I]) X[:I, :I]; the scratch holds the bracket.</summary>
    private static unsafe void InvertFactor(int n, ComplexView l, ComplexView scratch)
    {
        for (int i = 0; i < n; i += HermitianBlock.Size)
        {
            int high = Math.Min(HermitianBlock.Size, n - i);
            if (i > 0) ComplexProduct.Multiply(high, i, high, l.At(i, i), l.At(i, 0), scratch, ProductMode.SetNegated);
            for (int j = 0; j < i; j += HermitianBlock.Size)
                ComplexProduct.Multiply(high, HermitianBlock.Size, i - j, scratch.At(0, j), l.At(j, j), l.At(i, j), ProductMode.Set);
            for (int r = 0; r < high; r++)
            {
                ComplexView right = l.At(i + r, i + high);
                new Span<double>(right.Re, n - i - high).Clear();
                new Span<double>(right.Im, n - i - high).Clear();
            }
        }
    }

    /// <summary>result ← Xᴴ X of a lower triangular X: one triangle by blocks, then its mirror image.</summary>
    private static unsafe void ProductWithAdjoint(int n, ComplexView x, ComplexView result)
    {
        for (int i = 0; i < n; i += HermitianBlock.Size)
        {
            int high = Math.Min(HermitianBlock.Size, n - i);
            ComplexProduct.Multiply(high, i + high, n - i, x.At(i, i).Transposed().Conjugated(), x.At(i, 0), result.At(i, 0), ProductMode.Set);
            for (int r = i; r < i + high; r++)
            {
                result.At(r, r).Im[0] = 0;
                for (int c = 0; c < r; c++)
                {
                    ComplexView from = result.At(r, c), to = result.At(c, r);
                    to.Re[0] = from.Re[0];
                    to.Im[0] = -from.Im[0];
                }
            }
        }
    }
}
