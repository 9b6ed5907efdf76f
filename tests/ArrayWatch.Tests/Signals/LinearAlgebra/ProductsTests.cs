using System.Numerics;
using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Tests.Signals.LinearAlgebra;

[Trait("Category", "Kernels")]
public sealed class ProductsTests
{
    public static TheoryData<int, int, int> Shapes()
    {
        var shapes = new TheoryData<int, int, int>();
        for (int n = 1; n <= 35; n++) shapes.Add(n, (n * 7 % 19) + 1, (n * 11 % 23) + 1);
        foreach (int k in (int[])[1, 2, 63, 64, 65, 127, 128, 129, 200]) shapes.Add(5, 17, k);
        shapes.Add(1, 1, 1);
        shapes.Add(33, 48, 70);
        shapes.Add(66, 31, 5);
        return shapes;
    }

    [Theory]
    [MemberData(nameof(Shapes))]
    public void Every_product_is_its_defining_sum(int m, int n, int k)
    {
        var random = new Random(20261201);
        ComplexMatrix a = ScalarAlgebra.Random(random, m, k), b = ScalarAlgebra.Random(random, k, n);
        ComplexMatrix expected = ScalarAlgebra.Multiply(a, b), actual = ScalarAlgebra.Random(random, m, n);
        double tolerance = 1e-15 * (k + 4);

        Products.Multiply(a, b, actual);
        Assert.InRange(ScalarAlgebra.Difference(expected, actual), 0, tolerance);

        Products.ConjugateTransposeMultiply(ScalarAlgebra.Adjoint(a), b, actual);
        Assert.InRange(ScalarAlgebra.Difference(expected, actual), 0, tolerance);

        Products.MultiplyConjugateTranspose(a, ScalarAlgebra.Adjoint(b), actual);
        Assert.InRange(ScalarAlgebra.Difference(expected, actual), 0, tolerance);
    }

    [Theory]
    [InlineData(1, 1)]
    [InlineData(3, 5)]
    [InlineData(4, 16)]
    [InlineData(9, 17)]
    [InlineData(33, 31)]
    [InlineData(70, 67)]
    [InlineData(5, 130)]
    public void Forms_and_Gram_magnitudes_are_their_defining_sums(int count, int n)
    {
        var random = new Random(20261202);
        ComplexMatrix v = ScalarAlgebra.Random(random, count, n), m = ScalarAlgebra.RandomHermitian(random, n);
        double[] forms = new double[count], gram = new double[count * count];

        Products.QuadraticForms(v, m, forms);
        Products.GramMagnitudes(v, m, gram);

        for (int p = 0; p < count; p++)
        {
            Assert.Equal(ScalarAlgebra.Form(v, p, m, p).Real, forms[p], 1e-14 * n * n);
            for (int q = 0; q < count; q++)
            {
                double magnitude = Complex.Abs(ScalarAlgebra.Form(v, p, m, q));
                Assert.Equal(magnitude * magnitude, gram[(p * count) + q], 1e-13 * n * n * n);
            }
        }
    }

    [Fact]
    public void Forms_do_not_read_above_the_diagonal_blocks()
    {
        var random = new Random(20261203);
        ComplexMatrix v = ScalarAlgebra.Random(random, 3, 40), m = ScalarAlgebra.RandomHermitian(random, 40);
        double[] expected = new double[3], actual = new double[3];
        Products.QuadraticForms(v, m, expected);
        for (int i = 0; i < 16; i++)
        {
            for (int j = 16; j < 40; j++) m[i, j] = double.NaN;
        }

        Products.QuadraticForms(v, m, actual);
        Assert.Equal(expected, actual);
    }

    [Fact]
    public void A_value_that_is_not_a_number_spreads_over_its_row_only()
    {
        var random = new Random(20261204);
        ComplexMatrix a = ScalarAlgebra.Random(random, 6, 9), b = ScalarAlgebra.Random(random, 9, 7), c = new(6, 7);
        a[2, 3] = double.NaN;
        Products.Multiply(a, b, c);
        for (int i = 0; i < 6; i++) Assert.All(Enumerable.Range(0, 7), j => Assert.Equal(i == 2, double.IsNaN(c[i, j].Real)));
    }

    [Fact]
    public void Shapes_that_do_not_agree_are_named()
    {
        ComplexMatrix a = new(2, 3), b = new(4, 5), c = new(2, 5);
        ArgumentException e = Assert.Throws<ArgumentException>(() => Products.Multiply(a, b, c));
        Assert.Contains("2×3 and 4×5", e.Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentException>(() => Products.ConjugateTransposeMultiply(a, b, c));
        Assert.Throws<ArgumentException>(() => Products.MultiplyConjugateTranspose(a, b, c));
        Assert.Throws<ArgumentException>(() => Products.QuadraticForms(a, new ComplexMatrix(3, 3), new double[3]));
        Assert.Throws<ArgumentException>(() => Products.QuadraticForms(a, new ComplexMatrix(2, 2), new double[2]));
        Assert.Throws<ArgumentException>(() => Products.GramMagnitudes(a, new ComplexMatrix(3, 3), new double[3]));
    }

    [Fact]
    public void A_result_that_is_an_operand_is_refused()
    {
        ComplexMatrix a = new(3, 3), b = new(3, 3);
        Assert.Throws<ArgumentException>(() => Products.Multiply(a, b, a));
        Assert.Throws<ArgumentException>(() => Products.MultiplyConjugateTranspose(a, b, b));
    }
}
