using System.Numerics;
using ArrayWatch.Signals.LinearAlgebra;
using MathNet.Numerics.LinearAlgebra;

namespace ArrayWatch.Tests.Signals.LinearAlgebra;

[Trait("Category", "Kernels")]
public sealed class HermitianTests
{
    public static TheoryData<int> Sizes() => [.. Enumerable.Range(1, 67), 96, 100, 128, 130];

    [Theory]
    [MemberData(nameof(Sizes))]
    public void Inverse_times_matrix_is_the_unit_matrix(int n)
    {
        var random = new Random(20261205);
        ComplexMatrix a = ScalarAlgebra.RandomPositiveDefinite(random, n), factor = new(n, n), inverse = new(n, n);
        factor.CopyFrom(a);

        Assert.True(Hermitian.TryInvert(factor, inverse, out _));

        ComplexMatrix unit = ScalarAlgebra.Multiply(a, inverse);
        for (int i = 0; i < n; i++) unit[i, i] -= 1;
        Assert.InRange(ScalarAlgebra.Difference(unit, new ComplexMatrix(n, n)), 0, 1e-11);
        Assert.Equal(0, ScalarAlgebra.Difference(inverse, ScalarAlgebra.Adjoint(inverse)));
    }

    [Theory]
    [InlineData(5)]
    [InlineData(32)]
    [InlineData(50)]
    public void What_is_left_is_the_inverse_factor(int n)
    {
        var random = new Random(20261206);
        ComplexMatrix a = ScalarAlgebra.RandomPositiveDefinite(random, n), factor = new(n, n), inverse = new(n, n);
        factor.CopyFrom(a);

        Assert.True(Hermitian.TryInvert(factor, inverse, out double logDeterminant));

        ComplexMatrix whitened = ScalarAlgebra.Multiply(ScalarAlgebra.Multiply(factor, a), ScalarAlgebra.Adjoint(factor));
        double log = 0;
        for (int i = 0; i < n; i++)
        {
            whitened[i, i] -= 1;
            log -= 2 * Math.Log(factor[i, i].Real);
            for (int j = i + 1; j < n; j++) Assert.Equal(Complex.Zero, factor[i, j]);
        }

        Assert.InRange(ScalarAlgebra.Difference(whitened, new ComplexMatrix(n, n)), 0, 1e-12);
        Assert.Equal(log, logDeterminant, 1e-10);
    }

    [Theory]
    [InlineData(7)]
    [InlineData(33)]
    [InlineData(80)]
    public void Inverse_and_determinant_agree_with_MathNet(int n)
    {
        ComplexMatrix a = ScalarAlgebra.RandomPositiveDefinite(new Random(20261207), n), inverse = new(n, n);
        Matrix<Complex> m = Matrix<Complex>.Build.Dense(n, n, (i, j) => a[i, j]);
        Matrix<Complex> expected = m.Inverse();

        Assert.True(Hermitian.TryInvert(a, inverse, out double logDeterminant));

        Assert.Equal(m.Cholesky().DeterminantLn.Real, logDeterminant, 1e-9);
        double worst = 0;
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < n; j++) worst = Math.Max(worst, (expected[i, j] - inverse[i, j]).Magnitude);
        }

        Assert.InRange(worst, 0, 1e-11);
    }

    [Fact]
    public void Only_the_lower_triangle_is_read()
    {
        ComplexMatrix a = ScalarAlgebra.RandomPositiveDefinite(new Random(20261208), 37), b = new(37, 37);
        b.CopyFrom(a);
        for (int i = 0; i < 37; i++)
        {
            for (int j = i + 1; j < 37; j++) b[i, j] = double.NaN;
        }

        ComplexMatrix expected = new(37, 37), actual = new(37, 37);
        Assert.True(Hermitian.TryInvert(a, expected, out _));
        Assert.True(Hermitian.TryInvert(b, actual, out _));
        Assert.Equal(0, ScalarAlgebra.Difference(expected, actual));
    }

    [Theory]
    [InlineData(1, 0)]
    [InlineData(20, 3)]
    [InlineData(20, 19)]
    [InlineData(40, 16)]
    public void A_matrix_that_is_not_positive_definite_is_told(int n, int at)
    {
        foreach (double bad in (double[])[-1, 0, double.NaN, double.PositiveInfinity])
        {
            var a = new ComplexMatrix(n, n);
            for (int i = 0; i < n; i++) a[i, i] = i == at ? bad : 1;
            Assert.False(Hermitian.TryInvert(a, new ComplexMatrix(n, n), out double logDeterminant));
            Assert.True(double.IsNaN(logDeterminant));
        }
    }

    [Fact]
    public void A_badly_scaled_matrix_is_inverted_to_its_own_precision()
    {
        // diag(10^-12 … 10^12) times a correlation of one half next door.
        const int Size = 25;
        var a = new ComplexMatrix(Size, Size);
        double[] scale = [.. Enumerable.Range(0, Size).Select(i => Math.Pow(10, i - 12))];
        for (int i = 0; i < Size; i++)
        {
            a[i, i] = scale[i] * scale[i];
            if (i > 0) a[i, i - 1] = new Complex(0, 0.5) * scale[i] * scale[i - 1];
        }

        ComplexMatrix copy = new(Size, Size), inverse = new(Size, Size);
        copy.CopyFrom(a);
        Assert.True(Hermitian.TryInvert(copy, inverse, out _));
        for (int i = 0; i < Size; i++)
        {
            for (int j = 0; j < Size; j++)
            {
                Complex sum = 0;
                for (int k = Math.Max(0, i - 1); k <= Math.Min(Size - 1, i + 1); k++)
                    sum += (k <= i ? a[i, k] : Complex.Conjugate(a[k, i])) / scale[i] * inverse[k, j] * scale[j];
                Assert.InRange(Complex.Abs(sum - (i == j ? 1 : 0)), 0, 1e-12);
            }
        }
    }

    [Fact]
    public void Shapes_that_do_not_agree_are_named()
    {
        var a = new ComplexMatrix(3, 3);
        Assert.Throws<ArgumentException>(() => Hermitian.TryInvert(a, new ComplexMatrix(4, 4), out _));
        Assert.Throws<ArgumentException>(() => Hermitian.TryInvert(new ComplexMatrix(3, 4), a, out _));
        Assert.Throws<ArgumentException>(() => Hermitian.TryInvert(a, a, out _));
    }
}
