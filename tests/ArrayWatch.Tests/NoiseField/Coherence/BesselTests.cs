using ArrayWatch.NoiseField.Coherence;
using ArrayWatch.Tests.Signals.Statistics;
using CsCheck;
using MathNet.Numerics;

namespace ArrayWatch.Tests.NoiseField.Coherence;

public sealed class BesselTests
{
    // Abramowitz and Stegun (1964), Table 9.1, digits as recomputed in 30-digit arithmetic.
    [Theory]
    [InlineData(0, 1)]
    [InlineData(0.5, 0.938469807240813)]
    [InlineData(1, 0.765197686557966551)]
    [InlineData(2, 0.223890779141235668)]
    [InlineData(3, -0.260051954901934)]
    [InlineData(5, -0.177596771314338)]
    [InlineData(10, -0.245935764451348)]
    [InlineData(Math.PI, -0.304242177644094)]
    public void Order_zero_agrees_with_the_table(double x, double expected) => Assert.Equal(expected, Bessel.J0(x), 1e-13);

    // Abramowitz and Stegun (1964), Table 9.5.
    [Theory]
    [InlineData(2.404825557695773)]
    [InlineData(5.520078110286311)]
    [InlineData(8.653727912911012)]
    public void Order_zero_vanishes_at_its_zeros(double zero) => Assert.Equal(0, Bessel.J0(zero), 1e-14);

    [Fact]
    public void Both_orders_agree_with_an_independent_routine()
        => Gen.Double[-3000, 3000].Always(
            1,
            2000,
            x =>
            {
                Assert.Equal(SpecialFunctions.BesselJ(0, Math.Abs(x)), Bessel.J0(x), 1e-13);
                Assert.Equal(Math.Sign(x) * SpecialFunctions.BesselJ(1, Math.Abs(x)), Bessel.J1(x), 1e-13);
            });

    [Fact]
    public void The_two_methods_meet_at_their_switch()
    {
        foreach (double x in new[] { 24.999999, 25.0, 25.000001 })
        {
            Assert.Equal(SpecialFunctions.BesselJ(0, x), Bessel.J0(x), 1e-14);
            Assert.Equal(SpecialFunctions.BesselJ(1, x), Bessel.J1(x), 1e-14);
        }
    }

    [Fact]
    public void Edges_are_as_documented()
    {
        Assert.True(double.IsNaN(Bessel.J0(double.NaN)));
        Assert.True(double.IsNaN(Bessel.J1(double.NaN)));
        Assert.Equal(0, Bessel.J0(double.NegativeInfinity));
        Assert.Equal(0, Bessel.J1(double.PositiveInfinity));
        Assert.Equal(0, Bessel.J1(0));
    }
}
