using System.Numerics;

namespace ArrayWatch.Signals.Kernels;

/// <summary>
/// Triangular inverse of one diagonal block of at most 16×16 of a Hermitian matrix, by elimination of
/// [A | I] without a look at columns.
/// </summary>
/// <remarks>
/// Work rows are <c>[16 re | 16 im | 16 re | 16 im]</c>: a row of A, then of what becomes L⁻¹. With pivots d
/// the elimination leaves D Lᴴ and L⁻¹ of the unit-lower factor, so a row times 1/√d is a row of the
/// Cholesky factor's inverse. Rows and columns beyond the block are those of the unit matrix, so every
/// loop runs over whole vectors.
/// </remarks>
internal static unsafe class HermitianBlock
{
    /// <summary>Largest block.</summary>
    public const int Size = 16;

    /// <summary>Doubles of work space.</summary>
    public const int WorkLength = Size * RowLength;

    private const int RowLength = 4 * Size;

    /// <summary>Replaces a block by the inverse of its Cholesky factor, zero above the diagonal.</summary>
    /// <param name="n">1 to 16.</param>
    /// <param name="block">Row-major n×n; its lower triangle is read, all of it is written.</param>
    /// <param name="work"><see cref="WorkLength"/> values, contents ignored.</param>
    /// <param name="logDeterminant">ln det of the block; left as it was when not positive definite.</param>
    /// <returns>False when a pivot is not positive and finite.</returns>
    public static bool TryInvertFactor(int n, ComplexView block, double* work, ref double logDeterminant)
    {
        Load(n, block, work);
        double log = 0;
        for (int j = 0; j < n; j++)
        {
            double* pivot = work + (j * RowLength);
            double d = pivot[j];
            if (!(d > 0) || !double.IsFinite(d)) return false;
            log += Math.Log(d);
            double inverse = 1 / d;
            for (int i = j + 1; i < n; i++)
            {
                // A[i, j] is the conjugate of A[j, i], which stands in the pivot row.
                Subtract(work + (i * RowLength), pivot, pivot[i] * inverse, -pivot[Size + i] * inverse, j);
            }
        }

        for (int i = 0; i < n; i++)
        {
            double* row = work + (i * RowLength);
            double scale = 1 / Math.Sqrt(row[i]);
            ComplexView to = block.At(i, 0);
            for (int j = 0; j < n; j++)
            {
                to.Re[j] = j <= i ? scale * row[(2 * Size) + j] : 0;
                to.Im[j] = j < i ? scale * row[(3 * Size) + j] : 0;
            }
        }

        logDeterminant += log;
        return true;
    }

    private static void Load(int n, ComplexView block, double* work)
    {
        new Span<double>(work, WorkLength).Clear();
        for (int i = 0; i < Size; i++)
        {
            double* row = work + (i * RowLength);
            row[(2 * Size) + i] = 1;
            if (i >= n)
            {
                row[i] = 1;
                continue;
            }

            ComplexView from = block.At(i, 0);
            for (int j = 0; j < i; j++)
            {
                double* mirrored = work + (j * RowLength) + i;
                row[j] = mirrored[0] = from.Re[j];
                row[Size + j] = from.Im[j];
                mirrored[Size] = -from.Im[j];
            }

            row[i] = from.Re[i];
        }
    }

    /// <summary>row ← row − f·pivot, in A from column j on and in the inverse up to column j.</summary>
    private static void Subtract(double* row, double* pivot, double re, double im, int j)
    {
        Vector<double> x = new(-re), y = new(im), z = new(-im);
        int first = j - (j % Vector<double>.Count);
        Sweep(row, pivot, first, Size, x, y, z);
        Sweep(row + (2 * Size), pivot + (2 * Size), 0, first + Vector<double>.Count, x, y, z);
    }

    private static void Sweep(double* row, double* pivot, int from, int to, Vector<double> x, Vector<double> y, Vector<double> z)
    {
        for (int c = from; c < to; c += Vector<double>.Count)
        {
            Vector<double> pr = Vector.Load(pivot + c), pi = Vector.Load(pivot + Size + c);
            Vector<double> r = Vector.Load(row + c), i = Vector.Load(row + Size + c);
            Vector.MultiplyAddEstimate(y, pi, Vector.MultiplyAddEstimate(x, pr, r)).Store(row + c);
            Vector.MultiplyAddEstimate(z, pr, Vector.MultiplyAddEstimate(x, pi, i)).Store(row + Size + c);
        }
    }
}
