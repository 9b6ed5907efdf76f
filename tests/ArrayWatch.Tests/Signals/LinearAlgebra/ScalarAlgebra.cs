using System.Numerics;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Tests.Signals.LinearAlgebra;

/// <summary>The defining sums, one element at a time: the twins of the vector kernels.</summary>
internal static class ScalarAlgebra
{
    public static ComplexMatrix Random(Random random, int rows, int columns)
    {
        var m = new ComplexMatrix(rows, columns);
        for (int i = 0; i < m.Re.Length; i++)
        {
            m.Re[i] = (2 * random.NextDouble()) - 1;
            m.Im[i] = (2 * random.NextDouble()) - 1;
        }

        return m;
    }

    public static ComplexMatrix RandomHermitian(Random random, int n)
    {
        ComplexMatrix a = Random(random, n, n), h = new(n, n);
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < n; j++) h[i, j] = a[i, j] + Complex.Conjugate(a[j, i]);
        }

        return h;
    }

    /// <summary>A Aᴴ of a random n×(n+4) matrix, plus a tenth of the unit matrix: condition of some thousands at most.</summary>
    public static ComplexMatrix RandomPositiveDefinite(Random random, int n)
    {
        ComplexMatrix a = Random(random, n, n + 4);
        ComplexMatrix p = Multiply(a, Adjoint(a));
        for (int i = 0; i < n; i++) p[i, i] += 0.1;
        return p;
    }

    public static ComplexMatrix Adjoint(ComplexMatrix a)
    {
        var t = new ComplexMatrix(a.Columns, a.Rows);
        for (int i = 0; i < a.Rows; i++)
        {
            for (int j = 0; j < a.Columns; j++) t[j, i] = Complex.Conjugate(a[i, j]);
        }

        return t;
    }

    public static ComplexMatrix Multiply(ComplexMatrix a, ComplexMatrix b)
    {
        var c = new ComplexMatrix(a.Rows, b.Columns);
        for (int i = 0; i < a.Rows; i++)
        {
            for (int j = 0; j < b.Columns; j++)
            {
                Complex sum = 0;
                for (int k = 0; k < a.Columns; k++) sum += a[i, k] * b[k, j];
                c[i, j] = sum;
            }
        }

        return c;
    }

    public static Complex Form(ComplexMatrix rows, int p, ComplexMatrix m, int q)
    {
        Complex sum = 0;
        for (int i = 0; i < m.Rows; i++)
        {
            for (int j = 0; j < m.Rows; j++) sum += Complex.Conjugate(rows[p, i]) * m[i, j] * rows[q, j];
        }

        return sum;
    }

    public static double Difference(ComplexMatrix a, ComplexMatrix b)
    {
        double worst = 0;
        for (int i = 0; i < a.Re.Length; i++) worst = Math.Max(worst, Complex.Abs(new Complex(a.Re[i] - b.Re[i], a.Im[i] - b.Im[i])));
        return worst;
    }
}
