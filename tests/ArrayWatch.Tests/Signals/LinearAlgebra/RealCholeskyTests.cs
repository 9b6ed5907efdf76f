using ArrayWatch.Signals.LinearAlgebra;

namespace ArrayWatch.Tests.Signals.LinearAlgebra;

[Trait("Category", "Kernels")]
public sealed class RealCholeskyTests
{
    public static TheoryData<int> Sizes() => [.. Enumerable.Range(1, 36), 64, 67, 130];

    [Theory]
    [MemberData(nameof(Sizes))]
    public void Solution_and_inverse_satisfy_the_system(int n)
    {
        var random = new Random(20261210);
        double[] a = PositiveDefinite(random, n), factor = [.. a], x = [.. Enumerable.Range(0, n).Select(_ => random.NextDouble() - 0.5)];
        double[] b = [.. x];

        Assert.True(RealCholesky.TryFactor(factor, n));
        RealCholesky.Solve(factor, n, x);
        for (int i = 0; i < n; i++)
        {
            Assert.Equal(b[i], Enumerable.Range(0, n).Sum(j => a[(i * n) + j] * x[j]), 1e-11);
            for (int j = i + 1; j < n; j++) Assert.Equal(a[(i * n) + j], factor[(i * n) + j]);
        }

        RealCholesky.Invert(factor, n);
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < n; j++)
                Assert.Equal(i == j ? 1 : 0, Enumerable.Range(0, n).Sum(k => a[(i * n) + k] * factor[(k * n) + j]), 1e-11);
        }
    }

    [Fact]
    public void A_matrix_that_is_not_positive_definite_is_told()
    {
        foreach (double bad in (double[])[-1, 0, double.NaN, double.PositiveInfinity])
            Assert.False(RealCholesky.TryFactor([1, 0, 0, bad], 2));
    }

    [Fact]
    public void Lengths_that_do_not_agree_are_refused()
    {
        Assert.Throws<ArgumentException>(() => RealCholesky.TryFactor(new double[3], 2));
        Assert.Throws<ArgumentException>(() => RealCholesky.Solve(new double[4], 2, new double[3]));
        Assert.Throws<ArgumentException>(() => RealCholesky.Invert(new double[5], 2));
        Assert.Throws<ArgumentOutOfRangeException>(() => RealCholesky.TryFactor([], 0));
    }

    private static double[] PositiveDefinite(Random random, int n)
    {
        double[] g = [.. Enumerable.Range(0, n * (n + 3)).Select(_ => random.NextDouble() - 0.5)], a = new double[n * n];
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < n; j++)
                a[(i * n) + j] = Enumerable.Range(0, n + 3).Sum(k => g[(i * (n + 3)) + k] * g[(j * (n + 3)) + k]) + (i == j ? 0.1 : 0);
        }

        return a;
    }
}
