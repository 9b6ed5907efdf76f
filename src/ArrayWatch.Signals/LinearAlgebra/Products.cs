using System.Buffers;
using System.Diagnostics.CodeAnalysis;
using ArrayWatch.Signals.Kernels;

namespace ArrayWatch.Signals.LinearAlgebra;

/// <summary>Products of complex matrices into storage that the caller owns.</summary>
/// <remarks>
/// Safe to call concurrently on different destinations. Sums are fused where the machine fuses, so that
/// results may differ between machines by a few units in the last place of Σ|a||b|. Non-finite values
/// spread as in the defining sums.
/// </remarks>
public static class Products
{
    /// <summary><paramref name="result"/> ← A B.</summary>
    /// <param name="a">m×k.</param>
    /// <param name="b">k×n.</param>
    /// <param name="result">m×n, not A or B.</param>
    /// <exception cref="ArgumentException">The shapes do not agree, or the result is an operand.</exception>
    public static void Multiply(ComplexMatrix a, ComplexMatrix b, ComplexMatrix result)
    {
        Check(a, b, result);
        if (a.Columns != b.Rows || result.Rows != a.Rows || result.Columns != b.Columns) ThrowShape(a, b, result, "A B");
        Form(a, b, result, false, false);
    }

    /// <summary><paramref name="result"/> ← Aᴴ B.</summary>
    /// <param name="a">k×m.</param>
    /// <param name="b">k×n.</param>
    /// <param name="result">m×n, not A or B.</param>
    /// <exception cref="ArgumentException">The shapes do not agree, or the result is an operand.</exception>
    public static void ConjugateTransposeMultiply(ComplexMatrix a, ComplexMatrix b, ComplexMatrix result)
    {
        Check(a, b, result);
        if (a.Rows != b.Rows || result.Rows != a.Columns || result.Columns != b.Columns) ThrowShape(a, b, result, "Aᴴ B");
        Form(a, b, result, true, false);
    }

    /// <summary><paramref name="result"/> ← A Bᴴ.</summary>
    /// <param name="a">m×k.</param>
    /// <param name="b">n×k.</param>
    /// <param name="result">m×n, not A or B.</param>
    /// <exception cref="ArgumentException">The shapes do not agree, or the result is an operand.</exception>
    public static void MultiplyConjugateTranspose(ComplexMatrix a, ComplexMatrix b, ComplexMatrix result)
    {
        Check(a, b, result);
        if (a.Columns != b.Columns || result.Rows != a.Rows || result.Columns != b.Rows) ThrowShape(a, b, result, "A Bᴴ");
        Form(a, b, result, false, true);
    }

    /// <summary>Real quadratic forms b_q = v_qᴴ M v_q of a Hermitian matrix.</summary>
    /// <param name="rows">Q×n: row q holds v_q.</param>
    /// <param name="matrix">Hermitian, n×n; its lower triangle and the diagonal blocks of 16 are read.</param>
    /// <param name="forms">Q values; receives the forms.</param>
    /// <exception cref="ArgumentException">The shapes do not agree.</exception>
    public static unsafe void QuadraticForms(ComplexMatrix rows, ComplexMatrix matrix, Span<double> forms)
    {
        ArgumentNullException.ThrowIfNull(rows);
        ArgumentNullException.ThrowIfNull(matrix);
        if (matrix.Columns != matrix.Rows || rows.Columns != matrix.Rows || forms.Length != rows.Rows)
            ThrowRows(rows, matrix, $"{forms.Length} forms");
        fixed (double* vr = rows.Re, vi = rows.Im, mr = matrix.Re, mi = matrix.Im, b = forms)
            HermitianForms.Evaluate(rows.Rows, matrix.Rows, ComplexView.Of(rows, vr, vi), ComplexView.Of(matrix, mr, mi), b);
    }

    /// <summary>Squared magnitudes of the Gram matrix in the metric of W: g_pq = |v_pᴴ W v_q|².</summary>
    /// <param name="rows">Q×n: row q holds v_q.</param>
    /// <param name="weight">W, Hermitian, n×n.</param>
    /// <param name="gram">Q² values, row-major; receives g, symmetric.</param>
    /// <exception cref="ArgumentException">The shapes do not agree.</exception>
    public static unsafe void GramMagnitudes(ComplexMatrix rows, ComplexMatrix weight, Span<double> gram)
    {
        ArgumentNullException.ThrowIfNull(rows);
        ArgumentNullException.ThrowIfNull(weight);
        int q = rows.Rows, n = weight.Rows;
        if (weight.Columns != n || rows.Columns != n || gram.Length != (long)q * q) ThrowRows(rows, weight, $"{gram.Length} values");
        double[] space = ArrayPool<double>.Shared.Rent(HermitianForms.GramWork(q, n));
        fixed (double* vr = rows.Re, vi = rows.Im, wr = weight.Re, wi = weight.Im, g = gram, work = space)
        {
            ComplexView v = ComplexView.Of(rows, vr, vi), w = ComplexView.Of(weight, wr, wi);
            HermitianForms.Gram(q, n, v, w, g, work);
        }

        ArrayPool<double>.Shared.Return(space);
    }

    private static void Check(ComplexMatrix a, ComplexMatrix b, ComplexMatrix result)
    {
        ArgumentNullException.ThrowIfNull(a);
        ArgumentNullException.ThrowIfNull(b);
        ArgumentNullException.ThrowIfNull(result);
        if (ReferenceEquals(a, result) || ReferenceEquals(b, result))
            throw new ArgumentException("the result needs a matrix of its own", nameof(result));
    }

    private static unsafe void Form(ComplexMatrix a, ComplexMatrix b, ComplexMatrix result, bool adjointA, bool adjointB)
    {
        fixed (double* ar = a.Re, ai = a.Im, br = b.Re, bi = b.Im, cr = result.Re, ci = result.Im)
        {
            ComplexView va = ComplexView.Of(a, ar, ai), vb = ComplexView.Of(b, br, bi);
            if (adjointA) va = va.Transposed().Conjugated();
            if (adjointB) vb = vb.Transposed().Conjugated();
            ComplexProduct.Multiply(result.Rows, result.Columns, adjointA ? a.Rows : a.Columns, va, vb, ComplexView.Of(result, cr, ci), ProductMode.Set);
        }
    }

    [DoesNotReturn]
    private static void ThrowShape(ComplexMatrix a, ComplexMatrix b, ComplexMatrix result, string product) =>
        throw new ArgumentException($"{product} of {a.Rows}×{a.Columns} and {b.Rows}×{b.Columns} does not make {result.Rows}×{result.Columns}", nameof(result));

    [DoesNotReturn]
    private static void ThrowRows(ComplexMatrix rows, ComplexMatrix matrix, string destination) =>
        throw new ArgumentException($"{rows.Rows}×{rows.Columns} rows, a {matrix.Rows}×{matrix.Columns} matrix and {destination} do not go together", nameof(rows));
}
