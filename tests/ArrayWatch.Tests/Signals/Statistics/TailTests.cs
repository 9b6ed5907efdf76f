using ArrayWatch.Signals.Statistics;
using CsCheck;

namespace ArrayWatch.Tests.Signals.Statistics;

public sealed class TailTests
{
    [Fact]
    public void Normal_tail_agrees_with_scipy()
    {
        foreach ((double[] a, double value) in ReferenceValues.Of("normal_log_upper"))
            ReferenceValues.Near(value, NormalTail.LogUpper(a[0]), 1e-12);
    }

    // Abramowitz and Stegun (1964), Table 26.2, −log10 Q(x): 23.11805 at x = 10, 349.43701 at x = 40 (read from memory of the
    // table, confirmed by SciPy).
    [Theory]
    [InlineData(10, 23.11805)]
    [InlineData(40, 349.43701)]
    public void Normal_tail_agrees_with_the_table(double z, double expected)
        => Assert.Equal(expected, -NormalTail.LogUpper(z) / Math.Log(10), 1e-5);

    [Fact]
    public void Normal_quantile_inverts_the_tail()
        => Gen.Double[-8, 60].Always(
            2,
            2000,
            z =>
            {
                double log = NormalTail.LogUpper(z);
                double back = NormalTail.LogUpper(NormalTail.QuantileOfLogUpper(log));
                Assert.Equal(log, back, 1e-12 * Math.Abs(log) + 1e-300);
            });

    [Fact]
    public void Chi_square_tail_agrees_with_scipy()
    {
        foreach ((double[] a, double value) in ReferenceValues.Of("chi_square_log_upper"))
            ReferenceValues.Near(value, GammaTail.LogChiSquareUpper(a[0], a[1]), 1e-11);
    }

    // With two degrees of freedom the survival function is e^(−x/2).
    [Theory]
    [InlineData(1e-9)]
    [InlineData(3)]
    [InlineData(1e4)]
    public void Chi_square_with_two_degrees_of_freedom_is_exponential(double x)
        => ReferenceValues.Near(-x / 2, GammaTail.LogChiSquareUpper(x, 2), 1e-12);

    [Fact]
    public void Chi_square_quantile_inverts_the_tail()
        => Gen.Select(Gen.Double[0.5, 300], Gen.Double[-400, -1e-3]).Always(
            3,
            300,
            (dof, log) => ReferenceValues.Near(log, GammaTail.LogChiSquareUpper(GammaTail.ChiSquareQuantileOfLogUpper(log, dof), dof), 1e-9));

    [Fact]
    public void Gamma_tails_are_complements_and_smooth_for_large_shapes()
    {
        foreach (double a in new[] { 0.01, 0.5, 11.99, 12.01, 300, 1e6 })
        {
            foreach (double ratio in new[] { 0.5, 0.999, 1, 1.001, 2 })
            {
                double sum = Math.Exp(GammaTail.LogUpper(a, a * ratio)) + Math.Exp(GammaTail.LogLower(a, a * ratio));
                Assert.Equal(1, sum, 1e-12);
            }
        }

        // Wilson and Hilferty (1931): the cube root of a gamma variable is nearly normal; good to 1e-4 at this shape.
        const double Shape = 1e6;
        double z = (Math.Cbrt(1.002) - 1 + (1 / (9 * Shape))) * 3 * Math.Sqrt(Shape);
        Assert.Equal(NormalTail.LogUpper(z), GammaTail.LogUpper(Shape, 1.002 * Shape), 1e-3);
    }

    [Fact]
    public void Beta_tail_agrees_with_scipy()
    {
        foreach ((double[] a, double value) in ReferenceValues.Of("beta_lower"))
            ReferenceValues.Near(value, Math.Exp(BetaTail.LogLower(a[0], a[1], a[2])), 1e-11);
    }

    // Beta(1, b) has P(B > x) = (1 − x)^b.
    [Fact]
    public void Beta_tail_keeps_its_accuracy_far_out()
    {
        ReferenceValues.Near(500 * Math.Log(1 - 0.99), BetaTail.LogUpper(0.99, 1, 500), 1e-12);
        ReferenceValues.Near(300 * Math.Log(1e-3), BetaTail.LogLower(1e-3, 300, 1), 1e-12);
    }

    [Fact]
    public void Edges_are_as_documented()
    {
        Assert.Equal(0, NormalTail.LogUpper(double.NegativeInfinity));
        Assert.Equal(double.NegativeInfinity, NormalTail.LogUpper(double.PositiveInfinity));
        Assert.True(double.IsNaN(NormalTail.LogUpper(double.NaN)));
        Assert.True(double.IsFinite(NormalTail.LogUpper(1e150)));
        Assert.Equal(0, GammaTail.LogUpper(3, 0));
        Assert.Equal(double.NegativeInfinity, GammaTail.LogUpper(3, double.PositiveInfinity));
        Assert.Equal(0, BetaTail.LogUpper(0, 2, 3));
        Assert.Equal(0, BetaTail.LogLower(1, 2, 3));
        Assert.Throws<ArgumentOutOfRangeException>(() => NormalTail.QuantileOfLogUpper(0));
        Assert.Throws<ArgumentOutOfRangeException>(() => GammaTail.LogUpper(0, 1));
        Assert.Throws<ArgumentOutOfRangeException>(() => GammaTail.LogUpper(1, double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => BetaTail.LogUpper(1.1, 2, 3));
    }

    [Fact]
    public void Small_arguments_keep_their_digits()
    {
        Assert.Equal(1e-18, MoreMath.Log1p(1e-18));
        Assert.Equal(1e-18, MoreMath.Expm1(1e-18));
        ReferenceValues.Near(1e-10 - 0.5e-20, MoreMath.Log1p(1e-10), 1e-15);
        ReferenceValues.Near(Math.Log(2), -MoreMath.Log1mExp(-Math.Log(2)), 1e-14);
        ReferenceValues.Near(0.5e-12, MoreMath.ExcessOverLog1p(1e-6), 1e-6);
        ReferenceValues.Near(0.1 - Math.Log(1.1), MoreMath.ExcessOverLog1p(0.1), 1e-13);
    }
}
