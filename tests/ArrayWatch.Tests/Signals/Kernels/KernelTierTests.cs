using ArrayWatch.Signals.Kernels;

namespace ArrayWatch.Tests.Signals.Kernels;

[Trait("Category", "Kernels")]
public sealed class KernelTierTests
{
    /// <summary>A run that switches instruction sets off names the tier it means to test.</summary>
    [Fact]
    public void The_tier_that_is_expected_is_the_tier_that_runs()
    {
        string? expected = Environment.GetEnvironmentVariable("ARRAYWATCH_EXPECT_TIER");
        Assert.Equal(string.IsNullOrEmpty(expected) ? KernelTiers.Best : Tiers.Parse(expected), KernelTiers.Best);
    }

    [Fact]
    public void The_scalar_tier_is_always_there()
    {
        Assert.Equal(KernelTier.Scalar, Enum.GetValues<KernelTier>().Min());
        Assert.Contains(nameof(KernelTier.Scalar), Tiers.Available().Select(row => row.Data));
    }
}
