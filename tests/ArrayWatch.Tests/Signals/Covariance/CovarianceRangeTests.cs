using ArrayWatch.Signals.Covariance;
using ArrayWatch.Signals.LinearAlgebra;
using ArrayWatch.Tests.Signals.Kernels;

namespace ArrayWatch.Tests.Signals.Covariance;

/// <summary>Silence, gaps and amplitudes at the ends of what a float holds.</summary>
[Trait("Category", "Kernels")]
public sealed class CovarianceRangeTests
{
    private static readonly TimeSpan s_memory = TimeSpan.FromSeconds(10);

    [Theory]
    [MemberData(nameof(Tiers.Available), MemberType = typeof(Tiers))]
    public void Amplitudes_from_1e_minus_18_to_1e18_make_no_difference(string tier)
    {
        const int Channels = 18, Snapshots = 50;
        float[] data = WeightedSum.Noise(new Random(20270105), Snapshots * 2 * Channels);
        double[] weights = WeightedSum.Exponential(Math.Exp(-0.05), Snapshots);
        foreach (double unit in (double[])[1e-18, 1e-12, 1, 1e12, 1e18])
        {
            float[] scaled = [.. data.Select(v => (float)(v * unit))];
            var covariance = new ExponentialCovariance(Channels, 1, s_memory, conjugatePhase: false, Tiers.Parse(tier));
            covariance.Fold(scaled, Snapshots, 0.5, 0);
            Assert.InRange(WeightedSum.Difference(Copy(covariance), WeightedSum.Estimate(scaled, weights, 1, Channels, 0)), 0, 2e-6);
        }
    }

    [Theory]
    [InlineData(1e-12, 1e12)]
    [InlineData(1e12, 1e-12)]
    [InlineData(1e-36, 1e36)]
    [InlineData(1, 3e38)]
    public void A_change_of_unit_in_the_stream_is_followed(double first, double then)
    {
        const int Channels = 3, Snapshots = 120;
        var random = new Random(20270106);
        float[] data = [.. Enumerable.Range(0, Snapshots * 2 * Channels).Select(i => (float)((i < Snapshots * Channels ? first : then) * ((2 * random.NextDouble()) - 1)))];
        var covariance = new ExponentialCovariance(Channels, 1, s_memory);
        for (int k = 0; k < Snapshots; k += 6) covariance.Fold(data.AsSpan(k * 2 * Channels, 12 * Channels), 6, 0.5, 0);
        ComplexMatrix expected = WeightedSum.Estimate(data, WeightedSum.Exponential(Math.Exp(-0.05), Snapshots), 1, Channels, 0);
        Assert.InRange(WeightedSum.Difference(Copy(covariance), expected), 0, 3e-6);
    }

    [Fact]
    public void Ninety_decibels_and_more_between_channels_are_kept()
    {
        const int Channels = 17, Snapshots = 40;
        float[] data = WeightedSum.Noise(new Random(20270107), Snapshots * 2 * Channels);
        for (int i = 0; i < data.Length; i++) data[i] *= MathF.Pow(10, -(i / 2 % Channels) / 2f);
        var covariance = new ExponentialCovariance(Channels, 1, s_memory);
        covariance.Fold(data, Snapshots, 0.5, 0);
        ComplexMatrix expected = WeightedSum.Estimate(data, WeightedSum.Exponential(Math.Exp(-0.05), Snapshots), 1, Channels, 0);
        Assert.InRange(WeightedSum.Difference(Copy(covariance), expected), 0, 2e-6);
    }

    [Fact]
    public void Silence_from_the_start_is_zero_and_not_NaN()
    {
        var covariance = new ExponentialCovariance(20, 2, s_memory);
        covariance.Fold(new float[100 * 2 * 2 * 20], 100, 1, 0);
        ComplexMatrix s = Copy(covariance);
        Assert.All(s.Re.Concat(s.Im), v => Assert.Equal(0, v));
        Assert.Equal(100, covariance.Snapshots);
    }

    [Fact]
    public void Long_silence_after_data_fades_to_exact_zeros_and_data_after_it_count_as_ever()
    {
        const int Channels = 4;
        float[] data = WeightedSum.Noise(new Random(20270108), 64 * 2 * Channels), silence = new float[64 * 2 * Channels];
        var covariance = new ExponentialCovariance(Channels, 1, s_memory);
        covariance.Fold(data, 64, 1, 0);
        double before = Copy(covariance)[0, 0].Real;
        covariance.Fold(silence, 64, 1, 0);
        Assert.Equal(before * Math.Exp(-6.4) * (1 - Math.Exp(-6.4)) / (1 - Math.Exp(-12.8)), Copy(covariance)[0, 0].Real, 1e-6 * before);
        for (int i = 0; i < 200; i++) covariance.Fold(silence, 64, 1, 0);
        Assert.All(Copy(covariance).Re, v => Assert.Equal(0, v));

        covariance.Fold(data, 64, 1, 0);
        ComplexMatrix expected = WeightedSum.Estimate(data, WeightedSum.Exponential(Math.Exp(-0.1), 64), 1, Channels, 0);
        double share = 1 - Math.Exp(-6.4);
        for (int i = 0; i < expected.Re.Length; i++) (expected.Re[i], expected.Im[i]) = (expected.Re[i] * share, expected.Im[i] * share);
        Assert.InRange(WeightedSum.Difference(Copy(covariance), expected), 0, 3e-6);
    }

    [Fact]
    public void A_channel_that_falls_silent_never_leaves_subnormal_numbers()
    {
        const int Channels = 3;
        var random = new Random(20270109);
        var covariance = new ExponentialCovariance(Channels, 1, s_memory);
        covariance.Fold(WeightedSum.Noise(random, 64 * 2 * Channels), 64, 1, 0);
        for (int i = 0; i < 40; i++)
        {
            float[] data = WeightedSum.Noise(random, 64 * 2 * Channels);
            for (int k = 0; k < 64; k++) data[(k * 2 * Channels) + 4] = data[(k * 2 * Channels) + 5] = 0;
            covariance.Fold(data, 64, 1, 0);
        }

        ComplexMatrix s = Copy(covariance);
        Assert.Equal(0, s[2, 2].Real);
        Assert.Equal(0, s[2, 0].Magnitude);
        Assert.InRange(s[0, 0].Real, 0.5, 6);
    }

    [Fact]
    public void A_gap_leaves_the_estimate_and_lets_new_data_rule()
    {
        const int Channels = 5;
        float[] data = WeightedSum.Noise(new Random(20270110), 60 * 2 * Channels);
        foreach (double gap in (double[])[1, 30, 1e5])
        {
            var covariance = new ExponentialCovariance(Channels, 1, s_memory);
            covariance.Fold(data.AsSpan(0, 40 * 2 * Channels), 40, 0.5, 0);
            ComplexMatrix before = Copy(covariance);
            double freedom = covariance.DegreesOfFreedom;
            covariance.Fade(gap);
            Assert.Equal(0, WeightedSum.Difference(Copy(covariance), before));
            if (gap < 1e4) Assert.Equal(freedom, covariance.DegreesOfFreedom, 1e-9);

            covariance.Fold(data.AsSpan(40 * 2 * Channels), 20, 0.5, 0);
            double[] weights = WeightedSum.Exponential(Math.Exp(-0.05), 60);
            for (int k = 0; k < 40; k++) weights[k] *= Math.Exp(-gap / s_memory.TotalSeconds);
            Assert.InRange(WeightedSum.Difference(Copy(covariance), WeightedSum.Estimate(data, weights, 1, Channels, 0)), 0, 2e-6);
            Assert.Equal(weights.Sum() * weights.Sum() / weights.Sum(w => w * w), covariance.DegreesOfFreedom, 1e-9);
        }
    }

    [Fact]
    public void Reset_forgets_everything()
    {
        var covariance = new ExponentialCovariance(3, 1, s_memory);
        covariance.Fold([float.NaN, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1, 1], 2, 1, 0.5);
        covariance.Reset();
        Assert.Equal(0, covariance.Snapshots);
        Assert.Equal(0, covariance.DegreesOfFreedom);
        Assert.Equal([0L, 0, 0], covariance.NonFiniteSnapshots.ToArray());
        Assert.All(Copy(covariance).Re, v => Assert.Equal(0, v));
        covariance.Fold([2, 0, 0, 0, 0, 0], 1, 1, 0.5);
        Assert.Equal(4, Copy(covariance)[0, 0].Real, 1e-6);
        Assert.Equal(1, covariance.DegreesOfFreedom, 1e-12);
    }

    [Fact]
    public void Arguments_out_of_range_are_told_with_their_value_and_change_nothing()
    {
        var covariance = new ExponentialCovariance(2, 1, s_memory);
        float[] data = [1, 2, 3, 4];
        Assert.Throws<ArgumentException>(() => covariance.Fold(data.AsSpan(1), 1, 1, 0));
        Assert.Throws<ArgumentException>(() => covariance.Fold(data, 1, 1, 0, [1, 1]));
        foreach (double bad in (double[])[0, -1, double.NaN, double.PositiveInfinity])
            Assert.Throws<ArgumentOutOfRangeException>(() => covariance.Fold(data, 1, bad, 0));
        foreach (double bad in (double[])[-0.1, 1, double.NaN])
        {
            ArgumentOutOfRangeException e = Assert.Throws<ArgumentOutOfRangeException>(() => covariance.Fold(data, 1, 1, bad));
            Assert.Equal(bad, e.ActualValue);
        }

        Assert.Throws<ArgumentOutOfRangeException>(() => covariance.Fold(data, 1, 1, 0, [1.5]));
        Assert.Throws<ArgumentOutOfRangeException>(() => covariance.CopyBin(1, new ComplexMatrix(2, 2)));
        Assert.Throws<ArgumentException>(() => covariance.CopyBin(0, new ComplexMatrix(2, 3)));
        Assert.Throws<ArgumentOutOfRangeException>(() => new ExponentialCovariance(0, 1, s_memory));
        Assert.Throws<ArgumentOutOfRangeException>(() => new ExponentialCovariance(1, 1, TimeSpan.Zero));
        Assert.Equal(0, covariance.Snapshots);
        Assert.Equal(0, covariance.DegreesOfFreedom);
    }

    private static ComplexMatrix Copy(ExponentialCovariance covariance)
    {
        var s = new ComplexMatrix(covariance.Channels, covariance.Channels);
        covariance.CopyBin(0, s);
        return s;
    }
}
