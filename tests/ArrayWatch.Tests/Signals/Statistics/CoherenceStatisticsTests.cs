using ArrayWatch.Signals.Statistics;
using CsCheck;

namespace ArrayWatch.Tests.Signals.Statistics;

public sealed class CoherenceStatisticsTests
{
    // Carter, Knapp and Nuttall (1973): 1 − a^(1/(n−1)).
    [Theory]
    [InlineData(2, 0.05, 0.95)]
    [InlineData(5, 0.05, 0.5271291955)]
    [InlineData(16, 0.05, 0.1810362725)]
    [InlineData(32, 0.01, 0.1380464335)]
    [InlineData(64, 0.001, 0.1038494981)]
    [InlineData(256, 0.01, 0.0178973956)]
    public void The_threshold_is_that_of_no_coherence(double n, double alarm, double expected)
    {
        double threshold = CoherenceStatistics.ZeroCoherenceThreshold(n, alarm);
        Assert.Equal(expected, threshold, 1e-10);
        ReferenceValues.Near(Math.Log(alarm), CoherenceStatistics.LogZeroCoherenceTail(threshold, n), 1e-12);
        Assert.Equal(1 - alarm, CoherenceStatistics.Cdf(threshold, 0, n), 1e-12);
    }

    // Carter, Knapp and Nuttall (1973), recomputed by the finite hypergeometric sum.
    [Theory]
    [InlineData(0.2, 0.0082547717)]
    [InlineData(0.3, 0.0477947057)]
    [InlineData(0.5, 0.4232192837)]
    [InlineData(0.7, 0.9461495889)]
    [InlineData(0.8, 0.9977304085)]
    public void The_distribution_has_the_published_values(double estimate, double expected)
        => Assert.Equal(expected, CoherenceStatistics.Cdf(estimate, 0.5, 16), 1e-10);

    [Fact]
    public void The_distribution_agrees_with_the_integrated_density()
    {
        foreach ((double[] a, double value) in ReferenceValues.Of("coherence_cdf"))
            Assert.Equal(value, CoherenceStatistics.Cdf(a[0], a[1], a[2]), 1e-11);
    }

    [Fact]
    public void The_distribution_rises_with_the_estimate_and_falls_with_the_coherence()
        => Gen.Select(Gen.Double[1.5, 400], Gen.Double[0, 0.999], Gen.Double[0.001, 0.999]).Always(
            4,
            400,
            (n, c, x) =>
            {
                double middle = CoherenceStatistics.Cdf(x, c, n);
                Assert.InRange(middle, 0, 1);
                Assert.True(CoherenceStatistics.Cdf(Math.Min(1, x * 1.001), c, n) >= middle - 1e-10);
                Assert.True(CoherenceStatistics.Cdf(x, Math.Min(0.9999, c + 0.001), n) <= middle + 1e-10);
            });

    // With many snapshots the estimate is nearly normal about C with variance 2C(1−C)²/n (Bendat and Piersol).
    [Theory]
    [InlineData(0.9, 20000)]
    [InlineData(0.999, 5000)]
    [InlineData(0.3, 100000)]
    public void With_many_snapshots_the_median_is_the_coherence(double c, double n)
    {
        Assert.Equal(0.5, CoherenceStatistics.Cdf(CoherenceStatistics.Mean(c, n), c, n), 0.01);
        double above = CoherenceStatistics.Mean(c, n) + Math.Sqrt(CoherenceStatistics.Variance(c, n));
        Assert.Equal(0.8413, CoherenceStatistics.Cdf(above, c, n), 0.01);
    }

    // Carter, Knapp and Nuttall (1973): exact mean, so bias, by ₂F₁.
    [Theory]
    [InlineData(0, 0.03125)]
    [InlineData(0.1, 0.0254672784)]
    [InlineData(0.3, 0.0155985425)]
    [InlineData(0.5, 0.0080603289)]
    [InlineData(0.9, 0.0003310588)]
    public void The_bias_has_the_published_values(double c, double bias)
        => Assert.Equal(bias, CoherenceStatistics.Mean(c, 32) - c, 1e-10);

    [Fact]
    public void The_variance_is_exact_without_coherence()
    {
        Assert.Equal(0.0587085273, Math.Sqrt(CoherenceStatistics.Variance(0, 16)), 1e-10);
        Assert.Equal(0.516629952821, CoherenceStatistics.Mean(0.5, 16), 1e-12);
        Assert.Equal(0, CoherenceStatistics.Variance(1, 16));
        Assert.Equal(1, CoherenceStatistics.Mean(1, 16), 1e-6);
    }

    // The distribution above, inverted.
    [Theory]
    [InlineData(0.5, 32, 0.29906614, 0.64853549)]
    [InlineData(0.9, 32, 0.83585207, 0.93601072)]
    [InlineData(0.1, 32, 0, 0.25262076)]
    [InlineData(0.5, 16, 0.20084965, 0.69730194)]
    [InlineData(0.5, 100, 0.39318790, 0.58980254)]
    public void The_interval_is_exact(double estimate, double n, double lower, double upper)
    {
        (double low, double high) = CoherenceStatistics.ConfidenceInterval(estimate, n, 0.95);
        Assert.Equal(lower, low, 1e-6);
        Assert.Equal(upper, high, 1e-6);
    }

    // Goodman (1963): R² of p others ~ Beta(p, n − p).
    [Theory]
    [InlineData(3, 32, 0.05, 0.1894644674)]
    [InlineData(3, 32, 0.01, 0.2446095480)]
    [InlineData(7, 64, 0.05, 0.1793395463)]
    [InlineData(7, 64, 0.01, 0.2159050766)]
    public void Multiple_coherence_has_its_beta_law(int p, double n, double alarm, double expected)
    {
        Assert.Equal(expected, CoherenceStatistics.ZeroMultipleCoherenceThreshold(p, n, alarm), 1e-9);
        ReferenceValues.Near(Math.Log(alarm), CoherenceStatistics.LogZeroMultipleCoherenceTail(expected, p, n), 1e-8);
    }

    [Fact]
    public void With_one_other_channel_multiple_coherence_is_coherence()
        => Assert.Equal(
            CoherenceStatistics.ZeroCoherenceThreshold(20.5, 0.003), CoherenceStatistics.ZeroMultipleCoherenceThreshold(1, 20.5, 0.003), 1e-13);

    // Bendat and Piersol: 4.051423° at C = 0.5, n = 100.
    [Fact]
    public void Phase_has_its_standard_error_and_a_ceiling()
    {
        Assert.Equal(4.051423, CoherenceStatistics.PhaseStandardError(0.5, 100) * 180 / Math.PI, 1e-6);
        Assert.Equal(Math.PI / Math.Sqrt(3), CoherenceStatistics.PhaseStandardError(0, 100));
        Assert.Equal(0, CoherenceStatistics.PhaseStandardError(1, 100));
    }

    [Fact]
    public void Arguments_out_of_range_are_refused_with_value_and_range()
    {
        ArgumentOutOfRangeException e = Assert.Throws<ArgumentOutOfRangeException>(() => CoherenceStatistics.ZeroCoherenceThreshold(1, 0.05));
        Assert.Contains("snapshots is 1; above 1", e.Message, StringComparison.Ordinal);
        Assert.Throws<ArgumentOutOfRangeException>(() => CoherenceStatistics.ZeroCoherenceThreshold(10, 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => CoherenceStatistics.Cdf(double.NaN, 0.5, 10));
        Assert.Throws<ArgumentOutOfRangeException>(() => CoherenceStatistics.Cdf(0.5, 0.5, double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => CoherenceStatistics.ZeroMultipleCoherenceThreshold(10, 10, 0.05));
        Assert.Throws<ArgumentOutOfRangeException>(() => CoherenceStatistics.ConfidenceInterval(0.5, 10, 1));
        Assert.Equal((1, 1), CoherenceStatistics.ConfidenceInterval(1, 10, 0.95));
        Assert.Equal(0, CoherenceStatistics.Cdf(0.99, 1, 10));
        foreach (double vanishing in new[] { 1e-300, 1e-82, 1e-12 })
            Assert.Equal(CoherenceStatistics.Cdf(0.05, 0, 97), CoherenceStatistics.Cdf(0.05, vanishing, 97), 1e-9);
    }
}
