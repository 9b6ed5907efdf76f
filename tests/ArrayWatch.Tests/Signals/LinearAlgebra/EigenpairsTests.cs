using System.Numerics;
using ArrayWatch.Signals.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra;

namespace ArrayWatch.Tests.Signals.LinearAlgebra;

public sealed class EigenpairsTests
{
    [Theory]
    [InlineData(1, 1)]
    [InlineData(2, 2)]
    [InlineData(24, 24)]
    [InlineData(32, 3)]
    [InlineData(60, 4)]
    [InlineData(90, 1)]
    [InlineData(130, 5)]
    public void Values_agree_with_the_whole_decomposition_and_vectors_are_orthonormal(int n, int count)
    {
        ComplexMatrix a = ScalarAlgebra.RandomHermitian(new Random(20261211), n), vectors = new(count, n);
        double[] values = new double[count];
        double residual = Hermitian.LargestEigenpairs(a, count, values, vectors);

        double[] expected = [.. Matrix<Complex>.Build.Dense(n, n, (i, j) => a[i, j]).Evd(Symmetricity.Hermitian).EigenValues.Select(v => v.Real).OrderDescending()];
        for (int p = 0; p < count; p++) Assert.Equal(expected[p], values[p], 1e-9 * n);
        Assert.InRange(residual, 0, 1e-9);

        ComplexMatrix gram = ScalarAlgebra.Multiply(vectors, ScalarAlgebra.Adjoint(vectors));
        for (int p = 0; p < count; p++) gram[p, p] -= 1;
        Assert.InRange(ScalarAlgebra.Difference(gram, new ComplexMatrix(count, count)), 0, 1e-10);
        for (int p = 0; p < count; p++)
        {
            for (int i = 0; i < n; i++)
            {
                Complex product = 0;
                for (int j = 0; j < n; j++) product += a[i, j] * vectors[p, j];
                Assert.InRange(Complex.Abs(product - (values[p] * vectors[p, i])), 0, 1e-8 * n);
            }
        }
    }

    [Fact]
    public void Repeated_eigenvalues_are_found_as_often_as_they_occur()
    {
        // Three equal eigenvalues of 5 on a floor of ones, in a random basis of 100.
        var random = new Random(20261212);
        const int Size = 100;
        ComplexMatrix q = Orthonormal(random, Size, 3), a = ScalarAlgebra.Multiply(q, ScalarAlgebra.Adjoint(q)), vectors = new(4, Size);
        for (int i = 0; i < Size; i++)
        {
            for (int j = 0; j < Size; j++) a[i, j] = (4 * a[i, j]) + (i == j ? 1 : 0);
        }

        double[] values = new double[4];
        Hermitian.LargestEigenpairs(a, 4, values, vectors);
        Assert.Equal([5, 5, 5, 1], values.Select(v => Math.Round(v, 9)));
    }

    [Fact]
    public void A_zero_matrix_has_zero_eigenvalues()
    {
        double[] values = [1, 1];
        var vectors = new ComplexMatrix(2, 100);
        Assert.Equal(0, Hermitian.LargestEigenpairs(new ComplexMatrix(100, 100), 2, values, vectors));
        Assert.Equal([0, 0], values);
    }

    [Fact]
    public void Shapes_that_do_not_agree_are_refused()
    {
        var a = new ComplexMatrix(4, 4);
        Assert.Throws<ArgumentOutOfRangeException>(() => Hermitian.LargestEigenpairs(a, 5, new double[5], new ComplexMatrix(5, 4)));
        Assert.Throws<ArgumentException>(() => Hermitian.LargestEigenpairs(a, 2, new double[1], new ComplexMatrix(2, 4)));
        Assert.Throws<ArgumentException>(() => Hermitian.LargestEigenpairs(new ComplexMatrix(4, 3), 2, new double[2], new ComplexMatrix(2, 4)));
    }

    private static ComplexMatrix Orthonormal(Random random, int n, int columns)
    {
        Matrix<Complex> m = Matrix<Complex>.Build.Dense(n, columns, (_, _) => new Complex(random.NextDouble() - 0.5, random.NextDouble() - 0.5));
        Matrix<Complex> q = m.GramSchmidt().Q;
        var result = new ComplexMatrix(n, columns);
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < columns; j++) result[i, j] = q[i, j];
        }

        return result;
    }
}
