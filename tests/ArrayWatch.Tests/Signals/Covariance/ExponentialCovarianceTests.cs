using System.Numerics;
using ArrayWatch.Signals.Covariance;
using ArrayWatch.Signals.LinearAlgebra;
using ArrayWatch.Tests.Signals.Kernels;
using CsCheck;

namespace ArrayWatch.Tests.Signals.Covariance;

[Trait("Category", "Kernels")]
public sealed class ExponentialCovarianceTests
{
    private static readonly TimeSpan s_memory = TimeSpan.FromSeconds(10);

    [Theory]
    [MemberData(nameof(Tiers.Available), MemberType = typeof(Tiers))]
    public void Recursive_is_the_explicit_weighted_sum(string tier)
    {
        var random = new Random(20261230);
        for (int channels = 1; channels <= 67; channels += 3)
        {
            int snapshots = 1 + (channels * 29 % 140), bins = 2, stride = 2 * bins * channels;
            float[] data = WeightedSum.Noise(random, snapshots * stride);
            var covariance = new ExponentialCovariance(channels, bins, s_memory, conjugatePhase: false, Tiers.Parse(tier));
            for (int k = 0; k < snapshots;)
            {
                int block = Math.Min(snapshots - k, 1 + random.Next(70));
                Assert.Equal(0, covariance.Fold(data.AsSpan(k * stride, block * stride), block, 0.5, 0));
                k += block;
            }

            double[] weights = WeightedSum.Exponential(Math.Exp(-0.05), snapshots);
            for (int bin = 0; bin < bins; bin++)
                Assert.InRange(WeightedSum.Difference(Copy(covariance, bin), WeightedSum.Estimate(data, weights, bins, channels, bin)), 0, 3e-6);
            Assert.Equal(snapshots, covariance.Snapshots);
        }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(8)]
    [InlineData(64)]
    [InlineData(65)]
    [InlineData(200)]
    public void Block_size_and_reading_in_between_make_no_difference(int block)
    {
        const int Channels = 20, Snapshots = 200;
        float[] data = WeightedSum.Noise(new Random(20261231), Snapshots * 2 * Channels);
        var covariance = new ExponentialCovariance(Channels, 1, s_memory);
        for (int k = 0; k < Snapshots; k += block)
        {
            int now = Math.Min(block, Snapshots - k);
            covariance.Fold(data.AsSpan(k * 2 * Channels, now * 2 * Channels), now, 0.2, 0);
            if (k % 3 == 0) Copy(covariance, 0);
        }

        ComplexMatrix expected = WeightedSum.Estimate(data, WeightedSum.Exponential(Math.Exp(-0.02), Snapshots), 1, Channels, 0);
        Assert.InRange(WeightedSum.Difference(Copy(covariance, 0), expected), 0, 3e-6);
    }

    [Theory]
    [InlineData(1e-3)]
    [InlineData(3)]
    [InlineData(12)]
    [InlineData(40)]
    [InlineData(5000)]
    public void Any_ratio_of_interval_to_memory_works(double memories)
    {
        const int Channels = 5, Snapshots = 70;
        float[] data = WeightedSum.Noise(new Random(20270101), Snapshots * 2 * Channels);
        var covariance = new ExponentialCovariance(Channels, 1, s_memory);
        covariance.Fold(data, Snapshots, memories * s_memory.TotalSeconds, 0);

        ComplexMatrix expected = WeightedSum.Estimate(data, WeightedSum.Exponential(Math.Exp(-memories), Snapshots), 1, Channels, 0);
        Assert.InRange(WeightedSum.Difference(Copy(covariance, 0), expected), 0, 3e-6);
    }

    [Fact]
    public void A_snapshot_that_is_not_finite_is_left_out_and_counts_against_its_channels()
    {
        const int Channels = 6, Bins = 3, Snapshots = 9, Stride = 2 * Bins * Channels;
        float[] data = WeightedSum.Noise(new Random(20270102), Snapshots * Stride), spoilt = [.. data];
        spoilt[(2 * Stride) + (2 * Channels) + (2 * 4)] = float.NaN;
        spoilt[(2 * Stride) + (4 * Channels) + (2 * 4) + 1] = float.PositiveInfinity;
        spoilt[(7 * Stride) + (2 * 1)] = float.NegativeInfinity;
        var covariance = new ExponentialCovariance(Channels, Bins, s_memory);

        Assert.Equal(2, covariance.Fold(spoilt, Snapshots, 0.5, 0));

        Assert.Equal([0L, 1, 0, 0, 1, 0], covariance.NonFiniteSnapshots.ToArray());
        Assert.Equal(7, covariance.Snapshots);
        double[] weights = WeightedSum.Exponential(Math.Exp(-0.05), Snapshots);
        weights[2] = weights[7] = 0;
        Assert.InRange(WeightedSum.Difference(Copy(covariance, 1), WeightedSum.Estimate(data, weights, Bins, Channels, 1)), 0, 2e-6);
        Assert.Equal(weights.Sum() * weights.Sum() / weights.Sum(w => w * w), covariance.DegreesOfFreedom, 1e-9);
    }

    [Fact]
    public void Weights_of_snapshots_count()
    {
        const int Channels = 4, Snapshots = 40;
        float[] data = WeightedSum.Noise(new Random(20270103), Snapshots * 2 * Channels);
        double[] factors = [.. Enumerable.Range(0, Snapshots).Select(k => k % 4 / 3.0)];
        var covariance = new ExponentialCovariance(Channels, 1, s_memory);
        covariance.Fold(data, Snapshots, 0.5, 0, factors);

        double[] weights = [.. WeightedSum.Exponential(Math.Exp(-0.05), Snapshots).Zip(factors, (w, f) => w * f)];
        Assert.InRange(WeightedSum.Difference(Copy(covariance, 0), WeightedSum.Estimate(data, weights, 1, Channels, 0)), 0, 2e-6);
        Assert.Equal(weights.Sum() * weights.Sum() / weights.Sum(w => w * w), covariance.DegreesOfFreedom, 1e-9);
        Assert.Equal(30, covariance.Snapshots);
    }

    [Fact]
    public void The_other_phase_convention_is_the_conjugate()
    {
        float[] data = WeightedSum.Noise(new Random(20270104), 10 * 2 * 19);
        ExponentialCovariance direct = new(19, 1, s_memory), other = new(19, 1, s_memory, conjugatePhase: true);
        direct.Fold(data, 10, 0.5, 0);
        other.Fold(data, 10, 0.5, 0);
        ComplexMatrix s = Copy(direct, 0), conjugate = Copy(other, 0);
        for (int i = 0; i < s.Re.Length; i++) s.Im[i] = -s.Im[i];
        Assert.InRange(WeightedSum.Difference(conjugate, s), 0, 1e-6);
    }

    [Fact]
    public void Estimates_are_Hermitian_and_positive()
    {
        Gen.Select(Gen.Int[1, 40], Gen.Int[1, 80], Gen.Int[0, 1 << 30]).Sample(
            (channels, snapshots, start) =>
            {
                float[] data = WeightedSum.Noise(new Random(start), snapshots * 2 * channels);
                var covariance = new ExponentialCovariance(channels, 1, s_memory);
                covariance.Fold(data, snapshots, 0.5, 0);
                ComplexMatrix s = Copy(covariance, 0), loaded = new(channels, channels);
                loaded.CopyFrom(s);
                double trace = 0;
                for (int l = 0; l < channels; l++)
                {
                    trace += s[l, l].Real;
                    for (int m = 0; m < channels; m++)
                    {
                        if (s[l, m] != Complex.Conjugate(s[m, l])) return false;
                    }
                }

                // Positive but for the rounding of single precision: 10⁻⁶ of the trace on the diagonal mends it.
                for (int l = 0; l < channels; l++) loaded[l, l] += 1e-6 * trace;
                return Hermitian.TryInvert(loaded, new ComplexMatrix(channels, channels), out _);
            },
            iter: 60,
            seed: "0000KOIPe743");
    }

    [Fact]
    public void A_linear_map_of_the_data_maps_the_estimate_on_both_sides()
    {
        Gen.Select(Gen.Int[1, 24], Gen.Int[1, 70], Gen.Int[0, 1 << 30]).Sample(
            (channels, snapshots, start) =>
            {
                var random = new Random(start);
                float[] data = WeightedSum.Noise(random, snapshots * 2 * channels), mapped = new float[data.Length];
                var a = new ComplexMatrix(channels, channels);
                for (int i = 0; i < a.Re.Length; i++) (a.Re[i], a.Im[i]) = (WeightedSum.Gaussian(random), WeightedSum.Gaussian(random));
                for (int k = 0; k < snapshots; k++)
                {
                    for (int l = 0; l < channels; l++)
                    {
                        Complex sum = 0;
                        for (int m = 0; m < channels; m++) sum += a[l, m] * new Complex(data[2 * ((k * channels) + m)], data[(2 * ((k * channels) + m)) + 1]);
                        (mapped[2 * ((k * channels) + l)], mapped[(2 * ((k * channels) + l)) + 1]) = ((float)sum.Real, (float)sum.Imaginary);
                    }
                }

                ExponentialCovariance before = new(channels, 1, s_memory), after = new(channels, 1, s_memory);
                before.Fold(data, snapshots, 0.5, 0);
                after.Fold(mapped, snapshots, 0.5, 0);
                ComplexMatrix left = new(channels, channels), expected = new(channels, channels);
                Products.Multiply(a, Copy(before, 0), left);
                Products.MultiplyConjugateTranspose(left, a, expected);

                // Cancellation in A S Aᴴ can cost an order or two of the 10⁻⁶ that single precision gives.
                return WeightedSum.Difference(Copy(after, 0), expected) < 3e-4;
            },
            iter: 60,
            seed: "0000KOIPe743");
    }

    private static ComplexMatrix Copy(ExponentialCovariance covariance, int bin)
    {
        var s = new ComplexMatrix(covariance.Channels, covariance.Channels);
        covariance.CopyBin(bin, s);
        return s;
    }
}
