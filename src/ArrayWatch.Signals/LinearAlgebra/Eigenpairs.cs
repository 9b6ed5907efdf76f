using System.Numerics;
using MathNet.Numerics.LinearAlgebra;

namespace ArrayWatch.Signals.LinearAlgebra;

/// <summary>
/// The largest eigenvalues of a Hermitian matrix and their vectors: the whole decomposition when the matrix
/// is small, otherwise Rayleigh–Ritz on a block Krylov space, restarted from its own Ritz vectors.
/// </summary>
/// <remarks>
/// G.H. Golub, R. Underwood, "The block Lanczos method for computing eigenvalues", in Mathematical Software
/// III, 1977, 361–377. All vectors stand as rows xᴴ: B collects the orthonormal basis, its image is B A,
/// the projected matrix T = B A Bᴴ, and an eigenvector y of T gives the Ritz vector xᴴ = yᴴ B. A block of
/// p = count + 2 rows W is orthonormalised against B (twice), joins it, and W ← W A, until B has the size
/// wanted; the best p Ritz vectors are the next round's W. Deterministic: the first W is a fixed sequence.
/// </remarks>
internal sealed class Eigenpairs
{
    private const int WholeSize = 32;
    private const int Rounds = 60;
    private const double Tolerance = 1e-12;
    private const double Dependent = 1e-10;

    private readonly ComplexMatrix _matrix;
    private readonly int _count;
    private readonly int _n;
    private readonly ComplexMatrix _basis;
    private readonly ComplexMatrix _image;
    private readonly ComplexMatrix _block;
    private readonly ComplexMatrix _spare;
    private readonly ComplexMatrix _overlaps;
    private int _size;

    private Eigenpairs(ComplexMatrix matrix, int count)
    {
        int space = SpaceFor(count);
        _matrix = matrix;
        _count = count;
        _n = matrix.Rows;
        _basis = new ComplexMatrix(space, _n);
        _image = new ComplexMatrix(space, _n);
        _block = new ComplexMatrix(BlockFor(count), _n);
        _spare = new ComplexMatrix(_block.Rows, _n);
        _overlaps = new ComplexMatrix(_block.Rows, space);
    }

    /// <summary>See <see cref="Hermitian.LargestEigenpairs"/>, which has checked the arguments.</summary>
    public static double Solve(ComplexMatrix matrix, int count, Span<double> values, ComplexMatrix vectors)
    {
        int n = matrix.Rows;
        if (n > WholeSize && SpaceFor(count) < n / 2) return new Eigenpairs(matrix, count).Iterate(values, vectors);
        (double[] all, Matrix<Complex> y) = Decompose(matrix, n);
        for (int p = 0; p < count; p++)
        {
            values[p] = all[p];
            for (int i = 0; i < n; i++) vectors[p, i] = y[i, p];
        }

        return 0;
    }

    private static int BlockFor(int count) => count + 2;

    private static int SpaceFor(int count) => Math.Max(24, 4 * BlockFor(count));

    /// <summary>All eigenvalues, descending, and vectors (columns) of the leading part of a matrix; its lower triangle is read.</summary>
    private static (double[] Values, Matrix<Complex> Vectors) Decompose(ComplexMatrix matrix, int n)
    {
        Matrix<Complex> full = Matrix<Complex>.Build.Dense(n, n, (i, j) => i == j ? matrix[i, i].Real : i > j ? matrix[i, j] : Complex.Conjugate(matrix[j, i]));
        var evd = full.Evd(Symmetricity.Hermitian);
        double[] values = [.. evd.EigenValues.Select(v => v.Real)];
        int[] order = [.. Enumerable.Range(0, n).OrderByDescending(i => values[i])];
        return ([.. order.Select(i => values[i])], Matrix<Complex>.Build.Dense(n, n, (i, j) => evd.EigenVectors[i, order[j]]));
    }

    private double Iterate(Span<double> values, ComplexMatrix vectors)
    {
        // Fractional parts of multiples of the golden ratio and of √2: equidistributed, and no field's eigenvector.
        for (int i = 0; i < _block.Re.Length; i++)
        {
            _block.Re[i] = ((i + 1) * 0.6180339887498949 % 1) - 0.5;
            _block.Im[i] = ((i + 1) * 0.4142135623730951 % 1) - 0.5;
        }

        double residual = double.PositiveInfinity;
        for (int round = 0; round < Rounds && residual > Tolerance; round++)
        {
            _size = 0;
            _basis.Clear();
            _image.Clear();
            int active = _block.Rows;
            while (active > 0 && _size < _basis.Rows) active = Extend(active);
            residual = Ritz(values);
        }

        for (int p = 0; p < _count; p++)
        {
            for (int i = 0; i < _n; i++) vectors[p, i] = Complex.Conjugate(_block[p, i]);
        }

        return residual;
    }

    /// <summary>Adds what the block's first rows add to the space, replaces them by their images, and counts them.</summary>
    private int Extend(int active)
    {
        Span<double> before = stackalloc double[active];
        for (int r = 0; r < active; r++) before[r] = Norm(_block, r);
        for (int pass = 0; pass < 2; pass++)
        {
            Products.MultiplyConjugateTranspose(_block, _basis, _overlaps);
            Products.Multiply(_overlaps, _basis, _spare);
            for (int i = 0; i < _block.Re.Length; i++)
            {
                _block.Re[i] -= _spare.Re[i];
                _block.Im[i] -= _spare.Im[i];
            }
        }

        int first = _size;
        for (int r = 0; r < active && _size < _basis.Rows; r++)
        {
            for (int pass = 0; pass < 2; pass++)
            {
                for (int q = first; q < _size; q++) Subtract(_block, r, _basis, q, Inner(_block, r, _basis, q));
            }

            double norm = Norm(_block, r);
            if (norm > Dependent * before[r]) Scale(_block, r, 1 / norm, _basis, _size++);
        }

        int added = _size - first;
        for (int r = 0; r < added; r++) Scale(_basis, first + r, 1, _block, r);
        Products.Multiply(_block, _matrix, _spare);
        _block.CopyFrom(_spare);
        for (int r = 0; r < added; r++) Scale(_block, r, 1, _image, first + r);
        return added;
    }

    /// <summary>Puts the best Ritz vectors into the block; the largest residual ‖A x − θ x‖ over the largest |θ|.</summary>
    private double Ritz(Span<double> values)
    {
        var projected = new ComplexMatrix(_basis.Rows, _basis.Rows);
        Products.MultiplyConjugateTranspose(_image, _basis, projected);
        (double[] theta, Matrix<Complex> y) = Decompose(projected, _size);
        var adjoint = new ComplexMatrix(_block.Rows, _basis.Rows);
        for (int p = 0; p < Math.Min(_block.Rows, _size); p++)
        {
            for (int i = 0; i < _size; i++) adjoint[p, i] = Complex.Conjugate(y[i, p]);
        }

        Products.Multiply(adjoint, _basis, _block);
        Products.Multiply(adjoint, _image, _spare);
        double worst = 0, largest = Math.Max(Math.Abs(theta[0]), Math.Abs(theta[^1]));
        for (int p = 0; p < _count; p++)
        {
            values[p] = theta[p];
            Subtract(_spare, p, _block, p, theta[p]);
            worst = Math.Max(worst, Norm(_spare, p));
        }

        return largest > 0 ? worst / largest : 0;
    }

    private static double Norm(ComplexMatrix a, int row)
    {
        double sum = 0;
        for (int i = row * a.Columns; i < (row + 1) * a.Columns; i++) sum += (a.Re[i] * a.Re[i]) + (a.Im[i] * a.Im[i]);
        return Math.Sqrt(sum);
    }

    private static Complex Inner(ComplexMatrix a, int row, ComplexMatrix b, int other)
    {
        Complex sum = 0;
        for (int i = 0; i < a.Columns; i++) sum += a[row, i] * Complex.Conjugate(b[other, i]);
        return sum;
    }

    private static void Subtract(ComplexMatrix a, int row, ComplexMatrix b, int other, Complex factor)
    {
        for (int i = 0; i < a.Columns; i++) a[row, i] -= factor * b[other, i];
    }

    private static void Scale(ComplexMatrix from, int row, double factor, ComplexMatrix to, int other)
    {
        for (int i = 0; i < from.Columns; i++) to[other, i] = factor * from[row, i];
    }
}
