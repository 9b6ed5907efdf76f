using ArrayWatch.Signals.Statistics;
using CsCheck;

namespace ArrayWatch.Tests.Signals.Statistics;

public sealed class LargestEigenvalueTests
{
    // The Hastings–McLeod solution of Painlevé II, integrated by SciPy: another road to the same law.
    [Fact]
    public void Tracy_widom_agrees_with_painleve()
    {
        foreach ((double[] a, double value) in ReferenceValues.Of("tracy_widom_cdf"))
            Assert.Equal(value, TracyWidom.Cdf(a[0]), 1e-9);
    }

    // Fredholm determinant in 40-digit arithmetic.
    [Theory]
    [InlineData(-5, 2.135996984741116e-5)]
    [InlineData(-4, 0.0035445535955092)]
    [InlineData(-3, 0.08031955293933455)]
    [InlineData(-2, 0.4132241425051226)]
    [InlineData(-1, 0.8072142419992853)]
    [InlineData(0, 0.9693728283552627)]
    [InlineData(1, 0.9975054381493892)]
    [InlineData(2, 0.9998875536983092)]
    public void Tracy_widom_has_the_tabulated_values(double s, double expected) => Assert.Equal(expected, TracyWidom.Cdf(s), 1e-12);

    [Theory]
    [InlineData(0.001, -4.2922364010)]
    [InlineData(0.05, -3.1941667322)]
    [InlineData(0.25, -2.3948986778)]
    [InlineData(0.5, -1.8049124089)]
    [InlineData(0.9, -0.5968512971)]
    [InlineData(0.95, -0.2324744698)]
    [InlineData(0.99, 0.4776360474)]
    [InlineData(0.999, 1.3144194801)]
    [InlineData(0.999999, 3.2785882821)]
    public void Tracy_widom_has_the_tabulated_quantiles(double probability, double expected)
        => Assert.Equal(expected, TracyWidom.UpperQuantile(1 - probability), 1e-8);

    // Bornemann (2010): mean −1.771086807411, variance 0.8131947928329, skewness 0.224084203610.
    [Fact]
    public void Tracy_widom_has_bornemanns_moments()
    {
        GaussLegendre rule = GaussLegendre.WithNodes(80);
        double first = 0, second = 0, third = 0;
        const double Low = -8, High = 6;
        for (int i = 0; i < 80; i++)
        {
            // E X^m over [Low, High] by parts: High^m F(High) − ∫ m x^(m−1) F dx.
            double x = Low + ((High - Low) * rule.Nodes[i]), f = TracyWidom.Cdf(x) * rule.Weights[i] * (High - Low);
            first += f;
            second += 2 * x * f;
            third += 3 * x * x * f;
        }

        double mean = High - first, square = (High * High) - second, cube = (High * High * High) - third;
        double variance = square - (mean * mean);
        Assert.Equal(-1.771086807411, mean, 1e-8);
        Assert.Equal(0.8131947928329, variance, 1e-7);
        Assert.Equal(0.224084203610, (cube - (3 * mean * square) + (2 * mean * mean * mean)) / Math.Pow(variance, 1.5), 1e-6);
    }

    // ln P(X > s) → −(4/3)s^(3/2) − ln(16π s^(3/2)), the leading term (Baik, Buckingham and DiFranco, Commun. Math. Phys.
    // 280, 2008, cited from memory); corrections are of relative order s^(−3/2).
    [Theory]
    [InlineData(6)]
    [InlineData(15)]
    [InlineData(29)]
    public void The_upper_tail_follows_its_asymptote(double s)
    {
        double power = Math.Pow(s, 1.5);
        Assert.Equal((-4 * power / 3) - Math.Log(16 * Math.PI * power), TracyWidom.LogUpper(s), 2 / power);
    }

    [Fact]
    public void The_quantile_inverts_the_upper_tail_to_a_very_small_false_alarm()
    {
        foreach (double log10 in new[] { -1.0, -3, -6, -9, -12, -30, -80 })
        {
            double p = Math.Pow(10, log10);
            ReferenceValues.Near(Math.Log(p), TracyWidom.LogUpper(TracyWidom.UpperQuantile(p)), 1e-8);
        }
    }

    // Marchenko and Pastur (1967).
    [Theory]
    [InlineData(8, 80, 0.467544467966, 1.732455532034)]
    [InlineData(8, 32, 0.25, 2.25)]
    [InlineData(8, 16, 0.085786437627, 2.914213562373)]
    [InlineData(8, 8, 0, 4)]
    public void Edges_follow_marchenko_and_pastur(int p, double n, double lower, double upper)
    {
        (double low, double high) = LargestEigenvalue.MarchenkoPasturEdges(p, n);
        Assert.Equal(lower, low, 1e-12);
        Assert.Equal(upper, high, 1e-12);
    }

    // El Karoui (2006); figures as CRAN RMTstat's WishartMax has them.
    [Theory]
    [InlineData(4, 64, 1.5609446050, 0.1337068656)]
    [InlineData(8, 32, 2.2490019954, 0.2146538950)]
    [InlineData(8, 80, 1.7319211503, 0.1140577111)]
    [InlineData(16, 160, 1.7323220457, 0.0718423471)]
    public void Centre_and_scale_are_of_second_order(int p, double n, double centre, double scale)
    {
        (double c, double s) = LargestEigenvalue.CentreAndScale(p, n);
        Assert.Equal(centre, c, 1e-9);
        Assert.Equal(scale, s, 1e-9);
    }

    // Exact quantiles by Khatri's determinant of incomplete gamma functions (1964), recomputed in many digits.
    [Theory]
    [InlineData(4, 64, 0.5, 1.3245545557)]
    [InlineData(4, 64, 0.05, 1.5246740789)]
    [InlineData(4, 64, 0.01, 1.6176151109)]
    [InlineData(8, 32, 0.05, 2.1923581317)]
    [InlineData(8, 80, 0.05, 1.7021673178)]
    [InlineData(8, 80, 0.01, 1.7820804768)]
    [InlineData(8, 80, 0.001, 1.8777311033)]
    [InlineData(8, 256, 0.001, 1.4542475857)]
    [InlineData(16, 64, 0.001, 2.4248254023)]
    [InlineData(16, 160, 0.05, 1.7142396675)]
    [InlineData(16, 160, 0.5, 1.6039716074)]
    public void The_threshold_is_the_exact_one(int p, double n, double alarm, double exact)
    {
        double threshold = LargestEigenvalue.Threshold(p, n, alarm);
        Assert.Equal(exact, threshold, 1e-9);
        ReferenceValues.Near(Math.Log(alarm), LargestEigenvalue.LogFalseAlarm(threshold, p, n), 1e-8);
    }

    [Fact]
    public void The_threshold_inverts_the_law_for_every_size()
        => Gen.Select(Gen.Int[1, 40], Gen.Double[0, 400], Gen.Double[-40, -0.1]).Always(
            21,
            60,
            (p, more, logAlarm) =>
            {
                double n = p + more, alarm = Math.Exp(logAlarm), threshold = LargestEigenvalue.Threshold(p, n, alarm);
                ReferenceValues.Near(logAlarm, LargestEigenvalue.LogFalseAlarm(threshold, p, n), 1e-6);
                Assert.True(LargestEigenvalue.LogFalseAlarm(threshold * 1.01, p, n) < logAlarm);
            });

    // One channel: νλ is a gamma variable of shape ν, another road to the same number.
    [Theory]
    [InlineData(1e-3)]
    [InlineData(1e-12)]
    [InlineData(1e-60)]
    public void With_one_channel_the_law_is_the_gamma_law(double alarm)
    {
        double threshold = LargestEigenvalue.Threshold(1, 37.5, alarm);
        ReferenceValues.Near(Math.Log(alarm), GammaTail.LogUpper(37.5, 37.5 * threshold), 1e-9);
    }

    // Johnstone (2001): both laws meet as the matrices grow.
    [Theory]
    [InlineData(4, 64, 0.05, 0.0035)]
    [InlineData(32, 500, 0.001, 0.0005)]
    [InlineData(128, 1000, 1e-6, 0.0002)]
    [InlineData(300, 310.5, 1e-3, 0.0005)]
    public void The_asymptotic_threshold_approaches_the_exact_one(int p, double n, double alarm, double tolerance)
        => ReferenceValues.Near(
            LargestEigenvalue.Threshold(p, n, alarm), LargestEigenvalue.ThresholdAt(p, n, TracyWidom.UpperQuantile(alarm)), tolerance);

    [Fact]
    public void With_fewer_snapshots_than_channels_the_threshold_is_the_asymptotic_one()
    {
        double threshold = LargestEigenvalue.Threshold(16, 8.5, 1e-4);
        Assert.Equal(LargestEigenvalue.ThresholdAt(16, 8.5, TracyWidom.UpperQuantile(1e-4)), threshold, 1e-12);
        ReferenceValues.Near(Math.Log(1e-4), LargestEigenvalue.LogFalseAlarm(threshold, 16, 8.5), 1e-7);
        // No step where one law takes over from the other.
        ReferenceValues.Near(LargestEigenvalue.Threshold(16, 16, 1e-3), LargestEigenvalue.Threshold(16, 15.99, 1e-3), 5e-3);
    }

    // Baik, Ben Arous and Péché (2005); overlap Paul (2007).
    [Theory]
    [InlineData(3, 10, 20, 3.75, 0.70)]
    [InlineData(2, 10, 100, 2.20, 0.818181818182)]
    [InlineData(5, 10, 40, 5.3125, 0.926470588235)]
    [InlineData(1.5, 10, 100, 1.80, 0.5)]
    [InlineData(1.2, 10, 100, 1.732455532034, 0)]
    public void A_spike_shows_only_beyond_the_transition(double eigenvalue, int p, double n, double sample, double overlap)
    {
        (double seen, double kept, double deviation) = LargestEigenvalue.Spike(eigenvalue, p, n);
        Assert.Equal(sample, seen, 1e-12);
        Assert.Equal(overlap, kept, 1e-12);
        Assert.Equal(overlap == 0, double.IsNaN(deviation));
    }

    [Fact]
    public void Arguments_out_of_range_are_refused()
    {
        Assert.Equal(0, TracyWidom.Cdf(double.NegativeInfinity));
        Assert.Equal(1, TracyWidom.Cdf(double.PositiveInfinity));
        Assert.Throws<ArgumentOutOfRangeException>(() => TracyWidom.Cdf(double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => TracyWidom.UpperQuantile(0));
        Assert.Throws<ArgumentOutOfRangeException>(() => LargestEigenvalue.Threshold(0, 10, 0.01));
        Assert.Throws<ArgumentOutOfRangeException>(() => LargestEigenvalue.Threshold(4, double.NaN, 0.01));
        Assert.Throws<ArgumentOutOfRangeException>(() => LargestEigenvalue.Spike(0.5, 4, 10));
    }
}
