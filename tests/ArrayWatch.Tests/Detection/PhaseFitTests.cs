using ArrayWatch.Detection.Fitting;

namespace ArrayWatch.Tests.Detection;

/// <summary>Each law of phase over frequency is told from the others. Noise of 1°, start value fixed.</summary>
public sealed class PhaseFitTests
{
    private static readonly double[] Frequencies = [150, 225, 300, 375, 450, 525, 600, 675, 750, 825, 900, 950];

    [Theory]
    [InlineData(0, 0, PhaseLaw.None)]
    [InlineData(40, 0, PhaseLaw.Constant)]
    [InlineData(-25, 0, PhaseLaw.Constant)]
    [InlineData(180, 0, PhaseLaw.Reversed)]
    [InlineData(0, 200, PhaseLaw.Delay)]
    [InlineData(0, -1500, PhaseLaw.Delay)]
    [InlineData(60, 300, PhaseLaw.Both)]
    internal void The_law_is_told(double degrees, double microseconds, PhaseLaw law)
    {
        Random random = new(7);
        double[] phases = [.. Frequencies.Select(f => Math.IEEERemainder(
            (degrees * Math.PI / 180) - (2 * Math.PI * f * microseconds * 1e-6) + (0.0175 * (random.NextDouble() + random.NextDouble() - 1) * 2.4), 2 * Math.PI))];
        PhaseFit fit = new(Frequencies, phases, [.. Frequencies.Select(_ => 0.0175)]);
        Assert.Equal(law, fit.Law);
        if (law == PhaseLaw.Delay) Assert.InRange(1e6 * fit.DelaySeconds, microseconds - 5, microseconds + 5);
        if (law == PhaseLaw.Constant) Assert.InRange(fit.ConstantRadians * 180 / Math.PI, degrees - 1.5, degrees + 1.5);
    }

    [Fact]
    public void A_bin_gone_astray_does_not_rule()
    {
        double[] phases = [.. Frequencies.Select(f => -2 * Math.PI * f * 100e-6)];
        phases[4] = 2.5;
        PhaseFit fit = new(Frequencies, phases, [.. Frequencies.Select(_ => 0.02)]);
        Assert.Equal(PhaseLaw.Delay, fit.Law);
        Assert.InRange(1e6 * fit.DelaySeconds, 95, 105);
    }
}
