using ArrayWatch.Signals.Statistics;
using CsCheck;

namespace ArrayWatch.Tests.Signals.Statistics;

public sealed class EffectiveSnapshotsTests
{
    // (1+λ)/(1−λ), and (Σw)²/Σw² of the weights themselves.
    [Theory]
    [InlineData(0, 1)]
    [InlineData(0.5, 3)]
    [InlineData(0.9, 19)]
    [InlineData(0.95, 39)]
    [InlineData(0.99, 199)]
    public void Exponential_weights_settle(double lambda, double expected)
        => Assert.Equal(expected, EffectiveSnapshots.Exponential(lambda), 1e-10);

    [Fact]
    public void Exponential_weights_start_as_their_explicit_sum()
        => Gen.Select(Gen.Double[0, 0.999], Gen.Int[1, 400]).Always(
            5,
            1000,
            (lambda, count) =>
            {
                double sum = 0, squares = 0, weight = 1;
                for (int k = 0; k < count; k++)
                {
                    sum += weight;
                    squares += weight * weight;
                    weight *= lambda;
                }

                ReferenceValues.Near(sum * sum / squares, EffectiveSnapshots.Exponential(lambda, count), 1e-10);
            });

    // Welch (1967); L/(1 + 2(1/36)(1 − 1/L)) for Hann windows at half overlap.
    [Theory]
    [InlineData(1, 1)]
    [InlineData(2, 1.94594595)]
    [InlineData(7, 6.68181818)]
    [InlineData(31, 29.41836735)]
    [InlineData(127, 120.36567164)]
    public void Half_overlapped_hann_windows_lose_a_twentieth(long count, double expected)
        => Assert.Equal(expected, EffectiveSnapshots.Overlapped(count, [1.0 / 36]), 1e-8);

    // Welch (1967), as overlap factors for L → ∞; amplitude correlations also in Harris, Proc. IEEE 66, 51–83, 1978.
    [Fact]
    public void Window_correlations_have_the_published_factors()
    {
        const int M = 1024;
        double[] Window(Func<double, double> w) => [.. Enumerable.Range(0, M).Select(k => w((double)k / M))];
        double Share(double[] w, int step) => EffectiveSnapshots.Overlapped(1_000_000_000_000, EffectiveSnapshots.OverlapCorrelations(w, step)) / 1e12;

        double[] hann = Window(x => 0.5 - (0.5 * Math.Cos(2 * Math.PI * x)));
        double[] hamming = Window(x => 0.54 - (0.46 * Math.Cos(2 * Math.PI * x)));
        double[] harris = Window(x => 0.35875 - (0.48829 * Math.Cos(2 * Math.PI * x)) + (0.14128 * Math.Cos(4 * Math.PI * x)) - (0.01168 * Math.Cos(6 * Math.PI * x)));
        Assert.Equal(18.0 / 19, Share(hann, M / 2), 1e-6);
        Assert.Equal(0.519578, Share(hann, M / 4), 1e-5);
        Assert.Equal(0.901472, Share(hamming, M / 2), 1e-5);
        Assert.Equal(0.701262, Share(harris, M / 4), 1e-5);
        Assert.Equal(2.0 / 3, Share(Window(_ => 1), M / 2), 1e-9);
        Assert.Equal(8.0 / 9, Share(Window(x => 1 - Math.Abs((2 * x) - 1)), M / 2), 1e-4);
        Assert.Empty(EffectiveSnapshots.OverlapCorrelations(hann, M));
    }

    [Theory]
    [InlineData(0, 0)]
    [InlineData(0.5, 1)]
    [InlineData(0.75, 3)]
    [InlineData(0.6, 2)]
    public void The_closed_form_of_the_hann_window_agrees_with_its_samples(double overlap, int count)
    {
        const int M = 20000;
        double[] hann = [.. Enumerable.Range(0, M).Select(k => 0.5 - (0.5 * Math.Cos(2 * Math.PI * k / M)))];
        double[] sampled = EffectiveSnapshots.OverlapCorrelations(hann, (int)Math.Round(M * (1 - overlap)));
        double[] closed = EffectiveSnapshots.HannCorrelations(overlap);
        Assert.Equal(count, closed.Length);
        for (int j = 0; j < count; j++) Assert.Equal(sampled[j], closed[j], 1e-9);
    }

    // [(1+λ)/(1−λ)]/(1 + λ/18), derived from Welch's correlations; checked below against the explicit double sum.
    [Theory]
    [InlineData(0.9, 18.0952380952)]
    [InlineData(0.95, 37.0448548813)]
    [InlineData(0.99, 188.6255924270)]
    public void Both_together_lose_both(double lambda, double expected)
    {
        double value = EffectiveSnapshots.ExponentialOverlapped(lambda, EffectiveSnapshots.HannCorrelations(0.5));
        Assert.Equal(expected, value, 1e-8);
        double sum = 0, variance = 0;
        for (int k = 0; k < 6000; k++)
        {
            double w = Math.Pow(lambda, k);
            sum += w;
            variance += (w * w) + (2 * w * w * lambda / 36);
        }

        ReferenceValues.Near(sum * sum / variance, value, 1e-10);
    }

    [Fact]
    public void Arguments_out_of_range_are_refused()
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => EffectiveSnapshots.Exponential(1));
        Assert.Throws<ArgumentOutOfRangeException>(() => EffectiveSnapshots.Exponential(double.NaN));
        Assert.Throws<ArgumentOutOfRangeException>(() => EffectiveSnapshots.Overlapped(0, []));
        Assert.Throws<ArgumentOutOfRangeException>(() => EffectiveSnapshots.Overlapped(5, [2.0]));
        Assert.Throws<ArgumentOutOfRangeException>(() => EffectiveSnapshots.HannCorrelations(1));
        Assert.Throws<ArgumentOutOfRangeException>(() => EffectiveSnapshots.OverlapCorrelations([0, 0], 1));
    }
}
