namespace ArrayWatch.Signals.LinearAlgebra;

/// <summary>Products of complex matrices into storage that the caller owns.</summary>
public static class Products
{
    /// <summary><paramref name="result"/> ← A B.</summary>
    /// <param name="a">m×k.</param>
    /// <param name="b">k×n.</param>
    /// <param name="result">m×n, not A or B.</param>
    /// <exception cref="ArgumentException">The shapes do not agree.</exception>
    public static void Multiply(ComplexMatrix a, ComplexMatrix b, ComplexMatrix result)
    {
        ArgumentNullException.ThrowIfNull(a);
        ArgumentNullException.ThrowIfNull(b);
        ArgumentNullException.ThrowIfNull(result);
        if (a.Columns != b.Rows || result.Rows != a.Rows || result.Columns != b.Columns)
            throw new ArgumentException($"{a.Rows}×{a.Columns} times {b.Rows}×{b.Columns} does not make {result.Rows}×{result.Columns}", nameof(result));
        int n = b.Columns;
        result.Clear();
        for (int i = 0; i < a.Rows; i++)
        {
            Span<double> cr = result.Re.AsSpan(i * n, n), ci = result.Im.AsSpan(i * n, n);
            for (int k = 0; k < a.Columns; k++)
            {
                double ar = a.Re[(i * a.Columns) + k], ai = a.Im[(i * a.Columns) + k];
                ReadOnlySpan<double> br = b.Re.AsSpan(k * n, n), bi = b.Im.AsSpan(k * n, n);
                for (int j = 0; j < n; j++)
                {
                    cr[j] += (ar * br[j]) - (ai * bi[j]);
                    ci[j] += (ar * bi[j]) + (ai * br[j]);
                }
            }
        }
    }

    /// <summary>Real quadratic forms b_q = v_qᴴ M v_q of a Hermitian matrix.</summary>
    /// <param name="rows">Q×n: row q holds v_q.</param>
    /// <param name="matrix">Hermitian, n×n.</param>
    /// <param name="forms">Q values; receives the forms.</param>
    /// <exception cref="ArgumentException">The shapes do not agree.</exception>
    public static void QuadraticForms(ComplexMatrix rows, ComplexMatrix matrix, Span<double> forms)
    {
        ArgumentNullException.ThrowIfNull(rows);
        ArgumentNullException.ThrowIfNull(matrix);
        int n = matrix.Rows;
        if (matrix.Columns != n || rows.Columns != n || forms.Length != rows.Rows)
            throw new ArgumentException("one form a row, and a square matrix of the rows' length, are needed", nameof(forms));
        for (int q = 0; q < rows.Rows; q++)
        {
            ReadOnlySpan<double> vr = rows.Re.AsSpan(q * n, n), vi = rows.Im.AsSpan(q * n, n);
            double sum = 0;
            for (int i = 0; i < n; i++)
            {
                double tr = 0, ti = 0;
                ReadOnlySpan<double> mr = matrix.Re.AsSpan(i * n, n), mi = matrix.Im.AsSpan(i * n, n);
                for (int j = 0; j < n; j++)
                {
                    tr += (mr[j] * vr[j]) - (mi[j] * vi[j]);
                    ti += (mr[j] * vi[j]) + (mi[j] * vr[j]);
                }

                sum += (vr[i] * tr) + (vi[i] * ti);
            }

            forms[q] = sum;
        }
    }
}
