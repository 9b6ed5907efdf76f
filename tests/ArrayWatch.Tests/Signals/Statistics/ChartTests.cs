using ArrayWatch.Signals.Statistics;

namespace ArrayWatch.Tests.Signals.Statistics;

public sealed class ChartTests
{
    // Lucas and Crosier (1982), Table 1, two-sided, k = 0.5, h = 4; more digits by the integral equation.
    [Theory]
    [InlineData(0, 167.683789, 168)]
    [InlineData(0.25, 74.224028, 74.2)]
    [InlineData(0.5, 26.630203, 26.6)]
    [InlineData(1, 8.383132, 8.38)]
    [InlineData(2, 3.342770, 3.34)]
    [InlineData(4, 1.708457, 1.71)]
    public void A_two_sided_cusum_has_the_published_run_lengths(double mean, double digits, double published)
    {
        double length = Cusum.TwoSided(Cusum.AverageRunLength(mean, 0.5, 4), Cusum.AverageRunLength(-mean, 0.5, 4));
        Assert.Equal(digits, length, 1e-5);
        ReferenceValues.Near(published, length, 3e-3);
    }

    // Brook and Evans (1972) 117.59; Vance (1986) with k = 0, h = 10; Waldmann (1986) with mean −0.5.
    [Theory]
    [InlineData(0, 0.5, 3, 117.59)]
    [InlineData(1.5, 0.5, 3, 3.75)]
    [InlineData(0, 0, 10, 124.66)]
    [InlineData(0.25, 0, 10, 36.71)]
    [InlineData(1, 0, 10, 10.75)]
    [InlineData(-0.5, 0.5, 3, 1963)]
    public void A_one_sided_cusum_has_the_published_run_lengths(double mean, double k, double h, double published)
        => ReferenceValues.Near(published, Cusum.AverageRunLength(mean, k, h), 1e-3);

    // Brook and Evans's Markov chain, extrapolated: another method.
    [Fact]
    public void The_integral_equation_agrees_with_the_markov_chain()
    {
        foreach ((double[] a, double value) in ReferenceValues.Of("cusum_arl"))
            ReferenceValues.Near(value, Cusum.AverageRunLength(a[0], a[1], a[2]), 1e-6);
    }

    [Theory]
    [InlineData(370.3983, 4.096495)]
    [InlineData(500, 4.389130)]
    [InlineData(1000, 5.070704)]
    [InlineData(10000, 7.360786)]
    public void The_threshold_solves_for_the_run_length(double runLength, double expected)
        => Assert.Equal(expected, Cusum.ThresholdFor(0.5, runLength), 1e-6);

    [Theory]
    [InlineData(0.25, 1e7)]
    [InlineData(1, 1e5)]
    [InlineData(0.5, 1e12)]
    public void The_threshold_gives_back_its_run_length(double k, double runLength)
    {
        double h = Cusum.ThresholdFor(k, runLength);
        double back = runLength > 1e8 ? Cusum.Siegmund(0, k, h) : Cusum.AverageRunLength(0, k, h);
        ReferenceValues.Near(runLength, back, 1e-5);
    }

    // Siegmund (1985): 338.0932 at h = 4, 938.2224 at h = 5, 8.3434 at a shift of 1.
    [Theory]
    [InlineData(0, 4, 338.0932)]
    [InlineData(0, 5, 938.2224)]
    [InlineData(1, 4, 8.3434)]
    [InlineData(0.5, 4, 26.687556)]
    public void Siegmunds_form_has_its_values(double mean, double h, double expected)
        => Assert.Equal(expected, Cusum.Siegmund(mean, 0.5, h), 1e-4);

    [Fact]
    public void Siegmunds_form_is_smooth_where_the_drift_vanishes()
    {
        foreach (double drift in new[] { 1e-3, 1e-5, 1e-9, 0 })
            ReferenceValues.Near(5.166 * 5.166, Cusum.Siegmund(0.5 + drift, 0.5, 4), 5 * drift + 1e-9);
    }

    // Lorden (1971): E∞T ≥ e^b, and the delay tends to ln(L)/I from below, slowly (0.7589 at h = 5).
    [Fact]
    public void Lordens_bound_holds()
    {
        Assert.Equal(148.4132, Cusum.LordenBound(5), 1e-4);
        Assert.Equal(5, Cusum.LordenThreshold(Cusum.LordenBound(5)), 1e-12);
        double previous = 0;
        foreach (double h in new[] { 4.0, 6, 8, 10, 12, 14 })
        {
            double quiet = Cusum.AverageRunLength(0, 0.5, h);
            Assert.True(quiet >= Cusum.LordenBound(h));
            double ratio = Cusum.AverageRunLength(1, 0.5, h) / (Math.Log(quiet) / 0.5);
            Assert.InRange(ratio, previous, 1);
            previous = ratio;
        }

        Assert.Equal(0.8949, previous, 2e-4);
    }

    // Lucas and Saccucci (1990), Table 3; more digits by the integral equation.
    [Theory]
    [InlineData(0.5, 3.071, 0, 499.9060)]
    [InlineData(0.5, 3.071, 1, 17.4766)]
    [InlineData(0.25, 2.998, 0.5, 48.2939)]
    [InlineData(0.1, 2.814, 0, 499.5796)]
    [InlineData(0.1, 2.814, 1, 10.3307)]
    [InlineData(0.05, 2.615, 0, 499.9330)]
    [InlineData(0.03, 2.437, 0, 499.8592)]
    [InlineData(0.03, 2.437, 1, 12.5976)]
    [InlineData(0.1, 2.703, 0, 371.8878)]
    public void An_ewma_has_the_published_run_lengths(double weight, double limit, double mean, double expected)
        => Assert.Equal(expected, Ewma.AverageRunLength(mean, weight, limit), 1e-3);

    // The SAS documentation of EWMAARL(1, 0.25, 3).
    [Fact]
    public void An_ewma_has_the_documented_digits() => Assert.Equal(11.154267016, Ewma.AverageRunLength(1, 0.25, 3), 1e-8);

    [Theory]
    [InlineData(0.1, 500, 2.814310)]
    [InlineData(0.2, 370.3983, 2.859336)]
    public void The_limit_solves_for_the_run_length(double weight, double runLength, double expected)
        => Assert.Equal(expected, Ewma.LimitFor(weight, runLength), 1e-6);

    [Fact]
    public void Arguments_out_of_range_are_refused()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => Cusum.AverageRunLength(double.NaN, 0.5, 4));
        Assert.Throws<ArgumentOutOfRangeException>(() => Cusum.AverageRunLength(0, 0.5, 0));
        Assert.Throws<ArgumentOutOfRangeException>(() => Cusum.ThresholdFor(5, 100));
        Assert.Throws<ArgumentOutOfRangeException>(() => Cusum.ThresholdFor(0.05, 1e30));
        Assert.Throws<ArgumentOutOfRangeException>(() => Ewma.AverageRunLength(0, 0, 3));
        Assert.Throws<ArgumentOutOfRangeException>(() => GaussLegendre.WithNodes(0));
    }
}
