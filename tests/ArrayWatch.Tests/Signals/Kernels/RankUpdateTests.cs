using ArrayWatch.Signals.Kernels;

namespace ArrayWatch.Tests.Signals.Kernels;

[Trait("Category", "Kernels")]
public sealed unsafe class RankUpdateTests
{
    private static readonly int[] s_depths = [0, 1, 2, 3, 5, 7, 8, 9, 15, 16, 17, 31, 32, 33, 48, 63, 64];

    [Theory]
    [MemberData(nameof(Tiers.Available), MemberType = typeof(Tiers))]
    public void Every_tier_is_the_weighted_sum_at_every_size(string tier)
    {
        for (int channels = 1; channels <= 67; channels++)
        {
            for (int d = 0; d < 4; d++) Check(Tiers.Parse(tier), channels, s_depths[((channels * 4) + d) % s_depths.Length], 0.75f, 0.5f);
        }
    }

    [Theory]
    [MemberData(nameof(Tiers.Available), MemberType = typeof(Tiers))]
    public void Every_tier_is_the_weighted_sum_at_every_depth(string tier)
    {
        for (int depth = 0; depth <= RankUpdate.MaximumDepth; depth++) Check(Tiers.Parse(tier), 50, depth, 0.9f, 1);
    }

    [Theory]
    [MemberData(nameof(Tiers.Available), MemberType = typeof(Tiers))]
    public void Zeros_stay_zeros(string tier)
    {
        using var sum = new GuardedFloats((int)RankUpdate.TileOffset(4, 0), 0);
        using var packed = new GuardedFloats(4 * RankUpdate.PackedPanelLength, 0);
        RankUpdate.Apply(Tiers.Parse(tier), sum.Start, packed.Start, 4, 64, 0.5f, 1);
        Assert.Equal(-1, sum.Values.IndexOfAnyExcept(0f));
    }

    [Theory]
    [MemberData(nameof(Tiers.Available), MemberType = typeof(Tiers))]
    public void Every_tier_packs_the_same_bits_whatever_the_alignment(string tier)
    {
        var random = new Random(20261220);
        for (int channels = 1; channels <= 67; channels++)
        {
            float[] data = [.. Enumerable.Range(0, (2 * channels) + 3).Select(_ => random.NextSingle() - 0.5f)];
            int panels = RankUpdate.Panels(channels);
            using var packed = new GuardedFloats(panels * RankUpdate.PackedPanelLength, float.NaN);
            bool conjugate = channels % 2 == 0;
            fixed (float* x = data) SnapshotPack.Append(Tiers.Parse(tier), x + (channels % 4), channels, 0.375f, conjugate, packed.Start + (5 * RankUpdate.PackedLength));
            packed.CheckGuards();
            for (int n = 0; n < 16 * panels; n++)
            {
                int at = ((n / 16) * RankUpdate.PackedPanelLength) + (5 * RankUpdate.PackedLength) + (n % 16);
                float re = n < channels ? 0.375f * data[(channels % 4) + (2 * n)] : 0;
                float im = n < channels ? (conjugate ? -0.375f : 0.375f) * data[(channels % 4) + (2 * n) + 1] : 0;
                Assert.Equal(re, packed.Values[at]);
                Assert.Equal(im, packed.Values[at + 16]);
                Assert.Equal(re - im, packed.Values[at + 32]);
            }
        }
    }

    [Theory]
    [InlineData(0, 0)]
    [InlineData(1, 7)]
    [InlineData(67, 66)]
    [InlineData(131, 40)]
    public void The_peak_is_exact_and_a_value_that_is_not_finite_makes_it_NaN(int length, int at)
    {
        float[] values = [.. Enumerable.Range(0, length).Select(i => MathF.Sin(i) * MathF.Pow(10, (i % 20) - 10))];
        Assert.Equal(values.Select(MathF.Abs).DefaultIfEmpty().Max(), PeakScan.Peak(values));
        if (at >= length) return;
        foreach (float bad in (float[])[float.NaN, -float.NaN, float.PositiveInfinity, float.NegativeInfinity])
        {
            float[] spoilt = [.. values];
            spoilt[at] = bad;
            Assert.True(float.IsNaN(PeakScan.Peak(spoilt)));
        }
    }

    /// <summary>Against the sum in double precision; the bound is the kernel's own, 2⁻²⁴ (K + 4) times three, relative to √(S_ll S_mm).</summary>
    private static void Check(KernelTier tier, int channels, int depth, float keep, float gain)
    {
        var random = new Random((100 * channels) + depth);
        int panels = RankUpdate.Panels(channels);
        using var sum = new GuardedFloats((int)RankUpdate.TileOffset(panels, 0), 0.25f);
        using var packed = new GuardedFloats(panels * RankUpdate.PackedPanelLength, 0);
        float[] x = new float[2 * channels * Math.Max(1, depth)];
        for (int i = 0; i < x.Length; i++) x[i] = random.NextSingle() - 0.5f;
        fixed (float* start = x)
        {
            for (int k = 0; k < depth; k++) SnapshotPack.Append(KernelTier.Scalar, start + (2 * channels * k), channels, 1, false, packed.Start + (k * RankUpdate.PackedLength));
        }

        RankUpdate.Apply(tier, sum.Start, packed.Start, panels, depth, keep, gain);

        sum.CheckGuards();
        packed.CheckGuards();
        double tolerance = 3 * Math.ScaleB(1, -24) * (depth + 4) * ((gain * depth / 3.0) + 1);
        for (int l = 0; l < channels; l++)
        {
            for (int m = 0; m <= l; m++)
            {
                double re = keep * 0.25, im = keep * 0.25;
                for (int k = 0; k < depth; k++)
                {
                    int a = 2 * ((k * channels) + l), b = 2 * ((k * channels) + m);
                    re += gain * (((double)x[a] * x[b]) + ((double)x[a + 1] * x[b + 1]));
                    im += gain * (((double)x[a + 1] * x[b]) - ((double)x[a] * x[b + 1]));
                }

                float* at = sum.Start + RankUpdate.TileOffset(l / 16, m / 16) + (m % 16 * RankUpdate.ColumnLength) + (l % 16);
                Assert.InRange(at[0] - re, -tolerance, tolerance);
                Assert.InRange(at[16] - im, -tolerance, tolerance);
            }
        }
    }
}
